import type { CellPieces } from './cell-pieces';

/** Where a point stands to a piece: how far off, whether on the side that has its units, and the way towards it there. */
export interface PieceGaps {
  /** Distances, mm. */
  readonly distance: Float64Array;
  /** 1 where the point has the piece's units as far as the piece tells, −1 where not. */
  readonly side: Int8Array;
  /** Unit vector from the nearest point of the piece to the point. */
  readonly awayX: Float64Array;
  readonly awayY: Float64Array;
  /** Distances with ties broken, where two pieces meet, for the one that tells the side. */
  readonly key: Float64Array;
}

export function pieceGapsRoom(size: number): PieceGaps {
  return {
    distance: new Float64Array(size),
    side: new Int8Array(size),
    awayX: new Float64Array(size),
    awayY: new Float64Array(size),
    key: new Float64Array(size),
  };
}

/** Where two pieces meet, a point is equally far from both; the one it is more squarely off tells its side. */
const TIE_MM = 1e-7;

/** Writes how the point (u, v) stands to piece n at `at`. */
export function pieceGap(
  pieces: CellPieces,
  n: number,
  u: number,
  v: number,
  room: PieceGaps,
  at: number,
): void {
  const { x0, y0, x1, y1, cx, cy, radius, ux, uy, length } = pieces;
  const ax = x0[n];
  const ay = y0[n];
  let off: number;
  let nearX: number;
  let nearY: number;
  if (radius[n] === 0) {
    const px = u - ax;
    const py = v - ay;
    off = ux[n] * py - uy[n] * px;
    const along = px * ux[n] + py * uy[n];
    if (along > 0 && along < length[n]) {
      // The nearest point is the foot.
      const left = off >= 0;
      const d = left ? off : -off;
      room.distance[at] = d;
      room.side[at] = left ? 1 : -1;
      room.awayX[at] = d === 0 ? 0 : left ? -uy[n] : uy[n];
      room.awayY[at] = d === 0 ? 0 : left ? ux[n] : -ux[n];
      room.key[at] = d > 0 ? d - TIE_MM : 0;
      return;
    }
    nearX = along <= 0 ? ax : x1[n];
    nearY = along <= 0 ? ay : y1[n];
  } else {
    const bx = x1[n];
    const by = y1[n];
    const px = u - cx[n];
    const py = v - cy[n];
    const d0 = Math.sqrt(px * px + py * py);
    off = d0 - radius[n];
    // Within the quarter's angle, or nearer to one of its ends. It runs clockwise.
    const inside =
      d0 > 0 &&
      (ax - cx[n]) * py - (ay - cy[n]) * px <= 0 &&
      (bx - cx[n]) * py - (by - cy[n]) * px >= 0 &&
      px * (ax + bx - 2 * cx[n]) + py * (ay + by - 2 * cy[n]) > 0;
    if (inside) {
      nearX = cx[n] + (px / d0) * radius[n];
      nearY = cy[n] + (py / d0) * radius[n];
    } else {
      const first = (u - ax) ** 2 + (v - ay) ** 2 < (u - bx) ** 2 + (v - by) ** 2;
      nearX = first ? ax : bx;
      nearY = first ? ay : by;
    }
  }
  const dx = u - nearX;
  const dy = v - nearY;
  const d = Math.sqrt(dx * dx + dy * dy);
  room.distance[at] = d;
  room.side[at] = off >= 0 ? 1 : -1;
  room.awayX[at] = d > 0 ? dx / d : 0;
  room.awayY[at] = d > 0 ? dy / d : 0;
  room.key[at] = d > 0 ? d - TIE_MM * Math.min(1, Math.abs(off) / d) : 0;
}

/** True when the piece belongs to that unit. */
export function pieceHasUnit({ unitStart, units }: CellPieces, n: number, unit: number): boolean {
  let low = unitStart[n];
  let high = unitStart[n + 1];
  if (high - low === 1) return units[low] === unit;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (units[middle] < unit) low = middle + 1;
    else high = middle;
  }
  return low < unitStart[n + 1] && units[low] === unit;
}

/** Runs of more units than this are held against each other as runs. */
const LONG_RUN = 4;

