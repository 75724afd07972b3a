import type { CellPieces } from './cell-pieces';
import { pieceCrossing } from './count';
import { clearStrips } from './clear-strip';
import { depthMoved, SPLIT } from './most';

/**
 * A cell in equal squares, or nearly square rectangles, row by row, with what holds for every origin of each.
 * All squares are told at once, piece by piece, which costs far less than to look into each.
 */
export interface OriginSquares {
  readonly columns: number;
  readonly rows: number;
  /** Sides of a square, mm. */
  readonly width: number;
  readonly height: number;
  /** How far an origin of a square may be from the point of it that `SPLIT` tells, mm. */
  readonly far: number;
  /** Units whole at that point. */
  readonly depth: Int32Array;
  /** No origin of the square has more units than the depth and these. */
  readonly gains: Int32Array;
  /** No origin of the square has more slack than this, mm. */
  readonly slack: Float64Array;
}

/** Squares that a piece misses by less than this, mm, are taken to meet it. */
const HAIR_MM = 1e-6;

/** Lays about so many squares over a cell; `start` is an origin whose count is known, `reach` how far off the pieces are complete. */
export function originSquares(
  near: CellPieces,
  pitch: number,
  rise: number,
  reach: number,
  start: { readonly count: number; readonly u: number; readonly v: number },
  squares: number,
): OriginSquares {
  const columns = Math.max(1, Math.round(Math.sqrt((squares * pitch) / rise)));
  const rows = Math.max(1, Math.round(squares / columns));
  const width = pitch / columns;
  const height = rise / rows;
  const share = Math.max(SPLIT, 1 - SPLIT);
  const grid: OriginSquares = {
    columns,
    rows,
    width,
    height,
    far: share * Math.hypot(width, height),
    depth: new Int32Array(columns * rows),
    gains: new Int32Array(columns * rows),
    slack: new Float64Array(columns * rows).fill(reach),
  };
  squareDepths(near, grid, start);
  squareGains(near, grid);
  squareSlacks(near, grid, reach);
  return grid;
}

/** Counts along the lines through the squares' points: by what is crossed up the first column, then along each row. */
function squareDepths(
  near: CellPieces,
  { columns, rows, width, height, depth }: OriginSquares,
  start: { readonly count: number; readonly u: number; readonly v: number },
): void {
  const { count, x0, y0, x1, y1, cx, cy, radius, step } = near;
  const u0 = SPLIT * width;
  const v0 = SPLIT * height;
  /** The first of the points from + n · size that is not before `at`. */
  const firstFrom = (at: number, from: number, size: number): number => {
    let n = Math.max(0, Math.ceil((at - from) / size));
    while (n > 0 && from + (n - 1) * size >= at) n--;
    while (from + n * size < at) n++;
    return n;
  };
  const up = new Int32Array(rows);
  const every = Int32Array.from({ length: count }, (_, n) => n);
  up[0] = depthMoved(near, every, 0, count, start.u, start.v, u0, v0, start.count);
  for (let n = 0; n < count; n++) {
    const ax = x0[n];
    const ay = y0[n];
    const bx = x1[n];
    const by = y1[n];
    const weight = step[n] > 0 ? step[n] : -step[n];
    if (ax > u0 !== bx > u0) {
      const y = pieceCrossing(u0, ay, ax, by, bx, cy[n], cx[n], radius[n]);
      const row = firstFrom(y, v0, height);
      if (row > 0 && row < rows) up[row] += bx > ax ? weight : -weight;
    }
    if ((ax < bx ? bx : ax) <= u0) continue;
    const change = by > ay ? -weight : weight;
    const low = ay < by ? ay : by;
    const high = ay < by ? by : ay;
    for (let row = firstFrom(low, v0, height); row < rows; row++) {
      const v = v0 + row * height;
      if (v >= high) break;
      const x = pieceCrossing(v, ax, ay, bx, by, cx[n], cy[n], radius[n]);
      const column = firstFrom(x, u0, width);
      if (column > 0 && column < columns) depth[row * columns + column] += change;
    }
  }
  for (let row = 0, first = 0; row < rows; row++) {
    first += up[row];
    let here = first;
    for (let at = row * columns; at < (row + 1) * columns; at++) {
      here += depth[at];
      depth[at] = here;
    }
  }
}

