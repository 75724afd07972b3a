import type { Step, StepStanding } from '@/api-types/agreement';
import type { Role } from '@/api-types/people';
import type { VersionState } from '@/api-types/versions';
import { permissions } from './permissions';

/**
 * The life of a version as a table: saved → shared → accepted or change asked → issued → superseded. A version
 * of which a change was asked may be shared again, as it is, when the question is settled in words. One that is
 * issued is superseded when another version of its layout is issued, and by nothing else.
 */
export const STEP_LEADS = {
  share: { from: ['saved', 'change_asked'], to: 'shared' },
  accept: { from: ['shared'], to: 'accepted' },
  askChange: { from: ['shared'], to: 'change_asked' },
  issue: { from: ['accepted'], to: 'issued' },
} as const satisfies Record<Step, { from: readonly VersionState[]; to: VersionState }>;

const MAY: Record<Step, Readonly<Record<Role, boolean>>> = {
  share: permissions['projects, drafts, saving and sharing versions'],
  accept: permissions['accept, ask for a change, pay'],
  askChange: permissions['accept, ask for a change, pay'],
  issue: permissions['issue an accepted version for set-out'],
};

const NOT_THEIRS: Readonly<Record<Step, string>> = {
  share: 'Only the firm’s owner and designers share a version.',
  accept: 'Only the client accepts a version.',
  askChange: 'Only the client asks for a change. Leave a comment instead.',
  issue: 'Only the firm’s owner and designers issue a version for setting out.',
};

const SUPERSEDED =
  'This version is superseded: another version of this layout was issued in its place.';

/** Why a step does not follow on a state. */
const NOT_NOW: Readonly<Record<Step, Readonly<Partial<Record<VersionState, string>>>>> = {
  share: {
    shared: 'This version is shared already.',
    accepted: 'This version is shared already, and the client has accepted it.',
    issued: 'This version is shared already, and issued for setting out.',
    superseded: SUPERSEDED,
  },
  accept: {
    saved: 'This version has not been shared with the client yet.',
    change_asked:
      'A change was asked for on this version. It can be accepted once it is shared again, or a new version instead of it.',
    accepted: 'This version is accepted already.',
    issued: 'This version is accepted already, and issued for setting out.',
    superseded: SUPERSEDED,
  },
  askChange: {
    saved: 'This version has not been shared with the client yet.',
    change_asked: 'A change was asked for on this version already. Leave a comment to add to it.',
    accepted: 'This version is accepted. Leave a comment, and the designer can save another.',
    issued: 'This version is accepted and issued for setting out. Leave a comment instead.',
    superseded: SUPERSEDED,
  },
  issue: {
    saved: 'The client has not accepted this version: share it with them first.',
    shared: 'The client has not accepted this version yet.',
    change_asked: 'The client asked for a change to this version and has not accepted it.',
    issued: 'This version is issued already.',
    superseded: `${SUPERSEDED} Save its floor as a new version and have that accepted.`,
  },
};

/** Null when the role may take the step at all, else why not. */
export const stepNotTheirs = (step: Step, role: Role): string | null =>
  MAY[step][role] ? null : NOT_THEIRS[step];

/** Null when the step follows on the state, else why not. */
export const stepNotNow = (step: Step, state: VersionState): string | null => {
  const from: readonly VersionState[] = STEP_LEADS[step].from;
  if (from.includes(state)) return null;
  return NOT_NOW[step][state] ?? 'This step does not follow on where the version stands.';
};

/** Whether a role may take a step now, and if not, why. */
export const stepStanding = (step: Step, role: Role, state: VersionState): StepStanding => {
  const why = stepNotTheirs(step, role) ?? stepNotNow(step, state);
  return { may: why === null, why };
};
