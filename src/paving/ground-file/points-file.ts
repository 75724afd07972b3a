import {
  cellLength,
  cellLines,
  columnOf,
  PLACE_HEADINGS,
  roundedMm,
  type CellLine,
} from '../cell-list';
import type { Vertex } from '../layout-document';
import type { GroundFile, GroundFileOptions } from './outline';

/** Corners as a list: a line each, in order round the edge; name, across and up, with headings or without. */

type Column = keyof typeof PLACE_HEADINGS;

/** Corners nearer than this are one: a ring closed by its first corner, mm. */
const SAME_MM = 0.5;

interface Columns {
  readonly columns: readonly (Column | null)[];
  readonly header: boolean;
  /** What was made of a list whose columns are not named, where that may be wrong. */
  readonly notes: readonly string[];
}

/** True where the first cells count the corners: 1, 2, 3 … or 101, 102, 103 …. */
const numbersCorners = (lines: readonly CellLine[]): boolean => {
  const [begin] = lines.map(({ cells }) => Number(cells[0]));
  return (
    Number.isInteger(begin) &&
    begin > 0 &&
    lines.every(({ cells }, n) => cells[0] === `${begin + n}`)
  );
};

function columnsOf(lines: readonly CellLine[]): Columns | string {
  const [first] = lines;
  const named = first.cells.map((heading) => columnOf(PLACE_HEADINGS, heading));
  if (named.some(Boolean) && !first.cells.some((cell) => /\d/.test(cell))) {
    return named.includes('x') && named.includes('y')
      ? { columns: named, header: true, notes: [] }
      : 'The headings must name a column x and a column y; a third may be name.';
  }
  const most = Math.max(...lines.map(({ cells }) => cells.length));
  if (most < 3) return { columns: ['x', 'y'], header: false, notes: [] };
  // A first cell that is no number is the corner's name.
  const isName = Number.isNaN(Number(first.cells[0].replace(',', '.')));
  if (isName || most > 3 || numbersCorners(lines))
    return {
      columns: ['name', 'x', 'y'],
      header: false,
      notes: isName
        ? []
        : [
            'The first column is taken for the numbers of the corners, the next two for across and up.',
          ],
    };
  return {
    columns: ['x', 'y'],
    header: false,
    notes: ['The first two columns are taken for across and up; the third is left out.'],
  };
}

/** Reads a list of corners. Every line that cannot be used is named with its reason; nothing is taken by halves. */
export function pointsFile(text: string, options: GroundFileOptions): GroundFile {
  const lines = cellLines(text);
  if (lines.length === 0) return { ok: false, messages: ['There is nothing in this list.'] };
  const arranged = columnsOf(lines);
  if (typeof arranged === 'string') return { ok: false, messages: [arranged] };
  const { columns, header, notes } = arranged;
  const messages: string[] = [];
  const ring: Vertex[] = [];
  for (const { line, cells } of header ? lines.slice(1) : lines) {
    const cell = (column: Column) => cells[columns.indexOf(column)] ?? '';
    const x = cellLength(cell('x'), options);
    const y = cellLength(cell('y'), options);
    if (x === null || y === null) {
      const [wrong, text_] = x === null ? ['across', cell('x')] : ['up', cell('y')];
      messages.push(
        `Line ${line}: ${wrong} ${text_ === '' ? 'is missing' : `“${text_}” is not a length`}. Write 3200, 3.2 m or 10' 6".`,
      );
      continue;
    }
    ring.push([roundedMm(x), roundedMm(y)]);
  }
  if (messages.length > 0) return { ok: false, messages };
  const [first] = ring;
  const last = ring[ring.length - 1];
  if (ring.length > 3 && Math.hypot(last[0] - first[0], last[1] - first[1]) < SAME_MM) ring.pop();
  if (ring.length < 3)
    return {
      ok: false,
      messages: [`The list has ${ring.length} corners; an edge needs at least 3.`],
    };
  return { ok: true, outlines: [{ name: '', ring }], stated: null, notes };
}
