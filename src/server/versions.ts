import { and, asc, desc, eq, max } from 'drizzle-orm';
import type { z } from 'zod';
import type {
  saveVersionSchema,
  VersionDetail,
  VersionEventKind,
  VersionWithDrawing,
} from '@/api-types/versions';
import { drafts, firms, layouts, people, projects, versionEvents, versions } from '@/db/schema';
import { recordAudit } from './audit';
import type { Db } from './database';
import { draftingLayout, lockDraft, ofDraft } from './drafts';
import { fingerprintOf } from './fingerprint';
import { newId } from './ids';
import { seenLayout } from './layouts';
import { changedMeanwhile, done, notFound, type Outcome } from './outcomes';
import type { Actor } from './permissions';
import { freezePricing, pricedFloor } from './pricing/version-pricing';
import { touchProject } from './projects';
import { reportOn } from './reports';
import { byCreator, summaryColumns, summaryOf } from './version-rows';
import { projectSeen, versionSeen } from './visibility';

/** The versions of a layout that the actor sees, newest first. */
export const listVersions = async (
  db: Db,
  actor: Actor,
  layoutId: string,
): Promise<Outcome<VersionWithDrawing[]>> => {
  if (!(await seenLayout(db, actor, layoutId))) return notFound('layout');
  const rows = await db
    .select({ ...summaryColumns, document: versions.document })
    .from(versions)
    .innerJoin(people, byCreator)
    .where(and(versionSeen(actor), eq(versions.layoutId, layoutId)))
    .orderBy(desc(versions.number));
  return done(rows.map((row) => ({ ...summaryOf(row), document: row.document })));
};

export const openVersion = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<VersionDetail>> => {
  const [row] = await db
    .select({
      ...summaryColumns,
      document: versions.document,
      report: versions.report,
      layoutName: layouts.name,
      projectId: projects.id,
      projectName: projects.name,
      clientName: projects.clientName,
      siteNote: projects.siteNote,
      firmName: firms.name,
    })
    .from(versions)
    .innerJoin(people, byCreator)
    .innerJoin(layouts, and(eq(layouts.firmId, versions.firmId), eq(layouts.id, versions.layoutId)))
    .innerJoin(
      projects,
      and(eq(projects.firmId, layouts.firmId), eq(projects.id, layouts.projectId)),
    )
    .innerJoin(firms, eq(firms.id, versions.firmId))
    .where(and(versionSeen(actor), projectSeen(actor), eq(versions.id, id)));
  if (!row) return notFound('version');
  const events = await db
    .select({
      kind: versionEvents.kind,
      at: versionEvents.at,
      note: versionEvents.note,
      person: { id: people.id, name: people.name },
    })
    .from(versionEvents)
    .innerJoin(people, eq(people.id, versionEvents.personId))
    .where(and(eq(versionEvents.firmId, actor.firmId), eq(versionEvents.versionId, id)))
    .orderBy(asc(versionEvents.place));
  const { layoutName, projectId, projectName, clientName, siteNote, firmName } = row;
  return done({
    ...summaryOf(row),
    layoutName,
    projectId,
    projectName,
    clientName,
    siteNote,
    firmName,
    document: row.document,
    report: row.report,
    fingerprint: row.fingerprint,
    events: events.map((event) => ({ ...event, at: event.at.toISOString() })),
  });
};

/** The version that a request has made already, when its answer was lost and it is asked again. */
const madeBy = async (
  db: Db,
  actor: Actor,
  layoutId: string,
  requestId: string | undefined,
): Promise<string | undefined> =>
  requestId === undefined
    ? undefined
    : (
        await db
          .select({ id: versions.id })
          .from(versions)
          .where(
            and(
              eq(versions.firmId, actor.firmId),
              eq(versions.layoutId, layoutId),
              eq(versions.requestId, requestId),
            ),
          )
      )[0]?.id;

const movedOn = () =>
  changedMeanwhile(
    'The draft was saved again since you opened it, so no version was made. Look at it, then save the version.',
  );

/**
 * Freezes the stored draft, if it is still at `baseRevision`, with its take-off and the prices it was reckoned with. All of it
 * is computed here, from the document, before the draft is locked; the lock then makes sure that the draft is still the one
 * reported on, and that no two versions get one number.
 */
export const saveVersion = async (
  db: Db,
  actor: Actor,
  layoutId: string,
  input: z.output<typeof saveVersionSchema>,
): Promise<Outcome<VersionDetail>> => {
  const layout = await draftingLayout(db, actor, layoutId);
  if (!layout.ok) return layout;
  const already = await madeBy(db, actor, layoutId, input.requestId);
  if (already) return openVersion(db, actor, already);
  const [draft] = await db.select().from(drafts).where(ofDraft(actor, layoutId));
  if (draft.revision !== input.baseRevision) return movedOn();
  const reported = reportOn(draft.document);
  if (!reported.ok) return reported;
  const { document, report } = reported.value;
  const priced = await pricedFloor(db, actor.firmId, layoutId, reported.value);

  const saved = await db.transaction(async (tx): Promise<Outcome<string>> => {
    const locked = await lockDraft(tx, actor, layoutId);
    const meanwhile = await madeBy(tx, actor, layoutId, input.requestId);
    if (meanwhile) return done(meanwhile);
    if (locked.revision !== input.baseRevision) return movedOn();
    const [{ last }] = await tx
      .select({ last: max(versions.number) })
      .from(versions)
      .where(and(eq(versions.firmId, actor.firmId), eq(versions.layoutId, layoutId)));
    const id = newId();
    await tx.insert(versions).values({
      id,
      firmId: actor.firmId,
      layoutId,
      number: (last ?? 0) + 1,
      label: input.label,
      note: input.note,
      document,
      report,
      fingerprint: fingerprintOf(document),
      requestId: input.requestId ?? null,
      createdBy: actor.personId,
    });
    await freezePricing(tx, actor.firmId, id, priced);
    await addVersionEvent(tx, actor, id, 'saved', '');
    await recordAudit(tx, actor, 'version.saved', { type: 'version', id }, { layoutId });
    await tx.update(drafts).set({ basedOnVersion: id }).where(ofDraft(actor, layoutId));
    await touchProject(tx, actor.firmId, layoutId);
    return done(id);
  });
  return saved.ok ? openVersion(db, actor, saved.value) : saved;
};

/** Adds to what happened to a version, under the lock of its layout's draft; the event's id. */
export const addVersionEvent = async (
  tx: Db,
  actor: Actor,
  versionId: string,
  kind: VersionEventKind,
  note: string,
): Promise<string> => {
  const [{ last }] = await tx
    .select({ last: max(versionEvents.place) })
    .from(versionEvents)
    .where(and(eq(versionEvents.firmId, actor.firmId), eq(versionEvents.versionId, versionId)));
  const id = newId();
  await tx.insert(versionEvents).values({
    id,
    firmId: actor.firmId,
    versionId,
    place: (last ?? 0) + 1,
    kind,
    personId: actor.personId,
    // The clock, not the transaction's start: it may have waited for the lock while others went before.
    at: new Date(),
    note,
  });
  return id;
};
