import { formatCount } from '@/paving/count';

/** Amounts are written to a thousandth, as they are ordered. */
const DECIMALS = 3;

/** So many of something, as it is printed: `1 240`, `12.5`, `0.125`; noughts at the end are left out. */
export function amountText(amount: number): string {
  const [whole, part] = Math.abs(amount).toFixed(DECIMALS).split('.');
  const decimals = part.replace(/0+$/, '');
  const figures = formatCount(Number(whole)) + (decimals ? `.${decimals}` : '');
  return amount < 0 && figures !== '0' ? `−${figures}` : figures;
}