/** Adds the units of each piece to the squares that it passes through, where the square's point has not got them. */
function squareGains(
  near: CellPieces,
  { columns, rows, width, height, gains }: OriginSquares,
): void {
  const { count, x0, y0, x1, y1, cx, cy, ux, uy, radius, step } = near;
  for (let n = 0; n < count; n++) {
    const ax = x0[n];
    const ay = y0[n];
    const bx = x1[n];
    const by = y1[n];
    const low = ay < by ? ay : by;
    const high = ay < by ? by : ay;
    const left = (ax < bx ? ax : bx) - HAIR_MM;
    const right = (ax < bx ? bx : ax) + HAIR_MM;
    const first = Math.max(0, Math.floor((low - HAIR_MM) / height));
    const last = Math.min(rows - 1, Math.floor((high + HAIR_MM) / height));
    const weight = step[n] > 0 ? step[n] : -step[n];
    for (let row = first; row <= last; row++) {
      const from = Math.max(low, row * height);
      const to = Math.min(high, (row + 1) * height);
      let begin = left;
      let end = right;
      if (from < to) {
        const p = pieceCrossing(from, ax, ay, bx, by, cx[n], cy[n], radius[n]);
        const q = pieceCrossing(to, ax, ay, bx, by, cx[n], cy[n], radius[n]);
        begin = Math.max(begin, (p < q ? p : q) - HAIR_MM);
        end = Math.min(end, (p < q ? q : p) + HAIR_MM);
      }
      const v = (row + SPLIT) * height;
      const firstColumn = Math.max(0, Math.floor(begin / width));
      const lastColumn = Math.min(columns - 1, Math.floor(end / width));
      for (let column = firstColumn; column <= lastColumn; column++) {
        const u = (column + SPLIT) * width;
        if (radius[n] > 0 || ux[n] * (v - ay) - uy[n] * (u - ax) <= 0)
          gains[row * columns + column] += weight;
      }
    }
  }
}

/** Where a square lies in a piece's strip, no origin of it is farther from losing a unit than from the piece's line. */
function squareSlacks(
  near: CellPieces,
  { columns, rows, width, height, slack }: OriginSquares,
  reach: number,
): void {
  const { x0, y0, ux, uy } = near;
  const { from, to } = clearStrips(near, reach);
  for (let n = 0; n < near.count; n++) {
    if (!(to[n] > from[n])) continue;
    const dx = ux[n];
    const dy = uy[n];
    // Half of a square along the piece and square to it.
    const half = (Math.abs(dx) * width + Math.abs(dy) * height) / 2 + HAIR_MM;
    const across = (Math.abs(dy) * width + Math.abs(dx) * height) / 2 + HAIR_MM;
    const begin = from[n] + half;
    const end = to[n] - half;
    const top = reach - across;
    if (begin > end || across > top) continue;
    const ax = x0[n];
    const ay = y0[n];
    // Heights of the corners of where squares' middles may be.
    const p = ay + dy * begin + dx * across;
    const q = ay + dy * end + dx * across;
    const r = dx * (top - across);
    const low = Math.min(p, q) + Math.min(0, r);
    const high = Math.max(p, q) + Math.max(0, r);
    const firstRow = Math.max(0, Math.ceil(low / height - 0.5));
    const lastRow = Math.min(rows - 1, Math.floor(high / height - 0.5));
    for (let row = firstRow; row <= lastRow; row++) {
      const away = (row + 0.5) * height - ay;
      // across ≤ dx · away − dy · x ≤ top and begin ≤ dx · x + dy · away ≤ end, x from the piece's start.
      let west = -ax;
      let east = columns * width - ax;
      if (dx > 0) {
        west = Math.max(west, (begin - dy * away) / dx);
        east = Math.min(east, (end - dy * away) / dx);
      } else if (dx < 0) {
        west = Math.max(west, (end - dy * away) / dx);
        east = Math.min(east, (begin - dy * away) / dx);
      } else if (dy * away < begin || dy * away > end) continue;
      if (dy > 0) {
        west = Math.max(west, (dx * away - top) / dy);
        east = Math.min(east, (dx * away - across) / dy);
      } else if (dy < 0) {
        west = Math.max(west, (dx * away - across) / dy);
        east = Math.min(east, (dx * away - top) / dy);
      } else if (dx * away < across || dx * away > top) continue;
      const first = Math.max(0, Math.ceil((west + ax) / width - 0.5));
      const last = Math.min(columns - 1, Math.floor((east + ax) / width - 0.5));
      let far = dx * away - dy * ((first + 0.5) * width - ax) + across;
      const step = -dy * width;
      for (let at = row * columns + first; at <= row * columns + last; at++) {
        if (far < slack[at]) slack[at] = far;
        far += step;
      }
    }
  }
}
