import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { Firm, firmChangeSchema } from '@/api-types/members';
import { firms } from '@/db/schema';
import { recordDeed } from './audit-record';
import type { Db } from './database';
import { done, type Outcome } from './outcomes';
import { refuseUnlessManaging, type Actor } from './permissions';

const columns = { id: firms.id, name: firms.name, terms: firms.terms };

/** Name, terms and the like. Not allowed: who is not an owner. */
export const openFirm = async (db: Db, actor: Actor): Promise<Outcome<Firm>> => {
  const refusal = refuseUnlessManaging(actor);
  if (refusal) return refusal;
  const [firm] = await db.select(columns).from(firms).where(eq(firms.id, actor.firmId));
  return done(firm);
};

/** Changes the firm's name and terms. What was accepted keeps the terms that were shown then. */
export const changeFirm = async (
  db: Db,
  actor: Actor,
  change: z.output<typeof firmChangeSchema>,
): Promise<Outcome<Firm>> => {
  const before = await openFirm(db, actor);
  if (!before.ok) return before;
  const { name, terms } = { ...before.value, ...change };
  return db.transaction(async (tx) => {
    const [firm] = await tx
      .update(firms)
      .set({ name, terms })
      .where(eq(firms.id, actor.firmId))
      .returning(columns);
    if (name !== before.value.name || terms !== before.value.terms) {
      await recordDeed(tx, actor, {
        what: 'firm.changed',
        subject: { type: 'firm', id: actor.firmId },
        detail: { name, termsChanged: terms !== before.value.terms },
      });
    }
    return done(firm);
  });
};
