import { isNull } from 'drizzle-orm';
import { outbox } from '@/db/schema';
import { database, theDatabase } from '@/server/database';
import { COURT_CHEQUER } from '@/server/demo-layouts';
import { acceptVersion, openAgreement, shareVersion } from '@/server/agreement';
import { openDraft, saveDraft } from '@/server/drafts';
import { postLetter } from '@/server/mail/outbox';
import { letterSender, SENDER_SETTINGS } from '@/server/mail/sender';
import { smtpPost } from '@/server/mail/smtp-post';
import { SMTP_PATIENCE } from '@/server/mail/smtp-settings';
import type { Actor } from '@/server/permissions';
import { listVersions, saveVersion } from '@/server/versions';

/**
 * One of several servers on one PostgreSQL: saves drafts and versions of one layout as fast as it can, shares
 * them, accepts for the client whatever is shared, its own and others', writes letters and sends whatever letters are due, its own and others'. Prints what was answered, a line of JSON each.
 */
const [layoutId, actorJson, clientJson, mark, times, smtpUrl] = process.argv.slice(2);
const actor = JSON.parse(actorJson) as Actor;
const client = JSON.parse(clientJson) as Actor;
const db = await database();

const say = (line: Record<string, unknown>) => process.stdout.write(`${JSON.stringify(line)}\n`);

const sender = letterSender(
  db,
  smtpPost({ url: smtpUrl, from: 'Evenlay <floors@firm.example>', ...SMTP_PATIENCE }),
  { ...SENDER_SETTINGS, restMs: 5 },
);

/** Accepts all that is shared with the client; another server is at the same ones. */
const acceptAll = async () => {
  const list = await listVersions(db, client, layoutId);
  // Before anything is shared the client sees no layout.
  if (!list.ok) return;
  for (const { id } of list.value.filter(({ state }) => state === 'shared')) {
    const shown = await openAgreement(db, client, id);
    if (!shown.ok) throw new Error(JSON.stringify(shown));
    const { fingerprint, terms } = shown.value;
    const accepted = await acceptVersion(db, client, id, {
      typedName: 'Client',
      fingerprint,
      terms,
      note: '',
    });
    say({ kind: accepted.ok ? 'accepted' : 'accept refused', version: id });
  }
};

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
      if (version.ok) await shareVersion(db, actor, version.value.id, { note: '' });
      await acceptAll();
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
