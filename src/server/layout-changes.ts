import { and, eq, inArray } from 'drizzle-orm';
import type { z } from 'zod';
import type { layoutChangeSchema, LayoutSummary } from '@/api-types/layouts';
import { layouts, projectPeople, projects, versionEvents, versions } from '@/db/schema';
import { recordAudit, type Subject } from './audit';
import type { Db } from './database';
import { lockDraft } from './drafts';
import { openLayout, seenLayout } from './layouts';
import { done, invalid, notFound, type Outcome, type Refusal } from './outcomes';
import { refuseUnlessDrafting, type Actor } from './permissions';
import { touchProject } from './projects';
import { projectSeen } from './visibility';

const putOn = async (db: Db, actor: Actor, projectId: string): Promise<string> => {
  const rows = await db
    .select({ id: projectPeople.personId })
    .from(projectPeople)
    .where(and(eq(projectPeople.firmId, actor.firmId), eq(projectPeople.projectId, projectId)));
  return rows
    .map(({ id }) => id)
    .sort()
    .join();
};

/**
 * A layout that somebody outside the drawing office has seen stays among those who have: moved elsewhere it would show
 * what was shared with one client to another, or take from a client what they have accepted.
 */
const refuseToMove = async (
  db: Db,
  actor: Actor,
  layoutId: string,
  from: string,
  to: string,
): Promise<Refusal | null> => {
  const [project] = await db
    .select({ id: projects.id })
    .from(projects)
    .where(and(projectSeen(actor), eq(projects.id, to)));
  if (!project) {
    return invalid('There is no such project to move this layout to.', [
      { path: ['projectId'], message: 'is no project of yours' },
    ]);
  }
  const [seen] = await db
    .select({ number: versions.number })
    .from(versions)
    .innerJoin(
      versionEvents,
      and(eq(versionEvents.firmId, versions.firmId), eq(versionEvents.versionId, versions.id)),
    )
    .where(
      and(
        eq(versions.firmId, actor.firmId),
        eq(versions.layoutId, layoutId),
        inArray(versionEvents.kind, ['shared', 'issued']),
      ),
    )
    .limit(1);
  if (!seen || (await putOn(db, actor, from)) === (await putOn(db, actor, to))) return null;
  return invalid(
    `Version ${seen.number} of this layout has been shared with the people of its project, and other people are on that one. Duplicate the layout into it instead.`,
    [{ path: ['projectId'], message: 'has other people on it' }],
  );
};

/** Renames a layout, moves it to another project of the firm, archives or restores it. */
export const changeLayout = async (
  db: Db,
  actor: Actor,
  id: string,
  { name, projectId, archived }: z.output<typeof layoutChangeSchema>,
): Promise<Outcome<LayoutSummary>> => {
  if (!(await seenLayout(db, actor, id))) return notFound('layout');
  const refusal = refuseUnlessDrafting(actor);
  if (refusal) return refusal;
  const changed = await db.transaction(async (tx): Promise<Outcome<null>> => {
    await lockDraft(tx, actor, id);
    const ofLayout = and(eq(layouts.firmId, actor.firmId), eq(layouts.id, id));
    const [before] = await tx.select().from(layouts).where(ofLayout);
    const moves = projectId !== undefined && projectId !== before.projectId;
    if (moves) {
      const refused = await refuseToMove(tx, actor, id, before.projectId, projectId);
      if (refused) return refused;
    }
    const wasArchived = before.archivedAt !== null;
    const archives = archived !== undefined && archived !== wasArchived;
    const renames = name !== undefined && name !== before.name;
    if (!moves && !archives && !renames) return done(null);
    if (moves) await touchProject(tx, actor.firmId, id);
    await tx
      .update(layouts)
      .set({
        ...(renames ? { name } : {}),
        ...(moves ? { projectId } : {}),
        ...(archives ? { archivedAt: archived ? new Date() : null } : {}),
      })
      .where(ofLayout);
    const subject: Subject = { type: 'layout', id };
    if (renames) {
      await recordAudit(tx, actor, 'layout.renamed', subject, { from: before.name, to: name });
    }
    if (moves) {
      const detail = { from: before.projectId, to: projectId };
      await recordAudit(tx, actor, 'layout.moved', subject, detail);
    }
    if (archives) {
      await recordAudit(tx, actor, archived ? 'layout.archived' : 'layout.restored', subject);
    }
    await touchProject(tx, actor.firmId, id);
    return done(null);
  });
  return changed.ok ? openLayout(db, actor, id) : changed;
};
