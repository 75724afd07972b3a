import { envelopeTop, planeEnvelope } from '@/geometry/plane-envelope';
import { boxFrom, boxKept, boxLevel, levelEmptied, levelRoom, type BoxLevel } from './box-level';
import type { CellPieces } from './cell-pieces';
import {
  choiceOffered,
  choicesListed,
  knownChoices,
  newsStair,
  reachIsShort,
  type CellChoice,
} from './known-choices';
import { freshClimbed } from './known-climbs';
import { arcMeetsBox, arcOnlyTakes, depthMoved, SPLIT } from './most';
import { pieceFinder, pieceGrid } from './piece-grid';
import { KEEP_OFF_MM, pieceGap, pieceGapsRoom, pointSlack, unitsApart } from './slack';
import { squaresSearched } from './square-search';
import { KEPT_OFF, stripCount, stripRoom, type KeptOff, type OriginBox } from './strip-bound';

export { SLACK_TOLERANCE_MM } from './known-choices';

const TOUCH_MM = 1e-8;
/** While boxes are so many times larger than the most slack known, they are halved without a look at each piece. */
const COARSE_TIMES = 3;
/** One in so many of those is looked into for slack, so that there is some to compare with. */
const COARSE_SAMPLE = 8;
/** So many of the nearest pieces are looked at one by one. */
const NEAREST = 28;
/** So many of the nearest pieces that no origin of a box loses are weighed against each other. */
const WEIGHED = 7;
/** So many units that must be lost, and as many that are held, are set against each other. */
const MOST_WAYS = 5;
/** So many of the nearest pieces that origins of a box may lose are weighed one by one. */
const MOST_LOSSES = 64;
/** With fewer lines right through a box, of many directions, strips are not looked at. */
const FEW_LINES = 24;
/** Directions whose sine is less are too nearly the same to cross. */
const LEAST_CROSS = 1e-6;
/** Boxes smaller than the slack by this are looked into where the slack should be greatest. */
const SMALL_SHARE = 8;
/** How much more steeply than a piece's own a plane rises that stands for having to be beyond it. */
const STEEP = 1000;
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
): CellChoice[] {
  const { x0, y0, x1, y1, radius, family, height, step, families } = near;
  const known = knownChoices(least, most.count);
  const { atLeast } = known;
  const offer = (count: number, slack: number, u: number, v: number) =>
    choiceOffered(known, count, slack, u, v);

  const every = new Int32Array(near.count);
  for (let n = 0; n < near.count; n++) every[n] = n;
  const room = pieceGapsRoom(Math.max(64, near.count));
  const order = new Int32Array(Math.max(64, near.count));
  const finder = () => {
    const lines = Math.max(1, Math.round((PLACES * rise) / pitch));
    const places = pieceGrid(near, -reach, -reach, pitch + reach, rise + reach, PLACES, lines);
    return pieceFinder(near, places);
  };
  const cell = { near, every, pitch, rise, reach, about: squares > 0 ? finder() : undefined };
  offer(most.count, most.slack, most.u, most.v);

  const strips = stripRoom(near);
  const planes = planeEnvelope(WEIGHED);
  const ways = planeEnvelope(2 * MOST_WAYS);
  const gaps = pieceGapsRoom(Math.max(64, near.count));
  // Pieces through which units may be gained, by the slack that an origin beyond them may have, most first.
  const gainPiece = new Int32Array(near.count);
  const gainSlack = new Float64Array(near.count);
  const putGain = (count: number, n: number, slack: number): number => {
    let place = count;
    for (; place > 0 && gainSlack[place - 1] < slack; place--) {
      gainSlack[place] = gainSlack[place - 1];
      gainPiece[place] = gainPiece[place - 1];
    }
    gainSlack[place] = slack;
    gainPiece[place] = n;
    return count + 1;
  };
  // For each unit that a piece has to itself, when it was last seen, and in how many pieces of a list.
  const seenAt = new Int32Array(strips.stamp.length);
  const seen = new Int32Array(strips.stamp.length);
  let looks = 0;
  let stamped = 0;
  const others = new Int32Array(near.count);
  const lossAt = new Int32Array(MOST_LOSSES);
  const lossWeight = new Int32Array(MOST_LOSSES);
  const lossSlack = new Float64Array(MOST_LOSSES);

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
        const box = { ax, ay, bx, by };
        if (!stripsNews(local, box, u, v, depth, h, within, onceSeen(local))) return;
      }
      if (out.count % COARSE_SAMPLE === 0) {
        offer(depth, pointSlack(near, list, own, top, u, v, within, room, order), u, v);
      }
      boxKept(out, ax, ay, bx, by, depth, within, top);
      return;
    }
    looks++;
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
      alone = unitSeen(n) && alone;
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
          gains = putGain(gains, n, h - d);
        continue;
      }
      if (off > half - TOUCH_MM || off < TOUCH_MM - half) continue;
      const ends =
        (px > ax && px < bx && py > ay && py < by) || (qx > ax && qx < bx && qy > ay && qy < by);
      if (!ends) through++;
      const above = height[n] - families.nx[f] * u - families.ny[f] * v;
      if (step[n] > 0 ? above < 0 : above > 0) continue;
      let beyond = h;
      if (straightBefore(n, u, v, h)) {
        const gx = room.awayX[at];
        const gy = room.awayY[at];
        beyond =
          (gx > 0 ? gx * (u - ax) : gx * (u - bx)) + (gy > 0 ? gy * (v - ay) : gy * (v - by));
      }
      if (beyond > d) gains = putGain(gains, n, beyond - d);
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
    let count = inOrder(top - own, within, NEAREST);
    for (let m = 0; planes.count < WEIGHED; m++) {
      if (m === count) {
        if (held >= 0 || count < NEAREST || count > NEAREST) break;
        count = inOrder(top - own, within, Infinity);
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
      const plain = straightBefore(local[at], u, v, h);
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
    const box = { ax, ay, bx, by };
    if (!news(local, box, u, v, depth, h, all, gains, losses, through, alone)) return;
    // Over the box no origin has more slack than this: what is farther off does not matter there.
    boxKept(out, ax, ay, bx, by, depth, Math.min(within, all), top);
  };

  /** Tells which units are in one listed piece only; true when each of the pieces is of one unit. */
  const onceSeen = (local: Int32Array): boolean => {
    let alone = true;
    looks++;
    for (const n of local) alone = unitSeen(n) && alone;
    return alone;
  };

  /** Counts one more piece of a listed piece's unit; false when it has more units than one. */
  const unitSeen = (n: number): boolean => {
    const unit = strips.unit[n];
    if (unit < 0) return false;
    if (seenAt[unit] === looks) seen[unit]++;
    else {
      seenAt[unit] = looks;
      seen[unit] = 1;
    }
    return true;
  };

  /** The count that an origin of the box with more slack can have by its strips; `room` has the distances, or less. */
  const stripsBound = (
    local: Int32Array,
    box: OriginBox,
    u: number,
    v: number,
    depth: number,
    h: number,
    slack: number,
    alone: boolean,
  ): number => {
    // A unit whose only piece near enough is this one is whole right up to it.
    const nearby = slack + h;
    const keptOff = (at: number): KeptOff => {
      const unit = strips.unit[local[at]];
      if (alone && seen[unit] === 1) return KEPT_OFF.held;
      let count = 0;
      for (let n = 0; n < local.length; n++) {
        if (n === at || room.distance[n] > nearby) continue;
        if (!alone) others[count++] = n;
        else if (strips.unit[local[n]] === unit) return KEPT_OFF.none;
      }
      if (alone) return KEPT_OFF.held;
      const apart = unitsApart(near, local[at], local, others, count, 1);
      return apart > 0 ? KEPT_OFF.held : KEPT_OFF.none;
    };
    return stripCount(
      near,
      local,
      0,
      local.length,
      box,
      u,
      v,
      depth,
      slack,
      room.distance,
      h,
      false,
      keptOff,
      strips,
    );
  };

  /** Tries where the strips that allow the most, of the two families with most lines, cross. */
  const tryStrips = (
    local: Int32Array,
    { ax, ay, bx, by }: OriginBox,
    u: number,
    v: number,
    depth: number,
    all: number,
  ) => {
    const { found, nx, ny, at } = strips;
    const cross = found < 2 ? 0 : nx[0] * ny[1] - ny[0] * nx[1];
    if (Math.abs(cross) < LEAST_CROSS) return;
    const toU = (at[0] * ny[1] - at[1] * ny[0]) / cross;
    const toV = (at[1] * nx[0] - at[0] * nx[1]) / cross;
    if (!(toU > ax && toU < bx && toV > ay && toV < by)) return;
    const there = depthMoved(near, local, 0, local.length, u, v, toU, toV, depth);
    if (there < least || atLeast[Math.min(there, most.count) - least] >= all) return;
    const slack = pointSlack(near, local, 0, local.length, toU, toV, all, gaps, order);
    if (slack < all) offer(there, slack, toU, toV);
  };

  /** False when the strips alone show that no origin of the box is news. */
  const stripsNews = (
    local: Int32Array,
    box: OriginBox,
    u: number,
    v: number,
    depth: number,
    h: number,
    all: number,
    alone: boolean,
  ): boolean => {
    for (const { slack, fewest } of newsStair(known)) {
      if (slack >= all || stripsBound(local, box, u, v, depth, h, slack, alone) < fewest) continue;
      tryStrips(local, box, u, v, depth, all);
      return true;
    }
    return false;
  };

  /**
   * False when no origin of the box is news. For each step of the stair the origins with more slack are bounded: units that none of them can keep are lost, and those that none can be so far beyond the edge of are not
   * gained; the ways to lose them must not contradict each other; and the strips must have room.
   */
  const news = (
    local: Int32Array,
    box: OriginBox,
    u: number,
    v: number,
    depth: number,
    h: number,
    all: number,
    gains: number,
    losses: number,
    through: number,
    alone: boolean,
  ): boolean => {
    for (const { slack, fewest } of newsStair(known)) {
      if (slack >= all) continue;
      let count = depth;
      for (let m = 0; m < losses; m++) if (lossSlack[m] <= slack) count -= lossWeight[m];
      const counted = --stamped;
      for (let m = 0; m < gains && count < fewest && gainSlack[m] > slack; m++) {
        const unit = strips.unit[gainPiece[m]];
        if (unit >= 0) {
          if (seenAt[unit] === counted) continue;
          seenAt[unit] = counted;
        }
        count += Math.abs(step[gainPiece[m]]);
      }
      if (count < fewest || !waysAgree(local, box, u, v, depth, h, all, slack, losses)) continue;
      // Few lines of many directions leave no strips that tell.
      if (through === 0 || (strips.bundles && through < FEW_LINES)) return true;
      const bound = stripsBound(local, box, u, v, depth, h, slack, alone);
      if (bound < fewest) continue;
      tryStrips(local, box, u, v, depth, all);
      return true;
    }
    return false;
  };

  /**
   * False when no origin of the box is beyond the edges of all the units that must be lost for the slack and
   * off those of the units that are held by as much. An origin that has lost a unit has gone out through some
   * piece of it, and is beyond that piece's line; and not far from beyond the nearest one's, where they bend little.
   */
  const waysAgree = (
    local: Int32Array,
    { ax, ay, bx, by }: OriginBox,
    u: number,
    v: number,
    depth: number,
    h: number,
    all: number,
    slack: number,
    losses: number,
  ): boolean => {
    ways.count = 0;
    for (let m = 0; m < losses && ways.count < MOST_WAYS; m++) {
      if (lossSlack[m] > slack) continue;
      const n = local[lossAt[m]];
      const unit = strips.unit[n];
      if (unit < 0 || radius[n] > 0) continue;
      const off = near.ux[n] * (v - y0[n]) - near.uy[n] * (u - x0[n]);
      let bend = 0;
      for (let a = 0, left = seen[unit] - 1; left > 0 && a < local.length; a++) {
        const o = local[a];
        if (o === n || strips.unit[o] !== unit) continue;
        left--;
        if (room.distance[a] > h) continue;
        if (radius[o] > 0) bend = Infinity;
        const other = near.ux[o] * (v - y0[o]) - near.uy[o] * (u - x0[o]);
        const turn = Math.hypot(near.ux[n] - near.ux[o], near.uy[n] - near.uy[o]);
        bend = Math.max(bend, off - other + turn * h);
      }
      if (bend > h) continue;
      const to = ways.count++;
      ways.d[to] = bend - off;
      ways.gx[to] = near.uy[n];
      ways.gy[to] = -near.ux[n];
    }
    if (ways.count === 0) return true;
    const lines = ways.count;
    for (let m = 0; m < planes.count && m < MOST_WAYS; m++) {
      const to = ways.count++;
      ways.d[to] = planes.d[m] - slack;
      ways.gx[to] = planes.gx[m];
      ways.gy[to] = planes.gy[m];
    }
    if (envelopeTop(ways, ax - u, ay - v, bx - u, by - v) < 0) return false;
    if (h * SMALL_SHARE > slack) return true;
    // In a small box, try where the slack is greatest just beyond those lines.
    for (let to = 0; to < lines; to++) {
      ways.d[to] = (ways.d[to] - 2 * KEEP_OFF_MM) * STEEP;
      ways.gx[to] *= STEEP;
      ways.gy[to] *= STEEP;
    }
    if (envelopeTop(ways, ax - u, ay - v, bx - u, by - v) <= 0) return true;
    const toU = u + ways.x;
    const toV = v + ways.y;
    const there = depthMoved(near, local, 0, local.length, u, v, toU, toV, depth);
    const found = pointSlack(near, local, 0, local.length, toU, toV, all, gaps, order);
    if (found < all) offer(there, found, toU, toV);
    return true;
  };

  /** Puts the listed pieces nearer than `within` in `order`, nearest first, `most` of them at most. */
  const inOrder = (listed: number, within: number, most: number): number => {
    let count = 0;
    for (let at = 0; at < listed; at++) {
      if (room.distance[at] >= within) continue;
      const key = room.key[at];
      const full = count === most;
      if (full && key >= room.key[order[count - 1]]) continue;
      let place = full ? count - 1 : count++;
      for (; place > 0 && room.key[order[place - 1]] > key; place--)
        order[place] = order[place - 1];
      order[place] = at;
    }
    return count;
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

  /** True when every point within h of (u, v) has its foot on the straight piece. */
  const straightBefore = (n: number, u: number, v: number, h: number): boolean => {
    if (radius[n] > 0) return false;
    const along = (u - x0[n]) * near.ux[n] + (v - y0[n]) * near.uy[n];
    return along >= h && along <= near.length[n] - h;
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
  while (level.count > 0 && !reachIsShort(known.atLeast[0], reach, pitch) && !stop?.()) {
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
  return choicesListed(known);
}
