import { and, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type {
  draftFromVersionSchema,
  DraftSaved,
  DraftState,
  saveDraftSchema,
  StaleDraft,
} from '@/api-types/layouts';
import { drafts, people, versions } from '@/db/schema';
import type { LayoutDocument } from '@/paving/layout-document';
import type { Db } from './database';
import { canonicalJson } from './fingerprint';
import { seenLayout } from './layouts';
import { changedMeanwhile, done, notFound, type Outcome } from './outcomes';
import { refuseUnlessDrafting, type Actor } from './permissions';
import { touchProject } from './projects';
import { setAside } from './set-aside';
import { versionSeen } from './visibility';

/** The draft of a layout, in the actor’s firm. */
export const ofDraft = (actor: Actor, layoutId: string) =>
  and(eq(drafts.firmId, actor.firmId), eq(drafts.layoutId, layoutId));

/** The layout's draft row, locked until the transaction ends: saves of one layout go one by one. */
export const lockDraft = async (tx: Db, actor: Actor, layoutId: string) =>
  (await tx.select().from(drafts).where(ofDraft(actor, layoutId)).for('update'))[0];

/** Not found for those who do not see the layout, not allowed for those who see it but do not draft. */
export const draftingLayout = async (
  db: Db,
  actor: Actor,
  layoutId: string,
): Promise<Outcome<NonNullable<Awaited<ReturnType<typeof seenLayout>>>>> => {
  const layout = await seenLayout(db, actor, layoutId);
  if (!layout) return notFound('layout');
  return refuseUnlessDrafting(actor) ?? done(layout);
};

/** The draft as it is stored, with its revision. Not found: no such layout, or not theirs to see. Not allowed: who does not draft. */
export const openDraft = async (
  db: Db,
  actor: Actor,
  layoutId: string,
): Promise<Outcome<DraftState>> => {
  const layout = await draftingLayout(db, actor, layoutId);
  if (!layout.ok) return layout;
  const [row] = await db
    .select({
      draft: drafts,
      person: { id: people.id, name: people.name },
      number: versions.number,
    })
    .from(drafts)
    .innerJoin(people, eq(people.id, drafts.updatedBy))
    .leftJoin(
      versions,
      and(eq(versions.firmId, drafts.firmId), eq(versions.id, drafts.basedOnVersion)),
    )
    .where(ofDraft(actor, layoutId));
  const { draft, person, number } = row;
  return done({
    layoutId,
    layoutName: layout.value.name,
    projectId: layout.value.project.id,
    projectName: layout.value.project.name,
    revision: draft.revision,
    document: draft.document,
    savedAt: draft.updatedAt.toISOString(),
    savedBy: person,
    basedOn: draft.basedOnVersion && number ? { id: draft.basedOnVersion, number } : null,
  });
};

type DraftRow = typeof drafts.$inferSelect;
type Save = z.output<typeof saveDraftSchema>;

/**
 * How a save stands to the stored draft. A save from the tab that wrote the stored revision is of the
 * same line of work, even when that tab never heard of the revision; one that is older than what the
 * tab has stored since (it was held up on the way) is already superseded by it.
 */
const standing = (draft: DraftRow, save: Save): 'next' | 'same' | 'superseded' | 'stale' => {
  if (canonicalJson(draft.document) === canonicalJson(save.document)) return 'same';
  const { tab } = save;
  const sameTab = tab !== undefined && tab.id === draft.tabId;
  if (sameTab && tab.save <= (draft.tabSave ?? 0)) return 'superseded';
  return sameTab || save.baseRevision === draft.revision ? 'next' : 'stale';
};

const storeNext = async (
  tx: Db,
  actor: Actor,
  draft: DraftRow,
  document: LayoutDocument,
  beside: Partial<Pick<DraftRow, 'tabId' | 'tabSave' | 'basedOnVersion'>>,
): Promise<DraftSaved> => {
  const updatedAt = new Date();
  const revision = draft.revision + 1;
  await tx
    .update(drafts)
    .set({ document, revision, updatedAt, updatedBy: actor.personId, ...beside })
    .where(ofDraft(actor, draft.layoutId));
  await touchProject(tx, actor.firmId, draft.layoutId);
  return { revision, savedAt: updatedAt.toISOString() };
};

/** Stores the draft, or, when somebody else has since, sets the work aside and gives both sides. */
export const saveDraft = async (
  db: Db,
  actor: Actor,
  layoutId: string,
  save: Save,
): Promise<Outcome<DraftSaved>> => {
  const layout = await draftingLayout(db, actor, layoutId);
  if (!layout.ok) return layout;
  return db.transaction(async (tx): Promise<Outcome<DraftSaved>> => {
    const draft = await lockDraft(tx, actor, layoutId);
    const stands = standing(draft, save);
    if (stands === 'same' || stands === 'superseded') {
      return done({ revision: draft.revision, savedAt: draft.updatedAt.toISOString() });
    }
    if (stands === 'next') {
      if (save.setCurrentAside) {
        await setAside(tx, actor, layoutId, draft.revision, draft.document);
      }
      return done(
        await storeNext(tx, actor, draft, save.document, {
          tabId: save.tab?.id ?? null,
          tabSave: save.tab?.save ?? null,
        }),
      );
    }
    const aside = await setAside(tx, actor, layoutId, save.baseRevision, save.document);
    const current = await openDraft(tx, actor, layoutId);
    if (!current.ok) return current;
    const sides: StaleDraft = { current: current.value, setAside: aside };
    return changedMeanwhile(
      `${current.value.savedBy.name} has saved this draft since you opened it. ` +
        'Your work was not stored over theirs; it is set aside and kept.',
      { ...sides },
    );
  });
};

/** A floor that a draft can take: of which version it comes, or is made from. */
interface Taken {
  readonly document: LayoutDocument;
  readonly versionId: string;
}

/** The draft, if it is still at `baseRevision`, takes the document that `find` gives; what it held is set aside. */
export const draftTaking = async (
  db: Db,
  actor: Actor,
  layoutId: string,
  baseRevision: number,
  find: (tx: Db) => Promise<Outcome<Taken>>,
): Promise<Outcome<DraftState>> => {
  const layout = await draftingLayout(db, actor, layoutId);
  if (!layout.ok) return layout;
  const started = await db.transaction(async (tx): Promise<Outcome<DraftSaved>> => {
    const draft = await lockDraft(tx, actor, layoutId);
    const taken = await find(tx);
    if (!taken.ok) return taken;
    const { document, versionId } = taken.value;
    if (draft.revision !== baseRevision) {
      return changedMeanwhile('The draft was saved again since you opened it. Look at it first.');
    }
    if (canonicalJson(draft.document) !== canonicalJson(document)) {
      await setAside(tx, actor, layoutId, draft.revision, draft.document);
    }
    return done(
      await storeNext(tx, actor, draft, document, {
        tabId: null,
        tabSave: null,
        basedOnVersion: versionId,
      }),
    );
  });
  return started.ok ? openDraft(db, actor, layoutId) : started;
};

/** The draft takes a version's document; what it held is set aside. */
export const draftFromVersion = (
  db: Db,
  actor: Actor,
  layoutId: string,
  input: z.output<typeof draftFromVersionSchema>,
): Promise<Outcome<DraftState>> =>
  draftTaking(db, actor, layoutId, input.baseRevision, async (tx) => {
    const [version] = await tx
      .select({ versionId: versions.id, document: versions.document })
      .from(versions)
      .where(
        and(versionSeen(actor), eq(versions.layoutId, layoutId), eq(versions.id, input.versionId)),
      );
    return version ? done(version) : notFound('version');
  });
