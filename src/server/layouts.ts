import { and, asc, count, desc, eq, inArray } from 'drizzle-orm';
import type { z } from 'zod';
import type { LayoutSummary, newLayoutSchema } from '@/api-types/layouts';
import type { VersionSummary } from '@/api-types/versions';
import { drafts, layouts, people, projects, versions } from '@/db/schema';
import type { LayoutDocument } from '@/paving/layout-document';
import { recordAudit } from './audit';
import type { Db } from './database';
import { newId } from './ids';
import { done, notFound, type Outcome } from './outcomes';
import { mayDraft, refuseUnlessDrafting, type Actor } from './permissions';
import { startingDocument } from './starting-document';
import { layoutSeen, projectSeen, versionSeen } from './visibility';
import { byCreator, summaryColumns, summaryOf } from './version-rows';

const inProject = and(eq(projects.firmId, layouts.firmId), eq(projects.id, layouts.projectId));
const ofLayout = and(eq(drafts.firmId, layouts.firmId), eq(drafts.layoutId, layouts.id));

interface Latest {
  readonly summary: VersionSummary;
  readonly document: LayoutDocument;
}

const latestVersions = async (
  db: Db,
  actor: Actor,
  ids: readonly string[],
): Promise<Map<string, Latest>> => {
  const rows = await db
    .selectDistinctOn([versions.layoutId], { ...summaryColumns, document: versions.document })
    .from(versions)
    .innerJoin(people, byCreator)
    .where(and(versionSeen(actor), inArray(versions.layoutId, [...ids])))
    .orderBy(versions.layoutId, desc(versions.number));
  return new Map(
    rows.map((row) => [row.layoutId, { summary: summaryOf(row), document: row.document }]),
  );
};

const versionCounts = async (
  db: Db,
  actor: Actor,
  ids: readonly string[],
): Promise<Map<string, number>> => {
  const rows = await db
    .select({ layoutId: versions.layoutId, n: count() })
    .from(versions)
    .where(and(versionSeen(actor), inArray(versions.layoutId, [...ids])))
    .groupBy(versions.layoutId);
  return new Map(rows.map((row) => [row.layoutId, row.n]));
};

const summaries = async (
  db: Db,
  actor: Actor,
  which: ReturnType<typeof and>,
): Promise<LayoutSummary[]> => {
  const rows = await db
    .select({
      layout: layouts,
      draft: {
        document: drafts.document,
        revision: drafts.revision,
        updatedAt: drafts.updatedAt,
      },
    })
    .from(layouts)
    .innerJoin(projects, inProject)
    .innerJoin(drafts, ofLayout)
    .where(and(layoutSeen(actor), projectSeen(actor), which))
    .orderBy(asc(layouts.createdAt), asc(layouts.id));
  if (rows.length === 0) return [];
  const ids = rows.map((row) => row.layout.id);
  const latest = await latestVersions(db, actor, ids);
  const counts = await versionCounts(db, actor, ids);
  const seesDrafts = mayDraft(actor.role);
  return rows.map(({ layout, draft }) => {
    const newest = latest.get(layout.id);
    return {
      id: layout.id,
      projectId: layout.projectId,
      name: layout.name,
      createdAt: layout.createdAt.toISOString(),
      archivedAt: layout.archivedAt?.toISOString() ?? null,
      draftedAt: seesDrafts ? draft.updatedAt.toISOString() : null,
      draftRevision: seesDrafts ? draft.revision : null,
      versions: counts.get(layout.id) ?? 0,
      latest: newest?.summary ?? null,
      document: seesDrafts || !newest ? draft.document : newest.document,
    };
  });
};

/** The layouts of these projects that the actor sees, oldest first. */
export const layoutSummaries = (
  db: Db,
  actor: Actor,
  projectIds: readonly string[],
): Promise<LayoutSummary[]> =>
  projectIds.length === 0
    ? Promise.resolve([])
    : summaries(db, actor, inArray(layouts.projectId, [...projectIds]));

/** A layout with its project, if the actor sees it. */
export const seenLayout = async (db: Db, actor: Actor, id: string) =>
  (
    await db
      .select({ id: layouts.id, name: layouts.name, project: projects })
      .from(layouts)
      .innerJoin(projects, inProject)
      .where(and(layoutSeen(actor), projectSeen(actor), eq(layouts.id, id)))
  )[0];

/** A layout with its versions in short. Not found: no such one, or not theirs to see. */
export const openLayout = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<LayoutSummary>> => {
  const [summary] = await summaries(db, actor, eq(layouts.id, id));
  return summary ? done(summary) : notFound('layout');
};

/** Adds a layout, with its draft, to a project. */
export const createLayout = async (
  db: Db,
  actor: Actor,
  projectId: string,
  input: z.output<typeof newLayoutSchema>,
): Promise<Outcome<LayoutSummary>> => {
  const [project] = await db
    .select({ id: projects.id })
    .from(projects)
    .where(and(projectSeen(actor), eq(projects.id, projectId)));
  if (!project) return notFound('project');
  const refusal = refuseUnlessDrafting(actor);
  if (refusal) return refusal;
  const id = newId();
  await db.transaction(async (tx) => {
    const [drafter] = await tx
      .select({ display: people.display })
      .from(people)
      .where(eq(people.id, actor.personId));
    const { firmId } = actor;
    await tx.insert(layouts).values({ id, firmId, projectId, name: input.name });
    await tx.insert(drafts).values({
      firmId,
      layoutId: id,
      document: input.document ?? startingDocument(drafter.display),
      revision: 1,
      updatedBy: actor.personId,
    });
    await tx
      .update(projects)
      .set({ updatedAt: new Date() })
      .where(and(eq(projects.firmId, firmId), eq(projects.id, projectId)));
    const { name } = input;
    await recordAudit(tx, actor, 'layout.made', { type: 'layout', id }, { projectId, name });
  });
  return openLayout(db, actor, id);
};
