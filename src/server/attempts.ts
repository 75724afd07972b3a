import { and, desc, eq, gt, lt } from 'drizzle-orm';
import { signInAttempts } from '@/db/schema';
import type { Db } from './database';
import { newId } from './ids';
import { done, tooMany, type Outcome } from './outcomes';

const MINUTE = 60_000;

/** So many attempts are taken within the window; the next is refused until the oldest is that old. */
interface Limit {
  readonly attempts: number;
  readonly windowMinutes: number;
}

/** One person's password, tried from one address. */
export const SIGN_IN_PAIR: Limit = { attempts: 8, windowMinutes: 15 };
/** Any passwords, tried from one address. */
const SIGN_IN_ADDRESS: Limit = { attempts: 100, windowMinutes: 15 };
/** Firms made from one address. */
const SIGN_UP_ADDRESS: Limit = { attempts: 30, windowMinutes: 60 };

/** Letters for a new password asked for one person, and for anybody, from one address. */
export const RESET_PAIR: Limit = { attempts: 4, windowMinutes: 60 };
const RESET_ADDRESS: Limit = { attempts: 30, windowMinutes: 60 };

type Kind = 'sign-in' | 'sign-up' | 'reset';

const LIMITS: Readonly<Record<Kind, { readonly pair?: Limit; readonly address: Limit }>> = {
  'sign-in': { pair: SIGN_IN_PAIR, address: SIGN_IN_ADDRESS },
  'sign-up': { address: SIGN_UP_ADDRESS },
  reset: { pair: RESET_PAIR, address: RESET_ADDRESS },
};

/** Who tries what, from where. */
export interface Attempt {
  readonly kind: Kind;
  readonly email: string;
  readonly address: string;
}

const inWords = (minutes: number): string => (minutes === 1 ? '1 minute' : `${minutes} minutes`);

const wait = async (
  db: Db,
  attempt: Attempt,
  limit: Limit,
  ofOnePerson: boolean,
  now: Date,
): Promise<number> => {
  const window = limit.windowMinutes * MINUTE;
  const rows = await db
    .select({ at: signInAttempts.at })
    .from(signInAttempts)
    .where(
      and(
        eq(signInAttempts.kind, attempt.kind),
        eq(signInAttempts.address, attempt.address),
        ofOnePerson ? eq(signInAttempts.email, attempt.email) : undefined,
        gt(signInAttempts.at, new Date(now.getTime() - window)),
      ),
    )
    .orderBy(desc(signInAttempts.at))
    .limit(limit.attempts + 1);
  // This attempt is already among them, so as many as are allowed may be there.
  const last = rows[limit.attempts];
  return last ? last.at.getTime() + window - now.getTime() : 0;
};

/**
 * Counts an attempt and says whether it may go on. It is counted before it is tried, so that many
 * at the same moment do not slip through together; a refused one is not counted.
 */
export const countAttempt = async (
  db: Db,
  attempt: Attempt,
  now = new Date(),
): Promise<Outcome<string>> => {
  const id = newId();
  await db.insert(signInAttempts).values({ id, ...attempt, at: now });
  const { pair, address } = LIMITS[attempt.kind];
  const waitMs = Math.max(
    pair ? await wait(db, attempt, pair, true, now) : 0,
    await wait(db, attempt, address, false, now),
  );
  if (waitMs <= 0) return done(id);
  await db.delete(signInAttempts).where(eq(signInAttempts.id, id));
  const minutes = Math.ceil(waitMs / MINUTE);
  return tooMany(
    `That was tried too often. Try again in ${inWords(minutes)}.`,
    Math.ceil(waitMs / 1000),
  );
};

/** After a success the pair starts afresh, and what no limit looks at any more is swept out. */
export const forgetAttempts = async (db: Db, attempt: Attempt, now = new Date()): Promise<void> => {
  await db
    .delete(signInAttempts)
    .where(
      and(
        eq(signInAttempts.kind, attempt.kind),
        eq(signInAttempts.email, attempt.email),
        eq(signInAttempts.address, attempt.address),
      ),
    );
  await db
    .delete(signInAttempts)
    .where(lt(signInAttempts.at, new Date(now.getTime() - 24 * 60 * MINUTE)));
};
