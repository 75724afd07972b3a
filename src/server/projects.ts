import { and, eq, inArray, sql, type SQL } from 'drizzle-orm';
import type { z } from 'zod';
import type { LayoutSummary } from '@/api-types/layouts';
import {
  projectStages,
  type newProjectSchema,
  type projectChangeSchema,
  type ProjectDetail,
  type ProjectSummary,
} from '@/api-types/projects';
import { drafts, firms, layouts, projectPeople, projects, versions } from '@/db/schema';
import type { LayoutDocument } from '@/paving/layout-document';
import { recordAudit, type Subject } from './audit';
import type { Db } from './database';
import { newId } from './ids';
import { layoutSummaries } from './layouts';
import { done, notFound, type Outcome } from './outcomes';
import { mayDraft, permissions, refuseUnlessDrafting, type Actor } from './permissions';
import { peopleOnProject } from './project-people';
import { projectSeen, versionSeen } from './visibility';
import { versionState } from './version-rows';

export { listProjects } from './project-list';

type ProjectRow = typeof projects.$inferSelect;
type Stage = ProjectSummary['stage'];

/**
 * The furthest stage of a project's current layouts that the actor sees, for use in a query over `projects`. For those who see
 * every version the database keeps it beside the project; others have few projects, and it is worked out.
 */
export const seenStage = (actor: Actor): SQL<Stage> =>
  permissions['see a version'][actor.role] === 'any'
    ? sql<Stage>`${projects.stage}`
    : sql<Stage>`coalesce((
        select seen.state from (
          select (${versionState}) as state from ${versions}
          inner join ${layouts} on ${layouts.firmId} = ${versions.firmId} and ${layouts.id} = ${versions.layoutId}
          where ${layouts.firmId} = ${actor.firmId} and ${layouts.projectId} = ${projects.id}
          and ${layouts.archivedAt} is null and ${versionSeen(actor)}
        ) seen order by array_position(${sql.raw(`array['${projectStages.join("','")}']`)}, seen.state) desc limit 1
      ), 'draft')`;

const baseOf = (row: ProjectRow) => ({
  id: row.id,
  name: row.name,
  clientName: row.clientName,
  siteNote: row.siteNote,
  archivedAt: row.archivedAt?.toISOString() ?? null,
  createdAt: row.createdAt.toISOString(),
  updatedAt: row.updatedAt.toISOString(),
});

/**
 * Joined for its being there: in a query over one table alone Drizzle names columns without their table,
 * and within a look-up in another table `id` would be that one's.
 */
const ofItsFirm = eq(firms.id, projects.firmId);

/** What a list shows of each project besides its own row. */
interface Beside {
  readonly layouts: number;
  readonly stage: Stage;
  readonly document: LayoutDocument | null;
}

/** For those who see drafts: the draft last saved stands for the project. One look-up of an index a project. */
const besideForDrafters = async (
  db: Db,
  actor: Actor,
  ids: readonly string[],
): Promise<Map<string, Beside>> => {
  const current = sql`${layouts.firmId} = ${actor.firmId} and ${layouts.projectId} = ${projects.id}
    and ${layouts.archivedAt} is null`;
  const rows = await db
    .select({
      id: projects.id,
      stage: projects.stage,
      layouts: sql<number>`(select count(*) from ${layouts} where ${current})`.mapWith(Number),
      document: sql<LayoutDocument | null>`(select ${drafts.document} from ${layouts}
        inner join ${drafts} on ${drafts.firmId} = ${layouts.firmId} and ${drafts.layoutId} = ${layouts.id}
        where ${current} order by ${drafts.updatedAt} desc limit 1)`.mapWith(drafts.document),
    })
    .from(projects)
    .innerJoin(firms, ofItsFirm)
    .where(and(eq(projects.firmId, actor.firmId), inArray(projects.id, [...ids])));
  return new Map(rows.map(({ id, ...beside }) => [id, beside]));
};

/** For those who see versions only: the newest they see stands for the project. */
const besideForOthers = async (
  db: Db,
  actor: Actor,
  ids: readonly string[],
): Promise<Map<string, Beside>> => {
  const own = (await layoutSummaries(db, actor, ids)).filter((layout) => !layout.archivedAt);
  const stages = await db
    .select({ id: projects.id, stage: seenStage(actor) })
    .from(projects)
    .innerJoin(firms, ofItsFirm)
    .where(and(eq(projects.firmId, actor.firmId), inArray(projects.id, [...ids])));
  return new Map(
    stages.map(({ id, stage }) => {
      const inProject = own.filter(({ projectId }) => projectId === id);
      const newest = inProject.reduce<LayoutSummary | undefined>(
        (best, layout) => (!best || lastWorked(layout) > lastWorked(best) ? layout : best),
        undefined,
      );
      return [id, { layouts: inProject.length, stage, document: newest?.document ?? null }];
    }),
  );
};

