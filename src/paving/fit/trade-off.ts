import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import type { CellPieces } from './cell-pieces';
import { arcMeetsBox, arcOnlyTakes, depthMoved, SPLIT } from './most';
import { KEEP_OFF_MM, pieceGap, pieceGapsRoom, pointSlack, unitsApart } from './slack';
import { slackPolished } from './slack-polish';

/** The origin of the cell with the most slack among those with a count. */
export interface CellChoice {
  readonly count: number;
  readonly slack: number;
  readonly u: number;
  readonly v: number;
}

/** No origin of the same count has this much more slack than the one that is given, mm. */
export const SLACK_TOLERANCE_MM = 0.004;
const TOUCH_MM = 1e-8;
/** Up to this many pieces through a box, each is held against each to see which tell a unit's whole edge there. */
const FEW_THROUGH = 32;
/** While boxes are so many times larger than the most slack known, they are halved without a look at each piece. */
const COARSE_TIMES = 3;
/** One in so many of those is looked into for slack, so that there is some to compare with. */
const COARSE_SAMPLE = 8;
/** So many of the nearest pieces are looked at one by one. */
const NEAREST = 28;
/** Up to this many pieces that no origin of a box loses are set against each other. */
const GREATEST_HELD = 8;
/** Places that a level of boxes has for pieces at first. */
const FIRST_ROOM = 256;
/** Below this, mm, a box is left. */
const SMALLEST_BOX_MM = 1e-5;

interface Level {
  readonly x0: number[];
  readonly y0: number[];
  readonly x1: number[];
  readonly y1: number[];
  readonly depth: number[];
  readonly reach: number[];
  readonly from: number[];
  readonly to: number[];
  list: Int32Array;
  top: number;
}

const levelOf = (size: number): Level => ({
  x0: [],
  y0: [],
  x1: [],
  y1: [],
  depth: [],
  reach: [],
  from: [],
  to: [],
  list: new Int32Array(size),
  top: 0,
});

