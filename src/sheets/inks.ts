/** The tokens of the screen, as colours that paper and PDF take. */
export const INK = '#1f2527';
/** For what explains, beside what is drawn. */
export const SECOND_INK = '#566062';
/** The sheet itself. */
export const PAPER = '#ffffff';
/** Used where the document names no colour. */
export const UNIT_COLOUR = '#efebe1';
/** Where the document names no colour of its own. */
export const AGGREGATE_COLOUR = '#d9c7a0';
/** Nothing is laid there. */
export const KEEP_OUT_COLOUR = '#ffffff';

const channels = (colour: string): readonly number[] =>
  [1, 3, 5].map((at) => Number.parseInt(colour.slice(at, at + 2), 16));

/** `share` of the way from one `#rrggbb` to another. */
export function inkMix(from: string, to: string, share: number): string {
  const target = channels(to);
  const mixed = channels(from).map((value, n) => Math.round(value + (target[n] - value) * share));
  return `#${mixed.map((value) => value.toString(16).padStart(2, '0')).join('')}`;
}
