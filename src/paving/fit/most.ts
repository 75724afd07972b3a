import { bundleAdd, bundlesEmptied, bundlesGain, bundlesOf } from './bundle-bound';
import type { CellPieces } from './cell-pieces';
import { pieceCrossing } from './count';
import { leafFaces } from './leaf';
import { pieceGrid } from './piece-grid';

/** An origin in the cell and how many units are whole there. */
export interface CellBest {
  readonly count: number;
  readonly u: number;
  readonly v: number;
}

/** A box that this few pieces cross is solved outright. */
const LEAF_PIECES = 6;
/** Cells with more pieces and directions than these are looked into square by square from the start. */
const MANY_PIECES = 500;
const MANY_FAMILIES = 24;
const GRID_SQUARES = 256;
/** In boxes that more pieces cross than this, bundles of nearly parallel ones are too many to bound much. */
const BUNDLED_PIECES = 400;
/** Boxes smaller than this, mm, are left: no start holds its count for less than `FIT_MARGIN_MM` about it. */
const SMALLEST_BOX_MM = 2e-7;
/** What comes no further into a box than this, mm, only touches it. */
const TOUCH_MM = 1e-8;
/** Where boxes are halved and looked into: off the middle, so as not to fall on what lies symmetrically. */
export const SPLIT = 0.48713;

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

/** Boxes of the cell, the count at the point of each that `SPLIT` tells, and the pieces that meet it. */
export interface CellBoxes {
  readonly x0: number[];
  readonly y0: number[];
  readonly x1: number[];
  readonly y1: number[];
  readonly depth: number[];
  readonly list: Int32Array[];
}

