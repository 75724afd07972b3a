import type { Role } from '@/api-types/people';
import type { Letter } from './letter';

const IN_THE_ROLE: Readonly<Record<Role, string>> = {
  owner: 'as an owner: with everything, people and settings included',
  designer: 'as a designer, to draw floors, save versions and share them',
  installer: 'as an installer, to see the plans that are issued for building',
  client: 'to look at your floor, say what you think of it and accept it',
};

/** What an invitation tells; `days` is how long it holds. */
export interface InvitationTold {
  readonly firm: string;
  readonly inviter: string;
  readonly role: Role;
  readonly project: string | null;
  readonly token: string;
  readonly days: number;
}

const link = (page: string, token: string) => `/${page}?token=${encodeURIComponent(token)}`;

/** To somebody who is invited, known here or not. */
export const invitationLetter = (told: InvitationTold): Letter => ({
  kind: 'invitation',
  subject: told.project
    ? `${told.firm} invites you to “${told.project}”`
    : `${told.firm} invites you to work with them`,
  blocks: [
    {
      kind: 'paragraph',
      text:
        `${told.inviter} of ${told.firm} invites you` +
        `${told.project ? ` to the project “${told.project}”` : ''} ${IN_THE_ROLE[told.role]}.`,
    },
    {
      kind: 'action',
      label: 'Look at the invitation',
      path: link('accept-invitation', told.token),
    },
    {
      kind: 'paragraph',
      text: `The invitation is for you alone, works once, and for ${told.days} days.`,
    },
  ],
  why: `You get this letter because somebody of ${told.firm} gave your address. If you do not know them, leave it be: nothing happens unless you accept.`,
});

/** The person is of the firm already and was put on a project. */
export const putOnProjectLetter = (told: {
  readonly name: string;
  readonly by: string;
  readonly firm: string;
  readonly project: string;
  readonly projectId: string;
}): Letter => ({
  kind: 'put-on-project',
  subject: `You can now see “${told.project}”`,
  name: told.name,
  blocks: [
    {
      kind: 'paragraph',
      text: `${told.by} of ${told.firm} has put you on the project “${told.project}”.`,
    },
    { kind: 'action', label: 'Open the project', path: `/projects/${told.projectId}` },
  ],
  why: `You get this letter because you work with ${told.firm} in Evenlay.`,
});

/** With the link that chooses a new password. */
export const newPasswordLetter = (told: {
  readonly name: string;
  readonly token: string;
  readonly minutes: number;
}): Letter => ({
  kind: 'new-password',
  subject: 'Choose a new password',
  name: told.name,
  blocks: [
    {
      kind: 'paragraph',
      text: 'Somebody, we take it you, asked for a new password for your account.',
    },
    { kind: 'action', label: 'Choose a new password', path: link('reset-password', told.token) },
    {
      kind: 'paragraph',
      text: `The link works once, within ${told.minutes} minutes. Choosing a new password signs you out everywhere else.`,
    },
  ],
  why: 'If it was not you, leave it be: your password stays as it is, and nobody has been let in.',
});

/** To whom a password belongs, after it was changed. */
export const passwordChangedLetter = (told: { readonly name: string }): Letter => ({
  kind: 'password-changed',
  subject: 'Your password was changed',
  name: told.name,
  blocks: [
    {
      kind: 'paragraph',
      text: 'The password of your account was changed just now, and every other device was signed out.',
    },
    {
      kind: 'paragraph',
      text: 'If it was you, all is well. If it was not, choose a new one at once:',
    },
    { kind: 'action', label: 'Choose a new password', path: '/forgotten-password' },
  ],
  why: 'You get this letter whenever your password changes; it cannot be turned off.',
});

/** To somebody who was taken off a firm. */
export const removedLetter = (told: { readonly name: string; readonly firm: string }): Letter => ({
  kind: 'removed',
  subject: `You no longer work with ${told.firm} in Evenlay`,
  name: told.name,
  blocks: [
    {
      kind: 'paragraph',
      text: `${told.firm} has taken you off its people, so you no longer see its projects. What you wrote and agreed to there is kept with them, under your name.`,
    },
  ],
  why: `If you think that this is a mistake, ask ${told.firm}. Your account stays yours.`,
});
