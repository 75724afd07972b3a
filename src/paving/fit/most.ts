import { bundleAdd, bundlesEmptied, bundlesGain, bundlesOf } from './bundle-bound';
import type { CellPieces } from './cell-pieces';
import { pieceCrossing } from './count';
import { leafFaces } from './leaf';

/** An origin in the cell and how many units are whole there. */
export interface CellBest {
  readonly count: number;
  readonly u: number;
  readonly v: number;
}

/** A box that this few pieces cross is solved outright. */
const LEAF_PIECES = 6;
/** In boxes that more pieces cross than this, bundles of nearly parallel ones are too many to bound much. */
const BUNDLED_PIECES = 400;
/** Boxes smaller than this, mm, are left: no start holds its count for less than `FIT_MARGIN_MM` about it. */
const SMALLEST_BOX_MM = 2e-7;
/** What comes no further into a box than this, mm, only touches it. */
const TOUCH_MM = 1e-8;
/** Where boxes are halved and looked into: off the middle, so as not to fall on what lies symmetrically. */
const SPLIT = 0.48713;

/** Count at (u1, v1) from that at (u0, v0) by the pieces that the way along u, then along v, crosses. */
export function depthMoved(
  pieces: CellPieces,
  list: Int32Array,
  from: number,
  to: number,
  u0: number,
  v0: number,
  u1: number,
  v1: number,
  depth: number,
): number {
  const { x0, y0, x1, y1, cx, cy, radius, step } = pieces;
  let sum = depth;
  const right = u1 > u0;
  const west = right ? u0 : u1;
  const east = right ? u1 : u0;
  const up = v1 > v0;
  const south = up ? v0 : v1;
  const north = up ? v1 : v0;
  for (let a = from; a < to; a++) {
    const n = list[a];
    const ax = x0[n];
    const ay = y0[n];
    const bx = x1[n];
    const by = y1[n];
    if (west !== east && ay > v0 !== by > v0) {
      const x =
        radius[n] === 0
          ? ax + ((v0 - ay) / (by - ay)) * (bx - ax)
          : pieceCrossing(v0, ax, ay, bx, by, cx[n], cy[n], radius[n]);
      if (x > west && x <= east) {
        const weight = step[n] > 0 ? step[n] : -step[n];
        sum += by > ay === right ? -weight : weight;
      }
    }
    if (south !== north && ax > u1 !== bx > u1) {
      let y: number;
      if (radius[n] === 0) y = ay + ((u1 - ax) / (bx - ax)) * (by - ay);
      else {
        const away = u1 - cx[n];
        const reach = Math.sqrt(Math.max(0, radius[n] * radius[n] - away * away));
        y = (ay + by) / 2 >= cy[n] ? cy[n] + reach : cy[n] - reach;
      }
      if (y > south && y <= north) {
        const weight = step[n] > 0 ? step[n] : -step[n];
        sum += bx > ax === up ? weight : -weight;
      }
    }
  }
  return sum;
}

/**
 * The most units that any origin of the cell gives, and one that gives them: branch and bound over boxes. A box's bound is the count at a point of it and what could be gained on the way to any
 * other: for each family of parallel pieces that cross all of the box the best height among them,
 * and for each other piece its units if the point has not got them. Boxes with the best bound go
 * first; those that few pieces cross are solved outright. `start` is a count that is known.
 */
