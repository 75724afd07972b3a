import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '../layout-document';
import { pieceCrossing, unitCount } from './count';
import { fitFrame, type FitFrame } from './fit-frame';

/**
 * How many units are whole from each start in one lattice cell, as a picture: `counts` row by row from
 * the foot up, each taken at the middle of its square. The cell is laid out as a rectangle, `pitch`
 * along a row of units and `rise` square to it: with every start in it once, whatever the lattice's skew.
 */
export interface ShiftMap {
  readonly width: number;
  readonly height: number;
  readonly counts: Uint32Array<ArrayBuffer>;
  readonly least: number;
  readonly most: number;
  readonly pitch: number;
  readonly rise: number;
  /** What one row up shifts a start along the row, mm. */
  readonly shift: number;
  /** The rectangle's lower left corner on the ground, and the unit vector of its rows. */
  readonly from: Point;
  readonly direction: Point;
  /** Outline, at the picture's grain, of the squares with the most: segments in the rectangle, mm. */
  readonly outline: readonly (readonly [Point, Point])[];
}

/** Rows are not fewer than this, nor more than that, however long the cell. */
const ROWS = { least: 24, most: 400 };

/** Counts along the line at `v`, at the middle of each of `out.length` squares. */
function countsAlong(frame: FitFrame, v: number, out: Uint32Array): void {
  const { clear, pitch, rise, shift } = frame;
  const square = pitch / out.length;
  const change = new Int32Array(out.length + 1);
  const first = square / 2;
  const step = (x: number, row: number, by: number) => {
    const along = (x - row * shift) / pitch;
    const at = (along - Math.floor(along)) * pitch;
    // From the first square whose middle lies beyond the crossing.
    const square_ = Math.floor((at - first) / square) + 1;
    if (square_ > 0) change[Math.min(square_, out.length)] += by;
  };
  for (const { count, x0, y0, x1, y1, cx, cy, radius } of clear)
    for (let n = 0; n < count; n++) {
      const up = y1[n] > y0[n];
      const [low, high] = up ? [y0[n], y1[n]] : [y1[n], y0[n]];
      const end = Math.ceil((high - v) / rise);
      for (let row = Math.ceil((low - v) / rise); row < end; row++) {
        const x = pieceCrossing(
          v + row * rise,
          x0[n],
          y0[n],
          x1[n],
          y1[n],
          cx[n],
          cy[n],
          radius[n],
        );
        step(x, row, up ? -1 : 1);
      }
    }
  let sum = unitCount(frame, first, v);
  for (let n = 0; n < out.length; n++) {
    sum += n === 0 ? 0 : change[n];
    out[n] = sum;
  }
}

/** Sides of the squares that hold `most` and whose neighbour does not. */
function outlineOf(counts: Uint32Array, width: number, height: number, most: number) {
  const segments: [Point, Point][] = [];
  const holds = (column: number, row: number) =>
    column >= 0 &&
    row >= 0 &&
    column < width &&
    row < height &&
    counts[row * width + column] === most;
  for (let row = 0; row <= height; row++)
    for (let column = 0; column <= width; column++) {
      if (holds(column, row) !== holds(column, row - 1))
        segments.push([
          [column, row],
          [column + 1, row],
        ]);
      if (holds(column, row) !== holds(column - 1, row))
        segments.push([
          [column, row],
          [column, row + 1],
        ]);
    }
  return segments;
}

/** The shift map of a valid document at its turn, `across` counts wide. */
export function shiftMap(document: LayoutDocument, across: number): ShiftMap {
  const frame = fitFrame(document);
  const { pitch, rise, shift, from, direction } = frame;
  const width = across;
  const height = Math.max(ROWS.least, Math.min(ROWS.most, Math.round((across * rise) / pitch)));
  const counts = new Uint32Array(width * height);
  for (let row = 0; row < height; row++)
    countsAlong(
      frame,
      ((row + 0.5) / height) * rise,
      counts.subarray(row * width, (row + 1) * width),
    );
  let least = Infinity;
  let most = 0;
  for (const count of counts) {
    if (count < least) least = count;
    if (count > most) most = count;
  }
  const place = ([column, row]: Point): Point => [(column / width) * pitch, (row / height) * rise];
  const outline = outlineOf(counts, width, height, most).map(
    ([a, b]) => [place(a), place(b)] as const,
  );
  return { width, height, counts, least, most, pitch, rise, shift, from, direction, outline };
}

/** Where a start on the ground stands in the map's rectangle, mm: `[along, up]`, in [0, pitch) and [0, rise). */
export function shiftMapPlace(map: ShiftMap, [x, y]: Point): Point {
  const dx = x - map.from[0];
  const dy = y - map.from[1];
  const [ux, uy] = map.direction;
  const v = dy * ux - dx * uy;
  const row = Math.floor(v / map.rise);
  const u = (dx * ux + dy * uy - row * map.shift) / map.pitch;
  return [(u - Math.floor(u)) * map.pitch, v - row * map.rise];
}

/** A shift in the map's rectangle as a shift on the ground, mm. */
export function shiftMapShift(map: ShiftMap, [along, up]: Point): Point {
  const [ux, uy] = map.direction;
  return [along * ux - up * uy, along * uy + up * ux];
}
