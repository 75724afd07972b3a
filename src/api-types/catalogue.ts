import { z } from 'zod';
import type { PackMeasure, PriceKind } from '@/takeoff/price-list';
import type { PersonName } from './people';

/**
 * The firm's catalogue: what it buys, from whom, in which packs and at which price from which day. It holds cost
 * prices, so it is the owners' and designers' alone.
 */

export const priceKinds = ['unit', 'aggregate', 'sundry'] as const satisfies readonly PriceKind[];
export const packMeasures = [
  'each',
  'm',
  'm2',
  'm3',
  't',
  'kg',
] as const satisfies readonly PackMeasure[];

/** A day as it is written, `2026-03-01`; one that the calendar has. */
export const daySchema = z
  .string({ error: 'Give a day such as 2026-03-01' })
  .regex(/^\d{4}-\d{2}-\d{2}$/, 'Give a day such as 2026-03-01')
  .refine((day) => {
    const date = new Date(`${day}T00:00:00Z`);
    return !Number.isNaN(date.getTime()) && date.toISOString().startsWith(day);
  }, 'The calendar has no such day')
  .refine((day) => day >= '1990-01-01' && day < '2200-01-01', 'Give a day from 1990 to 2199');

/** Ten thousand million of the smallest coin, far from where whole numbers end in a double. */
const GREATEST_MINOR = 10_000_000_000;

/** Money in whole minor units of the firm's currency. */
export const minorSchema = z
  .number({ error: 'Give an amount of money' })
  .int('Give a whole number of the smallest coin')
  .min(0, 'An amount cannot be less than 0')
  .max(GREATEST_MINOR, 'That is more money than Evenlay can work with');

const positive = (what: string, most: number, unit: string) =>
  z
    .number({ error: `Give ${what} as a number` })
    .positive(`${what[0].toUpperCase()}${what.slice(1)} must be more than 0`)
    .max(most, `${what[0].toUpperCase()}${what.slice(1)} is over ${most} ${unit}`)
    .nullable();

const side = (what: string) => positive(what, 10_000, 'mm');

