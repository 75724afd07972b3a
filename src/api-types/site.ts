import { z } from 'zod';
import type { LayoutDocument } from '@/paving/layout-document';
import { siteEntryContentSchema, type SiteEntryContent } from '@/paving/site/site-entry';
import type { Account, PersonName } from './people';
import { ENTRIES_AT_ONCE } from './site-limits';
import type { VersionState } from './versions';

/** Made by the phone: random, so that no two ever meet, and the same however often the entry is sent. */
const madeId = z.string().regex(/^[A-Za-z0-9_-]{16,64}$/, 'must be 16 to 64 letters and digits');

const entryFields = z.object({
  id: madeId,
  /** From 1, in the order in which the phone made its entries, over all versions. */
  place: z.number().int().min(1).max(2_000_000_000),
  /** By the phone's clock. */
  madeAt: z.iso.datetime({ error: 'must be a time in UTC such as 2026-05-04T07:30:00Z' }),
});

/**
 * POST /api/versions/{id}/site-entries: entries made on one phone, in their order. 200 → `EntriesKept`. Each is kept
 * once, however often it is sent; one that cannot be kept is refused with its reason and holds up none after it. 403
 * `not-allowed` when somebody else is signed in than who made them: nothing is kept then. Photos are sent one by one,
 * see `photoQuerySchema`.
 */
export const siteEntriesSchema = z.object({
  device: madeId,
  /** The person who made them. */
  by: z.string().min(1).max(64),
  entries: z
    .array(entryFields.extend({ content: siteEntryContentSchema }))
    .min(1)
    .max(ENTRIES_AT_ONCE),
});
export type SendSiteEntries = z.input<typeof siteEntriesSchema>;

export interface EntriesKept {
  /** Ids that the server has now, those that it had before included. */
  readonly kept: readonly string[];
  readonly refused: readonly { readonly id: string; readonly reason: string }[];
}

/**
 * POST /api/versions/{id}/site-photos?id=…&device=…&place=…&by=…&madeAt=…&caption=… with the image as the body (JPEG,
 * PNG, WebP or AVIF, at most `PHOTO_LIMIT`). 201 → `SitePhoto`; the same id again answers with what was kept. 422
 * `invalid` when it is no such image, 413 when it is too large.
 */
export const photoQuerySchema = entryFields.extend({
  place: z.coerce.number().int().min(1).max(2_000_000_000),
  device: madeId,
  by: z.string().min(1).max(64),
  caption: z.string().trim().max(300).default(''),
});
export type PhotoQuery = z.input<typeof photoQuerySchema>;

/** GET /api/site-photos/{id}?size=… → the image, as JPEG without anything but its pixels. */
const photoSizes = ['phone', 'full'] as const;
export type PhotoSize = (typeof photoSizes)[number];
export const photoSizeQuerySchema = z.object({ size: z.enum(photoSizes).default('full') });

export interface SitePhoto {
  /** The entry's id. */
  readonly id: string;
  /** Of the full size, px. */
  readonly width: number;
  readonly height: number;
}

/** An entry as the server has it. */
export interface SiteEntry {
  readonly id: string;
  readonly device: string;
  readonly place: number;
  readonly madeAt: string;
  readonly receivedAt: string;
  readonly by: PersonName;
  readonly content: SiteEntryContent;
}

/** The version that has taken the place of one. */
export interface Superseding {
  readonly id: string;
  readonly number: number;
  readonly at: string;
}

/**
 * GET /api/versions/{id}/site-entries → `SiteStanding`: everything written down on the ground for a version, oldest
 * first. Clients are given courses and checks alone.
 */
export interface SiteStanding {
  readonly versionId: string;
  readonly state: VersionState;
  readonly supersededBy: Superseding | null;
  readonly entries: readonly SiteEntry[];
}

/** An issued version in the list of what may be kept on a phone. */
export interface SitePackSummary {
  readonly versionId: string;
  readonly number: number;
  readonly label: string;
  readonly layoutId: string;
  readonly layoutName: string;
  readonly projectId: string;
  readonly projectName: string;
  readonly siteNote: string;
  readonly state: VersionState;
  readonly issuedAt: string;
  readonly supersededBy: Superseding | null;
}

/**
 * GET /api/site → `SitePacks`: issued versions of the current projects that this person sees, last issued first, at most
 * `PACKS_LISTED`. `keep`: whether a phone keeps them all (those of the projects that a person is put on), or
 * only those that are opened on it (for those who see every project of the firm).
 */
export interface SitePacks {
  readonly account: Account;
  readonly keep: 'all' | 'opened';
  /** AES-256 key of this person, base64: what waits to be sent is locked with it while they are signed out. */
  readonly key: string;
  readonly packs: readonly SitePackSummary[];
}

/** GET /api/versions/{id}/site-pack: all that a phone needs to build from an issued version. */
export interface SitePack extends SitePackSummary {
  readonly firmName: string;
  readonly shortFingerprint: string;
  readonly issuedBy: PersonName;
  readonly issueNote: string;
  readonly note: string;
  readonly document: LayoutDocument;
  readonly standing: SiteStanding;
}

/**
 * POST /api/site-proposals/{id}/draft: the layout's draft takes the proposal's floor; what it held is set aside. 200 →
 * `DraftState`; 409 `changed` when the draft is no longer at `baseRevision`.
 */
export const draftFromProposalSchema = z.object({ baseRevision: z.number().int().min(1) });
