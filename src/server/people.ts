import { asc, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type {
  Account,
  accountChangeSchema,
  Role,
  signInSchema,
  signUpSchema,
} from '@/api-types/people';
import { firms, memberships, people } from '@/db/schema';
import { countAttempt, forgetAttempts } from './attempts';
import type { Db } from './database';
import { newId } from './ids';
import { done, invalid, signedOut, type Outcome } from './outcomes';
import { passwordFits, passwordHash } from './passwords';
import { isUniqueViolation } from './postgres-errors';
import { startSession, type SignedIn, type Visit } from './sessions';

/** Somebody who makes an account. */
export interface NewPerson {
  readonly name: string;
  readonly email: string;
  readonly password: string;
  readonly display: 'metric' | 'imperial';
}

/** Adds a person to a firm; throws on an e-mail address that is taken. */
export const addPerson = async (
  db: Db,
  firmId: string,
  role: Role,
  person: NewPerson,
): Promise<string> => {
  const id = newId();
  await db.insert(people).values({
    id,
    name: person.name,
    email: person.email.toLowerCase(),
    passwordHash: await passwordHash(person.password),
    display: person.display,
  });
  await db.insert(memberships).values({ firmId, personId: id, role });
  return id;
};

const taken = () =>
  invalid('There is already an account with this e-mail address.', [
    {
      path: ['email'],
      message: 'There is already an account with this e-mail address. Sign in instead.',
    },
  ]);

/** Makes a firm and its owner, and signs the owner in. */
export const signUp = async (
  db: Db,
  input: z.output<typeof signUpSchema>,
  visit: Visit,
): Promise<Outcome<SignedIn>> => {
  const counted = await countAttempt(db, {
    kind: 'sign-up',
    email: input.email,
    address: visit.address,
  });
  if (!counted.ok) return counted;
  try {
    const made = await db.transaction(async (tx) => {
      const firmId = newId();
      await tx.insert(firms).values({ id: firmId, name: input.firmName });
      return { firmId, personId: await addPerson(tx, firmId, 'owner', input) };
    });
    return done(await startSession(db, made.personId, made.firmId, visit));
  } catch (error) {
    if (isUniqueViolation(error, 'people_email_unique')) return taken();
    throw error;
  }
};

/** Said only to who has given the right password. */
export const OF_NO_FIRM =
  'This account is no longer of any firm. Ask to be invited again; the invitation brings you back in.';

/** The same answer, after the same time, whether the address is unknown or the password wrong. */
export const signIn = async (
  db: Db,
  input: z.output<typeof signInSchema>,
  visit: Visit,
): Promise<Outcome<SignedIn>> => {
  const attempt = { kind: 'sign-in' as const, email: input.email, address: visit.address };
  const counted = await countAttempt(db, attempt);
  if (!counted.ok) return counted;
  const [person] = await db
    .select({
      id: people.id,
      passwordHash: people.passwordHash,
      firmId: memberships.firmId,
    })
    .from(people)
    .leftJoin(memberships, eq(memberships.personId, people.id))
    .where(eq(people.email, input.email))
    .orderBy(asc(memberships.createdAt))
    .limit(1);
  const fits = await passwordFits(person?.passwordHash ?? null, input.password);
  if (!person || !fits) {
    return signedOut('This e-mail address and password do not belong together.');
  }
  await forgetAttempts(db, attempt);
  if (!person.firmId) return signedOut(OF_NO_FIRM);
  return done(await startSession(db, person.id, person.firmId, visit));
};

/** Changes name or display, and answers with the account as it is then. */
export const changeAccount = async (
  db: Db,
  account: Account,
  change: z.output<typeof accountChangeSchema>,
): Promise<Outcome<Account>> => {
  const changed = { name: change.name ?? account.name, display: change.display ?? account.display };
  await db.update(people).set(changed).where(eq(people.id, account.id));
  return done({ ...account, ...changed });
};
