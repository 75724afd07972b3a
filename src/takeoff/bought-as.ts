import { amountText } from './amount-text';
import type { PackMeasure, PriceItem } from './price-list';

const MEASURE_SIGNS: Readonly<Record<PackMeasure, string>> = {
  each: 'pieces',
  m: 'm',
  m2: 'm²',
  m3: 'm³',
  t: 't',
  kg: 'kg',
};

/** Packs that are their measure, by whatever of its names. */
const MEASURE_NAMES: Readonly<Record<PackMeasure, readonly string[]>> = {
  each: [],
  m: ['m', 'metre'],
  m2: ['m2', 'm²', 'square metre'],
  m3: ['m3', 'm³', 'cubic metre'],
  t: ['t', 'tonne'],
  kg: ['kg', 'kilogram'],
};

/** What is bought at once, in words: `pallet of 288`, `bulk bag of 0.8 t`, `each`. */
export function boughtAs({ name, holds, measure }: PriceItem['pack']): string {
  if (holds === 1 && (measure === 'each' || MEASURE_NAMES[measure].includes(name.toLowerCase()))) {
    return name;
  }
  const amount = `${amountText(holds)}${measure === 'each' ? '' : `\u202f${MEASURE_SIGNS[measure]}`}`;
  return `${name} of ${amount}`;
}