const fields = z.object({
  kind: z.enum(priceKinds, { error: 'Choose unit, aggregate or sundry' }),
  name: z
    .string({ error: 'Give it a name' })
    .trim()
    .min(1, 'Give it a name')
    .max(80, 'Keep the name to 80 characters'),
  code: z.string().trim().max(60, 'Keep the code to 60 characters'),
  supplierId: z.string().min(1).max(64).nullable(),
  packName: z
    .string({ error: 'Say what is bought at once, such as pallet' })
    .trim()
    .min(1, 'Say what is bought at once, such as pallet')
    .max(60, 'Keep the pack’s name to 60 characters'),
  packHolds: z
    .number({ error: 'Give how much a pack holds' })
    .positive('A pack must hold more than 0')
    .max(1_000_000, 'A pack cannot hold over 1,000,000'),
  packMeasure: z.enum(packMeasures, { error: 'Choose each, m, m2, m3, t or kg' }),
  packWhole: z.boolean({ error: 'Say whether only whole packs are sold' }),
  length: side('the length'),
  width: side('the width'),
  thickness: side('the thickness'),
  tolerance: z
    .number({ error: 'Give the tolerance as a number' })
    .min(0, 'The tolerance cannot be less than 0')
    .max(100, 'The tolerance is over 100 mm')
    .nullable(),
  massKg: positive('the mass', 20_000, 'kg'),
  colour: z
    .string()
    .regex(/^#[0-9a-f]{6}$/i, 'must be a colour such as #e9e4d8')
    .nullable(),
  looseDensity: positive('the loose density', 10_000, 'kg/m³'),
  stoneLeast: z.number().min(0, 'A stone cannot be smaller than 0').max(1000).nullable(),
  stoneGreatest: positive('the largest stone', 1000, 'mm'),
  note: z.string().trim().max(1000, 'Keep the note to 1,000 characters'),
});

type Fields = z.output<typeof fields>;

/** What holds between the fields of one item. */
export const itemFaults = (item: Partial<Fields>): { path: string[]; message: string }[] => {
  const faults: { path: string[]; message: string }[] = [];
  const { kind, stoneLeast = null, stoneGreatest = null, packMeasure } = item;
  if (kind === 'unit') {
    for (const name of ['length', 'width', 'thickness'] as const) {
      if (item[name] == null) faults.push({ path: [name], message: `A unit needs its ${name}` });
    }
    if (packMeasure !== undefined && !['each', 'm2'].includes(packMeasure)) {
      faults.push({ path: ['packMeasure'], message: 'A unit is sold each or by the m2' });
    }
  }
  if ((stoneLeast === null) !== (stoneGreatest === null)) {
    faults.push({
      path: [stoneLeast === null ? 'stoneLeast' : 'stoneGreatest'],
      message: 'Give both the smallest and the largest stone, or neither',
    });
  } else if (stoneLeast !== null && stoneGreatest !== null && stoneLeast > stoneGreatest) {
    faults.push({
      path: ['stoneGreatest'],
      message: 'The largest stone cannot be smaller than the smallest',
    });
  }
  return faults;
};

const checked = <T extends Partial<Fields>>(item: T, context: z.RefinementCtx<T>): void => {
  for (const { path, message } of itemFaults(item)) {
    context.addIssue({ code: 'custom', path, message });
  }
};

const priceSchema = z.object({ costMinor: minorSchema, from: daySchema });

const newFields = fields.extend({
  code: fields.shape.code.default(''),
  supplierId: fields.shape.supplierId.default(null),
  packName: fields.shape.packName.default('each'),
  packHolds: fields.shape.packHolds.default(1),
  packMeasure: fields.shape.packMeasure.default('each'),
  packWhole: fields.shape.packWhole.default(true),
  length: fields.shape.length.default(null),
  width: fields.shape.width.default(null),
  thickness: fields.shape.thickness.default(null),
  tolerance: fields.shape.tolerance.default(null),
  massKg: fields.shape.massKg.default(null),
  colour: fields.shape.colour.default(null),
  looseDensity: fields.shape.looseDensity.default(null),
  stoneLeast: fields.shape.stoneLeast.default(null),
  stoneGreatest: fields.shape.stoneGreatest.default(null),
  note: fields.shape.note.default(''),
  price: priceSchema.nullable().default(null),
});

/** POST /api/catalogue. 201 → `CatalogueItem`; 422 when the supplier sells one of that name already. */
export const newItemSchema = newFields.superRefine(checked);
export type NewItem = z.input<typeof newItemSchema>;
export type ItemFields = Omit<z.output<typeof newItemSchema>, 'price'>;

/**
 * PATCH /api/catalogue/{id}: any of the fields, retiring or taking back; `price` adds to its price history. 200 → `CatalogueItem`;
 * 409 with `current`, the item as it is, when it was changed since `revision`.
 */
export const itemChangeSchema = fields
  .extend({ retired: z.boolean(), price: priceSchema })
  .partial()
  .extend({ revision: z.number({ error: 'names no revision' }).int().min(1) });
export type ItemChange = z.input<typeof itemChangeSchema>;

export interface CataloguePrice {
  readonly costMinor: number;
  /** The day it holds from. */
  readonly from: string;
}

/** An item with the price of today and the next one that is known. */
export interface CatalogueItem extends ItemFields {
  readonly id: string;
  readonly revision: number;
  readonly supplierName: string | null;
  /** Today's; null when none holds yet. */
  readonly price: CataloguePrice | null;
  /** Already entered for a later day. */
  readonly nextPrice: CataloguePrice | null;
  readonly retiredAt: string | null;
  readonly updatedAt: string;
}

const itemSorts = ['name', 'updated'] as const;
export type ItemSort = (typeof itemSorts)[number];

/** GET /api/catalogue?search=…&kind=…&supplier=…&retired=…&sort=…&size=…&after=… → `CataloguePage`. */
export const catalogueQuerySchema = z.object({
  /** Beginnings of words of name and code, all of them. */
  search: z.string().trim().max(120).optional(),
  kind: z.enum(priceKinds).optional(),
  supplier: z.string().max(64).optional(),
  retired: z.enum(['no', 'only']).default('no'),
  sort: z.enum(itemSorts).default('name'),
  size: z.coerce.number().int().min(1).max(200).default(50),
  after: z.string().max(600).optional(),
});
export type CatalogueQuery = z.input<typeof catalogueQuerySchema>;

export interface CataloguePage {
  readonly items: readonly CatalogueItem[];
  readonly next: string | null;
  /** What prices are in, ISO 4217. */
  readonly currency: string;
}

/** GET /api/catalogue/{id}/prices → `{ prices: PriceEntry[] }`, the newest day first. */
export interface PriceEntry extends CataloguePrice {
  readonly at: string;
  readonly by: PersonName;
  /** Whether another price of the same day was entered after it. */
  readonly corrected: boolean;
}

/** GET /api/catalogue/price-list?on=2026-03-01 → `PriceList`; of today without a day. */
export const priceListQuerySchema = z.object({ on: daySchema.optional() });

/** No file of a catalogue may be larger, bytes: some 20,000 rows. */
export const CATALOGUE_FILE_LIMIT = 4_000_000;

/**
 * POST /api/catalogue/import?how=… with the file as the body. `look` reads it and says what it would do; `take` does
 * it, all of it or, when any row is wrong, nothing. 200 → `ImportOutlook`.
 */
export const importQuerySchema = z.object({
  how: z.enum(['look', 'take'], { error: 'must be look or take' }),
  /** The day from which prices hold that give none; today without. */
  from: daySchema.optional(),
});

export interface ImportProblem {
  /** Of the file, counted from 1, its heading included. */
  readonly line: number;
  /** The heading of the column; null for the row as a whole. */
  readonly column: string | null;
  readonly message: string;
}

export interface ImportRow {
  readonly line: number;
  readonly what: 'add' | 'change' | 'same';
  readonly name: string;
  readonly kind: PriceKind;
  /** What would change, in the headings' words. */
  readonly changes: readonly string[];
}

export interface ImportOutlook {
  readonly taken: boolean;
  readonly added: number;
  readonly changed: number;
  readonly same: number;
  /** Suppliers that the catalogue does not have yet and would be added by name. */
  readonly newSuppliers: readonly string[];
  /** The first of them. */
  readonly problems: readonly ImportProblem[];
  readonly problemCount: number;
  /** The first of the rows that can be read, for looking over. */
  readonly rows: readonly ImportRow[];
  /** Headings that mean nothing here and are passed over. */
  readonly unknownColumns: readonly string[];
}
