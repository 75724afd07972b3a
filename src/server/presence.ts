import { and, asc, eq, gt, inArray, lt, ne, sql } from 'drizzle-orm';
import type { z } from 'zod';
import { PRESENCE_BEAT_S, type Present, type presenceSchema } from '@/api-types/live';
import { draftPresence, people } from '@/db/schema';
import type { Db } from './database';
import { draftingLayout } from './drafts';
import { done, type Outcome } from './outcomes';
import type { Actor } from './permissions';

/** Somebody not heard of for this long, s, is gone: two beats may be lost, as on a train. */
export const AWAY_AFTER_S = 3 * PRESENCE_BEAT_S;
/** Somebody who changed the draft within this, s, is shown as editing it. */
export const EDITING_FOR_S = 60;

const secondsAgo = (seconds: number): Date => new Date(Date.now() - seconds * 1000);

/** Who is present, and where. */
export interface PresentAt extends Present {
  readonly layoutId: string;
}

/** Who else has the drafts of these layouts open just now. */
export const presentAt = async (
  db: Db,
  actor: Actor,
  layoutIds: readonly string[],
): Promise<PresentAt[]> => {
  if (layoutIds.length === 0) return [];
  const rows = await db
    .select({
      layoutId: draftPresence.layoutId,
      person: { id: people.id, name: people.name },
      editedAt: draftPresence.editedAt,
    })
    .from(draftPresence)
    .innerJoin(people, eq(people.id, draftPresence.personId))
    .where(
      and(
        eq(draftPresence.firmId, actor.firmId),
        inArray(draftPresence.layoutId, [...layoutIds]),
        ne(draftPresence.personId, actor.personId),
        gt(draftPresence.seenAt, secondsAgo(AWAY_AFTER_S)),
      ),
    )
    .orderBy(asc(people.name), asc(people.id));
  const editingSince = secondsAgo(EDITING_FOR_S);
  return rows.map(({ layoutId, person, editedAt }) => ({
    layoutId,
    person,
    editing: editedAt !== null && editedAt > editingSince,
  }));
};

/** Takes the beat of an open drafting table, and tells who else is at it. */
export const beat = async (
  db: Db,
  actor: Actor,
  layoutId: string,
  { state }: z.output<typeof presenceSchema>,
): Promise<Outcome<{ present: Present[] }>> => {
  const layout = await draftingLayout(db, actor, layoutId);
  if (!layout.ok) return layout;
  const { firmId, personId } = actor;
  if (state === 'gone') {
    await db
      .delete(draftPresence)
      .where(
        and(
          eq(draftPresence.firmId, firmId),
          eq(draftPresence.layoutId, layoutId),
          eq(draftPresence.personId, personId),
        ),
      );
  } else {
    const seenAt = new Date();
    const editedAt = state === 'editing' ? seenAt : null;
    await db
      .insert(draftPresence)
      .values({ firmId, layoutId, personId, seenAt, editedAt })
      .onConflictDoUpdate({
        target: [draftPresence.firmId, draftPresence.layoutId, draftPresence.personId],
        set: { seenAt, editedAt: sql`coalesce(excluded.edited_at, ${draftPresence.editedAt})` },
      });
    await db.delete(draftPresence).where(lt(draftPresence.seenAt, secondsAgo(AWAY_AFTER_S)));
  }
  const present = await presentAt(db, actor, [layoutId]);
  return done({ present: present.map(({ person, editing }) => ({ person, editing })) });
};
