import {
  daySchema,
  newItemSchema,
  type CataloguePrice,
  type ImportProblem,
  type ImportRow,
  type ItemFields,
} from '@/api-types/catalogue';
import { dayText } from '@/takeoff/day-text';
import { formatMoney } from '@/takeoff/money';
import { stepsRun, type Steps } from '../steps';
import { COLUMNS, type Field } from './csv-columns';
import type { ReadRow } from './csv-reading';

/** An item as the catalogue has it, with every price that was entered for it, in the order of their days and entry. */
export interface KnownItem {
  readonly id: string;
  readonly fields: ItemFields;
  readonly retired: boolean;
  readonly revision: number;
  readonly prices: readonly CataloguePrice[];
}

/** What one row of a file does to the catalogue. */
export interface PlannedItem {
  /** Null for a new one. */
  readonly known: KnownItem | null;
  /** All but the supplier, who may have to be added first. */
  readonly fields: ItemFields;
  /** Empty for none. */
  readonly supplier: string;
  readonly retired: boolean;
  /** To be added to the price history; null for none. */
  readonly price: CataloguePrice | null;
  readonly row: ImportRow;
}

/** What reading a file in would do, or why it cannot be. */
export interface ImportPlan {
  readonly items: readonly PlannedItem[];
  readonly problems: readonly ImportProblem[];
  readonly newSuppliers: readonly string[];
}

/** The catalogue that a file is read into. */
export interface KnownCatalogue {
  readonly items: readonly KnownItem[];
  readonly suppliers: readonly { readonly id: string; readonly name: string }[];
  readonly currency: string;
  /** The day from which prices hold that give none. */
  readonly from: string;
}

const headingOf = (field: unknown): string | null =>
  COLUMNS.find((column) => column.field === (field === 'costMinor' ? 'cost' : field))?.heading ??
  null;

const key = (name: string, supplier: string): string =>
  JSON.stringify([name.trim().toLowerCase(), supplier.trim().toLowerCase()]);

const heldOn = (prices: readonly CataloguePrice[], day: string): CataloguePrice | undefined =>
  prices.filter(({ from }) => from <= day).at(-1);

const ITEM_FIELDS = COLUMNS.map(({ field }) => field).filter(
  (field): field is Exclude<Field, 'reference' | 'supplier' | 'cost' | 'from' | 'retired'> =>
    !['reference', 'supplier', 'cost', 'from', 'retired'].includes(field),
);

/**
 * What a file would do, row by row, without doing it. A row is of an item that its reference names, else of the one offered
 * under its name by its supplier, else new. Columns that the file lacks leave an item as it is.
 */
export const importPlan = (rows: readonly ReadRow[], known: KnownCatalogue): ImportPlan =>
  stepsRun(importSteps(rows, known));

