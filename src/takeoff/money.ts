import { formatCount } from '@/paving/count';

/**
 * Money as whole minor units (cents, pence, yen, fils). Products and shares go through whole numbers of
 * any length and are rounded once, by a rule that is stated; no float stands for money on the way.
 */

/** `halfUp` rounds a half away from nought, `halfEven` to the even neighbour. */
export type RoundingRule = 'halfUp' | 'halfEven';

export interface Rounding {
  readonly rule: RoundingRule;
  /** Totals are rounded to so many minor units: 1, or 5 where the smallest coin is 5. */
  readonly step: number;
}

export const PLAIN_ROUNDING: Rounding = { rule: 'halfUp', step: 1 };

/** Whole hundredths of a per cent in the whole. */
export const WHOLE_BASIS_POINTS = 10_000;
/** Amounts are reckoned to a millionth; no measure of a floor is finer. */
const AMOUNT_PARTS = 1_000_000;

/**
 * Currencies of ISO 4217 whose minor unit is not a hundredth, by how many figures follow the point. Not
 * taken from Intl: there browsers and the server may differ (for RSD they do), which would make one
 * amount a hundred times the other.
 */
const EXPONENTS: Readonly<Record<number, string>> = {
  0: 'BIF CLP DJF GNF ISK JPY KMF KRW PYG RWF UGX UYI VND VUV XAF XOF XPF',
  3: 'BHD IQD JOD KWD LYD OMR TND',
  4: 'CLF UYW',
};
const EXPONENT_OF = new Map(
  Object.entries(EXPONENTS).flatMap(([exponent, codes]) =>
    codes.split(' ').map((code) => [code, Number(exponent)] as const),
  ),
);

/** Figures after the point of a currency: 2 for most, 0 for JPY, 3 for KWD (ISO 4217). */
export const currencyExponent = (currency: string): number => EXPONENT_OF.get(currency) ?? 2;

function wholeMinor(minor: number): bigint {
  if (!Number.isSafeInteger(minor)) throw new Error(`${minor} is not whole minor units`);
  return BigInt(minor);
}

/** A number of things as whole millionths; finer is rounded off. */
function amountParts(amount: number): bigint {
  if (!Number.isFinite(amount)) throw new Error(`${amount} is not an amount`);
  return BigInt(Math.round(amount * AMOUNT_PARTS));
}

/** over ÷ under as a whole number; under is not nought. */
export function ratioRounded(over: bigint, under: bigint, rule: RoundingRule): bigint {
  if (under === 0n) throw new Error('a ratio over nought');
  const negative = over < 0n !== under < 0n;
  const [size, by] = [over < 0n ? -over : over, under < 0n ? -under : under];
  const whole = size / by;
  const twice = 2n * (size % by);
  const up = twice > by || (twice === by && (rule === 'halfUp' || whole % 2n === 1n));
  const rounded = up ? whole + 1n : whole;
  return negative ? -rounded : rounded;
}

/** So many times a price, minor units. */
export function moneyTimes(amount: number, minor: number, rule: RoundingRule): number {
  return Number(ratioRounded(amountParts(amount) * wholeMinor(minor), BigInt(AMOUNT_PARTS), rule));
}

/** A share of a sum, minor units; `share` in basis points, whole. */
export function moneyShare(minor: number, share: number, rule: RoundingRule): number {
  return Number(
    ratioRounded(wholeMinor(minor) * wholeMinor(share), BigInt(WHOLE_BASIS_POINTS), rule),
  );
}

/** A sum to the nearest step, minor units. */
export function moneyStepped(minor: number, { rule, step }: Rounding): number {
  return Number(ratioRounded(wholeMinor(minor), wholeMinor(step), rule)) * step;
}

/**
 * `total` shared out in proportion to `weights` (whole, none negative), so that the parts add up to
 * it: each part is rounded down, and what is left goes one by one to the largest remainders, the first
 * of equal ones first. Where all weights are nought all goes to the first.
 */
