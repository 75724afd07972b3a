import { and, asc, desc, eq, inArray, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type {
  newProjectSchema,
  projectChangeSchema,
  ProjectDetail,
  ProjectSummary,
} from '@/api-types/projects';
import type { VersionState } from '@/api-types/versions';
import { layouts, memberships, people, projectPeople, projects, versions } from '@/db/schema';
import type { Db } from './database';
import { newId } from './ids';
import { layoutSummaries } from './layouts';
import { done, notFound, type Outcome } from './outcomes';
import { refuseUnlessDrafting, type Actor } from './permissions';
import { projectSeen, versionSeen } from './visibility';
import { versionState } from './version-rows';

type ProjectRow = typeof projects.$inferSelect;

/** From least to furthest; a superseded version always has an issued one after it. */
const STAGES: readonly (VersionState | 'draft')[] = [
  'draft',
  'superseded',
  'saved',
  'shared',
  'change_asked',
  'accepted',
  'issued',
];

const furthest = (states: readonly VersionState[]): VersionState | 'draft' =>
  states.reduce<VersionState | 'draft'>(
    (best, state) => (STAGES.indexOf(state) > STAGES.indexOf(best) ? state : best),
    'draft',
  );

const stagesOf = async (
  db: Db,
  actor: Actor,
  ids: readonly string[],
): Promise<Map<string, VersionState[]>> => {
  const rows =
    ids.length === 0
      ? []
      : await db
          .select({ projectId: layouts.projectId, state: versionState })
          .from(versions)
          .innerJoin(
            layouts,
            and(eq(layouts.firmId, versions.firmId), eq(layouts.id, versions.layoutId)),
          )
          .where(and(versionSeen(actor), inArray(layouts.projectId, [...ids])));
  const states = new Map<string, VersionState[]>();
  for (const row of rows) {
    states.set(row.projectId, [...(states.get(row.projectId) ?? []), row.state]);
  }
  return states;
};

const baseOf = (row: ProjectRow) => ({
  id: row.id,
  name: row.name,
  clientName: row.clientName,
  siteNote: row.siteNote,
  archivedAt: row.archivedAt?.toISOString() ?? null,
  createdAt: row.createdAt.toISOString(),
  updatedAt: row.updatedAt.toISOString(),
});

const summariesOf = async (
  db: Db,
  actor: Actor,
  rows: readonly ProjectRow[],
): Promise<ProjectSummary[]> => {
  const ids = rows.map((row) => row.id);
  const inEach = await layoutSummaries(db, actor, ids);
  const states = await stagesOf(db, actor, ids);
  return rows.map((row) => {
    const own = inEach.filter((layout) => layout.projectId === row.id);
    const last = own.reduce<(typeof own)[number] | undefined>(
      (best, layout) => (!best || lastWorked(layout) > lastWorked(best) ? layout : best),
      undefined,
    );
    return {
      ...baseOf(row),
      layouts: own.length,
      stage: furthest(states.get(row.id) ?? []),
      document: last?.document ?? null,
    };
  });
};

const lastWorked = (layout: Awaited<ReturnType<typeof layoutSummaries>>[number]): string =>
  layout.draftedAt ?? layout.latest?.createdAt ?? layout.createdAt;

/** The projects that the actor sees, last touched first. */
export const listProjects = async (db: Db, actor: Actor): Promise<ProjectSummary[]> =>
  summariesOf(
    db,
    actor,
    await db
      .select()
      .from(projects)
      .where(projectSeen(actor))
      .orderBy(desc(projects.updatedAt), asc(projects.id)),
  );

const seenProject = async (db: Db, actor: Actor, id: string): Promise<ProjectRow | undefined> =>
  (
    await db
      .select()
      .from(projects)
      .where(and(projectSeen(actor), eq(projects.id, id)))
  )[0];

export const openProject = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<ProjectDetail>> => {
  const row = await seenProject(db, actor, id);
  if (!row) return notFound('project');
  const own = await layoutSummaries(db, actor, [id]);
  const [summary] = await summariesOf(db, actor, [row]);
  const put = await db
    .select({ id: people.id, name: people.name, role: memberships.role })
    .from(projectPeople)
    .innerJoin(
      memberships,
      and(
        eq(memberships.firmId, projectPeople.firmId),
        eq(memberships.personId, projectPeople.personId),
      ),
    )
    .innerJoin(people, eq(people.id, projectPeople.personId))
    .where(and(eq(projectPeople.firmId, actor.firmId), eq(projectPeople.projectId, id)))
    .orderBy(asc(people.name));
  return done({ ...summary, layouts: own, people: put });
};

export const createProject = async (
  db: Db,
  actor: Actor,
  input: z.output<typeof newProjectSchema>,
): Promise<Outcome<ProjectSummary>> => {
  const refusal = refuseUnlessDrafting(actor);
  if (refusal) return refusal;
  const [row] = await db
    .insert(projects)
    .values({ id: newId(), firmId: actor.firmId, ...input })
    .returning();
  return done({ ...baseOf(row), layouts: 0, stage: 'draft', document: null });
};

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
  const [row] = await db
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
  return done((await summariesOf(db, actor, [row]))[0]);
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