export function cellMost(
  pieces: CellPieces,
  pitch: number,
  rise: number,
  start: CellBest,
  stop?: () => boolean,
): CellBest {
  const { x0, y0, x1, y1, family, height, step, families } = pieces;
  const bundles = bundlesOf(pieces);
  const familyX = families.nx;
  const familyY = families.ny;
  let best = start.count;
  let bestU = start.u;
  let bestV = start.v;
  let arena = new Int32Array(Math.max(1 << 14, 8 * pieces.count));
  let top = 0;
  // Boxes waiting, by bound; within a bound the last in is the first out.
  const waiting: number[][] = [];
  const boxX0: number[] = [];
  const boxY0: number[] = [];
  const boxX1: number[] = [];
  const boxY1: number[] = [];
  const boxDepth: number[] = [];
  const boxFrom: number[] = [];
  const boxTo: number[] = [];
  let highest = 0;

  const offer = (count: number, u: number, v: number) => {
    if (count <= best) return;
    best = count;
    bestU = u;
    bestV = v;
  };

  /** Looks into a box with the pieces list[from … to − 1] of a box about it; keeps it if it may hold more. */
  const look = (
    from: number,
    to: number,
    refU: number,
    refV: number,
    refDepth: number,
    ax: number,
    ay: number,
    bx: number,
    by: number,
  ) => {
    const u = ax + (bx - ax) * SPLIT;
    const v = ay + (by - ay) * SPLIT;
    const depth = depthMoved(pieces, arena, from, to, refU, refV, u, v, refDepth);
    offer(depth, u, v);
    const mx = (ax + bx) / 2;
    const my = (ay + by) / 2;
    const hx = (bx - ax) / 2;
    const hy = (by - ay) / 2;
    if (top + (to - from) > arena.length) {
      const larger = new Int32Array(2 * (top + (to - from)));
      larger.set(arena);
      arena = larger;
    }
    const inAx = ax + TOUCH_MM;
    const inAy = ay + TOUCH_MM;
    const inBx = bx - TOUCH_MM;
    const inBy = by - TOUCH_MM;
    const own = top;
    const list = arena;
    let end = top;
    // What may be gained but by the families, and by them.
    let gain = 0;
    let familyGain = 0;
    const bundled = to - from <= BUNDLED_PIECES;
    if (bundled) bundlesEmptied(bundles);
    // The two families that promise most, to look where both do best.
    let oneGain = 0;
    let one = -1;
    let oneAt = 0;
    let otherGain = 0;
    let other = -1;
    let otherAt = 0;
    for (let a = from; a < to;) {
      const f = family[list[a]];
      if (f < 0) {
        const n = list[a++];
        const px = x0[n];
        const py = y0[n];
        const qx = x1[n];
        const qy = y1[n];
        if (px < qx ? px > inBx || qx < inAx : qx > inBx || px < inAx) continue;
        if (py < qy ? py > inBy || qy < inAy : qy > inBy || py < inAy) continue;
        if (!arcMeetsBox(pieces, n, ax, ay, bx, by)) continue;
        list[end++] = n;
        if (!arcOnlyTakes(pieces, n, u, v)) gain += step[n] > 0 ? step[n] : -step[n];
        continue;
      }
      // One family: its pieces come by height, and the count rises or falls by each in turn.
      const nx = familyX[f];
      const ny = familyY[f];
      const middle = nx * mx + ny * my;
      const half = (nx < 0 ? -nx : nx) * hx + (ny < 0 ? -ny : ny) * hy;
      const low = middle - half + TOUCH_MM;
      const high = middle + half - TOUCH_MM;
      const ref = nx * u + ny * v;
      let sum = 0;
      let most = 0;
      let before = 0;
      let mostFrom = low;
      let mostTo = high;
      let open = true;
      for (; a < to; a++) {
        const n = list[a];
        if (family[n] !== f) break;
        const t = height[n];
        if (t < low || t > high) continue;
        const px = x0[n];
        const py = y0[n];
        const qx = x1[n];
        const qy = y1[n];
        if (px < qx ? px > inBx || qx < inAx : qx > inBx || px < inAx) continue;
        if (py < qy ? py > inBy || qy < inAy : qy > inBy || py < inAy) continue;
        list[end++] = n;
        const through =
          !(px > inAx && px < inBx && py > inAy && py < inBy) &&
          !(qx > inAx && qx < inBx && qy > inAy && qy < inBy);
        const change = step[n];
        if (!through) {
          if (change > 0) {
            if (ref < t) gain += change;
          } else if (ref > t) gain -= change;
          continue;
        }
        if (open) {
          open = false;
          mostTo = t;
        }
        if (bundled) bundleAdd(bundles, f, t - middle, hx, hy, change, t < ref);
        sum += change;
        if (t < ref) before = sum;
        if (sum > most) {
          most = sum;
          mostFrom = t;
          mostTo = high;
          open = true;
        }
      }
      const more = most - before;
      if (more <= 0) continue;
      familyGain += more;
      if (bundled) bundles.gain[bundles.of[f]] += more;
      const at = (mostFrom + mostTo) / 2;
      if (more > oneGain) {
        other = one;
        otherGain = oneGain;
        otherAt = oneAt;
        one = f;
        oneGain = more;
        oneAt = at;
      } else if (more > otherGain) {
        other = f;
        otherGain = more;
        otherAt = at;
      }
    }
    top = end;
    const bound =
      depth + gain + (bundled ? Math.min(familyGain, bundlesGain(bundles)) : familyGain);
    if (bound <= best) {
      top = own;
      return;
    }
    if (2 * (oneGain + otherGain) >= bound - depth && one >= 0) {
      // Two families promise most of it: where their best heights meet, or as near as one alone can be had.
      let cu = u;
      let cv = v;
      const px = families.nx[one];
      const py = families.ny[one];
      const cross = other < 0 ? 0 : px * families.ny[other] - py * families.nx[other];
      if (Math.abs(cross) > 1e-6) {
        cu = (oneAt * families.ny[other] - otherAt * py) / cross;
        cv = (otherAt * px - oneAt * families.nx[other]) / cross;
      } else {
        const away = oneAt - (px * u + py * v);
        cu = u + away * px;
        cv = v + away * py;
      }
      if (cu > ax && cu < bx && cv > ay && cv < by) {
        offer(depthMoved(pieces, arena, own, top, u, v, cu, cv, depth), cu, cv);
        if (bound <= best) {
          top = own;
          return;
        }
      }
    }
    if (top - own <= LEAF_PIECES) {
      const box = { x0: ax, y0: ay, x1: bx, y1: by };
      leafFaces(pieces, arena, own, top, box, u, v, depth, () => best + 1, offer);
      top = own;
      return;
    }
    if (hx * 2 < SMALLEST_BOX_MM && hy * 2 < SMALLEST_BOX_MM) {
      top = own;
      return;
    }
    const id = boxX0.length;
    boxX0.push(ax);
    boxY0.push(ay);
    boxX1.push(bx);
    boxY1.push(by);
    boxDepth.push(depth);
    boxFrom.push(own);
    boxTo.push(top);
    (waiting[bound] ??= []).push(id);
    if (bound > highest) highest = bound;
  };

  for (let n = 0; n < pieces.count; n++) arena[top++] = n;
  look(0, top, start.u, start.v, start.count, 0, 0, pitch, rise);
  let rounds = 0;
  while (highest > best) {
    const stack = waiting[highest];
    if (!stack || stack.length === 0) {
      highest--;
      continue;
    }
    if ((++rounds & 255) === 0 && stop?.()) break;
    const id = stack.pop()!;
    const ax = boxX0[id];
    const ay = boxY0[id];
    const bx = boxX1[id];
    const by = boxY1[id];
    const u = ax + (bx - ax) * SPLIT;
    const v = ay + (by - ay) * SPLIT;
    const from = boxFrom[id];
    const to = boxTo[id];
    const depth = boxDepth[id];
    if (bx - ax >= by - ay) {
      const cut = ax + (bx - ax) * SPLIT;
      look(from, to, u, v, depth, ax, ay, cut, by);
      look(from, to, u, v, depth, cut, ay, bx, by);
    } else {
      const cut = ay + (by - ay) * SPLIT;
      look(from, to, u, v, depth, ax, ay, bx, cut);
      look(from, to, u, v, depth, ax, cut, bx, by);
    }
  }
  return { count: best, u: bestU, v: bestV };
}

