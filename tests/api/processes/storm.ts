import { isNull } from 'drizzle-orm';
import { outbox } from '@/db/schema';
import { database, theDatabase } from '@/server/database';
import { COURT_CHEQUER } from '@/server/demo-layouts';
import { openDraft, saveDraft } from '@/server/drafts';
import { postLetter } from '@/server/mail/outbox';
import { letterSender, SENDER_SETTINGS } from '@/server/mail/sender';
import { smtpPost } from '@/server/mail/smtp-post';
import { SMTP_PATIENCE } from '@/server/mail/smtp-settings';
import type { Actor } from '@/server/permissions';
import { saveVersion } from '@/server/versions';

/**
 * One of several servers on one PostgreSQL: saves drafts and versions of one layout as fast as it can, writes
 * letters and sends whatever letters are due, its own and others'. Prints what was answered, a line of JSON each.
 */
const [layoutId, actorJson, mark, times, smtpUrl] = process.argv.slice(2);
const actor = JSON.parse(actorJson) as Actor;
const db = await database();

const say = (line: Record<string, unknown>) => process.stdout.write(`${JSON.stringify(line)}\n`);

const sender = letterSender(
  db,
  smtpPost({ url: smtpUrl, from: 'Evenlay <floors@firm.example>', ...SMTP_PATIENCE }),
  { ...SENDER_SETTINGS, restMs: 5 },
);

process.stdin.once('data', async () => {
  sender.start();
  for (let n = 0; n < Number(times); n += 1) {
    const opened = await openDraft(db, actor, layoutId);
    if (!opened.ok) throw new Error(JSON.stringify(opened));
    const { revision } = opened.value;
    // Told apart by who wrote it and the how-manieth it was.
    const document = {
      ...COURT_CHEQUER,
      placement: { ...COURT_CHEQUER.placement, origin: [Number(mark), n] as [number, number] },
    };
    const saved = await saveDraft(db, actor, layoutId, { baseRevision: revision, document });
    say(
      saved.ok
        ? { kind: 'saved', revision: saved.value.revision, origin: document.placement.origin }
        : { kind: saved.kind, origin: document.placement.origin },
    );
    if (saved.ok) {
      const version = await saveVersion(db, actor, layoutId, {
        baseRevision: saved.value.revision,
        label: `${mark}-${n}`,
        note: '',
      });
      say(
        version.ok
          ? { kind: 'version', number: version.value.number, origin: document.placement.origin }
          : { kind: `version ${version.kind}` },
      );
    }
    const subject = `Letter ${mark}-${n}`;
    await db.transaction((tx) =>
      postLetter(
        tx,
        { to: 'wren@firm.example', firmId: actor.firmId },
        { kind: 'test', subject, blocks: [], why: 'A letter of a test.' },
      ),
    );
    say({ kind: 'posted', subject });
  }
  for (;;) {
    const waiting = await db.$count(outbox, isNull(outbox.sentAt));
    if (waiting === 0) break;
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
  await sender.stop();
  await (await theDatabase()).close();
  process.exit(0);
});
process.stdout.write('ready\n');