export interface TradeOffOptions {
  /** Counts below this are of no interest. */
  readonly least: number;
  /** Of the origins with the most units, the one with the most slack. */
  readonly most: CellChoice;
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
  { least, most, stop }: TradeOffOptions,
): CellChoice[] {
  const { x0, y0, x1, y1, radius, family, height, step, families } = near;
  const span = most.count - least + 1;
  const bestSlack = new Float64Array(span).fill(-1);
  const bestU = new Float64Array(span);
  const bestV = new Float64Array(span);
  /** The most slack known of any origin with that count or more. */
  const known = new Float64Array(span).fill(-1);
  const fresh = new Set<number>();

  const offer = (count: number, slack: number, u: number, v: number) => {
    const at = count - least;
    if (at < 0 || at >= span || slack <= bestSlack[at]) return;
    bestSlack[at] = slack;
    bestU[at] = u;
    bestV[at] = v;
    if (slack <= known[at]) return;
    fresh.add(at);
    for (let n = at; n >= 0 && known[n] < slack; n--) known[n] = slack;
  };
  /** Nothing with up to `count` units and `slack` would be news. */
  const beaten = (count: number, slack: number) =>
    count < least || slack <= known[Math.min(count - least, span - 1)] + SLACK_TOLERANCE_MM;

  const every = new Int32Array(near.count);
  for (let n = 0; n < near.count; n++) every[n] = n;
  const room = pieceGapsRoom(Math.max(64, near.count));
  const order = new Int32Array(Math.max(64, near.count));
  const polish = () => {
    for (const at of [...fresh]) {
      if (bestSlack[at] < known[at]) continue;
      const found = slackPolished(near, every, bestU[at], bestV[at], bestSlack[at]);
      for (const { u, v, gained, slack } of found) offer(at + least + gained, slack, u, v);
    }
    fresh.clear();
  };
  offer(most.count, most.slack, most.u, most.v);

  // Scratch for one box: gaps of the listed pieces, those through it, and the family's lines.
  const through = new Uint8Array(near.count);
  const holds = new Uint8Array(near.count);
  const others = new Int32Array(near.count);
  const gainAt = new Float64Array(near.count);
  const gainWeight = new Float64Array(near.count);
  const putGain = (count: number, distance: number, weight: number): number => {
    let place = count;
    for (; place > 0 && gainAt[place - 1] > distance; place--) {
      gainAt[place] = gainAt[place - 1];
      gainWeight[place] = gainWeight[place - 1];
    }
    gainAt[place] = distance;
    gainWeight[place] = weight;
    return count + 1;
  };

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
    out: Level,
  ) => {
    const u = ax + (bx - ax) * SPLIT;
    const v = ay + (by - ay) * SPLIT;
    const depth = depthMoved(near, source, from, to, refU, refV, u, v, refDepth);
    const mx = (ax + bx) / 2;
    const my = (ay + by) / 2;
    const hx = (bx - ax) / 2;
    const hy = (by - ay) / 2;
    const h = Math.hypot(Math.max(u - ax, bx - u), Math.max(v - ay, by - v));
    if (out.top + (to - from) > out.list.length) {
      const larger = new Int32Array(2 * (out.top + (to - from)));
      larger.set(out.list);
      out.list = larger;
    }
    const own = out.top;
    let { top } = out;
    const { list } = out;
    if (h > COARSE_TIMES * known[0] && h > reach) {
      for (let a = from; a < to; a++) {
        const n = source[a];
        if (pieceWithin(n, ax, ay, bx, by, mx, my, hx, hy, within)) list[top++] = n;
      }
      if (out.x0.length % COARSE_SAMPLE === 0) {
        offer(depth, pointSlack(near, list, own, top, u, v, within, room, order), u, v);
      }
      keep(out, ax, ay, bx, by, depth, within, own, top);
      return;
    }
    let gain = 0;
    let current = -1;
    let half = 0;
    let middle = 0;
    let ref = 0;
    let sum = 0;
    let highest = 0;
    let before = 0;
    let crossing = 0;
    let gains = 0;
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
      if (f >= 0 && f !== current) {
        gain += highest - before;
        current = f;
        const nx = families.nx[f];
        const ny = families.ny[f];
        middle = nx * mx + ny * my;
        half = Math.abs(nx) * hx + Math.abs(ny) * hy;
        ref = nx * u + ny * v;
        sum = 0;
        highest = 0;
        before = 0;
      }
      const t = height[n];
      if (f >= 0 && Math.abs(t - middle) > half + within) continue;
      const at = top - own;
      pieceGap(near, n, u, v, room, at);
      if (room.distance[at] > within + h) continue;
      list[top++] = n;
      holds[at] = 0;
      // What it may add to the count over the box.
      through[at] = 0;
      if (room.distance[at] > h) continue;
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
      const weight = Math.abs(step[n]);
      if (f < 0) {
        if (!arcMeetsBox(near, n, ax, ay, bx, by)) continue;
        crossing++;
        through[at] = 1;
        if (!arcOnlyTakes(near, n, u, v)) {
          gain += weight;
          gains = putGain(gains, room.distance[at], weight);
        }
        continue;
      }
      if (Math.abs(t - middle) > half - TOUCH_MM) continue;
      crossing++;
      through[at] = 1;
      const bad = step[n] > 0 ? ref < t : ref > t;
      if (bad) {
        gains = putGain(gains, room.distance[at], weight);
      }
      const whole =
        !(px > ax + TOUCH_MM && px < bx - TOUCH_MM && py > ay + TOUCH_MM && py < by - TOUCH_MM) &&
        !(qx > ax + TOUCH_MM && qx < bx - TOUCH_MM && qy > ay + TOUCH_MM && qy < by - TOUCH_MM);
      if (!whole) {
        if (bad) gain += weight;
        continue;
      }
      through[at] = 2;
      sum += step[n];
      if (t < ref) before = sum;
      if (sum > highest) highest = sum;
    }
    gain += highest - before;
    const bound = Math.min(depth + gain, most.count);
    if (bound < least) return;

    // In order of distance: units that the point has and the box's origins may lose, up to the first
    // whose region holds the whole box.
    const local = list.subarray(own, top);
    let slackHere = -1;
    let doubtful = false;
    let open = false;
    let lost = 0;
    let all = within;
    let held = -1;
    // Units that the box's origins may gain. The way to one that does enters the unit through a piece
    // at least `d` off, so it is at most h − d beyond it; so far off, only nearer units can be gained.
    if (gains > 0) {
      let gained = 0;
      for (let m = 0; m < gains && !open; m++) {
        gained += gainWeight[m];
        open = !beaten(Math.min(bound, depth + gained), h - gainAt[m]);
      }
    }
    // The nearest few tell nearly always; where they do not, all are gone through.
    let count = inOrder(top - own, within, NEAREST);
    for (let m = 0; ; m++) {
      if (m === count) {
        if (count < NEAREST || count > NEAREST) break;
        count = inOrder(top - own, within, Infinity);
        if (m === count) break;
      }
      const at = order[m];
      if (room.side[at] < 0) {
        if (room.distance[at] < KEEP_OFF_MM) doubtful = true;
        continue;
      }
      const d = room.distance[at];
      // Once so many are lost that the rest is of no interest, how many more does not matter.
      const enough = d < h ? Math.max(1, Math.min(bound, depth - lost) - least + 1) : 1;
      const apart = unitsApart(near, local[at], local, order, m, enough);
      if (apart === 0) continue;
      if (slackHere < 0) slackHere = d;
      if (d >= h) {
        all = Math.min(all, d + h);
        held = m;
        break;
      }
      if (!open && !beaten(Math.min(bound, depth - lost), d + h)) open = true;
      lost += apart;
    }
    // With nothing within the whole reach the slack is that at least.
    if (slackHere < 0 && within === reach) slackHere = within;
    if (slackHere >= 0 && !doubtful) offer(depth, slackHere, u, v);
    // Two pieces that face each other across the box bound the slack by half their distance apart.
    if (held >= 0) {
      const first = order[held];
      const d0 = room.distance[first];
      const bend = straightBefore(local[first], u, v, h)
        ? 0
        : (h * h) / (2 * Math.max(1e-12, d0 - h));
      holds[first] = 1;
      let tried = 0;
      for (let m = held + 1; m < count && tried < GREATEST_HELD; m++) {
        const at = order[m];
        if (room.side[at] < 0) continue;
        const d = room.distance[at];
        if (unitsApart(near, local[at], local, order, m, 1) === 0) continue;
        tried++;
        holds[at] = 1;
        const leanX = room.awayX[first] + room.awayX[at];
        const leanY = room.awayY[first] + room.awayY[at];
        const bends =
          bend + (straightBefore(local[at], u, v, h) ? 0 : (h * h) / (2 * Math.max(1e-12, d - h)));
        all = Math.min(all, (d0 + d + bends) / 2 + (Math.hypot(leanX, leanY) / 2) * h);
      }
    }
    if (!open && !beaten(Math.min(bound, depth - lost), all)) open = true;
    if (!open) return;
    if (crossing <= FEW_THROUGH && stripsBeaten(local, depth, gain, all, u, v, ax, ay, bx, by))
      return;
    if (hx * 2 < SMALLEST_BOX_MM && hy * 2 < SMALLEST_BOX_MM) return;
    // Over the box no origin has more slack than this: what is farther off does not matter there.
    const farthest = lost > 0 || gains > 0 ? Math.max(all, 2 * h) : all;
    keep(out, ax, ay, bx, by, depth, Math.min(within, farthest), own, top);
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

  const keep = (
    out: Level,
    ax: number,
    ay: number,
    bx: number,
    by: number,
    depth: number,
    within: number,
    from: number,
    to: number,
  ) => {
    out.x0.push(ax);
    out.y0.push(ay);
    out.x1.push(bx);
    out.y1.push(by);
    out.depth.push(depth);
    out.reach.push(within);
    out.from.push(from);
    out.to.push(to);
    out.top = to;
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

  /**
   * True when some family of parallel pieces through the box shows that none of its origins is news:
   * between each two neighbours of the family the count is bounded by the family's steps, and the
   * slack by the nearest piece below and above that has a unit to itself in the box.
   */
  const stripsBeaten = (
    local: Int32Array,
    depth: number,
    gain: number,
    all: number,
    u: number,
    v: number,
    ax: number,
    ay: number,
    bx: number,
    by: number,
  ): boolean => {
    const mx = (ax + bx) / 2;
    const my = (ay + by) / 2;
    const hx = (bx - ax) / 2;
    const hy = (by - ay) / 2;
    const reachOfBox = Math.hypot(Math.max(u - ax, bx - u), Math.max(v - ay, by - v));
    for (let a = 0; a < local.length;) {
      const f = family[local[a]];
      let b = a;
      while (b < local.length && family[local[b]] === f) b++;
      // One line alone shows nothing that its distance does not.
      if (f < 0 || b - a < 2) {
        a = b;
        continue;
      }
      const nx = families.nx[f];
      const ny = families.ny[f];
      const middle = nx * mx + ny * my;
      const half = Math.abs(nx) * hx + Math.abs(ny) * hy;
      const along = -ny * mx + nx * my;
      const halfAlong = Math.abs(ny) * hx + Math.abs(nx) * hy;
      const ref = nx * u + ny * v;
      const lines: number[] = [];
      let farBelow = -Infinity;
      let farAbove = Infinity;
      let before = 0;
      let highest = 0;
      let sum = 0;
      for (let m = a; m < b; m++) {
        if (through[m] !== 2) {
          // Beyond the box, and of a unit that holds all of it.
          if (holds[m] === 1 && straightBefore(local[m], u, v, reachOfBox)) {
            const t = height[local[m]];
            if (t < middle && step[local[m]] > 0) farBelow = Math.max(farBelow, t);
            if (t > middle && step[local[m]] < 0) farAbove = Math.min(farAbove, t);
          }
          continue;
        }
        lines.push(m);
        sum += step[local[m]];
        if (height[local[m]] < ref) before = sum;
        if (sum > highest) highest = sum;
      }
      if (
        lines.length > 1 ||
        (lines.length === 1 && (farBelow > -Infinity || farAbove < Infinity))
      ) {
        const rest = depth + gain - (highest - before);
        const tells = lines.map((m) => {
          const n = local[m];
          const s0 = -ny * x0[n] + nx * y0[n];
          const s1 = -ny * x1[n] + nx * y1[n];
          if (Math.min(s0, s1) > along - halfAlong || Math.max(s0, s1) < along + halfAlong)
            return false;
          return hasOwnUnit(local, m);
        });
        let beatenAll = true;
        sum = 0;
        for (let line = 0; line <= lines.length && beatenAll; line++) {
          const low = line === 0 ? middle - half : height[local[lines[line - 1]]];
          const high = line === lines.length ? middle + half : height[local[lines[line]]];
          if (line > 0) sum += step[local[lines[line - 1]]];
          let below = farBelow;
          for (let m = line - 1; m >= 0; m--) {
            const n = local[lines[m]];
            if (step[n] > 0 && tells[m]) {
              below = height[n];
              break;
            }
          }
          let above = farAbove;
          for (let m = line; m < lines.length; m++) {
            const n = local[lines[m]];
            if (step[n] < 0 && tells[m]) {
              above = height[n];
              break;
            }
          }
          const at = Math.max(low, Math.min(high, (below + above) / 2));
          const slack =
            below === -Infinity
              ? above === Infinity
                ? Infinity
                : above - low
              : above === Infinity
                ? high - below
                : Math.min(at - below, above - at);
          beatenAll = beaten(Math.min(most.count, rest + sum - before), Math.min(all, slack));
        }
        if (beatenAll) return true;
      }
      a = b;
    }
    return false;
  };

  /** True when one of the piece's units has no other piece through the box. */
  const hasOwnUnit = (local: Int32Array, m: number): boolean => {
    let count = 0;
    for (let n = 0; n < local.length; n++) if (n !== m && through[n] > 0) others[count++] = n;
    return unitsApart(near, local[m], local, others, count, 1) > 0;
  };

  const wholeCell = (): Level => {
    const level = levelOf(near.count);
    look(every, 0, near.count, most.u, most.v, most.count, reach, 0, 0, pitch, rise, level);
    return level;
  };

  const search = (first: Level) => {
    let level = first;
    polish();
    while (level.x0.length > 0 && !stop?.()) {
      const next = levelOf(Math.max(FIRST_ROOM, 2 * level.top));
      for (let box = 0; box < level.x0.length; box++) {
        const ax = level.x0[box];
        const ay = level.y0[box];
        const bx = level.x1[box];
        const by = level.y1[box];
        const u = ax + (bx - ax) * SPLIT;
        const v = ay + (by - ay) * SPLIT;
        const wide = bx - ax >= by - ay;
        const cut = wide ? u : v;
        for (let part = 0; part < 2; part++) {
          look(
            level.list,
            level.from[box],
            level.to[box],
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
      level = next;
      polish();
    }
  };
  search(wholeCell());
  const choices: CellChoice[] = [];
  let above = -Infinity;
  for (let at = span - 1; at >= 0; at--) {
    if (bestSlack[at] <= above + LENGTH_TOLERANCE_MM) continue;
    above = bestSlack[at];
    choices.push({ count: at + least, slack: bestSlack[at], u: bestU[at], v: bestV[at] });
  }
  return choices;
}
