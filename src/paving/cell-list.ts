import Papa from 'papaparse';
import { MM_PER_FOOT, MM_PER_INCH, parseLength, type Display } from './length';

/** Places as text: cells of a list pasted from a sheet or a survey. */

/** What a number without a unit means in a list. */
export type BareUnit = 'mm' | 'm' | 'in' | 'ft';

export const MM_PER_BARE: Readonly<Record<BareUnit, number>> = {
  mm: 1,
  m: 1000,
  in: MM_PER_INCH,
  ft: MM_PER_FOOT,
};

/** How lists head the columns of a place. */
export const PLACE_HEADINGS = {
  name: ['name', 'spot', 'point', 'corner', 'id', 'no', 'nr', '#', 'label'],
  x: ['x', 'across', 'east', 'easting', 'e'],
  y: ['y', 'up', 'north', 'northing', 'n'],
} as const;

/** The column that a heading names; null for any other. */
export function columnOf<Column extends string>(
  headings: Readonly<Record<Column, readonly string[]>>,
  heading: string,
): Column | null {
  const bare = heading
    .toLowerCase()
    .replace(/\(.*\)|,.*$/g, '')
    .trim();
  const names = Object.keys(headings) as Column[];
  return names.find((name) => headings[name].includes(bare)) ?? null;
}

/** A line of a list, numbered from 1 as in the text. */
export interface CellLine {
  readonly line: number;
  readonly cells: readonly string[];
}

/** The lines of a list that are not empty: cells parted by tabs, semicolons or commas. */
export function cellLines(text: string): CellLine[] {
  const bare = text.replace(/^\uFEFF/, '').replace(/\s+$/, '');
  // Where cells are parted by tabs or semicolons, commas are decimal.
  const delimiter = ['\t', ';'].find((mark) => bare.includes(mark)) ?? ',';
  return Papa.parse<string[]>(bare, { delimiter })
    .data.map((cells, n) => ({ line: n + 1, cells: cells.map((cell) => cell.trim()) }))
    .filter(({ cells }) => cells.some((cell) => cell !== ''));
}

/** A number alone, its decimals after a point or a comma. */
const BARE_NUMBER = /^[-−+]?\s*(\d+([.,]\d*)?|[.,]\d+)$/;

/** A length in a cell, mm: as the trade types it, or a bare number in `bare`; null where it is neither. */
export function cellLength(
  text: string,
  { display, bare }: { readonly display: Display; readonly bare: BareUnit },
): number | null {
  const cell = text.trim();
  if (BARE_NUMBER.test(cell)) {
    const value = Number(cell.replace(/\s/g, '').replace('−', '-').replace(',', '.'));
    return value * MM_PER_BARE[bare];
  }
  const parsed = parseLength(cell, display);
  return parsed.ok ? parsed.mm : null;
}

/** A grid finer than a tape reads, mm: what a survey in metres loses in floating point comes back whole. */
const GRID_MM = 0.001;

export const roundedMm = (mm: number): number =>
  Number((Math.round(mm / GRID_MM) * GRID_MM).toFixed(3));