/** The most units, with boxes that hold every origin that has them. */
export interface CellMost extends CellBest {
  readonly boxes: CellBoxes;
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
): CellMost {
  const { families } = pieces;
  const bundles = bundlesOf(pieces);
  const familyX = families.nx;
  const familyY = families.ny;
  let best = start.count;
  let bestU = start.u;
  let bestV = start.v;
  let arena = new Int32Array(Math.max(1 << 14, 8 * pieces.count));
  let top = 0;
  // West, east, south, north of each piece.
  const sides = new Float64Array(4 * pieces.count);
  for (let n = 0; n < pieces.count; n++) {
    const { x0, y0, x1, y1 } = pieces;
    sides[4 * n] = Math.min(x0[n], x1[n]);
    sides[4 * n + 1] = Math.max(x0[n], x1[n]);
    sides[4 * n + 2] = Math.min(y0[n], y1[n]);
    sides[4 * n + 3] = Math.max(y0[n], y1[n]);
  }
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
  // Boxes that hold no more than the best known, but may hold as many.
  const tied: CellBoxes = { x0: [], y0: [], x1: [], y1: [], depth: [], list: [] };
  let tiedAt = best;

  const offer = (count: number, u: number, v: number) => {
    if (count <= best) return;
    best = count;
    bestU = u;
    bestV = v;
  };

  const tie = (
    bound: number,
    ax: number,
    ay: number,
    bx: number,
    by: number,
    depth: number,
    from: number,
    to: number,
  ) => {
    if (bound < best) return;
    if (tiedAt < best) {
      for (const values of Object.values(tied)) values.length = 0;
      tiedAt = best;
    }
    tied.list.push(arena.slice(from, to));
    tied.x0.push(ax);
    tied.y0.push(ay);
    tied.x1.push(bx);
    tied.y1.push(by);
    tied.depth.push(depth);
  };

  /**
   * Looks into a box with the pieces list[from … to − 1] of a box about it; keeps it if it may hold
   * more. The count is known at a point of the box, its edge included. Returns that at the box's own point.
   */
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
  ): number => {
    const { x0, y0, x1, y1, cx, cy, radius, family, height, step } = pieces;
    const u = ax + (bx - ax) * SPLIT;
    const v = ay + (by - ay) * SPLIT;
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
    const outAx = ax - TOUCH_MM;
    const outAy = ay - TOUCH_MM;
    const outBx = bx + TOUCH_MM;
    const outBy = by + TOUCH_MM;
    // The way to (u, v): along u first, then along v.
    const right = u > refU;
    const west = right ? refU : u;
    const east = right ? u : refU;
    const up = v > refV;
    const south = up ? refV : v;
    const north = up ? v : refV;
    let depth = refDepth;
    const own = top;
    const list = arena;
    let end = top;
    // What may be gained but by the families, and by them.
    let gain = 0;
    let familyGain = 0;
    const bundled = to - from <= BUNDLED_PIECES;
    if (bundled) bundlesEmptied(bundles, hx, hy);
    // The two families that promise most, to look where both do best.
    let oneGain = 0;
    let one = -1;
    let oneAt = 0;
    let otherGain = 0;
    let other = -1;
    let otherAt = 0;
    // One family: its pieces come by height, and the count rises or falls by each in turn.
    let current = -1;
    let middle = 0;
    let low = 0;
    let high = 0;
    let ref = 0;
    let sum = 0;
    let most = 0;
    let before = 0;
    let mostFrom = 0;
    let mostTo = 0;
    let open = true;
    for (let a = from; a <= to; a++) {
      const n = a < to ? list[a] : -1;
      const f = a < to ? family[n] : -1;
      if (a < to) {
        const s = 4 * n;
        if (
          sides[s] > outBx ||
          sides[s + 1] < outAx ||
          sides[s + 2] > outBy ||
          sides[s + 3] < outAy
        )
          continue;
      }
      if (f !== current) {
        if (current >= 0 && most > before) {
          const more = most - before;
          familyGain += more;
          if (bundled) bundles.gain[bundles.of[current]] += more;
          const at = (mostFrom + mostTo) / 2;
          if (more > oneGain) {
            other = one;
            otherGain = oneGain;
            otherAt = oneAt;
            one = current;
            oneGain = more;
            oneAt = at;
          } else if (more > otherGain) {
            other = current;
            otherGain = more;
            otherAt = at;
          }
        }
        current = f;
        if (f >= 0) {
          const nx = familyX[f];
          const ny = familyY[f];
          middle = nx * mx + ny * my;
          const half = (nx < 0 ? -nx : nx) * hx + (ny < 0 ? -ny : ny) * hy;
          low = middle - half + TOUCH_MM;
          high = middle + half - TOUCH_MM;
          ref = nx * u + ny * v;
          sum = 0;
          most = 0;
          before = 0;
          mostFrom = low;
          mostTo = high;
          open = true;
        }
      }
      if (a === to) break;
      const t = height[n];
      if (f >= 0 && (t < low - 2 * TOUCH_MM || t > high + 2 * TOUCH_MM)) continue;
      const px = x0[n];
      const py = y0[n];
      const qx = x1[n];
      const qy = y1[n];
      const change = step[n];
      if (west !== east && py > refV !== qy > refV) {
        const x =
          f >= 0
            ? px + ((refV - py) / (qy - py)) * (qx - px)
            : pieceCrossing(refV, px, py, qx, qy, cx[n], cy[n], radius[n]);
        if (x > west && x <= east) {
          const weight = change > 0 ? change : -change;
          depth += qy > py === right ? -weight : weight;
        }
      }
      if (south !== north && px > u !== qx > u) {
        const y =
          f >= 0
            ? py + ((u - px) / (qx - px)) * (qy - py)
            : pieceCrossing(u, py, px, qy, qx, cy[n], cx[n], radius[n]);
        if (y > south && y <= north) {
          const weight = change > 0 ? change : -change;
          depth += qx > px === up ? weight : -weight;
        }
      }
      if (px < qx ? px > inBx || qx < inAx : qx > inBx || px < inAx) continue;
      if (py < qy ? py > inBy || qy < inAy : qy > inBy || py < inAy) continue;
      if (f < 0) {
        if (!arcMeetsBox(pieces, n, ax, ay, bx, by)) continue;
        list[end++] = n;
        if (!arcOnlyTakes(pieces, n, u, v)) gain += change > 0 ? change : -change;
        continue;
      }
      if (t < low || t > high) continue;
      list[end++] = n;
      const through =
        !(px > inAx && px < inBx && py > inAy && py < inBy) &&
        !(qx > inAx && qx < inBx && qy > inAy && qy < inBy);
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
      if (bundled) bundleAdd(bundles, f, t - middle, change, t < ref);
      sum += change;
      if (t < ref) before = sum;
      if (sum > most) {
        most = sum;
        mostFrom = t;
        mostTo = high;
        open = true;
      }
    }
    offer(depth, u, v);
    top = end;
    const bound =
      depth + gain + (bundled ? Math.min(familyGain, bundlesGain(bundles)) : familyGain);
    if (bound <= best) {
      tie(bound, ax, ay, bx, by, depth, own, top);
      top = own;
      return depth;
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
          tie(bound, ax, ay, bx, by, depth, own, top);
          top = own;
          return depth;
        }
      }
    }
    if (top - own <= LEAF_PIECES) {
      const box = { x0: ax, y0: ay, x1: bx, y1: by };
      leafFaces(pieces, arena, own, top, box, u, v, depth, () => best + 1, offer);
      tie(bound, ax, ay, bx, by, depth, own, top);
      top = own;
      return depth;
    }
    if (hx * 2 < SMALLEST_BOX_MM && hy * 2 < SMALLEST_BOX_MM) {
      tie(bound, ax, ay, bx, by, depth, own, top);
      top = own;
      return depth;
    }
    const id = boxX0.length;
    boxX0.push(ax);
    boxY0.push(ay);
    boxX1.push(bx);
    boxY1.push(by);
    boxDepth.push(depth);
    boxFrom.push(own);
    boxTo.push(top);
    (waiting[bound - start.count] ??= []).push(id);
    if (bound > highest) highest = bound;
    return depth;
  };

  for (let n = 0; n < pieces.count; n++) arena[top++] = n;
  if (pieces.count < MANY_PIECES || familyX.length < MANY_FAMILIES) {
    look(0, top, start.u, start.v, start.count, 0, 0, pitch, rise);
  } else {
    // Boxes larger than a grid's squares have no bound that tells: begin with these.
    const across = Math.sqrt((GRID_SQUARES * pitch) / rise);
    const columns = Math.max(1, Math.round(across));
    const rows = Math.max(1, Math.round(GRID_SQUARES / across));
    const { x, y, start: first, of } = pieceGrid(pieces, 0, 0, pitch, rise, columns, rows);
    let rowU = 0;
    let rowV = 0;
    let rowDepth = depthMoved(pieces, arena, 0, top, start.u, start.v, 0, 0, start.count);
    for (let row = 0; row < rows; row++) {
      let u = rowU;
      let v = rowV;
      let depth = rowDepth;
      for (let column = 0; column < columns; column++) {
        const square = row * columns + column;
        const from = top;
        const to = top + first[square + 1] - first[square];
        if (to > arena.length) {
          const larger = new Int32Array(2 * to);
          larger.set(arena);
          arena = larger;
        }
        arena.set(of.subarray(first[square], first[square + 1]), from);
        top = to;
        depth = look(from, to, u, v, depth, x[column], y[row], x[column + 1], y[row + 1]);
        u = x[column] + (x[column + 1] - x[column]) * SPLIT;
        v = y[row] + (y[row + 1] - y[row]) * SPLIT;
        if (column === 0) {
          rowU = u;
          rowV = y[row + 1];
          rowDepth = depthMoved(pieces, arena, from, to, u, v, rowU, rowV, depth);
        }
        depth = depthMoved(pieces, arena, from, to, u, v, x[column + 1], v, depth);
        u = x[column + 1];
      }
    }
  }
  let rounds = 0;
  while (highest > best) {
    const stack = waiting[highest - start.count];
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
      look(from, to, u, v, depth, ax, ay, u, by);
      look(from, to, u, v, depth, u, ay, bx, by);
    } else {
      look(from, to, u, v, depth, ax, ay, bx, v);
      look(from, to, u, v, depth, ax, v, bx, by);
    }
  }
  for (const id of waiting[best - start.count] ?? [])
    tie(best, boxX0[id], boxY0[id], boxX1[id], boxY1[id], boxDepth[id], boxFrom[id], boxTo[id]);
  if (tiedAt < best) throw new Error(`no box holds the ${best} units at [${bestU}, ${bestV}]`);
  return { count: best, u: bestU, v: bestV, boxes: tied };
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