export function moneyAllotted(total: number, weights: readonly number[]): number[] {
  if (weights.length === 0) {
    if (total !== 0) throw new Error(`${total} cannot be shared out among nothing`);
    return [];
  }
  if (weights.some((weight) => weight < 0)) throw new Error('a negative weight');
  const sum = weights.reduce((all, weight) => all + wholeMinor(weight), 0n);
  if (sum === 0n) return weights.map((_, n) => (n === 0 ? total : 0));
  const size = total < 0 ? -wholeMinor(total) : wholeMinor(total);
  const shares = weights.map((weight, n) => {
    const product = size * wholeMinor(weight);
    return { n, part: product / sum, rest: product % sum };
  });
  const left = Number(size - shares.reduce((all, { part }) => all + part, 0n));
  const larger = [...shares].sort((a, b) => (a.rest === b.rest ? a.n - b.n : a.rest > b.rest ? -1 : 1)); // prettier-ignore
  const parts = shares.map(({ part }) => Number(part));
  for (const { n } of larger.slice(0, left)) parts[n] += 1;
  return total < 0 ? parts.map((part) => (part === 0 ? 0 : -part)) : parts;
}

/** Symbols that were asked of Intl before: to ask takes longer than all else of writing an amount. */
const SYMBOLS = new Map<string, string>();

/** `£`, `$`, `KWD`: before the figures. */
function currencySymbol(currency: string): string {
  const known = SYMBOLS.get(currency);
  if (known !== undefined) return known;
  const parts = new Intl.NumberFormat('en', {
    style: 'currency',
    currency,
    currencyDisplay: 'narrowSymbol',
  }).formatToParts(0);
  const symbol = parts.find(({ type }) => type === 'currency')?.value ?? currency;
  SYMBOLS.set(currency, symbol);
  return symbol;
}

/** `£1 234.50`, `¥980`, `KWD 3.125`, `−$0.05`. */
export function formatMoney(minor: number, currency: string): string {
  const exponent = currencyExponent(currency);
  const digits = String(wholeMinor(Math.abs(minor))).padStart(exponent + 1, '0');
  const whole = formatCount(Number(digits.slice(0, digits.length - exponent)));
  const part = exponent > 0 ? `.${digits.slice(-exponent)}` : '';
  const symbol = currencySymbol(currency);
  const between = /[A-Za-z]$/.test(symbol) ? '\u202f' : '';
  return `${minor < 0 ? '−' : ''}${symbol}${between}${whole}${part}`;
}

export type ParsedMoney =
  { readonly ok: true; readonly minor: number } | { readonly ok: false; readonly message: string };

/** Reads `1,234.50`, `£12`, `12,5`: minor units, or what would do. */
export function parseMoney(text: string, currency: string): ParsedMoney {
  const exponent = currencyExponent(currency);
  const example = `1,234${exponent > 0 ? `.${'50'.padEnd(exponent, '0').slice(0, exponent)}` : ''}`;
  const fail = (message = `Type an amount such as ${example}.`): ParsedMoney => ({
    ok: false,
    message,
  });
  const plain = text
    .replace(currencySymbol(currency), '')
    .replace(new RegExp(currency, 'i'), '')
    .replace(/[\s\u00a0\u2009\u202f']/g, '')
    .replace('−', '-');
  // Beside a point, commas part thousands. Alone, one before three digits does too, but not where the
  // currency itself has three figures after its point; any other is a decimal comma.
  const bare = plain.includes('.')
    ? plain.replace(/,/g, '')
    : plain.replace(/,(?=\d{3}(?:,|$))/g, exponent === 3 ? ',' : '').replace(',', '.');
  const match = /^(-?)(\d*)(?:\.(\d*))?$/.exec(bare);
  if (!match || (match[2] === '' && !match[3])) return fail();
  const part = match[3] ?? '';
  if (part.length > exponent && /[1-9]/.test(part.slice(exponent))) {
    return fail(
      exponent === 0
        ? `${currency} has no smaller coin; type a whole amount such as ${example}.`
        : `${currency} has ${exponent} figures after the point, such as ${example}.`,
    );
  }
  const minor = Number(
    `${match[2] === '' ? '0' : match[2]}${part.slice(0, exponent).padEnd(exponent, '0')}`,
  );
  if (!Number.isSafeInteger(minor)) return fail('That is more money than Evenlay can work with.');
  return { ok: true, minor: match[1] && minor !== 0 ? -minor : minor };
}
