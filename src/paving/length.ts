import { formatCount } from './count';
import type { LayoutDocument } from './layout-document';

/**
 * The one module that reads and prints lengths. Inside, a length is always a number of
 * millimetres; people type and read metric, or feet, inches and sixteenths.
 */

export type Display = LayoutDocument['display'];

/** Exact by definition: the international inch and foot (NIST SP 811, B.8). */
export const MM_PER_INCH = 25.4;
/** Exact: the international foot of 1959. */
export const MM_PER_FOOT = 304.8;

/** Thin space between thousands and before a unit; it does not break across lines. */
const THIN = '\u202f';
const MINUS = '−';

const UNIT_MM: Readonly<Record<string, number>> = {
  mm: 1,
  cm: 10,
  m: 1000,
  in: MM_PER_INCH,
  inch: MM_PER_INCH,
  inches: MM_PER_INCH,
  '"': MM_PER_INCH,
  ft: MM_PER_FOOT,
  foot: MM_PER_FOOT,
  feet: MM_PER_FOOT,
  "'": MM_PER_FOOT,
};

const FRACTION_GLYPHS: Readonly<Record<string, string>> = {
  '½': '1/2',
  '¼': '1/4',
  '¾': '3/4',
  '⅛': '1/8',
  '⅜': '3/8',
  '⅝': '5/8',
  '⅞': '7/8',
};

export type ParsedLength =
  { readonly ok: true; readonly mm: number } | { readonly ok: false; readonly message: string };

const failed = (display: Display): ParsedLength => ({
  ok: false,
  message:
    display === 'metric'
      ? 'Type a length such as 3200, 3.2 m or 320 cm.'
      : 'Type a length such as 10\' 6 1/2", 126.5 in or 3.2 m.',
});

const NUMBER = String.raw`\d+ \d+\/\d+|\d+\/\d+|\d*\.?\d+|\d+\.`;
const TERM = new RegExp(String.raw`^(${NUMBER}) ?(mm|cm|m|inches|inch|in|"|feet|foot|ft|')?[ ,-]*`);

/** `6 1/2`, `1/2` or `6.5` as a number; NaN for a fraction over nought. */
function numberOf(text: string): number {
  const [whole, fraction] = text.includes(' ') ? text.split(' ') : ['0', text];
  if (!fraction.includes('/')) return Number(fraction);
  const [over, under] = fraction.split('/').map(Number);
  return under === 0 ? NaN : Number(whole) + over / under;
}

/**
 * A comma before exactly three digits parts thousands (`3,200`), unless what follows are metres, centimetres or
 * feet or the number begins with nought (`0,450 m`, `3,250 m`); any other is a decimal comma (`3,2`).
 */
