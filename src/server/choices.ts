import { and, asc, eq, isNull, max, type SQL } from 'drizzle-orm';
import type { z } from 'zod';
import {
  choiceStates,
  type choicesSchema,
  type ChoiceVersion,
  type ClientChoices,
} from '@/api-types/choices';
import { choices, choiceVersions, layouts, people, projects, versions } from '@/db/schema';
import { recordDeed } from './audit-record';
import type { Db } from './database';
import { newId } from './ids';
import { changedMeanwhile, done, invalid, notFound, type Outcome, type Refusal } from './outcomes';
import { mayDraft, refuseUnlessDrafting, type Actor } from './permissions';
import type { SeenVersion } from './seen-version';
import { byCreator, summaryColumns, summaryOf } from './version-rows';
import { projectSeen, versionSeen } from './visibility';

/** A project's choices as they stand: those that were picked last and not taken back. */
const standing = (firmId: string, projectId: string): SQL | undefined =>
  and(eq(choices.firmId, firmId), eq(choices.projectId, projectId), isNull(choices.withdrawnAt));

/** Whether the actor sees the project. */
const isSeen = async (db: Db, actor: Actor, projectId: string): Promise<boolean> =>
  (
    await db
      .select({ id: projects.id })
      .from(projects)
      .where(and(projectSeen(actor), eq(projects.id, projectId)))
  ).length > 0;

/** The versions of a project's layouts in use that the actor sees and a client can choose, the oldest first. */
const choosable = async (db: Db, actor: Actor, projectId: string): Promise<ChoiceVersion[]> => {
  const rows = await db
    .select({ ...summaryColumns, document: versions.document, layoutName: layouts.name })
    .from(versions)
    .innerJoin(people, byCreator)
    .innerJoin(layouts, and(eq(layouts.firmId, versions.firmId), eq(layouts.id, versions.layoutId)))
    .where(and(versionSeen(actor), eq(layouts.projectId, projectId), isNull(layouts.archivedAt)))
    .orderBy(asc(versions.createdAt), asc(versions.id));
  return rows
    .filter(({ state }) => (choiceStates as readonly string[]).includes(state))
    .map((row) => ({ ...summaryOf(row), document: row.document, layoutName: row.layoutName }));
};

const pickedIds = async (db: Db, firmId: string, projectId: string): Promise<string[] | null> => {
  const rows = await db
    .select({ versionId: choiceVersions.versionId })
    .from(choices)
    .innerJoin(
      choiceVersions,
      and(eq(choiceVersions.firmId, choices.firmId), eq(choiceVersions.choiceId, choices.id)),
    )
    .where(standing(firmId, projectId))
    .orderBy(asc(choiceVersions.place));
  return rows.length > 0 ? rows.map(({ versionId }) => versionId) : null;
};

/** The id of the pick that stands; another with each new one. */
export const standingChoices = async (
  db: Db,
  firmId: string,
  projectId: string,
): Promise<string | null> =>
  (await db.select({ id: choices.id }).from(choices).where(standing(firmId, projectId))).at(0)
    ?.id ?? null;

/** What a project's client chooses from. */
export const clientChoices = async (
  db: Db,
  actor: Actor,
  projectId: string,
): Promise<Outcome<ClientChoices>> => {
  if (!(await isSeen(db, actor, projectId))) return notFound('project');
  const all = await choosable(db, actor, projectId);
  const ids = await pickedIds(db, actor.firmId, projectId);
  if (!ids) return done({ picked: null, versions: all, others: [] });
  const [pick] = await db
    .select({ by: { id: people.id, name: people.name }, at: choices.createdAt, note: choices.note })
    .from(choices)
    .innerJoin(people, eq(people.id, choices.offeredBy))
    .where(standing(actor.firmId, projectId));
  return done({
    picked: { by: pick.by, at: pick.at.toISOString(), note: pick.note },
    versions: ids.flatMap((id) => all.filter((version) => version.id === id)),
    others: mayDraft(actor.role) ? all.filter(({ id }) => !ids.includes(id)) : [],
  });
};

/** Picks of one project go one by one. */
const lockProject = (tx: Db, firmId: string, projectId: string) =>
  tx
    .select({ id: projects.id })
    .from(projects)
    .where(and(eq(projects.firmId, firmId), eq(projects.id, projectId)))
    .for('update');

