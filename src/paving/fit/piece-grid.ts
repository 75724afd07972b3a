import type { CellPieces } from './cell-pieces';

/** Pieces by the squares of a grid that they reach into, in order; a hair more than those, never fewer. */
export interface PieceGrid {
  readonly columns: number;
  readonly rows: number;
  /** Lines of the grid: `columns + 1` along u and `rows + 1` along v, mm. */
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** Pieces of square n: `of[start[n] … start[n + 1] − 1]`; squares go row by row. */
  readonly start: Int32Array;
  readonly of: Int32Array;
}

/** Pieces are listed in squares that they miss by less than this, mm. */
const HAIR_MM = 1e-6;

/** Lays a grid over the rectangle and lists the pieces in it. */
export function pieceGrid(
  { count, x0, y0, x1, y1, radius }: CellPieces,
  west: number,
  south: number,
  east: number,
  north: number,
  columns: number,
  rows: number,
): PieceGrid {
  const lines = (from: number, to: number, size: number) =>
    Float64Array.from({ length: size + 1 }, (_, n) =>
      n === size ? to : from + ((to - from) * n) / size,
    );
  const x = lines(west, east, columns);
  const y = lines(south, north, rows);
  const perU = columns / (east - west);
  const perV = rows / (north - south);
  const start = new Int32Array(columns * rows + 1);
  let of = new Int32Array(0);
  // First how many each square has, then which.
  for (let fill = 0; fill < 2; fill++) {
    for (let n = 0; n < count; n++) {
      const ax = x0[n];
      const ay = y0[n];
      const bx = x1[n];
      const by = y1[n];
      const low = (ay < by ? ay : by) - HAIR_MM;
      const high = (ay < by ? by : ay) + HAIR_MM;
      const left = (ax < bx ? ax : bx) - HAIR_MM;
      const right = (ax < bx ? bx : ax) + HAIR_MM;
      if (low > north || high < south || left > east || right < west) continue;
      const first = Math.max(0, Math.floor((low - south) * perV));
      const last = Math.min(rows - 1, Math.floor((high - south) * perV));
      const lean = radius[n] > 0 || ay === by ? 0 : (bx - ax) / (by - ay);
      for (let row = first; row <= last; row++) {
        let from = left;
        let to = right;
        if (lean !== 0 && first !== last) {
          const p = ax + (y[row] - HAIR_MM - ay) * lean;
          const q = ax + (y[row + 1] + HAIR_MM - ay) * lean;
          from = Math.max(from, (p < q ? p : q) - HAIR_MM);
          to = Math.min(to, (p < q ? q : p) + HAIR_MM);
        }
        const begin = Math.max(0, Math.floor((from - west) * perU));
        const end = Math.min(columns - 1, Math.floor((to - west) * perU));
        for (let column = begin; column <= end; column++) {
          const square = row * columns + column;
          if (fill === 0) start[square + 1]++;
          else of[start[square]++] = n;
        }
      }
    }
    if (fill > 0) break;
    for (let n = 0; n < columns * rows; n++) start[n + 1] += start[n];
    of = new Int32Array(start[columns * rows]);
  }
  // Filling moved each start on to the next.
  start.copyWithin(1, 0, columns * rows);
  start[0] = 0;
  return { columns, rows, x, y, start, of };
}

/** The pieces that may come into a rectangle, each once and in no order; the next answer overwrites it. */
export type PieceFinder = (west: number, south: number, east: number, north: number) => Int32Array;

/** Finds pieces by place, in the squares of a grid. */
export function pieceFinder(pieces: CellPieces, grid: PieceGrid): PieceFinder {
  const { columns, rows, x, y, start, of } = grid;
  const perU = columns / (x[columns] - x[0]);
  const perV = rows / (y[rows] - y[0]);
  const found = new Int32Array(pieces.count);
  /** The search that last found each piece. */
  const foundBy = new Int32Array(pieces.count);
  let search = 0;
  return (west, south, east, north) => {
    search++;
    let count = 0;
    const first = Math.max(0, Math.floor((west - x[0]) * perU - HAIR_MM));
    const last = Math.min(columns - 1, Math.floor((east - x[0]) * perU + HAIR_MM));
    const low = Math.max(0, Math.floor((south - y[0]) * perV - HAIR_MM));
    const high = Math.min(rows - 1, Math.floor((north - y[0]) * perV + HAIR_MM));
    for (let row = low; row <= high && first <= last; row++) {
      const end = start[row * columns + last + 1];
      for (let at = start[row * columns + first]; at < end; at++) {
        const n = of[at];
        if (foundBy[n] === search) continue;
        foundBy[n] = search;
        found[count++] = n;
      }
    }
    return found.subarray(0, count);
  };
}
