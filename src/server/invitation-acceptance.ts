import { and, eq, isNull, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { acceptInvitationSchema, OpenInvitation } from '@/api-types/invitations';
import { newPassword } from '@/api-types/people';
import { firms, invitations, memberships, people, projects } from '@/db/schema';
import { countAttempt, forgetAttempts } from './attempts';
import { recordDeed } from './audit-record';
import type { Db } from './database';
import { newId } from './ids';
import { done, invalid, type Outcome, type Refusal } from './outcomes';
import { passwordFits, passwordHash } from './passwords';
import { isPutOnProjects } from './permissions';
import { isUniqueViolation } from './postgres-errors';
import { putOnProject } from './projects';
import { startSession, type SignedIn, type Visit } from './sessions';
import { tokenHash } from './tokens';

const closed = (): Refusal => ({
  ok: false,
  kind: 'not-found',
  detail:
    'This invitation is not open: it was used, withdrawn or replaced by a newer one, or its time is over. ' +
    'Ask whoever invited you for a new one.',
});

const ofToken = (token: string) =>
  and(
    eq(invitations.tokenHash, tokenHash(token)),
    isNull(invitations.acceptedAt),
    isNull(invitations.withdrawnAt),
    sql`${invitations.expiresAt} > now()`,
  );

const accountWith = async (db: Db, email: string) =>
  (
    await db
      .select({ id: people.id, passwordHash: people.passwordHash })
      .from(people)
      .where(eq(people.email, email))
  )[0];

/** What an invitation invites to, for whoever has its link. Looking uses nothing up. */
export const lookAtInvitation = async (
  db: Db,
  token: string,
): Promise<Outcome<OpenInvitation & { readonly personId: string | null }>> => {
  const [row] = await db
    .select({
      firmName: firms.name,
      invitedBy: people.name,
      role: invitations.role,
      projectName: projects.name,
      email: invitations.email,
    })
    .from(invitations)
    .innerJoin(firms, eq(firms.id, invitations.firmId))
    .innerJoin(people, eq(people.id, invitations.invitedBy))
    .leftJoin(
      projects,
      and(eq(projects.firmId, invitations.firmId), eq(projects.id, invitations.projectId)),
    )
    .where(ofToken(token));
  if (!row) return closed();
  const account = await accountWith(db, row.email);
  return done({ ...row, hasAccount: account !== undefined, personId: account?.id ?? null });
};

type Input = z.output<typeof acceptInvitationSchema>;

/** Makes sure that it is the account's own person: their session, or their password. */
const checkOwner = async (
  db: Db,
  account: { readonly id: string; readonly passwordHash: string },
  email: string,
  { password = '' }: Input,
  visit: Visit,
): Promise<Refusal | null> => {
  if (visit.personId === account.id) return null;
  if (!password) {
    const message = 'There is an account with this e-mail address. Give its password';
    return invalid(message, [{ path: ['password'], message }]);
  }
  const attempt = { kind: 'sign-in' as const, email, address: visit.address };
  const counted = await countAttempt(db, attempt);
  if (!counted.ok) return counted;
  if (!(await passwordFits(account.passwordHash, password))) {
    const message = 'This is not the password of the account with this e-mail address';
    return invalid(message, [{ path: ['password'], message }]);
  }
  await forgetAttempts(db, attempt);
  return null;
};

interface NewAccount {
  readonly name: string;
  readonly passwordHash: string;
}

const newAccount = async ({ name, password }: Input): Promise<Outcome<NewAccount>> => {
  const chosen = newPassword.safeParse(password || undefined);
  const errors = [
    ...(name ? [] : [{ path: ['name'], message: 'Give your name' }]),
    ...(chosen.success ? [] : [{ path: ['password'], message: chosen.error.issues[0].message }]),
  ];
  if (!name || !chosen.success) return invalid('Some of what was sent is not right.', errors);
  return done({ name, passwordHash: await passwordHash(chosen.data) });
};

/** Uses the invitation up, if nobody has meanwhile; the person is of the firm and on the project afterwards. */
const join = (
  db: Db,
  token: string,
  display: Input['display'],
  who: { readonly personId: string } | NewAccount,
): Promise<{ personId: string; firmId: string } | null> =>
  db.transaction(async (tx) => {
    // Locked before anything is made, so that of two that accept at once one finds it used.
    const [row] = await tx.select().from(invitations).where(ofToken(token)).for('update');
    if (!row) return null;
    const { firmId } = row;
    let personId = 'personId' in who ? who.personId : '';
    if (!('personId' in who)) {
      personId = newId();
      await tx.insert(people).values({ id: personId, email: row.email, display, ...who });
    }
    await tx.insert(memberships).values({ firmId, personId, role: row.role }).onConflictDoNothing();
    if (row.projectId && isPutOnProjects(row.role)) {
      await putOnProject(tx, firmId, row.projectId, personId);
    }
    await tx
      .update(invitations)
      .set({ acceptedAt: sql`now()`, acceptedBy: personId })
      .where(and(eq(invitations.firmId, firmId), eq(invitations.id, row.id)));
    await recordDeed(
      tx,
      { firmId, personId },
      {
        what: 'person.joined',
        subject: { type: 'person', id: personId },
        detail: { email: row.email, role: row.role },
      },
    );
    return { personId, firmId };
  });

/** Accepts an invitation, for a person new or known, and signs them in to the firm. */
export const acceptInvitation = async (
  db: Db,
  input: Input,
  visit: Visit,
): Promise<Outcome<SignedIn>> => {
  const [open] = await db
    .select({ email: invitations.email })
    .from(invitations)
    .where(ofToken(input.token));
  if (!open) return closed();
  const account = await accountWith(db, open.email);
  const refusal = account && (await checkOwner(db, account, open.email, input, visit));
  if (refusal) return refusal;
  const made = account ? done({ personId: account.id }) : await newAccount(input);
  if (!made.ok) return made;
  try {
    const joined = await join(db, input.token, input.display, made.value);
    if (!joined) return closed();
    return done(await startSession(db, joined.personId, joined.firmId, visit));
  } catch (error) {
    // The same person has made an account with this address in the same moment.
    if (!isUniqueViolation(error, 'people_email_unique')) throw error;
    const message = 'There is an account with this e-mail address by now. Give its password';
    return invalid(message, [{ path: ['password'], message }]);
  }
};
