import { and, desc, eq, gt, ne } from 'drizzle-orm';
import type { OwnSession } from '@/api-types/account';
import { firms, sessions } from '@/db/schema';
import type { Db } from './database';
import { deviceName } from './device-name';
import { done, notFound, type Outcome } from './outcomes';
import { storedId } from './sessions';

/** One's own sessions in every firm, last used first. `current` is the id that the cookie holds. */
export const listOwnSessions = async (
  db: Db,
  personId: string,
  current: string,
): Promise<OwnSession[]> => {
  const rows = await db
    .select({ session: sessions, firm: firms.name })
    .from(sessions)
    .innerJoin(firms, eq(firms.id, sessions.firmId))
    .where(and(eq(sessions.userId, personId), gt(sessions.expiresAt, new Date())))
    .orderBy(desc(sessions.lastSeenAt), desc(sessions.createdAt));
  return rows.map(({ session, firm }) => ({
    id: session.id,
    firm,
    device: deviceName(session.userAgent),
    createdAt: session.createdAt.toISOString(),
    lastSeenAt: session.lastSeenAt.toISOString(),
    current: session.id === storedId(current),
  }));
};

/** Signs one of one's own devices out. */
export const endOwnSession = async (
  db: Db,
  personId: string,
  id: string,
): Promise<Outcome<Record<string, never>>> => {
  const ended = await db
    .delete(sessions)
    .where(and(eq(sessions.id, id), eq(sessions.userId, personId)))
    .returning({ id: sessions.id });
  return ended.length > 0 ? done({}) : notFound('session');
};

/** Signs every other device of one's own out. */
export const endOtherSessions = async (
  db: Db,
  personId: string,
  current: string,
): Promise<Outcome<{ ended: number }>> => {
  const ended = await db
    .delete(sessions)
    .where(and(eq(sessions.userId, personId), ne(sessions.id, storedId(current))))
    .returning({ id: sessions.id });
  return done({ ended: ended.length });
};