/** False when the arc's circle passes the box by, or runs all round it. */
export function arcMeetsBox(
  { cx, cy, radius }: CellPieces,
  n: number,
  ax: number,
  ay: number,
  bx: number,
  by: number,
): boolean {
  const nearX = Math.max(0, ax - cx[n], cx[n] - bx);
  const nearY = Math.max(0, ay - cy[n], cy[n] - by);
  const farX = Math.max(cx[n] - ax, bx - cx[n]);
  const farY = Math.max(cy[n] - ay, by - cy[n]);
  const square = radius[n] * radius[n];
  return nearX * nearX + nearY * nearY <= square && farX * farX + farY * farY >= square;
}

/**
 * True when no straight way from (u, v) can cross the arc outward, gaining its units: the point is
 * beyond the tangents at both ends of the quarter or less that the arc covers.
 */
export function arcOnlyTakes(
  { x0, y0, x1, y1, cx, cy }: CellPieces,
  n: number,
  u: number,
  v: number,
): boolean {
  return (
    (u - x0[n]) * (x0[n] - cx[n]) + (v - y0[n]) * (y0[n] - cy[n]) >= 0 &&
    (u - x1[n]) * (x1[n] - cx[n]) + (v - y1[n]) * (y1[n] - cy[n]) >= 0
  );
}
