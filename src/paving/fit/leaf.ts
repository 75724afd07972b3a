import { pieceCrossing } from './count';
import type { CellPieces } from './cell-pieces';

/** Rows and stretches of a leaf thinner than this, mm, are rounding: no start is looked for in them. */
const THINNEST_MM = 1e-7;

/**
 * The greatest count in a box that few pieces cross, by slabs: between two neighbouring heights at
 * which anything happens (an end, a crossing, a piece's way through the box's side) pieces keep
 * their order, so one line through the middle of each slab meets every face there is in it.
 * `depthAt` is the count at (refX, refY), a point of the box on no piece. Calls `visit` with the
 * middle of each face's stretch on those lines whose count is `least` or more.
 */
export function leafFaces(
  pieces: CellPieces,
  list: Int32Array,
  from: number,
  to: number,
  box: { x0: number; y0: number; x1: number; y1: number },
  refX: number,
  refY: number,
  depthAt: number,
  least: () => number,
  visit: (count: number, x: number, y: number, width: number, height: number) => void,
): void {
  const { x0, y0, x1, y1, cx, cy, radius, step } = pieces;
  const heights: number[] = [box.y0, box.y1];
  const add = (y: number) => {
    if (y > box.y0 && y < box.y1) heights.push(y);
  };
  const atX = (n: number, x: number) => {
    if (x0[n] > x === x1[n] > x) return;
    if (radius[n] === 0) add(y0[n] + ((x - x0[n]) / (x1[n] - x0[n])) * (y1[n] - y0[n]));
    else {
      const away = x - cx[n];
      const reach = Math.sqrt(Math.max(0, radius[n] * radius[n] - away * away));
      add((y0[n] + y1[n]) / 2 >= cy[n] ? cy[n] + reach : cy[n] - reach);
    }
  };
  for (let a = from; a < to; a++) {
    const n = list[a];
    add(y0[n]);
    add(y1[n]);
    atX(n, box.x0);
    atX(n, box.x1);
    for (let b = a + 1; b < to; b++) piecesMeet(pieces, n, list[b], add);
  }
  heights.sort((p, q) => p - q);
  const at: number[] = [];
  const change: number[] = [];
  for (let m = 0; m + 1 < heights.length; m++) {
    const height = heights[m + 1] - heights[m];
    if (height < THINNEST_MM) continue;
    const y = heights[m] + height / 2;
    // From the point that is known, up or down to this line.
    let depth = depthAt;
    at.length = 0;
    change.length = 0;
    for (let a = from; a < to; a++) {
      const n = list[a];
      const weight = Math.abs(step[n]);
      if (x0[n] > refX !== x1[n] > refX) {
        const cut =
          radius[n] === 0
            ? y0[n] + ((refX - x0[n]) / (x1[n] - x0[n])) * (y1[n] - y0[n])
            : arcHeight(pieces, n, refX);
        if (cut > refY !== cut > y) depth += x1[n] > x0[n] === y > refY ? weight : -weight;
      }
      if (y0[n] > y !== y1[n] > y) {
        const x = pieceCrossing(y, x0[n], y0[n], x1[n], y1[n], cx[n], cy[n], radius[n]);
        if (x <= box.x0 || x >= box.x1) continue;
        let place = at.length;
        for (; place > 0 && at[place - 1] > x; place--) {
          at[place] = at[place - 1];
          change[place] = change[place - 1];
        }
        at[place] = x;
        change[place] = y1[n] > y0[n] ? -weight : weight;
      }
    }
    for (let place = 0; place < at.length && at[place] < refX; place++) depth -= change[place];
    let x = box.x0;
    for (let place = 0; place <= at.length; place++) {
      const end = place < at.length ? at[place] : box.x1;
      if (depth >= least() && end - x >= THINNEST_MM)
        visit(depth, (x + end) / 2, y, end - x, height);
      if (place < at.length) depth += change[place];
      x = end;
    }
  }
}

function arcHeight({ y0, y1, cx, cy, radius }: CellPieces, n: number, x: number): number {
  const away = x - cx[n];
  const reach = Math.sqrt(Math.max(0, radius[n] * radius[n] - away * away));
  return (y0[n] + y1[n]) / 2 >= cy[n] ? cy[n] + reach : cy[n] - reach;
}

/** Heights at which two pieces, drawn out to whole lines and circles, meet. */
function piecesMeet(pieces: CellPieces, m: number, n: number, add: (y: number) => void): void {
  const { x0, y0, x1, y1, cx, cy, radius } = pieces;
  if (radius[m] > 0 && radius[n] === 0) return piecesMeet(pieces, n, m, add);
  const dx = x1[m] - x0[m];
  const dy = y1[m] - y0[m];
  if (radius[n] === 0) {
    const ex = x1[n] - x0[n];
    const ey = y1[n] - y0[n];
    const cross = dx * ey - dy * ex;
    if (cross === 0) return;
    const t = ((x0[n] - x0[m]) * ey - (y0[n] - y0[m]) * ex) / cross;
    if (t > -0.01 && t < 1.01) add(y0[m] + t * dy);
    return;
  }
  if (radius[m] === 0) {
    const fx = x0[m] - cx[n];
    const fy = y0[m] - cy[n];
    const a = dx * dx + dy * dy;
    const b = fx * dx + fy * dy;
    const root = b * b - a * (fx * fx + fy * fy - radius[n] * radius[n]);
    if (root < 0) return;
    for (const t of [(-b - Math.sqrt(root)) / a, (-b + Math.sqrt(root)) / a]) {
      if (t > -0.01 && t < 1.01) add(y0[m] + t * dy);
    }
    return;
  }
  const ex = cx[n] - cx[m];
  const ey = cy[n] - cy[m];
  const d = Math.hypot(ex, ey);
  if (d === 0 || d > radius[m] + radius[n]) return;
  const along = (d * d + radius[m] * radius[m] - radius[n] * radius[n]) / (2 * d);
  const square = radius[m] * radius[m] - along * along;
  if (square < 0) return;
  const half = Math.sqrt(square);
  add(cy[m] + (along * ey + half * ex) / d);
  add(cy[m] + (along * ey - half * ex) / d);
}
