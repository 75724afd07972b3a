import { and, desc, eq, isNull, ne, or, sql } from 'drizzle-orm';
import type { Unread } from '@/api-types/comments';
import { commentReads, comments, layouts, people, projects, versions } from '@/db/schema';
import type { Db } from './database';
import type { Actor } from './permissions';
import { projectSeen, versionSeen } from './visibility';

const THREADS = 50;
/** Comments looked through, newest first: who has more than this unread has not been here for a long while. */
const LOOKED_THROUGH = 500;

/** Comments that the actor sees, by others, and has not read; newest first. */
export const unreadComments = (db: Db, actor: Actor) =>
  db
    .select({
      id: comments.id,
      threadId: comments.threadId,
      versionId: comments.versionId,
      versionNumber: versions.number,
      layoutName: layouts.name,
      projectId: projects.id,
      projectName: projects.name,
      person: { id: people.id, name: people.name },
      body: comments.body,
      at: comments.at,
    })
    .from(comments)
    .innerJoin(
      versions,
      and(eq(versions.firmId, comments.firmId), eq(versions.id, comments.versionId)),
    )
    .innerJoin(layouts, and(eq(layouts.firmId, comments.firmId), eq(layouts.id, comments.layoutId)))
    .innerJoin(
      projects,
      and(eq(projects.firmId, comments.firmId), eq(projects.id, comments.projectId)),
    )
    .innerJoin(people, eq(people.id, comments.personId))
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
        versionSeen(actor),
        projectSeen(actor),
      ),
    )
    .orderBy(desc(comments.at), desc(comments.id))
    .limit(LOOKED_THROUGH)
    .$dynamic();

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
