import { bundleAdd, bundlesEmptied, bundlesGain, bundlesOf, type Bundles } from './bundle-bound';
import type { CellPieces } from './cell-pieces';
import { arcMeetsBox, arcOnlyTakes } from './most';

/** What comes no further into a box than this, mm, only touches it. */
const TOUCH_MM = 1e-8;
/** Strips between two lines thinner than this, mm, are rounding: no start is looked for in them. */
const THINNEST_MM = 1e-7;
/** Strips narrower by no more than this than they must be, mm, are counted as wide enough. */
const HAIR_MM = 1e-7;

/** With more families than this nearly parallel ones are bundled, in boxes that no more pieces are near to than the next. */
export const MANY_FAMILIES = 6;
const BUNDLED_PIECES = 400;

/** A box of origins, mm. */
export interface OriginBox {
  readonly ax: number;
  readonly ay: number;
  readonly bx: number;
  readonly by: number;
}

/** Which side of a piece must be kept off: none is known, the side that has its units, or both. */
export const KEPT_OFF = { none: 0, held: 1, both: 2 } as const;
export type KeptOff = (typeof KEPT_OFF)[keyof typeof KEPT_OFF];

export interface StripRoom {
  /** For each piece the number of its unit, from 0; −1 where it has more than one, or none is told. */
  readonly unit: Int32Array;
  /** Where there are many families: those of nearly one direction together. */
  readonly bundles: Bundles | null;
  /** Scratch. */
  readonly height: Float64Array;
  readonly change: Int32Array;
  readonly off: Uint8Array;
  readonly ends: Int32Array;
  readonly stamp: Int32Array;
  time: number;
  /** Where the two families with most lines through the box allow the most units: places along their normals. */
  readonly nx: Float64Array;
  readonly ny: Float64Array;
  readonly at: Float64Array;
  /** How many families those are. */
  found: number;
}

/** Room for the pieces' strips; `named` false where it is not worth while to tell which pieces are of one unit. */
export function stripRoom(pieces: CellPieces, named = true): StripRoom {
  const { count, unitStart, units, families } = pieces;
  const unit = new Int32Array(count).fill(-1);
  const numbers = new Map<number, number>();
  for (let n = 0; named && n < count; n++) {
    if (unitStart[n + 1] - unitStart[n] !== 1) continue;
    const name = units[unitStart[n]];
    let number = numbers.get(name);
    if (number === undefined) numbers.set(name, (number = numbers.size));
    unit[n] = number;
  }
  return {
    unit,
    bundles: families.nx.length < MANY_FAMILIES ? null : bundlesOf(pieces),
    height: new Float64Array(count),
    change: new Int32Array(count),
    off: new Uint8Array(count),
    ends: new Int32Array(count),
    stamp: new Int32Array(numbers.size),
    time: 0,
    nx: new Float64Array(2),
    ny: new Float64Array(2),
    at: new Float64Array(2),
    found: 0,
  };
}

/**
 * No origin of the box with more than `slack` of slack has more units than this; −1 where none has
 * that much slack. Parallel pieces right through the box cut it into strips. From one to the next the
 * count changes by the piece's step, and an origin with the slack stands off the pieces that
 * `keptOff` names by that much, so strips that leave no room for it are passed over.
 *
 * Any other piece adds its units if the point of reference (u, v), where the count is `depth`, has not
 * got them; but each unit once, and only if the piece is so near that an origin of the box can be
 * `slack` beyond it: `distance` tells how far the listed pieces are from (u, v), `far` how far the box
 * reaches. A unit with a piece right through the box may be lost and gained again, and counts each
 * time. `all` says that every piece is kept off, on both sides: then none that is farther is crossed.
 *
 * `list[from … to − 1]` must have, by family and height, every piece that meets the box; those
 * beyond it that an origin must keep off may be there too. `keptOff` is asked with the place in the
 * list, for straight pieces before which all of the box within `slack` has its foot.
 */
