import { z } from 'zod';
import type { LayoutDocument } from '@/paving/layout-document';
import type { Figures } from '@/paving/figure-comparison';
import type { Report } from '@/paving/report';
import type { PersonName } from './people';

export type VersionEventKind =
  'saved' | 'shared' | 'accepted' | 'change_asked' | 'issued' | 'superseded';

/** Where a version stands: the kind of the last event that changed it. */
export type VersionState = VersionEventKind;

export interface VersionEvent {
  readonly kind: VersionEventKind;
  readonly person: PersonName;
  readonly at: string;
  readonly note: string;
}

/**
 * POST /api/layouts/{id}/versions: freezes the stored draft as it stands at `baseRevision`.
 * 201 → `VersionDetail`; 409 `changed` when the draft has moved on; 422 `invalid` when the draft
 * cannot be laid (paths start at the document: `ground`, `bond` …). Sending the same `requestId`
 * again answers with the version that it made, so that a lost answer can be asked for again.
 */
export const saveVersionSchema = z.object({
  baseRevision: z.number().int().min(1),
  label: z
    .string({ error: 'Give the version a label' })
    .trim()
    .min(1, 'Give the version a label')
    .max(80, 'Keep the label to 80 characters'),
  note: z.string().trim().max(4000, 'Keep the note to 4,000 characters').default(''),
  requestId: z.string().min(8).max(64).optional(),
});
export type SaveVersion = z.input<typeof saveVersionSchema>;

/** A version in a list, with its figures but without its document. */
export interface VersionSummary {
  readonly id: string;
  readonly layoutId: string;
  /** Counts from 1 in each layout. */
  readonly number: number;
  readonly label: string;
  readonly note: string;
  readonly state: VersionState;
  readonly createdAt: string;
  readonly createdBy: PersonName;
  /** First 10 hexadecimal digits of the document's SHA-256, as printed on sheets. */
  readonly shortFingerprint: string;
  readonly figures: Figures;
}

/** GET /api/layouts/{id}/versions → `{ versions: VersionWithDrawing[] }`, newest first. */
export interface VersionWithDrawing extends VersionSummary {
  /** What to draw it from. */
  readonly document: LayoutDocument;
}

/** GET /api/versions/{id}. */
export interface VersionDetail extends VersionWithDrawing {
  readonly projectId: string;
  readonly projectName: string;
  readonly layoutName: string;
  readonly firmName: string;
  readonly clientName: string;
  readonly siteNote: string;
  /** SHA-256 of the canonical JSON of the document (RFC 8785), 64 hexadecimal digits. */
  readonly fingerprint: string;
  readonly report: Report;
  /** Oldest first. A client or installer sees every event of the versions they may see. */
  readonly events: readonly VersionEvent[];
}
