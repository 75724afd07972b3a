import { and, desc, eq, isNull, ne, or, sql } from 'drizzle-orm';
import type { Unread } from '@/api-types/comments';
import {
  commentReads,
  comments,
  layouts,
  people,
  projectPeople,
  projects,
  versions,
} from '@/db/schema';
import type { Db } from './database';
import { isPutOnProjects, type Actor } from './permissions';
import { projectSeen, versionSeen } from './visibility';

const THREADS = 50;
/** Comments looked through, newest first: who has more than this unread has not been here for a long while. */
const LOOKED_THROUGH = 200;

/**
 * Comments that the actor sees, by others, and has not read; newest first. The newest are taken first, from the actor's
 * projects, and then looked at closely: the work does not grow with what a firm has ever said.
 */
export const unreadComments = (db: Db, actor: Actor) => {
  const newest = db
    .select({
      id: comments.id,
      threadId: comments.threadId,
      versionId: comments.versionId,
      layoutId: comments.layoutId,
      projectId: comments.projectId,
      personId: comments.personId,
      body: comments.body,
      at: comments.at,
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
    .where(
      and(
        eq(comments.firmId, actor.firmId),
        ne(comments.personId, actor.personId),
        or(isNull(commentReads.readAt), sql`${comments.at} > ${commentReads.readAt}`),
        isPutOnProjects(actor.role)
          ? sql`${comments.projectId} in (select ${projectPeople.projectId} from ${projectPeople}
              where ${projectPeople.firmId} = ${actor.firmId} and ${projectPeople.personId} = ${actor.personId})`
          : undefined,
      ),
    )
    .orderBy(desc(comments.at), desc(comments.id))
    .limit(LOOKED_THROUGH)
    .as('newest');
  return db
    .select({
      id: newest.id,
      threadId: newest.threadId,
      versionId: newest.versionId,
      versionNumber: versions.number,
      layoutName: layouts.name,
      projectId: projects.id,
      projectName: projects.name,
      person: { id: people.id, name: people.name },
      body: newest.body,
      at: newest.at,
    })
    .from(newest)
    .innerJoin(versions, and(eq(versions.firmId, actor.firmId), eq(versions.id, newest.versionId)))
    .innerJoin(layouts, and(eq(layouts.firmId, actor.firmId), eq(layouts.id, newest.layoutId)))
    .innerJoin(projects, and(eq(projects.firmId, actor.firmId), eq(projects.id, newest.projectId)))
    .innerJoin(people, eq(people.id, newest.personId))
    .where(and(versionSeen(actor), projectSeen(actor)))
    .orderBy(desc(newest.at), desc(newest.id));
};

/** Threads with comments that the actor has not read, the newest of each with it; so many threads at the most. */
export const unreadThreads = async (db: Db, actor: Actor): Promise<Unread> => {
  const threads = new Map<string, Unread['threads'][number]>();
  for (const { threadId, id: _id, person, body, at, ...where } of await unreadComments(db, actor)) {
    const before = threads.get(threadId);
    threads.set(
      threadId,
      before
        ? { ...before, unread: before.unread + 1 }
        : {
            threadId,
            ...where,
            unread: 1,
            latest: { person, body, at: at.toISOString() },
          },
    );
  }
  return { threads: [...threads.values()].slice(0, THREADS) };
};
