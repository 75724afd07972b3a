import type { CatalogueItem, ItemFields } from '@/api-types/catalogue';
import { formatLength, formatSize, type Display } from '@/paving/length';
import { amountText } from '@/takeoff/amount-text';
import type { PackMeasure, PriceKind } from '@/takeoff/price-list';

export const KIND_WORDS: Readonly<Record<PriceKind, string>> = {
  unit: 'Unit',
  aggregate: 'Aggregate',
  sundry: 'Sundry',
};

export const MEASURE_WORDS: readonly (readonly [PackMeasure, string])[] = [
  ['each', 'pieces'],
  ['m', 'metres'],
  ['m2', 'square metres'],
  ['m3', 'cubic metres'],
  ['t', 'tonnes'],
  ['kg', 'kilograms'],
];

/** What an item is, in one line: a unit's size, an aggregate's stone. */
export function itemMeasure(item: CatalogueItem, display: Display): string {
  const { length, width, thickness, stoneLeast, stoneGreatest, looseDensity } = item;
  if (length !== null && width !== null) {
    const thick =
      thickness === null ? '' : `, ${formatLength(thickness, display, { decimals: 1 })} thick`;
    return formatSize(length, width, display) + thick;
  }
  if (stoneLeast !== null && stoneGreatest !== null) {
    const least = formatLength(stoneLeast, display, { decimals: 1, unit: false });
    return `stone ${least}–${formatLength(stoneGreatest, display, { decimals: 1 })}`;
  }
  return looseDensity === null ? '' : `${amountText(looseDensity)}\u202fkg/m³ loose`;
}

/** Names of fields as a person reads them, for what changed meanwhile. */
export const FIELD_WORDS: Readonly<Record<keyof ItemFields, string>> = {
  kind: 'Kind',
  name: 'Name',
  code: 'Supplier’s code',
  supplierId: 'Supplier',
  packName: 'Pack',
  packHolds: 'Pack holds',
  packMeasure: 'Measure',
  packWhole: 'Whole packs only',
  length: 'Length',
  width: 'Width',
  thickness: 'Thickness',
  tolerance: 'Tolerance',
  massKg: 'Mass of one',
  colour: 'Colour',
  looseDensity: 'Loose density',
  stoneLeast: 'Smallest stone',
  stoneGreatest: 'Largest stone',
  note: 'Note',
};

/** The day today, as the reader's own calendar has it. */
export function todayHere(): string {
  const now = new Date();
  const two = (n: number) => String(n).padStart(2, '0');
  return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
}
