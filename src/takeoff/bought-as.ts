import { amountText } from './amount-text';
import type { PackMeasure, PriceItem } from './price-list';

export const MEASURE_SIGNS: Readonly<Record<PackMeasure, string>> = {
  each: 'pieces',
  m: 'm',
  m2: 'm²',
  m3: 'm³',
  t: 't',
  kg: 'kg',
};

/** What is bought at once, in words: `pallet of 288`, `bulk bag of 0.8 t`, `each`. */
export function boughtAs({ name, holds, measure }: PriceItem['pack']): string {
  if (holds === 1 && (measure === 'each' || name.toLowerCase() === measure)) return name;
  const amount = `${amountText(holds)}${measure === 'each' ? '' : `\u202f${MEASURE_SIGNS[measure]}`}`;
  return `${name} of ${amount}`;
}