const takeBack = (tx: Db, firmId: string, projectId: string) =>
  tx.update(choices).set({ withdrawnAt: new Date() }).where(standing(firmId, projectId));

/** Puts these versions before the project's client, in this order, and no others. */
export const pickChoices = async (
  db: Db,
  actor: Actor,
  projectId: string,
  { versionIds, note }: z.output<typeof choicesSchema>,
): Promise<Outcome<ClientChoices>> => {
  if (!(await isSeen(db, actor, projectId))) return notFound('project');
  const refusal = refuseUnlessDrafting(actor);
  if (refusal) return refusal;
  const refused = await db.transaction(async (tx): Promise<Refusal | null> => {
    await lockProject(tx, actor.firmId, projectId);
    const all = await choosable(tx, actor, projectId);
    const wrong = versionIds.findIndex(
      (id, n) => versionIds.indexOf(id) !== n || !all.some((version) => version.id === id),
    );
    if (wrong >= 0) {
      const message =
        'Only a version of this project that is shared and not superseded can be put before the client, each only once';
      return invalid(message, [{ path: ['versionIds', wrong], message }]);
    }
    await takeBack(tx, actor.firmId, projectId);
    const id = newId();
    const { firmId, personId } = actor;
    await tx.insert(choices).values({
      id,
      firmId,
      projectId,
      title: '',
      note,
      offeredBy: personId,
      createdAt: new Date(),
    });
    await tx
      .insert(choiceVersions)
      .values(
        versionIds.map((versionId, n) => ({ firmId, choiceId: id, versionId, place: n + 1 })),
      );
    await recordDeed(tx, actor, {
      what: 'project.choices-picked',
      subject: { type: 'project', id: projectId },
      detail: { versions: versionIds.length, note },
    });
    return null;
  });
  return refused ?? clientChoices(db, actor, projectId);
};

/** Makes every shared version a choice again. */
export const unpickChoices = async (
  db: Db,
  actor: Actor,
  projectId: string,
): Promise<Outcome<ClientChoices>> => {
  if (!(await isSeen(db, actor, projectId))) return notFound('project');
  const refusal = refuseUnlessDrafting(actor);
  if (refusal) return refusal;
  await db.transaction(async (tx) => {
    await lockProject(tx, actor.firmId, projectId);
    const before = await takeBack(tx, actor.firmId, projectId).returning({ id: choices.id });
    if (before.length === 0) return;
    const subject = { type: 'project', id: projectId };
    await recordDeed(tx, actor, { what: 'project.choices-opened', subject });
  });
  return clientChoices(db, actor, projectId);
};

/** A version that is shared goes last among the choices that were picked, so that what a client is told of can be accepted. */
export const addToChoices = async (tx: Db, version: SeenVersion): Promise<void> => {
  const { firmId, projectId, id } = version;
  await lockProject(tx, firmId, projectId);
  const ids = await pickedIds(tx, firmId, projectId);
  if (!ids || ids.includes(id)) return;
  const [{ choiceId, last }] = await tx
    .select({ choiceId: choices.id, last: max(choiceVersions.place) })
    .from(choices)
    .innerJoin(
      choiceVersions,
      and(eq(choiceVersions.firmId, choices.firmId), eq(choiceVersions.choiceId, choices.id)),
    )
    .where(standing(firmId, projectId))
    .groupBy(choices.id);
  await tx
    .insert(choiceVersions)
    .values({ firmId, choiceId, versionId: id, place: (last ?? 0) + 1 });
};

/** Why a client cannot accept a version that was taken back from the choices; null while it is one of them. */
export const notAChoice = async (db: Db, version: SeenVersion): Promise<string | null> => {
  const ids = await pickedIds(db, version.firmId, version.projectId);
  return !ids || ids.includes(version.id)
    ? null
    : 'This version is no longer among your choices: your designer has taken it back. You can still look at it and comment on it.';
};

export const refuseUnlessChoice = async (db: Db, version: SeenVersion): Promise<Refusal | null> => {
  const why = await notAChoice(db, version);
  return why ? changedMeanwhile(why) : null;
};
