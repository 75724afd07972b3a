import { envelopeTop } from '@/geometry/plane-envelope';
import { boxFrom, boxKept, boxLevel, levelEmptied, levelRoom, type BoxLevel } from './box-level';
import { boxIsNews, stripsAreNews } from './box-news';
import type { CellPieces } from './cell-pieces';
import {
  choiceOffered,
  choicesListed,
  knownChoices,
  reachIsShort,
  type CellChoice,
} from './known-choices';
import { freshClimbed } from './known-climbs';
import {
  gainPut,
  lookRoom,
  MOST_LOSSES,
  nearestFirst,
  straightBefore,
  unitSeen,
  unitsSeen,
  WEIGHED,
  type BoxLook,
} from './look-room';
import { arcMeetsBox, arcOnlyTakes, depthMoved, SPLIT } from './most';
import { pieceFinder, pieceGrid } from './piece-grid';
import { KEEP_OFF_MM, pieceGap, pointSlack, unitsApart } from './slack';
import { squaresSearched } from './square-search';

export { SLACK_TOLERANCE_MM } from './known-choices';

const TOUCH_MM = 1e-8;
/** While boxes are so many times larger than the most slack known, they are halved without a look at each piece. */
const COARSE_TIMES = 3;
/** One in so many of those is looked into for slack, so that there is some to compare with. */
const COARSE_SAMPLE = 8;
/** So many of the nearest pieces are looked at one by one. */
const NEAREST = 28;
/** A piece that is not straight before all of a box makes no plane when it is no farther than this from being in it, mm. */
const LEAST_AWAY_MM = 1e-3;
/** Pieces are listed by so many columns of places. */
const PLACES = 20;
/** Below this, mm, a box is left. */
const SMALLEST_BOX_MM = 1e-5;

export interface TradeOffOptions {
  /** Counts below this are of no interest. */
  readonly least: number;
  /** Of the origins with the most units, the one with the most slack. */
  readonly most: CellChoice;
  /** How many squares a cell of many directions is looked over in at first. */
  readonly squares: number;
  readonly stop?: () => boolean;
}

export interface TradeOff {
  /** Most units first; each with more slack than all before it. */
  readonly choices: readonly CellChoice[];
  /** The most slack met with, mm, which may be a hair more than the last choice has. With all of the reach there may be more. */
  readonly slack: number;
}

/**
 * For each count from `least` to the most, an origin with more slack than any with more units, where
 * there is one: most units first. `near` are the cell's pieces with their repeats out to `reach`.
 *
 * Boxes of the cell are halved, all of a size together. One is let go when nothing in it can beat
 * what is known: every origin of it either loses or gains units by crossing a piece that passes near,
 * or keeps them all, and for each of these the count and the slack are bounded together.
 */
