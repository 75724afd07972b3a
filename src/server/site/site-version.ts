import { and, asc, desc, eq, sql } from 'drizzle-orm';
import type { Superseding } from '@/api-types/site';
import { people, versionEvents, versions } from '@/db/schema';
import type { SiteEntryKind } from '@/paving/site/site-entry';
import type { Db } from '../database';
import { notAllowed, notFound, done, type Outcome, type Refusal } from '../outcomes';
import { permissions, type Actor } from '../permissions';
import { seenVersion, type SeenVersion } from '../seen-version';
import { versionState } from '../version-rows';

const mayEnter = ({ role }: Actor): boolean =>
  permissions['check measurements, course progress'][role] === 'enter';

/** The kinds of entries that an actor is shown: clients see how it goes, not the crew's words and photos. */
export const siteKindsSeen = (actor: Actor): SiteEntryKind[] =>
  mayEnter(actor) ? ['course', 'check', 'note', 'photo', 'proposal'] : ['course', 'check'];

/** Asked only after what it is about was found to be seen. */
export const refuseUnlessEntering = (actor: Actor): Refusal | null =>
  mayEnter(actor)
    ? null
    : notAllowed(
        'Only the crew and the firm write down what is done on site. You see how it goes.',
      );

/** When, by whom and with what words a version was issued. */
export interface Issue {
  readonly at: Date;
  readonly note: string;
  readonly by: { readonly id: string; readonly name: string };
}

/** When a version was issued, by whom; undefined when it never was. */
const issueOf = async (db: Db, actor: Actor, versionId: string): Promise<Issue | undefined> =>
  (
    await db
      .select({
        at: versionEvents.at,
        note: versionEvents.note,
        by: { id: people.id, name: people.name },
      })
      .from(versionEvents)
      .innerJoin(people, eq(people.id, versionEvents.personId))
      .where(
        and(
          eq(versionEvents.firmId, actor.firmId),
          eq(versionEvents.versionId, versionId),
          eq(versionEvents.kind, 'issued'),
        ),
      )
      .orderBy(desc(versionEvents.place))
      .limit(1)
  )[0];

/** The version that is issued in the place of one that is superseded. */
export const supersedingOf = async (
  db: Db,
  actor: Actor,
  { id, layoutId, state }: Pick<SeenVersion, 'id' | 'layoutId' | 'state'>,
): Promise<Superseding | null> => {
  if (state !== 'superseded') return null;
  const [row] = await db
    .select({ id: versions.id, number: versions.number, at: versionEvents.at })
    .from(versions)
    .innerJoin(
      versionEvents,
      and(
        eq(versionEvents.firmId, versions.firmId),
        eq(versionEvents.versionId, versions.id),
        eq(versionEvents.kind, 'issued'),
      ),
    )
    .where(
      and(
        eq(versions.firmId, actor.firmId),
        eq(versions.layoutId, layoutId),
        sql`${versions.id} <> ${id}`,
        eq(versionState, 'issued'),
      ),
    )
    .orderBy(asc(versionEvents.at))
    .limit(1);
  return row ? { id: row.id, number: row.number, at: row.at.toISOString() } : null;
};

/** A version that the actor sees and that is or was issued, and may build from. */
export const siteVersion = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<{ readonly version: SeenVersion; readonly issue: Issue }>> => {
  const version = await seenVersion(db, actor, id);
  if (!version) return notFound('version');
  const refusal = refuseUnlessEntering(actor);
  if (refusal) return refusal;
  const issue = await issueOf(db, actor, id);
  return issue ? done({ version, issue }) : notFound('issued version');
};