/** The same for a piece whose units follow one another by one stride. */
function runApart(
  pieces: CellPieces,
  n: number,
  list: Int32Array,
  order: Int32Array,
  count: number,
  enough: number,
): number {
  const { unitStart, units, stride } = pieces;
  const from = unitStart[n];
  const total = unitStart[n + 1] - from;
  const by = stride[n];
  // Stretches of the run that others have, and others that go by another stride.
  const low: number[] = [];
  const high: number[] = [];
  const odd: number[] = [];
  for (let m = 0; m < count; m++) {
    const other = list[order[m]];
    const size = unitStart[other + 1] - unitStart[other];
    if (size > 1 && stride[other] !== by) {
      odd.push(other);
      continue;
    }
    const at = (units[unitStart[other]] - units[from]) / by;
    if (at !== Math.floor(at) || at >= total || at + size <= 0) continue;
    let place = low.length;
    for (; place > 0 && low[place - 1] > at; place--) {
      low[place] = low[place - 1];
      high[place] = high[place - 1];
    }
    low[place] = at;
    high[place] = at + size;
  }
  let apart = 0;
  let next = 0;
  for (let m = 0; m <= low.length; m++) {
    const end = m < low.length ? Math.min(total, low[m]) : total;
    if (odd.length === 0) apart += Math.max(0, end - next);
    else {
      for (let at = next; at < end && apart < enough; at++) {
        const unit = units[from + at];
        if (!odd.some((other) => pieceHasUnit(pieces, other, unit))) apart++;
      }
    }
    if (apart >= enough) return Math.min(apart, enough);
    if (m < low.length && high[m] > next) next = high[m];
  }
  return apart;
}

/** How many of piece n's units none of the pieces list[order[0 … count − 1]] has; at most `enough` are looked for. */
export function unitsApart(
  pieces: CellPieces,
  n: number,
  list: Int32Array,
  order: Int32Array,
  count: number,
  enough: number,
): number {
  const { unitStart, units } = pieces;
  const from = unitStart[n];
  const to = unitStart[n + 1];
  const total = to - from;
  if (count === 0) return total;
  if (total > LONG_RUN && pieces.stride[n] > 0) {
    return runApart(pieces, n, list, order, count, enough);
  }
  let apart = 0;
  // From the middle of the run outward: units at its ends are those that share corners.
  for (let step = 0; step < total; step++) {
    const half = (step + 1) >> 1;
    const at = from + (total >> 1) + (step % 2 === 0 ? half : -half);
    if (at < from || at >= to) continue;
    const unit = units[at];
    let shared = false;
    for (let m = 0; m < count && !shared; m++) shared = pieceHasUnit(pieces, list[order[m]], unit);
    if (!shared && ++apart >= enough) return apart;
  }
  return apart;
}

/** Origins are kept this far, mm, from gaining a unit, so that rounding does not give it to them. */
export const KEEP_OFF_MM = 0.0005;

/**
 * The slack at (u, v): the distance to the nearest boundary of the region of a unit that is whole
 * there, mm, or `reach` when there is none within it; −1 when the point is so near to gaining a unit that its
 * count is in doubt. `list[from … to − 1]` must have every piece within `reach`.
 */
export function pointSlack(
  pieces: CellPieces,
  list: Int32Array,
  from: number,
  to: number,
  u: number,
  v: number,
  reach: number,
  room: PieceGaps,
  order: Int32Array,
): number {
  let count = 0;
  for (let a = from; a < to; a++) {
    pieceGap(pieces, list[a], u, v, room, a - from);
    if (room.distance[a - from] >= reach) continue;
    let place = count++;
    for (; place > 0 && room.key[order[place - 1]] > room.key[a - from]; place--) {
      order[place] = order[place - 1];
    }
    order[place] = a - from;
  }
  const local = list.subarray(from, to);
  for (let m = 0; m < count; m++) {
    if (room.side[order[m]] < 0) {
      if (room.distance[order[m]] < KEEP_OFF_MM) return -1;
      continue;
    }
    // A unit whose nearer piece has the point on its far side is not whole there.
    if (unitsApart(pieces, local[order[m]], local, order, m, 1) > 0) return room.distance[order[m]];
  }
  return reach;
}