export function cellTradeOff(
  near: CellPieces,
  pitch: number,
  rise: number,
  reach: number,
  { least, most, squares, stop }: TradeOffOptions,
): TradeOff {
  const { x0, y0, x1, y1, family, height, step, families } = near;
  const known = knownChoices(least, most.count);
  const { atLeast } = known;
  const offer = (count: number, slack: number, u: number, v: number) =>
    choiceOffered(known, count, slack, u, v);

  const every = new Int32Array(near.count);
  for (let n = 0; n < near.count; n++) every[n] = n;
  const finder = () => {
    const lines = Math.max(1, Math.round((PLACES * rise) / pitch));
    const places = pieceGrid(near, -reach, -reach, pitch + reach, rise + reach, PLACES, lines);
    return pieceFinder(near, places);
  };
  const cell = { near, every, pitch, rise, reach, about: squares > 0 ? finder() : undefined };
  offer(most.count, most.slack, most.u, most.v);

  const scratch = lookRoom(near);
  const { strips, planes, gaps: room, order, lossAt, lossWeight, lossSlack } = scratch;

  const look = (
    source: Int32Array,
    from: number,
    to: number,
    refU: number,
    refV: number,
    refDepth: number,
    within: number,
    ax: number,
    ay: number,
    bx: number,
    by: number,
    out: BoxLevel,
  ) => {
    const u = ax + (bx - ax) * SPLIT;
    const v = ay + (by - ay) * SPLIT;
    const depth = depthMoved(near, source, from, to, refU, refV, u, v, refDepth);
    const mx = (ax + bx) / 2;
    const my = (ay + by) / 2;
    const hx = (bx - ax) / 2;
    const hy = (by - ay) / 2;
    const h = Math.hypot(Math.max(u - ax, bx - u), Math.max(v - ay, by - v));
    levelRoom(out, to - from);
    const own = out.top;
    let { top } = out;
    const { list } = out;
    if (h > COARSE_TIMES * atLeast[0] && h > reach) {
      for (let a = from; a < to; a++) {
        const n = source[a];
        if (pieceWithin(n, ax, ay, bx, by, mx, my, hx, hy, within)) list[top++] = n;
      }
      if (!strips.bundles) {
        // Parallel to few directions: strips tell much, even in a large box.
        const local = list.subarray(own, top);
        room.distance.fill(0, 0, local.length);
        const alone = unitsSeen(scratch, local);
        const found = { box: { ax, ay, bx, by }, local, u, v, depth, far: h, all: within, alone };
        if (!stripsAreNews(scratch, { ...found, gains: 0, losses: 0, through: 0 }, known)) return;
      }
      if (out.count % COARSE_SAMPLE === 0) {
        offer(depth, pointSlack(near, list, own, top, u, v, within, room, order), u, v);
      }
      boxKept(out, ax, ay, bx, by, depth, within, top);
      return;
    }
    scratch.looks++;
    let gains = 0;
    let through = 0;
    let alone = true;
    for (let a = from; a < to; a++) {
      const n = source[a];
      const px = x0[n];
      const py = y0[n];
      const qx = x1[n];
      const qy = y1[n];
      if (px < qx ? px > bx + within || qx < ax - within : qx > bx + within || px < ax - within)
        continue;
      if (py < qy ? py > by + within || qy < ay - within : qy > by + within || py < ay - within)
        continue;
      const f = family[n];
      let off = 0;
      let half = 0;
      if (f >= 0) {
        const nx = families.nx[f];
        const ny = families.ny[f];
        half = (nx < 0 ? -nx : nx) * hx + (ny < 0 ? -ny : ny) * hy;
        off = height[n] - nx * mx - ny * my;
        if (off > half + within || off < -half - within) continue;
      }
      const at = top - own;
      pieceGap(near, n, u, v, room, at);
      const d = room.distance[at];
      if (d > within + h) continue;
      list[top++] = n;
      alone = unitSeen(scratch, n) && alone;
      // What it may add to the count over the box.
      if (d >= h) continue;
      if (
        px < qx
          ? px > bx - TOUCH_MM || qx < ax + TOUCH_MM
          : qx > bx - TOUCH_MM || px < ax + TOUCH_MM
      )
        continue;
      if (
        py < qy
          ? py > by - TOUCH_MM || qy < ay + TOUCH_MM
          : qy > by - TOUCH_MM || py < ay + TOUCH_MM
      )
        continue;
      if (f < 0) {
        if (arcMeetsBox(near, n, ax, ay, bx, by) && !arcOnlyTakes(near, n, u, v))
          gains = gainPut(scratch, gains, n, h - d);
        continue;
      }
      if (off > half - TOUCH_MM || off < TOUCH_MM - half) continue;
      const ends =
        (px > ax && px < bx && py > ay && py < by) || (qx > ax && qx < bx && qy > ay && qy < by);
      if (!ends) through++;
      const above = height[n] - families.nx[f] * u - families.ny[f] * v;
      if (step[n] > 0 ? above < 0 : above > 0) continue;
      let beyond = h;
      if (straightBefore(near, n, u, v, h)) {
        const gx = room.awayX[at];
        const gy = room.awayY[at];
        beyond =
          (gx > 0 ? gx * (u - ax) : gx * (u - bx)) + (gy > 0 ? gy * (v - ay) : gy * (v - by));
      }
      if (beyond > d) gains = gainPut(scratch, gains, n, beyond - d);
    }

    // In order of distance: units that the point has and the box's origins may lose, up to the first
    // whose region holds the whole box.
    const local = list.subarray(own, top);
    let slackHere = -1;
    let doubtful = false;
    let lost = 0;
    let all = within;
    let held = -1;
    let losses = 0;
    planes.count = 0;
    // The nearest few tell nearly always; where they do not, all are gone through.
    let count = nearestFirst(scratch, top - own, within, NEAREST);
    for (let m = 0; planes.count < WEIGHED; m++) {
      if (m === count) {
        if (held >= 0 || count < NEAREST || count > NEAREST) break;
        count = nearestFirst(scratch, top - own, within, Infinity);
        if (m === count) break;
      }
      const at = order[m];
      if (room.side[at] < 0) {
        if (room.distance[at] < KEEP_OFF_MM) doubtful = true;
        continue;
      }
      const d = room.distance[at];
      // So far off that it is nowhere the nearest of those held.
      if (held >= 0 && d > room.distance[order[held]] + 2 * h) break;
      // Once so many are lost that the rest is of no interest, how many more does not matter.
      const enough = d < h ? Math.max(1, depth - lost - least + 1) : 1;
      const apart = unitsApart(near, local[at], local, order, m, enough);
      if (apart === 0) continue;
      if (slackHere < 0) slackHere = d;
      const plain = straightBefore(near, local[at], u, v, h);
      if (d >= h) {
        // No origin of the box loses it: what is farther from it than the plane says is not in the box.
        if (held < 0) held = m;
        if (!plain && d - h < LEAST_AWAY_MM) {
          all = Math.min(all, d + h);
          continue;
        }
        const to = planes.count++;
        planes.d[to] = d + (plain ? 0 : (h * h) / (2 * (d - h)));
        planes.gx[to] = room.awayX[at];
        planes.gy[to] = room.awayY[at];
        continue;
      }
      // An origin that keeps it has no more slack than it can be off it.
      const gx = room.awayX[at];
      const gy = room.awayY[at];
      const far = plain
        ? (gx > 0 ? gx * (bx - u) : gx * (ax - u)) + (gy > 0 ? gy * (by - v) : gy * (ay - v))
        : h;
      if (losses < MOST_LOSSES) {
        lossAt[losses] = at;
        lossWeight[losses] = apart;
        lossSlack[losses++] = d + far;
      }
      lost += apart;
    }
    if (planes.count > 0) all = Math.min(all, envelopeTop(planes, ax - u, ay - v, bx - u, by - v));
    // With nothing within the whole reach the slack is that at least.
    if (slackHere < 0 && within === reach) slackHere = within;
    if (slackHere >= 0 && !doubtful) offer(depth, slackHere, u, v);
    if (bx - ax < SMALLEST_BOX_MM && by - ay < SMALLEST_BOX_MM) return;
    const found: BoxLook = {
      box: { ax, ay, bx, by },
      local,
      u,
      v,
      depth,
      far: h,
      all,
      gains,
      losses,
      through,
      alone,
    };
    if (!boxIsNews(scratch, found, known)) return;
    // Over the box no origin has more slack than this: what is farther off does not matter there.
    boxKept(out, ax, ay, bx, by, depth, Math.min(within, all), top);
  };

  /** False when the piece is farther than `within` from the whole box; it may be, too, where true. */
  const pieceWithin = (
    n: number,
    ax: number,
    ay: number,
    bx: number,
    by: number,
    mx: number,
    my: number,
    hx: number,
    hy: number,
    within: number,
  ): boolean => {
    if (Math.min(x0[n], x1[n]) > bx + within || Math.max(x0[n], x1[n]) < ax - within) return false;
    if (Math.min(y0[n], y1[n]) > by + within || Math.max(y0[n], y1[n]) < ay - within) return false;
    const f = family[n];
    if (f < 0) return true;
    const nx = families.nx[f];
    const ny = families.ny[f];
    const half = Math.abs(nx) * hx + Math.abs(ny) * hy;
    return Math.abs(height[n] - nx * mx - ny * my) <= half + within;
  };

  let level = boxLevel(near.count);
  if (squares > 0) {
    squaresSearched(
      cell,
      known,
      most,
      squares,
      ({ ax, ay, bx, by }, depth, slack, list) => {
        const u = ax + (bx - ax) * SPLIT;
        const v = ay + (by - ay) * SPLIT;
        look(list, 0, list.length, u, v, depth, slack, ax, ay, bx, by, level);
      },
      stop,
    );
  } else {
    look(every, 0, near.count, most.u, most.v, most.count, reach, 0, 0, pitch, rise, level);
  }
  freshClimbed(cell, known);
  let next = boxLevel(near.count);
  while (level.count > 0 && !reachIsShort(atLeast[0], reach, pitch) && !stop?.()) {
    levelEmptied(next);
    for (let box = 0; box < level.count; box++) {
      const ax = level.sides[4 * box];
      const ay = level.sides[4 * box + 1];
      const bx = level.sides[4 * box + 2];
      const by = level.sides[4 * box + 3];
      const u = ax + (bx - ax) * SPLIT;
      const v = ay + (by - ay) * SPLIT;
      const wide = bx - ax >= by - ay;
      const cut = wide ? u : v;
      for (let part = 0; part < 2; part++) {
        look(
          level.list,
          boxFrom(level, box),
          level.end[box],
          u,
          v,
          level.depth[box],
          level.reach[box],
          wide && part === 1 ? cut : ax,
          !wide && part === 1 ? cut : ay,
          wide && part === 0 ? cut : bx,
          !wide && part === 0 ? cut : by,
          next,
        );
      }
    }
    [level, next] = [next, level];
    freshClimbed(cell, known);
  }
  return { choices: choicesListed(known), slack: atLeast[0] };
}
