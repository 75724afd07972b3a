import { familyOrder, type CellPieces } from './cell-pieces';

export interface NearPieces extends CellPieces {
  /** For each of the cell's own pieces the one here that it is, or is part of. */
  readonly of: Int32Array;
}

/** Ends nearer than this, mm, are one place; lines nearer than this are one line. */
const SAME_PLACE_MM = 1e-7;

/**
 * The pieces of a cell and their repeats as far as `reach` beyond it on every side, in the same
 * order: what may be near to an origin of the cell. Straight pieces that the cell's sides cut are
 * joined again where they are of the same units, so that a line is seen in its length. With
 * `outlines` it is enough that as many units are whole on its two sides; units are then told of pieces
 * that have but one all along.
 */
export function nearPieces(
  pieces: CellPieces,
  pitch: number,
  rise: number,
  shift: number,
  reach: number,
  outlines = false,
): NearPieces {
  const { x0, y0, x1, y1, families, family, unitStep } = pieces;
  // The pieces themselves first: they are in order already.
  const from: number[] = [];
  const right: number[] = [];
  const up: number[] = [];
  const offset: number[] = [];
  const put = (n: number, i: number, j: number) => {
    from.push(n);
    right.push(i * pitch + j * shift);
    up.push(j * rise);
    // The same place one lattice step on belongs to the unit one step back.
    offset.push(i === 0 && j === 0 ? 0 : -(i * unitStep.along + j * unitStep.up));
  };
  for (let n = 0; n < pieces.count; n++) put(n, 0, 0);
  const rows = Math.ceil(reach / rise);
  for (let n = 0; n < pieces.count; n++) {
    const west = x0[n] < x1[n] ? x0[n] : x1[n];
    const east = x0[n] < x1[n] ? x1[n] : x0[n];
    const south = y0[n] < y1[n] ? y0[n] : y1[n];
    const north = y0[n] < y1[n] ? y1[n] : y0[n];
    const f = family[n];
    const nx = f < 0 ? 0 : families.nx[f];
    const ny = f < 0 ? 0 : families.ny[f];
    const half =
      (pitch / 2 + reach) * (nx < 0 ? -nx : nx) + (rise / 2 + reach) * (ny < 0 ? -ny : ny);
    const off = pieces.height[n] - (pitch / 2) * nx - (rise / 2) * ny;
    for (let j = -rows; j <= rows; j++) {
      if (north + j * rise < -reach || south + j * rise > rise + reach) continue;
      const first = Math.ceil((-reach - east - j * shift) / pitch);
      const last = Math.floor((pitch + reach - west - j * shift) / pitch);
      for (let i = first; i <= last; i++) {
        if (i === 0 && j === 0) continue;
        // A slanting piece may pass the corner by.
        const away = off + (i * pitch + j * shift) * nx + j * rise * ny;
        if (f < 0 || (away <= half && away >= -half)) put(n, i, j);
      }
    }
  }
  const size = from.length;
  const pieceHeight = new Float64Array(size);
  const pieceFamily = new Int32Array(size);
  for (let m = 0; m < size; m++) {
    const f = family[from[m]];
    pieceFamily[m] = f;
    if (f >= 0)
      pieceHeight[m] = pieces.height[from[m]] + right[m] * families.nx[f] + up[m] * families.ny[f];
  }
  const order = familyOrder(pieceFamily, families.nx.length, pieceHeight);
  const near = {
    count: size,
    x0: new Float64Array(size),
    y0: new Float64Array(size),
    x1: new Float64Array(size),
    y1: new Float64Array(size),
    cx: new Float64Array(size),
    cy: new Float64Array(size),
    radius: new Float64Array(size),
    ux: new Float64Array(size),
    uy: new Float64Array(size),
    length: new Float64Array(size),
    family: new Int32Array(size),
    height: new Float64Array(size),
    step: new Int32Array(size),
    stride: new Float64Array(size),
    unitStart: new Int32Array(size + 1),
  };
  /** True when the pieces `order[…]` names have the same units. */
  const sameUnits = (one: number, other: number): boolean => {
    const a = pieces.unitStart[from[one]];
    const b = pieces.unitStart[from[other]];
    const many = pieces.unitStart[from[one] + 1] - a;
    if (pieces.unitStart[from[other] + 1] - b !== many) return false;
    const by = offset[one] - offset[other];
    if (pieces.units[b] - pieces.units[a] !== by) return false;
    if (pieces.units[b + many - 1] - pieces.units[a + many - 1] !== by) return false;
    for (let n = 1; n + 1 < many; n++) {
      if (pieces.units[b + n] - pieces.units[a + n] !== by) return false;
    }
    return true;
  };
  // Those at one height, left to right, so that each is looked at after the one that it goes on from.
  const along = new Float64Array(size);
  for (let m = 0; m < size;) {
    const first = order[m];
    const f = pieceFamily[first];
    let end = m + 1;
    while (
      f >= 0 &&
      end < size &&
      pieceFamily[order[end]] === f &&
      pieceHeight[order[end]] - pieceHeight[first] < SAME_PLACE_MM
    )
      end++;
    for (let a = m; end - m > 1 && a < end; a++) {
      const at = order[a];
      const n = from[at];
      const place =
        families.ny[f] * ((x0[n] + x1[n]) / 2 + right[at]) -
        families.nx[f] * ((y0[n] + y1[n]) / 2 + up[at]);
      let b = a;
      for (; b > m && along[b - 1] > place; b--) {
        order[b] = order[b - 1];
        along[b] = along[b - 1];
      }
      order[b] = at;
      along[b] = place;
    }
    m = end;
  }
  /** For each piece kept, which of `from` it began as. */
  const kept = new Int32Array(size);
  const of = new Int32Array(pieces.count);
  /** 1 where a piece is told to be of one unit. */
  const single = new Uint8Array(size);
  let count = 0;
  let total = 0;
  for (let m = 0; m < size; m++) {
    const at = order[m];
    const n = from[at];
    const ax = x0[n] + right[at];
    const ay = y0[n] + up[at];
    const bx = x1[n] + right[at];
    const by = y1[n] + up[at];
    let joined = false;
    if (family[n] >= 0) {
      for (let o = count - 1; o >= 0 && near.family[o] === family[n]; o--) {
        if (Math.abs(pieceHeight[at] - near.height[o]) > SAME_PLACE_MM) break;
        if (near.step[o] !== pieces.step[n]) continue;
        const after =
          Math.abs(near.x1[o] - ax) < SAME_PLACE_MM && Math.abs(near.y1[o] - ay) < SAME_PLACE_MM;
        const before =
          Math.abs(near.x0[o] - bx) < SAME_PLACE_MM && Math.abs(near.y0[o] - by) < SAME_PLACE_MM;
        if (!(after || before)) continue;
        if (!outlines) {
          if (!sameUnits(kept[o], at)) continue;
        } else if (single[o] === 1 && !sameUnits(kept[o], at)) single[o] = 0;
        if (after) {
          near.x1[o] = bx;
          near.y1[o] = by;
        } else {
          near.x0[o] = ax;
          near.y0[o] = ay;
        }
        // A piece of next to no length has next to no direction: the longer one tells.
        const ex = near.x1[o] - near.x0[o];
        const ey = near.y1[o] - near.y0[o];
        const length = Math.sqrt(ex * ex + ey * ey);
        if (length > 0) {
          near.ux[o] = ex / length;
          near.uy[o] = ey / length;
        }
        near.length[o] = length;
        if (at < pieces.count) of[at] = o;
        joined = true;
        break;
      }
    }
    if (joined) continue;
    kept[count] = at;
    if (at < pieces.count) of[at] = count;
    near.x0[count] = ax;
    near.y0[count] = ay;
    near.x1[count] = bx;
    near.y1[count] = by;
    near.cx[count] = pieces.cx[n] + right[at];
    near.cy[count] = pieces.cy[n] + up[at];
    near.radius[count] = pieces.radius[n];
    near.ux[count] = pieces.ux[n];
    near.uy[count] = pieces.uy[n];
    near.length[count] = pieces.length[n];
    near.family[count] = pieceFamily[at];
    near.height[count] = pieceHeight[at];
    near.step[count] = pieces.step[n];
    near.stride[count] = pieces.stride[n];
    single[count++] = pieces.unitStart[n + 1] - pieces.unitStart[n] === 1 ? 1 : 0;
  }
  for (let m = 0; m < count; m++) {
    const n = from[kept[m]];
    total += outlines ? single[m] : pieces.unitStart[n + 1] - pieces.unitStart[n];
    near.unitStart[m + 1] = total;
  }
  const units = new Float64Array(total);
  for (let m = 0; m < count; m++) {
    const at = kept[m];
    let unit = pieces.unitStart[from[at]];
    for (let to = near.unitStart[m]; to < near.unitStart[m + 1]; to++) {
      units[to] = pieces.units[unit++] + offset[at];
    }
  }
  return { ...near, count, units, families, unitStep, of };
}
