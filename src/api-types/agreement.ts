import { z } from 'zod';
import { vertexSchema } from '@/paving/layout-document';
import type { PersonName } from './people';
import type { VersionState } from './versions';

/** A spot of the ground, mm. */
export const spotSchema = vertexSchema.options[0];

const said = z.string().trim().max(4000, 'Keep it to 4,000 characters');
const note = said.default('');

/** POST /api/versions/{id}/share: a saved version, or one that a change was asked for. 200 → `VersionDetail`. */
export const shareVersionSchema = z.object({ note });
export type ShareVersion = z.input<typeof shareVersionSchema>;

/**
 * POST /api/versions/{id}/accept. `fingerprint` and `terms` are those of `Agreement`, as they were shown:
 * 409 `changed` when they are no longer the version's and the firm's. 200 → `AcceptanceRecord`.
 */
export const acceptVersionSchema = z.object({
  typedName: z
    .string({ error: 'Type your name' })
    .trim()
    .min(1, 'Type your name')
    .max(120, 'Keep it to 120 characters'),
  fingerprint: z.string({ error: 'must be the fingerprint that was shown' }).length(64),
  terms: z.string({ error: 'must be the terms that were shown' }).max(20_000),
  note,
});
export type AcceptVersion = z.input<typeof acceptVersionSchema>;

/** POST /api/versions/{id}/ask-change. Each pin becomes a comment thread at its spot. 200 → `VersionDetail`. */
export const askChangeSchema = z.object({
  note: said.min(1, 'Say what should change'),
  pins: z
    .array(z.object({ at: spotSchema, body: said.min(1, 'Say what should change here') }))
    .max(50, 'Keep it to 50 pins')
    .default([]),
});
export type AskChange = z.input<typeof askChangeSchema>;

/** POST /api/versions/{id}/issue: an accepted version. The layout's issued version is superseded. 200 → `VersionDetail`. */
export const issueVersionSchema = z.object({ note });
export type IssueVersion = z.input<typeof issueVersionSchema>;

export const steps = ['share', 'accept', 'askChange', 'issue'] as const;
export type Step = (typeof steps)[number];

/** Whether this person may take a step now; `why` not, in words for them, null when they may. */
export interface StepStanding {
  readonly may: boolean;
  readonly why: string | null;
}

/** What a client agreed to, word for word. GET /api/versions/{id}/acceptance; 404 before it is accepted. */
export interface AcceptanceRecord {
  readonly versionId: string;
  readonly projectName: string;
  readonly layoutName: string;
  readonly firmName: string;
  readonly number: number;
  readonly label: string;
  readonly person: PersonName;
  readonly typedName: string;
  readonly terms: string;
  /** SHA-256 of the document that was accepted, 64 hexadecimal digits. */
  readonly fingerprint: string;
  readonly at: string;
}

/** GET /api/versions/{id}/agreement: where a version stands, and what this person may do about it. */
export interface Agreement {
  readonly versionId: string;
  readonly state: VersionState;
  readonly steps: Readonly<Record<Step, StepStanding>>;
  /** The firm's terms as they stand, to be shown to whoever accepts; may be empty. */
  readonly terms: string;
  readonly fingerprint: string;
  readonly acceptance: AcceptanceRecord | null;
  /** The version of this layout that is issued, if this person may see it; to tell a crew which plan is current. */
  readonly issued: { readonly id: string; readonly number: number } | null;
}