export function stripCount(
  pieces: CellPieces,
  list: Int32Array,
  from: number,
  to: number,
  { ax, ay, bx, by }: OriginBox,
  u: number,
  v: number,
  depth: number,
  slack: number,
  distance: Float64Array,
  far: number,
  all: boolean,
  keptOff: (at: number) => KeptOff,
  room: StripRoom,
): number {
  const { family, height, step, families } = pieces;
  const mx = (ax + bx) / 2;
  const my = (ay + by) / 2;
  const hx = (bx - ax) / 2;
  const hy = (by - ay) / 2;
  const { unit, stamp, ends } = room;
  const through = (room.time += 2);
  const counted = through + 1;
  const bundles = to - from <= BUNDLED_PIECES ? room.bundles : null;
  if (bundles) bundlesEmptied(bundles, hx, hy);
  let ending = 0;
  room.found = 0;
  let bound = depth;
  let mostLines = 0;
  let nextLines = 0;
  let a = from;
  for (; a < to && family[list[a]] < 0; a++) {
    const n = list[a];
    if (arcMeetsBox(pieces, n, ax, ay, bx, by) && !arcOnlyTakes(pieces, n, u, v))
      ends[ending++] = a;
  }
  while (a < to) {
    const f = family[list[a]];
    const nx = families.nx[f];
    const ny = families.ny[f];
    const middle = nx * mx + ny * my;
    const half = (nx < 0 ? -nx : nx) * hx + (ny < 0 ? -ny : ny) * hy;
    const ref = nx * u + ny * v;
    // An origin's height is within these.
    let low = middle - half;
    let high = middle + half;
    let lines = 0;
    let before = 0;
    let sum = 0;
    for (; a < to && family[list[a]] === f; a++) {
      const n = list[a];
      const t = height[n];
      const crossing = crossesBox(pieces, n, t - middle, half, ax, ay, bx, by);
      if (crossing === 1) {
        if (step[n] > 0 ? ref < t : ref > t) ends[ending++] = a;
        continue;
      }
      if (crossing === 0 && (t < low - slack || t > high + slack)) continue;
      const hasFeet =
        (crossing === 2 && endsBeyond(pieces, n, slack, ax, ay, bx, by)) ||
        beforeLine(pieces, n, nx, ny, t, slack, ax, ay, bx, by);
      const off = hasFeet ? keptOff(a) : KEPT_OFF.none;
      if (crossing === 0) {
        if (off === KEPT_OFF.none) continue;
        if (t <= middle - half) {
          if (off === KEPT_OFF.both || step[n] > 0) low = Math.max(low, t + slack);
        } else if (t >= middle + half) {
          if (off === KEPT_OFF.both || step[n] < 0) high = Math.min(high, t - slack);
        }
        continue;
      }
      room.height[lines] = t;
      room.change[lines] = step[n];
      room.off[lines] = off;
      lines++;
      if (bundles) {
        const held = off === KEPT_OFF.none ? 0 : slack;
        bundleAdd(bundles, f, t - middle, step[n], t < ref, held);
      }
      if (unit[n] >= 0) stamp[unit[n]] = through;
      sum += step[n];
      if (t < ref) before = sum;
    }
    // From the highest strip down, with what is to be kept off above it; `low` of each on the way up.
    let most = -Infinity;
    let mostAt = 0;
    if (lines === 0) {
      if (low > high + HAIR_MM) return -1;
      continue;
    }
    let above = high;
    let firstBelow = lines;
    for (let strip = lines; strip >= 0; strip--) {
      // The strip lies between line strip − 1 and line strip.
      let upFrom = low;
      if (strip > 0) {
        upFrom = Math.max(upFrom, room.height[strip - 1]);
        // The nearest line below that has to be kept off.
        if (firstBelow >= strip) {
          firstBelow = strip - 1;
          while (firstBelow >= 0 && !keepsAbove(room, firstBelow)) firstBelow--;
        }
        if (firstBelow >= 0) upFrom = Math.max(upFrom, room.height[firstBelow] + slack);
      }
      const upTo = strip < lines ? Math.min(above, room.height[strip]) : above;
      const thin =
        strip > 0 && strip < lines && room.height[strip] - room.height[strip - 1] < THINNEST_MM;
      if (!thin && upFrom <= upTo + HAIR_MM && sum > most) {
        most = sum;
        mostAt = (upFrom + upTo) / 2;
      }
      if (strip > 0) {
        const line = strip - 1;
        sum -= room.change[line];
        const off = room.off[line];
        if (off === KEPT_OFF.both || (off === KEPT_OFF.held && room.change[line] < 0))
          above = Math.min(above, room.height[line] - slack);
      }
    }
    if (most === -Infinity) return -1;
    if (bundles) bundles.gain[bundles.of[f]] += most - before;
    else bound += most - before;
    if (lines > mostLines) {
      room.nx[1] = room.nx[0];
      room.ny[1] = room.ny[0];
      room.at[1] = room.at[0];
      nextLines = mostLines;
      mostLines = lines;
      room.nx[0] = nx;
      room.ny[0] = ny;
      room.at[0] = mostAt;
      room.found = Math.min(2, room.found + 1);
    } else if (lines > nextLines) {
      nextLines = lines;
      room.nx[1] = nx;
      room.ny[1] = ny;
      room.at[1] = mostAt;
      room.found = 2;
    }
  }
  if (bundles) bound += bundlesGain(bundles);
  for (let m = 0; m < ending; m++) {
    const n = list[ends[m]];
    const own = unit[n];
    const near = distance[ends[m] - from] < far - slack;
    if (all) {
      if (!near) continue;
    } else if (own >= 0 && stamp[own] !== through && !near) continue;
    if (own >= 0 && stamp[own] !== through) {
      if (stamp[own] === counted) continue;
      stamp[own] = counted;
    }
    bound += Math.abs(step[n]);
  }
  return bound;
}

