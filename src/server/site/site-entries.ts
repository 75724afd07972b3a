import { and, asc, eq, inArray } from 'drizzle-orm';
import type { z } from 'zod';
import type { EntriesKept, SiteEntry, siteEntriesSchema, SiteStanding } from '@/api-types/site';
import { people, siteEntries, versions } from '@/db/schema';
import type { LayoutDocument } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';
import type { SiteEntryContent } from '@/paving/site/site-entry';
import type { Db } from '../database';
import { done, notAllowed, notFound, type Outcome, type Refusal } from '../outcomes';
import type { Actor } from '../permissions';
import { seenVersion } from '../seen-version';
import { postProposalLetters } from './proposal-letters';
import { siteKindsSeen, siteVersion, supersedingOf } from './site-version';
import { versionSetOut } from './version-set-out';

type Batch = z.output<typeof siteEntriesSchema>;
type Sent = Batch['entries'][number];

/** Entries are written down under the name of whoever made them, or not at all. */
export const refuseUnlessMadeBy = (actor: Actor, by: string): Refusal | null =>
  by === actor.personId
    ? null
    : notAllowed(
        'These were written down by somebody else. They are sent when that person signs in.',
      );

const documentOf = async (db: Db, actor: Actor, versionId: string): Promise<LayoutDocument> =>
  (
    await db
      .select({ document: versions.document })
      .from(versions)
      .where(and(eq(versions.firmId, actor.firmId), eq(versions.id, versionId)))
  )[0].document;

/** Why an entry cannot be kept for a version; null when it can. */
const faultOf = (
  content: SiteEntryContent,
  versionId: string,
  document: LayoutDocument,
): string | null => {
  switch (content.kind) {
    case 'course': {
      const { courses } = versionSetOut(versionId, document);
      return content.course <= courses
        ? null
        : `There is no course ${content.course} on this floor; it has ${courses}.`;
    }
    case 'check':
      return versionSetOut(versionId, document).hasCheck(content.check)
        ? null
        : 'This check is not on the list of this version.';
    case 'photo':
      return 'A photo is sent with its image.';
    case 'proposal': {
      const parsed = parseLayoutDocument(content.document);
      return parsed.ok ? null : `The floor proposed cannot be laid: ${parsed.problems[0].message}`;
    }
    default:
      return null;
  }
};

/** Puts an entry in, unless it is there already; whether it is this person's and this version's now. */
export const putEntry = async (
  tx: Db,
  actor: Actor,
  versionId: string,
  device: string,
  entry: Sent,
): Promise<'new' | 'there' | 'taken'> => {
  const put = await tx
    .insert(siteEntries)
    .values({
      firmId: actor.firmId,
      id: entry.id,
      versionId,
      device,
      place: entry.place,
      kind: entry.content.kind,
      content: entry.content,
      personId: actor.personId,
      madeAt: new Date(entry.madeAt),
      // The clock, not the transaction's start: entries of one batch keep their order.
      receivedAt: new Date(),
    })
    .onConflictDoNothing()
    .returning({ id: siteEntries.id });
  if (put.length > 0) return 'new';
  const [there] = await tx
    .select({ versionId: siteEntries.versionId, personId: siteEntries.personId })
    .from(siteEntries)
    .where(and(eq(siteEntries.firmId, actor.firmId), eq(siteEntries.id, entry.id)));
  return there?.versionId === versionId && there.personId === actor.personId ? 'there' : 'taken';
};

/** Keeps what a phone sends, in its order and each once. What cannot be kept is refused with its reason. */
export const keepSiteEntries = async (
  db: Db,
  actor: Actor,
  versionId: string,
  { device, by, entries }: Batch,
): Promise<Outcome<EntriesKept>> => {
  const site = await siteVersion(db, actor, versionId);
  if (!site.ok) return site;
  const refusal = refuseUnlessMadeBy(actor, by);
  if (refusal) return refusal;
  const document = await documentOf(db, actor, versionId);
  return db.transaction(async (tx) => {
    const kept: string[] = [];
    const refused: { id: string; reason: string }[] = [];
    for (const entry of [...entries].sort((a, b) => a.place - b.place)) {
      const { id, content } = entry;
      const fault = faultOf(content, versionId, document);
      const put = fault === null ? await putEntry(tx, actor, versionId, device, entry) : null;
      if (put === null) refused.push({ id, reason: fault! });
      else if (put === 'taken')
        refused.push({
          id,
          reason: 'This was written down before with other words. Enter it again.',
        });
      else kept.push(id);
      if (put === 'new' && content.kind === 'proposal') {
        await postProposalLetters(tx, actor, site.value.version, content.text);
      }
    }
    return done({ kept, refused });
  });
};

/** Everything written down for a version, in the order of the phones it was made on. */
export const siteEntriesOf = async (
  db: Db,
  actor: Actor,
  versionId: string,
): Promise<SiteEntry[]> => {
  const rows = await db
    .select({ entry: siteEntries, by: { id: people.id, name: people.name } })
    .from(siteEntries)
    .innerJoin(people, eq(people.id, siteEntries.personId))
    .where(
      and(
        eq(siteEntries.firmId, actor.firmId),
        eq(siteEntries.versionId, versionId),
        inArray(siteEntries.kind, siteKindsSeen(actor)),
      ),
    )
    .orderBy(asc(siteEntries.device), asc(siteEntries.place), asc(siteEntries.id));
  return rows.map(({ entry, by }) => ({
    id: entry.id,
    device: entry.device,
    place: entry.place,
    madeAt: entry.madeAt.toISOString(),
    receivedAt: entry.receivedAt.toISOString(),
    by,
    content: entry.content,
  }));
};

export const siteStanding = async (
  db: Db,
  actor: Actor,
  versionId: string,
): Promise<Outcome<SiteStanding>> => {
  const version = await seenVersion(db, actor, versionId);
  if (!version) return notFound('version');
  return done({
    versionId,
    state: version.state,
    supersededBy: await supersedingOf(db, actor, version),
    entries: await siteEntriesOf(db, actor, versionId),
  });
};
