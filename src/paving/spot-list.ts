import {
  cellLength,
  cellLines,
  columnOf,
  PLACE_HEADINGS,
  roundedMm,
  type BareUnit,
} from './cell-list';
import { formatLength, type Display } from './length';
import { GREATEST_LEVEL_MM, GREATEST_SPOTS, spotClashes, type Spot } from './levels';

/** Spots as text: a list pasted from a sheet or a survey, a line each. */

export interface SpotListOptions {
  readonly display: Display;
  readonly bare: BareUnit;
  /** What the list calls the level of the edge's top, mm: taken off every level. */
  readonly datum: number;
}

/** A line that could not be read, and why. */
export interface SpotListProblem {
  /** Of the text, from 1. */
  readonly line: number;
  readonly message: string;
}

/** All the spots of a list, or what is wrong with it, line by line: nothing is taken by halves. */
export type ParsedSpotList =
  | {
      readonly ok: true;
      readonly spots: readonly Spot[];
      /** The line of the text that each spot stands on. */
      readonly lines: readonly number[];
    }
  | { readonly ok: false; readonly problems: readonly SpotListProblem[] };

type Column = 'name' | 'x' | 'y' | 'level';

/** As the table calls them. */
const WORDS: Readonly<Record<Column, string>> = {
  name: 'name',
  x: 'across',
  y: 'up',
  level: 'level',
};

const HEADINGS: Readonly<Record<Column, readonly string[]>> = {
  ...PLACE_HEADINGS,
  level: ['level', 'z', 'height', 'elevation', 'h', 'rl'],
};

/** The columns by a header, or in the usual order: name where there are four, then across, up, level. */
function columnsOf(
  first: readonly string[],
): { readonly columns: readonly Column[]; readonly header: boolean } | SpotListProblem['message'] {
  const named = first.map((heading) => columnOf(HEADINGS, heading));
  // A header is a line of words; a line with any number in it is a spot.
  if (named.some(Boolean) && !first.some((cell) => /\d/.test(cell))) {
    const missing = (['x', 'y', 'level'] as const).filter((column) => !named.includes(column));
    if (missing.length > 0) {
      return `The headings lack ${missing.join(' and ')}. Name three columns x, y and level; a fourth may be name.`;
    }
    return { columns: named as Column[], header: true };
  }
  if (first.length >= 4) return { columns: ['name', 'x', 'y', 'level'], header: false };
  return { columns: ['x', 'y', 'level'], header: false };
}

/**
 * Reads a list of spots: cells parted by commas, semicolons or tabs, with headings or without. Lengths as the
 * trade types them; a bare number is in `bare`. Every line that cannot be used is named with its reason.
 */
export function parseSpotList(text: string, options: SpotListOptions): ParsedSpotList {
  const lines = cellLines(text);
  if (lines.length === 0) {
    return {
      ok: false,
      problems: [
        {
          line: 1,
          message: 'There is nothing here yet. Paste one spot to a line: across, up, level.',
        },
      ],
    };
  }
  const arranged = columnsOf(lines[0].cells);
  if (typeof arranged === 'string') {
    return { ok: false, problems: [{ line: lines[0].line, message: arranged }] };
  }
  const { columns, header } = arranged;
  const problems: SpotListProblem[] = [];
  const spots: Spot[] = [];
  const from: number[] = [];
  for (const { line, cells } of header ? lines.slice(1) : lines) {
    const cell = (column: Column) => cells[columns.indexOf(column)] ?? '';
    const wrong = (message: string) => problems.push({ line, message });
    const given = cells.filter((text_) => text_ !== '').length;
    if (cells.slice(columns.length).some((text_) => text_ !== '')) {
      wrong(
        header
          ? `has ${cells.length} cells under ${columns.length} headings. A comma within a number parts it: write 3.2, or part cells with semicolons.`
          : `has ${cells.length} cells; ${columns.length} are looked for (${columns.map((column) => WORDS[column]).join(', ')}). A comma within a number parts it: write 3.2, or part cells with semicolons.`,
      );
      continue;
    }
    if (given < 3) {
      wrong(
        `has ${given} ${given === 1 ? 'cell' : 'cells'} filled in; a spot needs across, up and level.`,
      );
      continue;
    }
    const [x, y, level] = (['x', 'y', 'level'] as const).map((column) =>
      cellLength(cell(column), options),
    );
    const unread = (['x', 'y', 'level'] as const).filter((_, n) => [x, y, level][n] === null);
    if (unread.length > 0) {
      wrong(
        unread
          .map((column) =>
            cell(column) === ''
              ? `${WORDS[column]} is missing`
              : `${WORDS[column]} “${cell(column)}” is not a length`,
          )
          .join('; ') + '. Write 3200, 3.2 m or 10\' 6".',
      );
      continue;
    }
    const above = level! - options.datum;
    if (Math.abs(above) > GREATEST_LEVEL_MM) {
      wrong(
        `lies ${formatLength(Math.abs(above), options.display)} ${above < 0 ? 'below' : 'above'} the edge, which is more than 10 m. Say what the list calls the edge’s top.`,
      );
      continue;
    }
    const name = cell('name').slice(0, 40);
    spots.push({
      ...(name ? { name } : {}),
      at: [roundedMm(x!), roundedMm(y!)],
      level: roundedMm(above),
    });
    from.push(line);
  }
  for (const [first, second] of spotClashes(spots)) {
    problems.push({
      line: from[second],
      message: `is the same place as line ${from[first]}. Keep one of the two.`,
    });
  }
  if (spots.length > GREATEST_SPOTS) {
    problems.push({
      line: from[GREATEST_SPOTS],
      message: `is one more than the ${GREATEST_SPOTS} spots that a floor may have.`,
    });
  }
  problems.sort((one, other) => one.line - other.line);
  if (problems.length > 0) return { ok: false, problems };
  if (spots.length === 0) {
    return {
      ok: false,
      problems: [{ line: lines[0].line, message: 'There are headings, but no spot below them.' }],
    };
  }
  return { ok: true, spots, lines: from };
}
