import { createHash } from 'node:crypto';
import { and, asc, count, desc, eq, inArray, sql } from 'drizzle-orm';
import type { LiveLayout, LiveState, LiveVersion } from '@/api-types/live';
import {
  commentReads,
  comments,
  drafts,
  layouts,
  people,
  projects,
  siteEntries,
  versions,
} from '@/db/schema';
import { standingChoices } from './choices';
import type { Db } from './database';
import { done, notFound, type Outcome } from './outcomes';
import { mayDraft, type Actor } from './permissions';
import { presentAt } from './presence';
import { siteKindsSeen } from './site/site-version';
import { byCreator, versionState } from './version-rows';
import { layoutSeen, projectSeen, versionSeen } from './visibility';

interface Remarks {
  readonly comments: number;
  readonly unread: number;
  readonly stamp: string;
}

/** Comments on each version: how many, how many not read, and a stamp that moves with each and with each settling. */
const remarksOf = async (
  db: Db,
  actor: Actor,
  layoutIds: readonly string[],
): Promise<Map<string, Remarks>> => {
  const rows = await db
    .select({
      versionId: comments.versionId,
      n: count(),
      resolved: sql<number>`count(${comments.resolvedAt})::int`,
      last: sql<string>`greatest(max(${comments.at}), max(${comments.resolvedAt}))::text`,
      unread: sql<number>`(count(*) filter (where ${comments.personId} <> ${actor.personId}
        and (${commentReads.readAt} is null or ${comments.at} > ${commentReads.readAt})))::int`,
    })
    .from(comments)
    .leftJoin(
      commentReads,
      and(
        eq(commentReads.firmId, comments.firmId),
        eq(commentReads.personId, actor.personId),
        eq(commentReads.threadId, comments.threadId),
      ),
    )
    .where(and(eq(comments.firmId, actor.firmId), inArray(comments.layoutId, [...layoutIds])))
    .groupBy(comments.versionId);
  return new Map(
    rows.map(({ versionId, n, resolved, last, unread }) => [
      versionId,
      { comments: n, unread, stamp: `${n}/${resolved}/${last}` },
    ]),
  );
};

const stampOf = (value: unknown): string =>
  createHash('sha256').update(JSON.stringify(value)).digest('hex').slice(0, 20);

/** How a project stands for the actor: its drafts, versions, comments and who is at the drafting table. */
export const liveState = async (
  db: Db,
  actor: Actor,
  projectId: string,
): Promise<Outcome<LiveState>> => {
  const [project] = await db
    .select({ id: projects.id })
    .from(projects)
    .where(and(projectSeen(actor), eq(projects.id, projectId)));
  if (!project) return notFound('project');
  const own = await db
    .select({
      id: layouts.id,
      name: layouts.name,
      revision: drafts.revision,
      updatedAt: drafts.updatedAt,
      savedBy: { id: people.id, name: people.name },
    })
    .from(layouts)
    .innerJoin(drafts, and(eq(drafts.firmId, layouts.firmId), eq(drafts.layoutId, layouts.id)))
    .innerJoin(people, eq(people.id, drafts.updatedBy))
    .where(and(layoutSeen(actor), eq(layouts.projectId, projectId)))
    .orderBy(asc(layouts.createdAt), asc(layouts.id));
  const ids = own.map(({ id }) => id);
  const rows =
    ids.length === 0
      ? []
      : await db
          .select({
            id: versions.id,
            layoutId: versions.layoutId,
            number: versions.number,
            state: versionState,
            siteEntries: sql<number>`(select count(*) from ${siteEntries}
              where ${siteEntries.firmId} = ${versions.firmId}
              and ${siteEntries.versionId} = ${versions.id}
              and ${inArray(siteEntries.kind, siteKindsSeen(actor))})`.mapWith(Number),
          })
          .from(versions)
          .innerJoin(people, byCreator)
          .where(and(versionSeen(actor), inArray(versions.layoutId, ids)))
          .orderBy(desc(versions.number));
  const remarks = ids.length === 0 ? new Map<string, Remarks>() : await remarksOf(db, actor, ids);
  const drafting = mayDraft(actor.role);
  const present = drafting ? await presentAt(db, actor, ids) : [];
  const all = own.map(({ id, name, revision, updatedAt, savedBy }): LiveLayout => ({
    id,
    name,
    draft: drafting ? { revision, savedAt: updatedAt.toISOString(), savedBy } : null,
    versions: rows
      .filter(({ layoutId }) => layoutId === id)
      .map(({ id, number, state, siteEntries }): LiveVersion => {
        const said = remarks.get(id);
        return {
          id,
          number,
          state,
          comments: said?.comments ?? 0,
          unread: said?.unread ?? 0,
          commentsStamp: said?.stamp ?? '',
          siteEntries,
        };
      }),
    present: present
      .filter(({ layoutId }) => layoutId === id)
      .map(({ person, editing }) => ({ person, editing })),
  }));
  const picked = await standingChoices(db, actor.firmId, projectId);
  return done({ projectId, stamp: stampOf([all, picked]), layouts: all, choices: picked });
};