function keepsAbove({ off, change }: StripRoom, line: number): boolean {
  return off[line] === KEPT_OFF.both || (off[line] === KEPT_OFF.held && change[line] > 0);
}

/** 0 when the straight piece misses the box, 1 when it ends in it, 2 when it runs right through. `off` is its height from the middle. */
function crossesBox(
  { x0, y0, x1, y1 }: CellPieces,
  n: number,
  off: number,
  half: number,
  ax: number,
  ay: number,
  bx: number,
  by: number,
): 0 | 1 | 2 {
  if (off < TOUCH_MM - half || off > half - TOUCH_MM) return 0;
  const px = x0[n];
  const py = y0[n];
  const qx = x1[n];
  const qy = y1[n];
  const inAx = ax + TOUCH_MM;
  const inAy = ay + TOUCH_MM;
  const inBx = bx - TOUCH_MM;
  const inBy = by - TOUCH_MM;
  if (px < qx ? px > inBx || qx < inAx : qx > inBx || px < inAx) return 0;
  if (py < qy ? py > inBy || qy < inAy : qy > inBy || py < inAy) return 0;
  if (px > inAx && px < inBx && py > inAy && py < inBy) return 1;
  if (qx > inAx && qx < inBx && qy > inAy && qy < inBy) return 1;
  return 2;
}

/** True when neither end is in the box or within `slack` of its sides. */
function endsBeyond(
  { x0, y0, x1, y1 }: CellPieces,
  n: number,
  slack: number,
  ax: number,
  ay: number,
  bx: number,
  by: number,
): boolean {
  const px = x0[n];
  const py = y0[n];
  const qx = x1[n];
  const qy = y1[n];
  return (
    (px < ax - slack || px > bx + slack || py < ay - slack || py > by + slack) &&
    (qx < ax - slack || qx > bx + slack || qy < ay - slack || qy > by + slack)
  );
}

/** True when the piece has the foot of every point of the box that is within `slack` of its line. */
function beforeLine(
  { x0, y0, x1, y1 }: CellPieces,
  n: number,
  nx: number,
  ny: number,
  t: number,
  slack: number,
  ax: number,
  ay: number,
  bx: number,
  by: number,
): boolean {
  // Along (−ny, nx), as far as the box goes, and no farther than the line is within `slack` of it.
  const middle = (nx * (ay + by) - ny * (ax + bx)) / 2;
  const half = ((ny < 0 ? -ny : ny) * (bx - ax) + (nx < 0 ? -nx : nx) * (by - ay)) / 2;
  let low = middle - half;
  let high = middle + half;
  if (ny !== 0) {
    const one = (nx * t - (ax - slack)) / ny;
    const other = (nx * t - (bx + slack)) / ny;
    low = Math.max(low, one < other ? one : other);
    high = Math.min(high, one < other ? other : one);
  }
  if (nx !== 0) {
    const one = (ay - slack - ny * t) / nx;
    const other = (by + slack - ny * t) / nx;
    low = Math.max(low, one < other ? one : other);
    high = Math.min(high, one < other ? other : one);
  }
  const s0 = -ny * x0[n] + nx * y0[n];
  const s1 = -ny * x1[n] + nx * y1[n];
  return (s0 < s1 ? s0 : s1) <= low && (s0 < s1 ? s1 : s0) >= high;
}
