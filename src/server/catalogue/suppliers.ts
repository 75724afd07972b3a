import { and, asc, eq, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { newSupplierSchema, Supplier, supplierChangeSchema } from '@/api-types/suppliers';
import { catalogueItems, firms, suppliers } from '@/db/schema';
import { recordAudit } from '../audit';
import type { Db } from '../database';
import { newId } from '../ids';
import { changedMeanwhile, done, invalid, notFound, type Outcome } from '../outcomes';
import { refuseUnlessPricing, type Actor } from '../permissions';
import { isUniqueViolation } from '../postgres-errors';

// Joined with the firm: in a query over one table alone Drizzle names columns without their table.
const supplierRows = (db: Db, firmId: string) =>
  db
    .select({
      supplier: suppliers,
      items: sql<number>`(select count(*) from ${catalogueItems}
        where ${catalogueItems.firmId} = ${suppliers.firmId}
        and ${catalogueItems.supplierId} = ${suppliers.id}
        and ${catalogueItems.retiredAt} is null)`.mapWith(Number),
    })
    .from(suppliers)
    .innerJoin(firms, and(eq(firms.id, suppliers.firmId), eq(firms.id, firmId)))
    .$dynamic();

type Row = Awaited<ReturnType<typeof supplierRows>>[number];

const supplierOf = ({ supplier, items }: Row): Supplier => ({
  id: supplier.id,
  revision: supplier.revision,
  name: supplier.name,
  email: supplier.email,
  phone: supplier.phone,
  address: supplier.address,
  note: supplier.note,
  retiredAt: supplier.retiredAt?.toISOString() ?? null,
  items,
});

const supplierOr = async (db: Db, firmId: string, id: string): Promise<Supplier | null> => {
  const [row] = await supplierRows(db, firmId).where(eq(suppliers.id, id));
  return row ? supplierOf(row) : null;
};

/** All suppliers by name, retired ones among them. Not allowed: who does not see costs. */
export const listSuppliers = async (
  db: Db,
  actor: Actor,
): Promise<Outcome<{ suppliers: Supplier[] }>> => {
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  const rows = await supplierRows(db, actor.firmId).orderBy(
    asc(sql`lower(${suppliers.name})`),
    asc(suppliers.id),
  );
  return done({ suppliers: rows.map(supplierOf) });
};

const unlessTaken = async (
  name: string,
  run: () => Promise<Outcome<Supplier>>,
): Promise<Outcome<Supplier>> => {
  try {
    return await run();
  } catch (error) {
    if (!isUniqueViolation(error, 'suppliers_name')) throw error;
    return invalid(`There is a supplier called “${name}” already.`, [
      { path: ['name'], message: 'There is a supplier of this name already' },
    ]);
  }
};

/** Adds a supplier. Not allowed: who does not see costs. Invalid: a name that another has. */
export const addSupplier = async (
  db: Db,
  actor: Actor,
  input: z.output<typeof newSupplierSchema>,
): Promise<Outcome<Supplier>> => {
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  return unlessTaken(input.name, () =>
    db.transaction(async (tx) => {
      const id = newId();
      await tx.insert(suppliers).values({ id, firmId: actor.firmId, ...input });
      await recordAudit(
        tx,
        actor,
        'supplier.added',
        { type: 'supplier', id },
        { name: input.name },
      );
      return done((await supplierOr(tx, actor.firmId, id))!);
    }),
  );
};

/** Changes a supplier, if it is still at the revision that the person saw; else both sides are given back. */
export const changeSupplier = async (
  db: Db,
  actor: Actor,
  id: string,
  { revision, retired, ...change }: z.output<typeof supplierChangeSchema>,
): Promise<Outcome<Supplier>> => {
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  const own = and(eq(suppliers.firmId, actor.firmId), eq(suppliers.id, id));
  return unlessTaken(change.name ?? 'this', () =>
    db.transaction(async (tx): Promise<Outcome<Supplier>> => {
      const [row] = await tx.select().from(suppliers).where(own).for('update');
      if (!row) return notFound('supplier');
      if (row.revision !== revision) {
        return changedMeanwhile(
          `“${row.name}” was changed since you opened it, so your change was not stored over it.`,
          { current: await supplierOr(tx, actor.firmId, id) },
        );
      }
      await tx
        .update(suppliers)
        .set({
          ...change,
          ...(retired === undefined
            ? {}
            : { retiredAt: retired ? (row.retiredAt ?? new Date()) : null }),
          revision: revision + 1,
        })
        .where(own);
      await recordAudit(
        tx,
        actor,
        retired ? 'supplier.retired' : 'supplier.changed',
        { type: 'supplier', id },
        { name: change.name ?? row.name },
      );
      return done((await supplierOr(tx, actor.firmId, id))!);
    }),
  );
};
