import { and, asc, eq, gt, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { ImportOutlook, ImportProblem, importQuerySchema } from '@/api-types/catalogue';
import { catalogueItems, cataloguePrices, suppliers } from '@/db/schema';
import { recordAudit } from '../audit';
import type { Db } from '../database';
import { newId } from '../ids';
import { done, type Outcome } from '../outcomes';
import { refuseUnlessPricing, type Actor } from '../permissions';
import { isUniqueViolation } from '../postgres-errors';
import { rowsInserted } from '../rows-inserted';
import { rest, stepsWithRests } from '../steps';
import { today } from '../today';
import { lockCatalogue } from './catalogue-lock';
import { catalogueFileSteps } from './csv-reading';
import { importSteps, type ImportPlan, type KnownCatalogue, type PlannedItem } from './import-plan';
import { fieldsOf } from './item-rows';
import { currencyOf } from './pricing-settings';

/** Rows put in and read at a time: after so many, others have their turn on the thread. */
const ROWS_AT_ONCE = 250;
const ROWS_READ_AT_ONCE = 1000;
/** Rows and problems that are shown; the counts are of all. */
const SHOWN = 300;

/** Of everything that an import is planned by: another one says that something was changed. */
const catalogueStamp = async (db: Db, firmId: string): Promise<string> => {
  const [{ items }] = await db
    .select({
      items: sql<string>`concat(count(*), ' ', sum(${catalogueItems.revision}), ' ', max(${catalogueItems.updatedAt}))`,
    })
    .from(catalogueItems)
    .where(eq(catalogueItems.firmId, firmId));
  const [{ prices }] = await db
    .select({ prices: sql<string>`concat(count(*), ' ', max(${cataloguePrices.at}))` })
    .from(cataloguePrices)
    .where(eq(cataloguePrices.firmId, firmId));
  const [{ sellers }] = await db
    .select({
      sellers: sql<string>`concat(count(*), ' ', sum(${suppliers.revision}), ' ', max(${suppliers.createdAt}))`,
    })
    .from(suppliers)
    .where(eq(suppliers.firmId, firmId));
  return [items, prices, sellers, await currencyOf(db, firmId)].join(', ');
};

/** All rows of a table by id, some at a time. */
const everyRow = async <T extends { readonly id: string }>(
  some: (after: string) => Promise<T[]>,
): Promise<T[]> => {
  const all: T[] = [];
  for (;;) {
    const rows = await some(all.at(-1)?.id ?? '');
    all.push(...rows);
    if (rows.length < ROWS_READ_AT_ONCE) return all;
    await rest();
  }
};

const knownCatalogue = async (db: Db, firmId: string, from: string): Promise<KnownCatalogue> => {
  const rows = await everyRow((after) =>
    db
      .select()
      .from(catalogueItems)
      .where(and(eq(catalogueItems.firmId, firmId), gt(catalogueItems.id, after)))
      .orderBy(asc(catalogueItems.id))
      .limit(ROWS_READ_AT_ONCE),
  );
  const entered = await everyRow((after) =>
    db
      .select({
        id: cataloguePrices.id,
        itemId: cataloguePrices.itemId,
        costMinor: cataloguePrices.costMinor,
        from: cataloguePrices.fromDay,
        place: cataloguePrices.place,
      })
      .from(cataloguePrices)
      .where(and(eq(cataloguePrices.firmId, firmId), gt(cataloguePrices.id, after)))
      .orderBy(asc(cataloguePrices.id))
      .limit(ROWS_READ_AT_ONCE),
  );
  const prices = entered
    .sort((one, other) =>
      one.from === other.from ? one.place - other.place : one.from < other.from ? -1 : 1,
    )
    .map(({ itemId, costMinor, from: day }) => ({ itemId, costMinor, from: day }));
  const ofItem = new Map<string, typeof prices>();
  for (const price of prices) {
    const own = ofItem.get(price.itemId);
    if (own) own.push(price);
    else ofItem.set(price.itemId, [price]);
  }
  return {
    items: rows.map((row) => ({
      id: row.id,
      fields: fieldsOf(row),
      retired: row.retiredAt !== null,
      revision: row.revision,
      prices: ofItem.get(row.id) ?? [],
    })),
    suppliers: await db
      .select({ id: suppliers.id, name: suppliers.name })
      .from(suppliers)
      .where(eq(suppliers.firmId, firmId)),
    currency: await currencyOf(db, firmId),
    from,
  };
};

const outlookOf = (
  plan: ImportPlan,
  unknownColumns: readonly string[],
  taken: boolean,
): ImportOutlook => {
  const counted = (what: string) => plan.items.filter(({ row }) => row.what === what).length;
  return {
    taken,
    added: counted('add'),
    changed: counted('change'),
    same: counted('same'),
    newSuppliers: plan.newSuppliers,
    problems: plan.problems.slice(0, SHOWN),
    problemCount: plan.problems.length,
    rows: plan.items.slice(0, SHOWN).map(({ row }) => row),
    unknownColumns,
  };
};

const inParts = async <T>(all: readonly T[], put: (part: T[]) => Promise<unknown>) => {
  for (let from = 0; from < all.length; from += ROWS_AT_ONCE) {
    await put(all.slice(from, from + ROWS_AT_ONCE));
    await rest();
  }
};

const addSuppliers = async (tx: Db, firmId: string, names: readonly string[]) => {
  const added = names.map((name) => ({ id: newId(), firmId, name }));
  await inParts(added, (part) => tx.insert(suppliers).values(part));
  return added;
};

/** What an import writes of an item. */
const WRITTEN = [
  'kind',
  'name',
  'code',
  'supplierId',
  'packName',
  'packHolds',
  'packMeasure',
  'packWhole',
  'length',
  'width',
  'thickness',
  'tolerance',
  'massKg',
  'colour',
  'looseDensity',
  'stoneLeast',
  'stoneGreatest',
  'note',
  'revision',
  'updatedAt',
] as const satisfies readonly (keyof typeof catalogueItems.$inferInsert)[];

/** Puts items in, those that are there already over what was there; `retiredAt` stays where it was. */
const itemsPut = (tx: Db, rows: readonly (typeof catalogueItems.$inferInsert)[]) => {
  const names = ['id', 'firmId', ...WRITTEN, 'retiredAt'] as const;
  const over = WRITTEN.map((name) => {
    const column = sql.identifier(catalogueItems[name].name);
    return sql`${column} = excluded.${column}`;
  });
  return tx.execute(sql`${rowsInserted(catalogueItems, names, rows)}
    on conflict (id) do update set ${sql.join(over, sql`, `)},
    retired_at = case when excluded.retired_at is null then null
      else coalesce(${catalogueItems.retiredAt}, excluded.retired_at) end`);
};

const putIn = async (tx: Db, actor: Actor, plan: ImportPlan, known: KnownCatalogue) => {
  const { firmId } = actor;
  const all = [...known.suppliers, ...(await addSuppliers(tx, firmId, plan.newSuppliers))];
  const supplierIds = new Map(all.map(({ id, name }) => [name.toLowerCase(), id]));
  const now = new Date();
  const written = plan.items
    .filter(({ row }) => row.what !== 'same')
    .map((item) => ({ ...item, id: item.known?.id ?? newId() }));
  const row = ({ id, known: before, fields, supplier, retired }: PlannedItem & { id: string }) => ({
    id,
    firmId,
    ...fields,
    supplierId: supplierIds.get(supplier.toLowerCase()) ?? null,
    revision: (before?.revision ?? 0) + 1,
    retiredAt: retired ? now : null,
    updatedAt: now,
  });
  await inParts(written, (part) => itemsPut(tx, part.map(row)));
  const last = new Map(known.items.map(({ id, prices }) => [id, prices.length]));
  const prices = written.flatMap(({ id, price }) =>
    price
      ? [
          {
            id: newId(),
            firmId,
            itemId: id,
            fromDay: price.from,
            place: (last.get(id) ?? 0) + 1,
            costMinor: price.costMinor,
            setBy: actor.personId,
            at: now,
          },
        ]
      : [],
  );
  const priceNames = ['id', 'firmId', 'itemId', 'fromDay', 'place', 'costMinor', 'setBy', 'at'] as const; // prettier-ignore
  await inParts(prices, (part) => tx.execute(rowsInserted(cataloguePrices, priceNames, part)));
};

/** Spreadsheets write UTF-8, UTF-16 with its mark, or Windows' own letters. */
const fileText = (bytes: Uint8Array): string => {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return new TextDecoder('utf-16le').decode(bytes);
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    return new TextDecoder('windows-1252').decode(bytes);
  }
};