/** The same, a row a step. */
export function* importSteps(rows: readonly ReadRow[], known: KnownCatalogue): Steps<ImportPlan> {
  const byId = new Map(known.items.map((item) => [item.id, item]));
  const supplierNames = new Map(known.suppliers.map(({ id, name }) => [id, name]));
  const nameOf = (id: string | null) => (id === null ? '' : (supplierNames.get(id) ?? ''));
  const offered = new Map(
    known.items
      .filter(({ retired }) => !retired)
      .map((item) => [key(item.fields.name, nameOf(item.fields.supplierId)), item]),
  );
  const takenOn = new Map<string, number>();
  const problems: ImportProblem[] = [];
  const items: PlannedItem[] = [];
  const newSuppliers = new Map<string, string>();
  const haveSupplier = new Set(known.suppliers.map(({ name }) => name.toLowerCase()));

  for (const { line, values, problems: cellProblems } of rows) {
    const own: ImportProblem[] = [...cellProblems];
    const problem = (column: string | null, message: string) => own.push({ line, column, message });
    const reference = String(values.reference ?? '');
    const named = reference === '' ? undefined : byId.get(reference);
    if (reference !== '' && !named) {
      problem(
        'Reference',
        `“${reference}” is not an item of this catalogue. Leave it empty to add the item anew.`,
      );
    }
    const supplier =
      values.supplier === undefined
        ? nameOf(named?.fields.supplierId ?? null)
        : String(values.supplier).trim();
    if (supplier.length > 120) problem('Supplier', 'Keep the name to 120 characters');
    const item = named ?? offered.get(key(String(values.name ?? ''), supplier));

    const given = Object.fromEntries(
      ITEM_FIELDS.filter((field) => field in values).map((field) => [field, values[field]]),
    );
    const checked = newItemSchema.safeParse({
      ...item?.fields,
      ...given,
      supplierId: item?.fields.supplierId ?? null,
      price: null,
    });
    const wrongCells = new Set(cellProblems.map(({ column }) => column));
    for (const issue of checked.success ? [] : checked.error.issues) {
      const heading = headingOf(issue.path[0]);
      if (!wrongCells.has(heading)) problem(heading, issue.message);
    }

    const cost = values.cost as number | null | undefined;
    const day = values.from as string | null | undefined;
    let price: CataloguePrice | null = null;
    if (cost == null && day != null && !wrongCells.has('Price')) {
      problem('Price from', 'gives a day, but the row has no price');
    } else if (day != null && !daySchema.safeParse(day).success) {
      problem('Price from', `“${day}” is not a day. Write one such as 2026-03-01.`);
    } else if (cost != null) {
      const costChecked = newItemSchema.shape.price.safeParse({ costMinor: cost, from: day ?? known.from }); // prettier-ignore
      if (!costChecked.success) problem('Price', costChecked.error.issues[0].message);
      else price = costChecked.data;
    }
    const held = price && item ? heldOn(item.prices, price.from) : undefined;
    if (held && price && held.costMinor === price.costMinor) price = null;

    if (checked.success && own.length === 0) {
      const retired = values.retired === undefined ? (item?.retired ?? false) : values.retired === true; // prettier-ignore
      const marks = [
        ...(item ? [item.id] : []),
        ...(retired ? [] : [key(checked.data.name, supplier)]),
      ];
      const before = marks.map((mark) => takenOn.get(mark)).find((at) => at !== undefined);
      if (before !== undefined) {
        problem('Name', `is the same item as line ${before}`);
      } else {
        const other = retired ? undefined : offered.get(key(checked.data.name, supplier));
        if (other && other.id !== item?.id) {
          problem('Name', 'is the name of another item of this supplier in the catalogue');
        }
      }
      for (const mark of marks) takenOn.set(mark, line);
      if (own.length === 0) {
        const { price: _, ...fields } = checked.data;
        const changes = changesOf(item, fields, supplier, nameOf, retired, price, known.currency);
        items.push({
          known: item ?? null,
          fields,
          supplier,
          retired,
          price,
          row: {
            line,
            what: item ? (changes.length > 0 ? 'change' : 'same') : 'add',
            name: fields.name,
            kind: fields.kind,
            changes: item
              ? changes
              : price
                ? [`Price ${formatMoney(price.costMinor, known.currency)}`]
                : [],
          },
        });
        if (supplier !== '' && !haveSupplier.has(supplier.toLowerCase())) {
          newSuppliers.set(supplier.toLowerCase(), supplier);
        }
      }
    }
    problems.push(...own);
    yield;
  }
  return { items, problems, newSuppliers: [...newSuppliers.values()] };
}

const changesOf = (
  item: KnownItem | undefined,
  fields: ItemFields,
  supplier: string,
  nameOf: (id: string | null) => string,
  retired: boolean,
  price: CataloguePrice | null,
  currency: string,
): string[] => {
  if (!item) return [];
  const changed = ITEM_FIELDS.filter((field) => fields[field] !== item.fields[field]).map(
    (field) => headingOf(field) ?? field,
  );
  return [
    ...changed,
    ...(supplier.toLowerCase() === nameOf(item.fields.supplierId).toLowerCase()
      ? []
      : ['Supplier']),
    ...(retired === item.retired ? [] : [retired ? 'Retired' : 'Offered again']),
    ...(price
      ? [`Price ${formatMoney(price.costMinor, currency)} from ${dayText(price.from)}`]
      : []),
  ];
};
