import { z } from 'zod';
import type { LayoutDocument } from '@/paving/layout-document';
import { layoutDocumentSchema } from '@/paving/layout-document';
import type { PersonName } from './people';
import type { VersionSummary } from './versions';

const layoutName = z
  .string({ error: 'Give the layout a name' })
  .trim()
  .min(1, 'Give the layout a name')
  .max(80, 'Keep the name to 80 characters');

/** POST /api/projects/{id}/layouts. Without a document it starts from a plain rectangle. 201 → `LayoutSummary`. */
export const newLayoutSchema = z.object({
  name: layoutName,
  document: layoutDocumentSchema.optional(),
});
/**
 * PATCH /api/layouts/{id}: renames it, moves it to another project of the firm, archives or restores it. A layout
 * of which a version was shared moves only to a project with the same people on it: 422 `invalid`. 200 → `LayoutSummary`.
 */
export const layoutChangeSchema = z
  .object({ name: layoutName, projectId: z.string().min(1), archived: z.boolean() })
  .partial();
export type LayoutChange = z.input<typeof layoutChangeSchema>;

/**
 * POST /api/layouts/{id}/duplicate: a new layout from the draft, or from a version of the layout, in the
 * same project or another. Versions and comments stay with the first. 201 → `LayoutSummary`.
 */
export const duplicateLayoutSchema = z.object({
  name: layoutName.optional(),
  projectId: z.string().min(1).optional(),
  versionId: z.string().min(1).optional(),
});
export type DuplicateLayout = z.input<typeof duplicateLayoutSchema>;

export interface LayoutSummary {
  readonly id: string;
  readonly projectId: string;
  readonly name: string;
  readonly createdAt: string;
  readonly archivedAt: string | null;
  /** When its draft was last saved; null for those who may not see drafts. */
  readonly draftedAt: string | null;
  readonly draftRevision: number | null;
  /** How many versions this person may see. */
  readonly versions: number;
  /** The newest that this person may see. */
  readonly latest: VersionSummary | null;
  /** What to draw it from: the draft, or for those who may not see drafts the newest version. */
  readonly document: LayoutDocument;
}

/** GET /api/layouts/{id}/draft. */
export interface DraftState {
  readonly layoutId: string;
  readonly layoutName: string;
  readonly projectId: string;
  readonly projectName: string;
  /** Counts up by one with each save. */
  readonly revision: number;
  readonly document: LayoutDocument;
  readonly savedAt: string;
  readonly savedBy: PersonName;
  /** The version that this draft was started from, if any. */
  readonly basedOn: { readonly id: string; readonly number: number } | null;
}

/**
 * PUT /api/layouts/{id}/draft. 200 → `DraftSaved`; 409 → `StaleDraft`: the work sent is set aside,
 * not lost.
 *
 * A tab that saves says which tab it is and counts its saves: when the last revision was written by
 * the same tab, its later work is taken even if the answer to the earlier save was lost on the way,
 * and an older save that arrives late does not undo a newer one.
 *
 * The document need not be one that can be laid (a ring may cross itself while it is being drawn), but must
 * have the shape of one.
 */
export const saveDraftSchema = z.object({
  baseRevision: z.number().int().min(1),
  document: layoutDocumentSchema,
  tab: z.object({ id: z.string().min(8).max(64), save: z.number().int().min(1) }).optional(),
  /** Keeps what the draft held before as set aside: for going on with one's own side of a conflict. */
  setCurrentAside: z.boolean().optional(),
});
export type SaveDraft = z.input<typeof saveDraftSchema>;

export interface DraftSaved {
  readonly revision: number;
  readonly savedAt: string;
}

/** Added to the 409 problem of a stale save: both sides. */
export interface StaleDraft {
  readonly current: DraftState;
  readonly setAside: SetAsideSummary;
}

/** GET /api/layouts/{id}/set-aside → `{ setAside: SetAsideSummary[] }`, newest first. */
export interface SetAsideSummary {
  readonly id: string;
  readonly layoutId: string;
  readonly person: PersonName;
  readonly baseRevision: number;
  readonly at: string;
}

/** GET /api/set-aside/{id}. */
export interface SetAsideDetail extends SetAsideSummary {
  readonly document: LayoutDocument;
}

/**
 * POST /api/layouts/{id}/draft/from-version: the draft takes a version's document.
 * `baseRevision` is the draft's revision that the person saw; 409 → `changed` when it has moved on.
 * What the draft held before is set aside. 200 → `DraftState`.
 */
export const draftFromVersionSchema = z.object({
  versionId: z.string().min(1),
  baseRevision: z.number().int().min(1),
});
export type DraftFromVersion = z.input<typeof draftFromVersionSchema>;

/** POST /api/report → `{ report: Report }`; 422 `invalid` when the document cannot be laid. */
export const reportRequestSchema = z.object({ document: z.unknown() });
