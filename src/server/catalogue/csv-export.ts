import { asc, eq } from 'drizzle-orm';
import Papa from 'papaparse';
import { catalogueItems } from '@/db/schema';
import type { Db } from '../database';
import { done, type Outcome } from '../outcomes';
import { refuseUnlessPricing, type Actor } from '../permissions';
import { today } from '../today';
import { COLUMNS, type CatalogueRow } from './csv-columns';
import { fieldsOf, itemsOn, type ItemRow } from './item-rows';
import { currencyOf } from './pricing-settings';

const rowOfItem = ({ item, supplierName, price }: ItemRow): CatalogueRow => ({
  ...fieldsOf(item),
  reference: item.id,
  supplier: supplierName ?? '',
  price,
  retired: item.retiredAt !== null,
});

/** Rows as the text of a file, headings first; lines end as RFC 4180 has them. */
export const catalogueCsv = (rows: readonly CatalogueRow[], currency: string): string =>
  Papa.unparse(
    {
      fields: COLUMNS.map(({ heading }) => heading),
      data: rows.map((row) => COLUMNS.map(({ write }) => write(row, currency))),
    },
    { newline: '\r\n' },
  ) + '\r\n';

/** The whole catalogue with today's prices, retired items too. */
export const exportCatalogue = async (db: Db, actor: Actor): Promise<Outcome<Uint8Array>> => {
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  const rows = await itemsOn(db, today())
    .where(eq(catalogueItems.firmId, actor.firmId))
    .orderBy(asc(catalogueItems.kind), asc(catalogueItems.name), asc(catalogueItems.id));
  const csv = catalogueCsv(rows.map(rowOfItem), await currencyOf(db, actor.firmId));
  // Spreadsheets read a file as UTF-8 when it begins with this mark.
  return done(new TextEncoder().encode(`\ufeff${csv}`));
};
