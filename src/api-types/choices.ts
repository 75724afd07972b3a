import { z } from 'zod';
import type { PersonName } from './people';
import type { VersionState, VersionWithDrawing } from './versions';

/** The states in which a version can be put before the client. */
export const choiceStates = [
  'shared',
  'change_asked',
  'accepted',
  'issued',
] as const satisfies readonly VersionState[];

/**
 * PUT /api/projects/{id}/choices: the versions that are put before the client, first to last; those left out are taken
 * back, and can no longer be accepted. 200 → `ClientChoices`; 422 `invalid` when one is not shared or not of this project.
 * DELETE: every shared version is a choice again. 200 → `ClientChoices`.
 */
export const choicesSchema = z.object({
  versionIds: z
    .array(z.string().max(64))
    .min(1, 'Put at least one version before the client')
    .max(24, 'Keep it to 24 versions'),
  note: z.string().trim().max(4000, 'Keep it to 4,000 characters').default(''),
});
export type PickedChoices = z.input<typeof choicesSchema>;

/** A version that is or can be put before the client. */
export interface ChoiceVersion extends VersionWithDrawing {
  readonly layoutName: string;
}

/** GET /api/projects/{id}/choices: what a project's client chooses from, as far as the person sees it. */
export interface ClientChoices {
  /** Null while nobody has picked: then every shared version is a choice, the oldest first. */
  readonly picked: { readonly by: PersonName; readonly at: string; readonly note: string } | null;
  /** In the order in which they are put before the client. */
  readonly versions: readonly ChoiceVersion[];
  /** Shared, but not among the choices; for those who pick. */
  readonly others: readonly ChoiceVersion[];
}
