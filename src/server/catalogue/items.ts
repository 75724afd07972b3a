import { and, eq, max } from 'drizzle-orm';
import type { z } from 'zod';
import {
  itemFaults,
  type CatalogueItem,
  type CataloguePrice,
  type itemChangeSchema,
  type newItemSchema,
} from '@/api-types/catalogue';
import { catalogueItems, cataloguePrices, suppliers } from '@/db/schema';
import { recordAudit } from '../audit';
import type { Db } from '../database';
import { newId } from '../ids';
import { changedMeanwhile, done, invalid, notFound, type Outcome } from '../outcomes';
import { refuseUnlessPricing, type Actor } from '../permissions';
import { isUniqueViolation } from '../postgres-errors';
import { today } from '../today';
import { fieldsOf, itemOf, itemsOn } from './item-rows';
import { itemUses } from './item-uses';
import { lockCatalogue } from './catalogue-lock';

const ofItem = (actor: Actor, id: string) =>
  and(eq(catalogueItems.firmId, actor.firmId), eq(catalogueItems.id, id));

const itemOr = async (db: Db, actor: Actor, id: string): Promise<CatalogueItem | null> => {
  const [row] = await itemsOn(db, today()).where(ofItem(actor, id));
  return row ? itemOf(row) : null;
};

/** One item with its price of today. Not allowed: who does not see costs. */
export const openItem = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<CatalogueItem>> => {
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  const item = await itemOr(db, actor, id);
  return item ? done(item) : notFound('item of the catalogue');
};

/** Adds to an item's price history; the price that it had before is kept. */
const addPrice = async (
  tx: Db,
  actor: Actor,
  itemId: string,
  { costMinor, from }: CataloguePrice,
): Promise<void> => {
  const [{ last }] = await tx
    .select({ last: max(cataloguePrices.place) })
    .from(cataloguePrices)
    .where(and(eq(cataloguePrices.firmId, actor.firmId), eq(cataloguePrices.itemId, itemId)));
  await tx.insert(cataloguePrices).values({
    id: newId(),
    firmId: actor.firmId,
    itemId,
    fromDay: from,
    place: (last ?? 0) + 1,
    costMinor,
    setBy: actor.personId,
    at: new Date(),
  });
};

/** A supplier of the firm, or none at all. */
const hasSupplier = async (tx: Db, actor: Actor, id: string | null): Promise<boolean> =>
  id === null ||
  (
    await tx
      .select({ id: suppliers.id })
      .from(suppliers)
      .where(and(eq(suppliers.firmId, actor.firmId), eq(suppliers.id, id)))
  ).length > 0;

const noSupplier = () =>
  invalid('That supplier is not in the catalogue.', [
    { path: ['supplierId'], message: 'Choose a supplier of the catalogue' },
  ]);

const nameTaken = (name: string) =>
  invalid(`The catalogue has “${name}” from this supplier already.`, [
    { path: ['name'], message: 'The catalogue has one of this name from this supplier already' },
  ]);

/** Runs a change; a name that is taken is said, not thrown. */
const unlessTaken = async (
  name: string,
  run: () => Promise<Outcome<CatalogueItem>>,
): Promise<Outcome<CatalogueItem>> => {
  try {
    return await run();
  } catch (error) {
    if (isUniqueViolation(error, 'catalogue_items_offered')) return nameTaken(name);
    throw error;
  }
};

/**
 * Adds an item, with its first price if it has one. Not allowed: who does not see costs. Invalid: a name that its
 * supplier has already, a supplier of nobody.
 */
export const addItem = async (
  db: Db,
  actor: Actor,
  input: z.output<typeof newItemSchema>,
): Promise<Outcome<CatalogueItem>> => {
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  const { price, ...fields } = input;
  return unlessTaken(fields.name, () =>
    db.transaction(async (tx): Promise<Outcome<CatalogueItem>> => {
      await lockCatalogue(tx, actor.firmId);
      if (!(await hasSupplier(tx, actor, fields.supplierId))) return noSupplier();
      const id = newId();
      await tx.insert(catalogueItems).values({ id, firmId: actor.firmId, ...fields });
      if (price) await addPrice(tx, actor, id, price);
      const { name, kind } = fields;
      await recordAudit(tx, actor, 'item.added', { type: 'item', id }, { name, kind });
      return done((await itemOr(tx, actor, id))!);
    }),
  );
};

/** Changes an item, if it is still at the revision that the person saw; else both sides are given back. */
export const changeItem = async (
  db: Db,
  actor: Actor,
  id: string,
  { revision, retired, price, ...change }: z.output<typeof itemChangeSchema>,
): Promise<Outcome<CatalogueItem>> => {
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  return unlessTaken(change.name ?? 'this', () =>
    db.transaction(async (tx): Promise<Outcome<CatalogueItem>> => {
      await lockCatalogue(tx, actor.firmId);
      const [row] = await tx.select().from(catalogueItems).where(ofItem(actor, id)).for('update');
      if (!row) return notFound('item of the catalogue');
      if (row.revision !== revision) {
        return changedMeanwhile(
          `“${row.name}” was changed since you opened it, so your change was not stored over it.`,
          { current: await itemOr(tx, actor, id) },
        );
      }
      const fields = { ...fieldsOf(row), ...change };
      const faults = itemFaults(fields);
      if (faults.length > 0) return invalid('Some of what was sent is not right.', faults);
      if (!(await hasSupplier(tx, actor, fields.supplierId))) return noSupplier();
      const isRetired = row.retiredAt !== null;
      await tx
        .update(catalogueItems)
        .set({
          ...change,
          ...(retired === undefined
            ? {}
            : { retiredAt: retired ? (row.retiredAt ?? new Date()) : null }),
          revision: revision + 1,
          updatedAt: new Date(),
        })
        .where(ofItem(actor, id));
      if (price) await addPrice(tx, actor, id, price);
      const subject = { type: 'item', id } as const;
      if (retired !== undefined && retired !== isRetired) {
        await recordAudit(tx, actor, retired ? 'item.retired' : 'item.offered-again', subject, {
          name: fields.name,
        });
      }
      if (Object.keys(change).length > 0 || price) {
        const changed = [...Object.keys(change), ...(price ? ['price'] : [])];
        await recordAudit(tx, actor, 'item.changed', subject, {
          name: fields.name,
          what: changed.join(', '),
          ...(price ? { from: price.from } : {}),
        });
      }
      return done((await itemOr(tx, actor, id))!);
    }),
  );
};

/** Takes an item out for good, with its prices, if nothing was made with it; what was is retired instead. */
export const removeItem = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<Record<string, never>>> => {
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  return db.transaction(async (tx): Promise<Outcome<Record<string, never>>> => {
    const [row] = await tx.select().from(catalogueItems).where(ofItem(actor, id)).for('update');
    if (!row) return notFound('item of the catalogue');
    if (await itemUses(tx, actor, id)) {
      return changedMeanwhile(
        `“${row.name}” is used by a layout, a version or an order, so it cannot be taken out. Retire it: then it is no longer offered, and what was made with it stays as it is.`,
      );
    }
    await tx.delete(catalogueItems).where(ofItem(actor, id));
    await recordAudit(tx, actor, 'item.removed', { type: 'item', id }, { name: row.name });
    return done({});
  });
};
