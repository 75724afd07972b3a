import { createHash } from 'node:crypto';
import { DrizzlePostgreSQLAdapter } from '@lucia-auth/adapter-drizzle';
import { and, eq } from 'drizzle-orm';
import { Lucia, type Adapter, type DatabaseSession } from 'lucia';
import type { Account } from '@/api-types/people';
import { firms, memberships, people, sessions } from '@/db/schema';
import type { Db } from './database';

/** Lucia is retired by its author; this module alone knows it. */
declare module 'lucia' {
  interface Register {
    Lucia: ReturnType<typeof luciaOn>;
    DatabaseSessionAttributes: { firmId: string; userAgent: string; lastSeenAt: Date };
  }
}

/** Name of the cookie. */
export const SESSION_COOKIE = 'evenlay_session';

/** What stands for a session where its id must not be shown: its hash, which signs nobody in. */
export const storedId = (id: string): string => createHash('sha256').update(id).digest('hex');

/** Keeps only the hash of a session's id, so that a copy of the database signs nobody in. */
const hashing = (inner: Adapter): Adapter => ({
  getSessionAndUser: async (id) => {
    const [session, user] = await inner.getSessionAndUser(storedId(id));
    return [session && { ...session, id }, user];
  },
  getUserSessions: (userId) => inner.getUserSessions(userId),
  setSession: (session: DatabaseSession) =>
    inner.setSession({ ...session, id: storedId(session.id) }),
  updateSessionExpiration: (id, at) => inner.updateSessionExpiration(storedId(id), at),
  deleteSession: (id) => inner.deleteSession(storedId(id)),
  deleteUserSessions: (userId) => inner.deleteUserSessions(userId),
  deleteExpiredSessions: () => inner.deleteExpiredSessions(),
});

const luciaOn = (db: Db) =>
  new Lucia(hashing(new DrizzlePostgreSQLAdapter(db, sessions, people)), {
    sessionCookie: { name: SESSION_COOKIE },
    getSessionAttributes: ({ firmId, lastSeenAt }) => ({ firmId, lastSeenAt }),
  });

/** A session that holds, and whose it is. */
export interface SignedIn {
  readonly account: Account;
  readonly session: { readonly id: string; readonly expiresAt: Date };
  /** The session was prolonged, and the cookie must be sent again. */
  readonly prolonged: boolean;
}

const accountOf = async (db: Db, personId: string, firmId: string): Promise<Account | null> => {
  const [row] = await db
    .select({
      id: people.id,
      name: people.name,
      email: people.email,
      display: people.display,
      firm: { id: firms.id, name: firms.name },
      role: memberships.role,
    })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .innerJoin(firms, eq(firms.id, memberships.firmId))
    .where(and(eq(memberships.firmId, firmId), eq(memberships.personId, personId)));
  return row ?? null;
};

/** Who comes in, from where and with what. */
export interface Visit {
  readonly address: string;
  readonly userAgent: string;
  /** The id of the session that the browser has already. */
  readonly before: string | undefined;
  /** Whose that session is, if it still is one. */
  readonly personId: string | null;
}

/** Longest that is kept of what a browser calls itself. */
const USER_AGENT_LIMIT = 300;

/** How old the note of a session's last use may grow before it is written anew, ms. */
const SEEN_EVERY = 5 * 60_000;

/** Starts a session of a person in a firm of theirs. The one they had, if any, ends: its id is not used again. */
export const startSession = async (
  db: Db,
  personId: string,
  firmId: string,
  { before, userAgent }: Pick<Visit, 'before' | 'userAgent'>,
): Promise<SignedIn> => {
  const lucia = luciaOn(db);
  if (before) await lucia.invalidateSession(before);
  await lucia.deleteExpiredSessions();
  const session = await lucia.createSession(personId, {
    firmId,
    userAgent: userAgent.slice(0, USER_AGENT_LIMIT),
    lastSeenAt: new Date(),
  });
  const account = await accountOf(db, personId, firmId);
  if (!account) throw new Error(`Person ${personId} is not of firm ${firmId}`);
  return { account, session, prolonged: true };
};

/** Who a session's id stands for; null when it is unknown or over. */
export const signedInBy = async (db: Db, sessionId: string): Promise<SignedIn | null> => {
  const { session } = await luciaOn(db).validateSession(sessionId);
  if (!session) return null;
  const account = await accountOf(db, session.userId, session.firmId);
  if (Date.now() - session.lastSeenAt.getTime() > SEEN_EVERY) {
    await db
      .update(sessions)
      .set({ lastSeenAt: new Date() })
      .where(eq(sessions.id, storedId(sessionId)));
  }
  return account && { account, session, prolonged: session.fresh };
};

/** Signs out that one session. */
export const endSession = (db: Db, sessionId: string): Promise<void> =>
  luciaOn(db).invalidateSession(sessionId);
