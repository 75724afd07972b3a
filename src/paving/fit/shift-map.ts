import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '../layout-document';
import { frameMost } from './cell-fit';
import type { CellPieces } from './cell-pieces';
import { pieceCrossing, unitCount } from './count';
import { cellFace } from './face';
import { fitFrame, frameFromGround, groundFromFrame, type FitFrame } from './fit-frame';
import { cellPoint } from './line-fit';

/**
 * How many units are whole at every start in one cell of the lattice: u along the rows from 0 to
 * `pitch`, v square to them from 0 to `rise`, mm. Starts a lattice step apart are the same floor,
 * and a row up is shifted by `shift`.
 */
export interface ShiftMap {
  readonly width: number;
  readonly height: number;
  /** Row by row from v = 0 upward; the count at the middle of each square. */
  readonly counts: Uint32Array;
  readonly pitch: number;
  readonly rise: number;
  readonly shift: number;
  /** Fewest and most in `counts`, and the true most of any start. */
  readonly least: number;
  readonly most: number;
  /** Outline of the starts about `bestAt` that have the most units, in (u, v); may run out of the cell. */
  readonly best: readonly (readonly Point[])[];
  readonly frame: FitFrame;
}

/** Where a start on the ground, mm, stands in the map's cell. */
export function shiftMapFromGround({ frame }: Pick<ShiftMap, 'frame'>, origin: Point): Point {
  return cellPoint(frame, ...frameFromGround(frame, origin));
}

/** A step in the map as a step on the ground, mm. */
export function shiftMapShift({ frame }: Pick<ShiftMap, 'frame'>, [du, dv]: Point): Point {
  const [x0, y0] = groundFromFrame(frame, [0, 0]);
  const [x, y] = groundFromFrame(frame, [du, dv]);
  return [x - x0, y - y0];
}

/** Count at each of the middles of `width` squares along the line at v. */
function rowCounts(
  frame: FitFrame,
  pieces: CellPieces,
  v: number,
  width: number,
  put: (column: number, count: number) => void,
): void {
  const at: number[] = [];
  const change: number[] = [];
  for (let n = 0; n < pieces.count; n++) {
    const { x0, y0, x1, y1, cx, cy, radius, step } = pieces;
    if (y0[n] > v === y1[n] > v) continue;
    at.push(pieceCrossing(v, x0[n], y0[n], x1[n], y1[n], cx[n], cy[n], radius[n]));
    change.push(y1[n] > y0[n] ? -Math.abs(step[n]) : Math.abs(step[n]));
  }
  const order = at.map((_, n) => n).sort((m, n) => at[m] - at[n]);
  const square = frame.pitch / width;
  let count = unitCount(frame, square / 2, v);
  let next = 0;
  while (next < order.length && at[order[next]] <= square / 2) next++;
  put(0, count);
  for (let column = 1; column < width; column++) {
    const u = (column + 0.5) * square;
    for (; next < order.length && at[order[next]] <= u; next++) count += change[order[next]];
    put(column, count);
  }
}

/** The shift map of a valid document, `across` squares wide. */
export function shiftMap(document: LayoutDocument, across: number): ShiftMap {
  const frame = fitFrame(document);
  const { pitch, rise, shift } = frame;
  const { pieces, most } = frameMost(frame);
  const width = Math.max(1, Math.round(across));
  const height = Math.max(1, Math.round((across * rise) / pitch));
  const counts = new Uint32Array(width * height);
  let least = Infinity;
  for (let row = 0; row < height; row++) {
    const v = ((row + 0.5) / height) * rise;
    rowCounts(frame, pieces, v, width, (column, count) => {
      counts[row * width + column] = count;
      least = Math.min(least, count);
    });
  }
  const best = most.count > 0 ? cellFace(pieces, frame, most.u, most.v) : null;
  return {
    width,
    height,
    counts,
    pitch,
    rise,
    shift,
    least,
    most: most.count,
    best: best ? [best] : [],
    frame,
  };
}

/**
 * Makes a function that counts the whole units at any start on the ground, at the document's turn:
 * for a dot that is being dragged.
 */
export function startCounter(document: LayoutDocument): (origin: Point) => number {
  const frame = fitFrame(document);
  return (origin) => unitCount(frame, ...cellPoint(frame, ...frameFromGround(frame, origin)));
}
