import { asc, eq, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { ImportOutlook, ImportProblem, importQuerySchema } from '@/api-types/catalogue';
import { catalogueItems, cataloguePrices, suppliers } from '@/db/schema';
import { recordAudit } from '../audit';
import type { Db } from '../database';
import { newId } from '../ids';
import { done, type Outcome } from '../outcomes';
import { refuseUnlessPricing, type Actor } from '../permissions';
import { isUniqueViolation } from '../postgres-errors';
import { today } from '../today';
import { lockCatalogue } from './catalogue-lock';
import { catalogueFileRead } from './csv-reading';
import { importPlan, type ImportPlan, type KnownCatalogue, type PlannedItem } from './import-plan';
import { fieldsOf } from './item-rows';
import { currencyOf } from './pricing-settings';

/** Rows put in at a time: PostgreSQL takes at most 65,535 values a statement. */
const ROWS_AT_ONCE = 500;
/** Rows and problems that are shown; the counts are of all. */
const SHOWN = 300;

const knownCatalogue = async (db: Db, firmId: string, from: string): Promise<KnownCatalogue> => {
  const rows = await db.select().from(catalogueItems).where(eq(catalogueItems.firmId, firmId));
  const prices = await db
    .select({
      itemId: cataloguePrices.itemId,
      costMinor: cataloguePrices.costMinor,
      from: cataloguePrices.fromDay,
    })
    .from(cataloguePrices)
    .where(eq(cataloguePrices.firmId, firmId))
    .orderBy(asc(cataloguePrices.fromDay), asc(cataloguePrices.place));
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
  }
};

const addSuppliers = async (tx: Db, firmId: string, names: readonly string[]) => {
  const added = names.map((name) => ({ id: newId(), firmId, name }));
  await inParts(added, (part) => tx.insert(suppliers).values(part));
  return added;
};

/** What an import writes over in an item that is there already. */
const WRITTEN = {
  kind: sql`excluded.kind`,
  name: sql`excluded.name`,
  code: sql`excluded.code`,
  supplierId: sql`excluded.supplier_id`,
  packName: sql`excluded.pack_name`,
  packHolds: sql`excluded.pack_holds`,
  packMeasure: sql`excluded.pack_measure`,
  packWhole: sql`excluded.pack_whole`,
  length: sql`excluded.length`,
  width: sql`excluded.width`,
  thickness: sql`excluded.thickness`,
  tolerance: sql`excluded.tolerance`,
  massKg: sql`excluded.mass_kg`,
  colour: sql`excluded.colour`,
  looseDensity: sql`excluded.loose_density`,
  stoneLeast: sql`excluded.stone_least`,
  stoneGreatest: sql`excluded.stone_greatest`,
  note: sql`excluded.note`,
  revision: sql`excluded.revision`,
  retiredAt: sql`case when excluded.retired_at is null then null
    else coalesce(${catalogueItems.retiredAt}, excluded.retired_at) end`,
  updatedAt: sql`excluded.updated_at`,
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
  await inParts(written, (part) =>
    tx
      .insert(catalogueItems)
      .values(part.map(row))
      .onConflictDoUpdate({ target: catalogueItems.id, set: WRITTEN }),
  );
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
  await inParts(prices, (part) => tx.insert(cataloguePrices).values(part));
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
    const known = await knownCatalogue(tx, actor.firmId, from);
    const read = catalogueFileRead(text, known.currency);
    const plan = importPlan(read.rows, known);
    return {
      known,
      unknownColumns: read.unknownColumns,
      plan: { ...plan, problems: [...read.problems, ...plan.problems] },
    };
  };
  if (how === 'look') {
    const { plan, unknownColumns } = await planned(db);
    return done(outlookOf(plan, unknownColumns, false));
  }
  let clashed: ImportOutlook | undefined;
  try {
    return await db.transaction(async (tx): Promise<Outcome<ImportOutlook>> => {
      await lockCatalogue(tx, actor.firmId);
      const { known, plan, unknownColumns } = await planned(tx);
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
