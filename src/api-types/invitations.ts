import { z } from 'zod';
import { displaySchema, email, personName, roles, type PersonName, type Role } from './people';

/**
 * POST /api/invitations. A client is invited to one project, an installer to one or to none yet; owners and
 * designers see every project, so they are invited to none. 201 → `Invitation`.
 */
export const inviteSchema = z
  .object({
    email,
    role: z.enum(roles, { error: 'Choose a role' }),
    projectId: z
      .string()
      .max(64)
      .optional()
      .transform((id) => id || undefined),
  })
  .superRefine(({ role, projectId }, context) => {
    const wrong = (message: string) =>
      context.addIssue({ code: 'custom', path: ['projectId'], message });
    if (role === 'client' && !projectId) wrong('Choose the project that the client is invited to');
    if (projectId && (role === 'owner' || role === 'designer')) {
      wrong('Owners and designers see every project; choose none');
    }
  });
export type Invite = z.input<typeof inviteSchema>;

/** GET /api/invitations → `{ invitations: Invitation[] }`: those neither accepted nor withdrawn, newest first. */
export interface Invitation {
  readonly id: string;
  readonly email: string;
  readonly role: Role;
  readonly project: { readonly id: string; readonly name: string } | null;
  readonly invitedBy: PersonName;
  readonly at: string;
  readonly expiresAt: string;
  readonly expired: boolean;
  /** What became of its letter: `refused` when the receiving server will not take it. */
  readonly letter: 'waiting' | 'sent' | 'refused';
}

/**
 * POST /api/accept-invitation. Whoever has an account gives its password, unless they are signed in to it; whoever
 * has none gives a name and chooses a password. 200 → `Account`, signed in; 404 when the invitation is not open.
 */
export const acceptInvitationSchema = z.object({
  token: z.string({ error: 'must be the invitation’s token' }).min(1).max(200),
  name: personName.optional(),
  password: z.string().max(200, 'Keep it to 200 characters').optional(),
  display: displaySchema.default('metric'),
});
/** What somebody with an invitation's link is shown. */
export interface OpenInvitation {
  readonly firmName: string;
  readonly invitedBy: string;
  readonly role: Role;
  readonly projectName: string | null;
  readonly email: string;
  /** Whether there is an account with this e-mail address. */
  readonly hasAccount: boolean;
}