const lastWorked = (layout: LayoutSummary): string => layout.latest?.createdAt ?? layout.createdAt;

/** Projects as lists show them, in the order given. */
export const projectSummaries = async (
  db: Db,
  actor: Actor,
  rows: readonly ProjectRow[],
): Promise<ProjectSummary[]> => {
  if (rows.length === 0) return [];
  const ids = rows.map((row) => row.id);
  const beside = await (mayDraft(actor.role) ? besideForDrafters : besideForOthers)(db, actor, ids);
  return rows.map((row) => ({
    ...baseOf(row),
    ...(beside.get(row.id) ?? { layouts: 0, stage: 'draft', document: null }),
  }));
};

const seenProject = async (db: Db, actor: Actor, id: string): Promise<ProjectRow | undefined> =>
  (
    await db
      .select()
      .from(projects)
      .where(and(projectSeen(actor), eq(projects.id, id)))
  )[0];

/** A project with its layouts and people. Not found: no such one, or not theirs to see. */
export const openProject = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<ProjectDetail>> => {
  const row = await seenProject(db, actor, id);
  if (!row) return notFound('project');
  const own = await layoutSummaries(db, actor, [id]);
  const [summary] = await projectSummaries(db, actor, [row]);
  const put = await peopleOnProject(db, actor.firmId, id);
  return done({ ...summary, layouts: own, people: put });
};

/** Not allowed: who does not draft. */
export const createProject = async (
  db: Db,
  actor: Actor,
  input: z.output<typeof newProjectSchema>,
): Promise<Outcome<ProjectSummary>> => {
  const refusal = refuseUnlessDrafting(actor);
  if (refusal) return refusal;
  const row = await db.transaction(async (tx) => {
    const [made] = await tx
      .insert(projects)
      .values({ id: newId(), firmId: actor.firmId, ...input })
      .returning();
    await recordAudit(tx, actor, 'project.made', { type: 'project', id: made.id }, input);
    return made;
  });
  return done({ ...baseOf(row), layouts: 0, stage: 'draft', document: null });
};

/** Not found: no such one, or not theirs. Not allowed: who does not draft. */
export const changeProject = async (
  db: Db,
  actor: Actor,
  id: string,
  change: z.output<typeof projectChangeSchema>,
): Promise<Outcome<ProjectSummary>> => {
  const before = await seenProject(db, actor, id);
  if (!before) return notFound('project');
  const refusal = refuseUnlessDrafting(actor);
  if (refusal) return refusal;
  const { archived, ...fields } = change;
  const row = await db.transaction(async (tx) => {
    const [changed] = await tx
      .update(projects)
      .set({
        ...fields,
        ...(archived === undefined
          ? {}
          : { archivedAt: archived ? (before.archivedAt ?? new Date()) : null }),
        updatedAt: new Date(),
      })
      .where(and(eq(projects.firmId, actor.firmId), eq(projects.id, id)))
      .returning();
    const subject: Subject = { type: 'project', id };
    if (archived !== undefined && archived !== (before.archivedAt !== null)) {
      await recordAudit(tx, actor, archived ? 'project.archived' : 'project.restored', subject);
    }
    if (Object.keys(fields).length > 0) {
      await recordAudit(tx, actor, 'project.changed', subject, fields);
    }
    return changed;
  });
  return done((await projectSummaries(db, actor, [row]))[0]);
};

/** Lets an installer or client of the firm see a project. */
export const putOnProject = async (
  db: Db,
  firmId: string,
  projectId: string,
  personId: string,
): Promise<void> => {
  await db.insert(projectPeople).values({ firmId, projectId, personId }).onConflictDoNothing();
};

/** Marks a project, by one of its layouts, as worked on now. */
export const touchProject = async (db: Db, firmId: string, layoutId: string): Promise<void> => {
  await db
    .update(projects)
    .set({ updatedAt: new Date() })
    .where(
      and(
        eq(projects.firmId, firmId),
        sql`${projects.id} = (select ${layouts.projectId} from ${layouts}
          where ${layouts.firmId} = ${firmId} and ${layouts.id} = ${layoutId})`,
      ),
    );
};