function withoutCommas(text: string): string {
  return text
    .replace(/(?<!\d)[1-9]\d{0,2}(,\d{3})+(?![\d,])(?!\s*(m(?!m)|cm|f|'))/g, (grouped) =>
      grouped.replace(/,/g, ''),
    )
    .replace(/(\d),(?=\d)/g, '$1.');
}

/**
 * Reads a length as the trade types it: `3200`, `3.2m`, `3,200 mm`, `10' 6 1/2"`, `10ft 6`, `6½"`.
 * A bare number is millimetres in metric and inches in imperial; after feet, a bare number is inches.
 * Returns millimetres, or a message that says what would do.
 */
export function parseLength(text: string, display: Display): ParsedLength {
  let rest = withoutCommas(
    text
      .trim()
      .toLowerCase()
      .replace(/[\u00a0\u2009\u202f]/g, ' ')
      .replace(/(\d) (?=\d{3}(?!\d|\/))/g, '$1')
      .replace(/[½¼¾⅛⅜⅝⅞]/g, (glyph) => ` ${FRACTION_GLYPHS[glyph]}`)
      .replace(/⁄/g, '/')
      .replace(/[′’‘]{2}|''|[″”“]/g, '"')
      .replace(/[′’‘]/g, "'")
      .replace(/\s+/g, ' ')
      .trim(),
  );
  const negative = /^[-−]/.test(rest);
  rest = rest.replace(/^[-−+] ?/, '');
  if (rest === '') return failed(display);

  let mm = 0;
  let last: string | null = null;
  let terms = 0;
  while (rest !== '') {
    const term = TERM.exec(rest);
    if (!term) return failed(display);
    const value = numberOf(term[1]);
    const afterFeet = last !== null && UNIT_MM[last] === MM_PER_FOOT;
    const unit: string = term[2] ?? (afterFeet ? 'in' : display === 'metric' ? 'mm' : 'in');
    // Feet then inches, metres then the rest: each further term is of a smaller unit than the one before.
    if (last !== null && !(UNIT_MM[unit] < UNIT_MM[last])) return failed(display);
    mm += value * UNIT_MM[unit];
    last = unit;
    terms += 1;
    rest = rest.slice(term[0].length);
  }
  if (!Number.isFinite(mm) || terms > 3) return failed(display);
  return { ok: true, mm: negative ? -mm : mm };
}

/** A length taken apart for setting: fractions of an inch are drawn as fractions. */
export interface LengthParts {
  readonly negative: boolean;
  /** Metric figures, or feet and whole inches, without the fraction and unit that follow. */
  readonly figures: string;
  readonly fraction: readonly [over: number, under: number] | null;
  /** `mm` or `"`; empty when the figures end with feet. */
  readonly unit: string;
}

/**
 * @param decimals places of a millimetre to show in metric (trailing noughts are dropped). Imperial
 * always rounds to the nearest sixteenth.
 */
export function lengthParts(mm: number, display: Display, decimals = 0): LengthParts {
  if (display === 'metric') {
    const rounded = Number(Math.abs(mm).toFixed(decimals));
    const [whole, part] = String(rounded).split('.');
    return {
      negative: mm < 0 && rounded !== 0,
      figures: formatCount(Number(whole)) + (part ? `.${part}` : ''),
      fraction: null,
      unit: 'mm',
    };
  }
  const sixteenths = Math.round((Math.abs(mm) * 16) / MM_PER_INCH);
  const feet = Math.floor(sixteenths / 192);
  const inches = Math.floor((sixteenths % 192) / 16);
  let over = sixteenths % 16;
  let under = 16;
  while (over > 0 && over % 2 === 0) {
    over /= 2;
    under /= 2;
  }
  const fraction = over > 0 ? ([over, under] as const) : null;
  const showInches = inches > 0 || fraction !== null || feet === 0;
  const wholeInches = inches > 0 || fraction === null ? String(inches) : '';
  return {
    negative: mm < 0 && sixteenths !== 0,
    figures: [feet > 0 ? `${feet}'` : '', showInches ? wholeInches : ''].filter(Boolean).join(' '),
    fraction,
    unit: showInches ? '"' : '',
  };
}

/** A length as plain text: `7 200 mm`, `6.4 mm`, `23' 7 7/16"`. What it prints, `parseLength` reads. */
export function formatLength(
  mm: number,
  display: Display,
  { decimals = 0, unit = true }: { decimals?: number; unit?: boolean } = {},
): string {
  const parts = lengthParts(mm, display, decimals);
  const fraction = parts.fraction ? `${parts.fraction[0]}/${parts.fraction[1]}` : '';
  const figures = [parts.figures, fraction].filter(Boolean).join(' ');
  const suffix = display === 'imperial' ? parts.unit : unit ? `${THIN}mm` : '';
  return `${parts.negative ? MINUS : ''}${figures}${suffix}`;
}

/** Sizes of a unit's face: `450 × 450 mm`, `17 11/16" × 17 11/16"`. */
export function formatSize(lengthMm: number, widthMm: number, display: Display): string {
  const first = formatLength(lengthMm, display, { decimals: 1, unit: false });
  return `${first} × ${formatLength(widthMm, display, { decimals: 1 })}`;
}
