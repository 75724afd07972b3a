import { and, asc, eq, isNull, lt, ne, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type {
  forgottenPasswordSchema,
  passwordChangeSchema,
  resetPasswordSchema,
} from '@/api-types/account';
import { memberships, passwordResets, people, sessions } from '@/db/schema';
import { countAttempt, forgetAttempts } from './attempts';
import type { Db } from './database';
import { newPasswordLetter, passwordChangedLetter } from './mail/account-letters';
import { postLetter } from './mail/outbox';
import { done, invalid, signedOut, type Outcome, type Refusal } from './outcomes';
import { passwordFits, passwordHash } from './passwords';
import { OF_NO_FIRM } from './people';
import { startSession, storedId, type SignedIn, type Visit } from './sessions';
import { newToken, tokenHash } from './tokens';

type Nothing = Record<string, never>;

/** How long the link of a letter for a new password works, minutes. */
const RESET_MINUTES = 60;

/** Sends a letter for a new password, if there is such an account. The answer does not tell. */
export const forgottenPassword = async (
  db: Db,
  { email }: z.output<typeof forgottenPasswordSchema>,
  { address }: Pick<Visit, 'address'>,
): Promise<Outcome<Nothing>> => {
  const counted = await countAttempt(db, { kind: 'reset', email, address });
  if (!counted.ok) return counted;
  await db.transaction(async (tx) => {
    await tx
      .delete(passwordResets)
      .where(lt(passwordResets.expiresAt, sql`now() - interval '1 day'`));
    const [person] = await tx
      .select({ id: people.id, name: people.name })
      .from(people)
      .where(eq(people.email, email));
    if (!person) return;
    const token = newToken();
    await tx.insert(passwordResets).values({
      tokenHash: tokenHash(token),
      personId: person.id,
      expiresAt: new Date(Date.now() + RESET_MINUTES * 60_000),
    });
    const letter = newPasswordLetter({ name: person.name, token, minutes: RESET_MINUTES });
    await postLetter(tx, { to: email, firmId: null }, letter);
  });
  return done({});
};

/** Sets the password: every session but one ends, links of older letters no longer work, and a letter says so. */
const setPassword = async (
  tx: Db,
  personId: string,
  hash: string,
  keptSession: string | null,
): Promise<void> => {
  const [person] = await tx
    .update(people)
    .set({ passwordHash: hash })
    .where(eq(people.id, personId))
    .returning({ name: people.name, email: people.email });
  await tx
    .update(passwordResets)
    .set({ usedAt: sql`now()` })
    .where(and(eq(passwordResets.personId, personId), isNull(passwordResets.usedAt)));
  await tx
    .delete(sessions)
    .where(
      and(
        eq(sessions.userId, personId),
        keptSession === null ? undefined : ne(sessions.id, storedId(keptSession)),
      ),
    );
  const letter = passwordChangedLetter({ name: person.name });
  await postLetter(tx, { to: person.email, firmId: null }, letter);
};

const spent = (): Refusal => ({
  ok: false,
  kind: 'not-found',
  detail: 'This link was used already, or it is too old. Ask for a new letter.',
});

const ofToken = (token: string) =>
  and(
    eq(passwordResets.tokenHash, tokenHash(token)),
    isNull(passwordResets.usedAt),
    sql`${passwordResets.expiresAt} > now()`,
  );

/** Whether the link of a letter still works. Looking does not use it up. */
export const resetIsOpen = async (db: Db, token: string): Promise<boolean> =>
  (await db.select({ at: passwordResets.createdAt }).from(passwordResets).where(ofToken(token)))
    .length > 0;

/** Chooses a new password with the token of a letter, once, and signs the person in. */
export const resetPassword = async (
  db: Db,
  { token, password }: z.output<typeof resetPasswordSchema>,
  visit: Visit,
): Promise<Outcome<SignedIn>> => {
  if (!(await resetIsOpen(db, token))) return spent();
  const hash = await passwordHash(password);
  const personId = await db.transaction(async (tx) => {
    const [row] = await tx
      .update(passwordResets)
      .set({ usedAt: sql`now()` })
      .where(ofToken(token))
      .returning({ personId: passwordResets.personId });
    if (row) await setPassword(tx, row.personId, hash, null);
    return row?.personId;
  });
  if (!personId) return spent();
  const [member] = await db
    .select({ firmId: memberships.firmId })
    .from(memberships)
    .where(eq(memberships.personId, personId))
    .orderBy(asc(memberships.createdAt))
    .limit(1);
  if (!member) return signedOut(`Your password is changed. ${OF_NO_FIRM}`);
  return done(await startSession(db, personId, member.firmId, visit));
};

/** Changes one's own password; the session that asks goes on, every other ends. */
export const changePassword = async (
  db: Db,
  person: { readonly id: string; readonly email: string },
  { current, password }: z.output<typeof passwordChangeSchema>,
  visit: Visit,
): Promise<Outcome<Nothing>> => {
  const attempt = { kind: 'sign-in' as const, email: person.email, address: visit.address };
  const counted = await countAttempt(db, attempt);
  if (!counted.ok) return counted;
  const [row] = await db
    .select({ passwordHash: people.passwordHash })
    .from(people)
    .where(eq(people.id, person.id));
  if (!(await passwordFits(row.passwordHash, current))) {
    const message = 'That is not your present password';
    return invalid(message, [{ path: ['current'], message }]);
  }
  await forgetAttempts(db, attempt);
  const hash = await passwordHash(password);
  await db.transaction((tx) => setPassword(tx, person.id, hash, visit.before ?? ''));
  return done({});
};
