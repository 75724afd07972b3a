import { and, desc, eq, type SQL } from 'drizzle-orm';
import type { z } from 'zod';
import type { TimelineEntry, TimelinePage, timelineQuerySchema } from '@/api-types/timeline';
import { comments, layouts, people, projects, versionEvents, versions } from '@/db/schema';
import type { Db } from './database';
import { exactly, momentKeyRead, olderThan, pageOf } from './keyset';
import { seenLayout } from './layouts';
import { done, notFound, type Outcome } from './outcomes';
import type { Actor } from './permissions';
import { projectSeen, versionSeen } from './visibility';

type Query = z.output<typeof timelineQuerySchema>;

const where = {
  layout: { id: layouts.id, name: layouts.name },
  version: { id: versions.id, number: versions.number, label: versions.label },
  person: { id: people.id, name: people.name },
};

/** What happened to the versions of some layouts that the actor sees: steps and comments in one order. */
const timelineWhere = async (
  db: Db,
  actor: Actor,
  which: SQL | undefined,
  { after, size }: Query,
): Promise<TimelinePage> => {
  const key = momentKeyRead(after);
  const steps = await db
    .select({
      ...where,
      id: versionEvents.id,
      key: exactly(versionEvents.at),
      at: versionEvents.at,
      kind: versionEvents.kind,
      note: versionEvents.note,
    })
    .from(layouts)
    .innerJoin(
      versions,
      and(eq(versions.firmId, layouts.firmId), eq(versions.layoutId, layouts.id)),
    )
    .innerJoin(
      versionEvents,
      and(eq(versionEvents.firmId, versions.firmId), eq(versionEvents.versionId, versions.id)),
    )
    .innerJoin(people, eq(people.id, versionEvents.personId))
    .where(
      and(
        eq(layouts.firmId, actor.firmId),
        which,
        versionSeen(actor),
        olderThan(versionEvents.at, versionEvents.id, key),
      ),
    )
    .orderBy(desc(versionEvents.at), desc(versionEvents.id))
    .limit(size + 1);
  const said = await db
    .select({
      ...where,
      id: comments.id,
      key: exactly(comments.at),
      at: comments.at,
      threadId: comments.threadId,
      body: comments.body,
      pinX: comments.pinX,
      pinY: comments.pinY,
    })
    .from(layouts)
    .innerJoin(
      comments,
      and(eq(comments.firmId, layouts.firmId), eq(comments.layoutId, layouts.id)),
    )
    .innerJoin(
      versions,
      and(eq(versions.firmId, comments.firmId), eq(versions.id, comments.versionId)),
    )
    .innerJoin(people, eq(people.id, comments.personId))
    .where(
      and(
        eq(layouts.firmId, actor.firmId),
        which,
        versionSeen(actor),
        olderThan(comments.at, comments.id, key),
      ),
    )
    .orderBy(desc(comments.at), desc(comments.id))
    .limit(size + 1);
  const entries = [
    ...steps.map(({ key, at, ...step }) => ({
      key,
      id: step.id,
      micros: microseconds(key, at),
      entry: { ...step, at: at.toISOString() } satisfies TimelineEntry,
    })),
    ...said.map(({ key, at, pinX, pinY, ...one }) => ({
      key,
      id: one.id,
      micros: microseconds(key, at),
      entry: {
        ...one,
        kind: one.id === one.threadId ? 'commented' : 'replied',
        pin: pinX === null || pinY === null ? null : [pinX, pinY],
        at: at.toISOString(),
      } satisfies TimelineEntry,
    })),
  ].sort((a, b) => b.micros - a.micros || (a.id < b.id ? 1 : -1));
  const { page, next } = pageOf(entries, size);
  return { entries: page.map(({ entry }) => entry), next };
};

/** A moment in microseconds since 2020, which a double holds exactly: its Date has milliseconds only. */
const microseconds = (written: string, at: Date): number => {
  const fraction = /\.(\d{1,6})/.exec(written)?.[1] ?? '';
  const belowMillisecond = Number(fraction.padEnd(6, '0').slice(3));
  return (at.getTime() - Date.UTC(2020)) * 1000 + belowMillisecond;
};

/** What happened in a project, newest first, as far as the actor sees it. */
export const projectTimeline = async (
  db: Db,
  actor: Actor,
  projectId: string,
  query: Query,
): Promise<Outcome<TimelinePage>> => {
  const [project] = await db
    .select({ id: projects.id })
    .from(projects)
    .where(and(projectSeen(actor), eq(projects.id, projectId)));
  if (!project) return notFound('project');
  return done(await timelineWhere(db, actor, eq(layouts.projectId, projectId), query));
};

/** What happened to a layout, newest first, page by page. Not found: no such one, or not theirs to see. */
export const layoutTimeline = async (
  db: Db,
  actor: Actor,
  layoutId: string,
  query: Query,
): Promise<Outcome<TimelinePage>> => {
  if (!(await seenLayout(db, actor, layoutId))) return notFound('layout');
  return done(await timelineWhere(db, actor, eq(layouts.id, layoutId), query));
};