const clash: ImportProblem = {
  line: 1,
  column: null,
  message:
    'Two items would have one name at a supplier on the way, such as two that swap their names. Import one of them first.',
};

/** Reads a file into the catalogue, or only says what that would do. With any row wrong, nothing is taken. */
export const importCatalogue = async (
  db: Db,
  actor: Actor,
  { how, from = today() }: z.output<typeof importQuerySchema>,
  file: Uint8Array,
): Promise<Outcome<ImportOutlook>> => {
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  const text = fileText(file);
  const planned = async (tx: Db) => {
    const stamp = await catalogueStamp(tx, actor.firmId);
    const known = await knownCatalogue(tx, actor.firmId, from);
    const read = await stepsWithRests(catalogueFileSteps(text, known.currency));
    const plan = await stepsWithRests(importSteps(read.rows, known));
    return {
      stamp,
      known,
      unknownColumns: read.unknownColumns,
      plan: { ...plan, problems: [...read.problems, ...plan.problems] },
    };
  };
  // Before the lock, so that nobody waits for it meanwhile; under the lock it is asked whether it still holds.
  const before = await planned(db);
  if (how === 'look') return done(outlookOf(before.plan, before.unknownColumns, false));
  let clashed: ImportOutlook | undefined;
  try {
    return await db.transaction(async (tx): Promise<Outcome<ImportOutlook>> => {
      await lockCatalogue(tx, actor.firmId);
      const holds = (await catalogueStamp(tx, actor.firmId)) === before.stamp;
      const { known, plan, unknownColumns } = holds ? before : await planned(tx);
      if (plan.problems.length > 0) return done(outlookOf(plan, unknownColumns, false));
      clashed = outlookOf({ ...plan, problems: [clash] }, unknownColumns, false);
      await putIn(tx, actor, plan, known);
      const outlook = outlookOf(plan, unknownColumns, true);
      const { added, changed } = outlook;
      await recordAudit(
        tx,
        actor,
        'catalogue.imported',
        { type: 'firm', id: actor.firmId },
        { added, changed, newSuppliers: plan.newSuppliers.length },
      );
      return done(outlook);
    });
  } catch (error) {
    if (clashed && isUniqueViolation(error, 'catalogue_items_offered')) return done(clashed);
    throw error;
  }
};
