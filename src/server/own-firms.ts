import { and, asc, eq } from 'drizzle-orm';
import type { OwnFirm } from '@/api-types/account';
import type { Account } from '@/api-types/people';
import { firms, memberships, sessions } from '@/db/schema';
import type { Db } from './database';
import { done, notFound, type Outcome } from './outcomes';
import { signedInBy, storedId } from './sessions';

/** The firms that a person is of, by name. */
export const listOwnFirms = async (
  db: Db,
  personId: string,
  currentFirmId: string,
): Promise<OwnFirm[]> => {
  const rows = await db
    .select({ id: firms.id, name: firms.name, role: memberships.role })
    .from(memberships)
    .innerJoin(firms, eq(firms.id, memberships.firmId))
    .where(eq(memberships.personId, personId))
    .orderBy(asc(firms.name), asc(firms.id));
  return rows.map((row) => ({ ...row, current: row.id === currentFirmId }));
};

/** From now on this session acts in another firm of the person's. */
export const switchFirm = async (
  db: Db,
  personId: string,
  sessionId: string,
  firmId: string,
): Promise<Outcome<Account>> => {
  const [member] = await db
    .select({ role: memberships.role })
    .from(memberships)
    .where(and(eq(memberships.firmId, firmId), eq(memberships.personId, personId)));
  if (!member) return notFound('firm');
  await db
    .update(sessions)
    .set({ firmId })
    .where(and(eq(sessions.id, storedId(sessionId)), eq(sessions.userId, personId)));
  const signedIn = await signedInBy(db, sessionId);
  return signedIn ? done(signedIn.account) : notFound('firm');
};
