import { and, desc, eq, sql } from 'drizzle-orm';
import type { SetAsideDetail, SetAsideSummary } from '@/api-types/layouts';
import { people, setAsideDrafts } from '@/db/schema';
import type { LayoutDocument } from '@/paving/layout-document';
import type { Db } from './database';
import { newId } from './ids';
import { seenLayout } from './layouts';
import { done, notFound, type Outcome } from './outcomes';
import { refuseUnlessDrafting, type Actor } from './permissions';

const columns = {
  id: setAsideDrafts.id,
  layoutId: setAsideDrafts.layoutId,
  baseRevision: setAsideDrafts.baseRevision,
  at: setAsideDrafts.at,
  person: { id: people.id, name: people.name },
};

interface Row {
  readonly id: string;
  readonly layoutId: string;
  readonly baseRevision: number;
  readonly at: Date;
  readonly person: { readonly id: string; readonly name: string };
}

const summaryOf = ({ at, ...row }: Row): SetAsideSummary => ({ ...row, at: at.toISOString() });

/** Keeps work that was not stored as the draft. The same work sent again is kept once. */
export const setAside = async (
  tx: Db,
  actor: Actor,
  layoutId: string,
  baseRevision: number,
  document: LayoutDocument,
): Promise<SetAsideSummary> => {
  const same = and(
    eq(setAsideDrafts.firmId, actor.firmId),
    eq(setAsideDrafts.layoutId, layoutId),
    eq(setAsideDrafts.personId, actor.personId),
    eq(setAsideDrafts.baseRevision, baseRevision),
    sql`${setAsideDrafts.document} = ${JSON.stringify(document)}::jsonb`,
  );
  const find = () =>
    tx
      .select(columns)
      .from(setAsideDrafts)
      .innerJoin(people, eq(people.id, setAsideDrafts.personId))
      .where(same)
      .limit(1);
  const [kept] = await find();
  if (kept) return summaryOf(kept);
  await tx.insert(setAsideDrafts).values({
    id: newId(),
    firmId: actor.firmId,
    layoutId,
    personId: actor.personId,
    baseRevision,
    document,
  });
  return summaryOf((await find())[0]);
};

/** What was set aside of a layout, newest first. */
export const listSetAside = async (
  db: Db,
  actor: Actor,
  layoutId: string,
): Promise<Outcome<SetAsideSummary[]>> => {
  if (!(await seenLayout(db, actor, layoutId))) return notFound('layout');
  const refusal = refuseUnlessDrafting(actor);
  if (refusal) return refusal;
  const rows = await db
    .select(columns)
    .from(setAsideDrafts)
    .innerJoin(people, eq(people.id, setAsideDrafts.personId))
    .where(and(eq(setAsideDrafts.firmId, actor.firmId), eq(setAsideDrafts.layoutId, layoutId)))
    .orderBy(desc(setAsideDrafts.at), desc(setAsideDrafts.id));
  return done(rows.map(summaryOf));
};

/** A draft that was set aside, with its document. Not found: no such one, or not theirs. */
export const openSetAside = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<SetAsideDetail>> => {
  const [row] = await db
    .select({ ...columns, document: setAsideDrafts.document })
    .from(setAsideDrafts)
    .innerJoin(people, eq(people.id, setAsideDrafts.personId))
    .where(and(eq(setAsideDrafts.firmId, actor.firmId), eq(setAsideDrafts.id, id)));
  if (!row || !(await seenLayout(db, actor, row.layoutId))) return notFound('draft set aside');
  const refusal = refuseUnlessDrafting(actor);
  if (refusal) return refusal;
  const { document, ...rest } = row;
  return done({ ...summaryOf(rest), document });
};
