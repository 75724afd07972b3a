import { envelopeTop, planeEnvelope } from '@/geometry/plane-envelope';
import { depthMoved, SPLIT, type CellMost } from './most';
import type { NearPieces } from './near-pieces';
import { pieceGap, pieceGapsRoom, type PieceGaps } from './slack';
import { KEPT_OFF, stripCount, stripRoom, type OriginBox } from './strip-bound';
import { SLACK_TOLERANCE_MM, type CellChoice } from './known-choices';

/** So many of the pieces nearest to a point are weighed against each other. */
const WEIGHED = 7;
/** Of more pieces than this only the lines are looked at: many run right through. */
const MANY_LISTED = 100;
/** Below this, mm, a box is left. */
const SMALLEST_BOX_MM = 1e-5;
/** A climb ends with steps that gain less than this, mm. */
const LEAST_GAIN_MM = 1e-6;
const GREATEST_CLIMB = 40;
/** Ways whose cosine is more than this are the same. */
const SAME_WAY = 1 - 1e-12;
/** A climb's step stays within this share of the way to the nearest piece, so that it crosses none. */
const CLIMB_SHARE = 0.7;

interface Waiting {
  readonly bound: number;
  readonly box: OriginBox;
  readonly depth: number;
  /** The pieces that come within `within` of the box. */
  readonly list: Int32Array;
  readonly within: number;
}

/** Puts a box where a heap has it, the greatest bound at the top. */
function heapPut(heap: Waiting[], box: Waiting): void {
  let at = heap.length;
  heap.push(box);
  while (at > 0) {
    const over = (at - 1) >> 1;
    if (heap[over].bound >= box.bound) break;
    heap[at] = heap[over];
    at = over;
  }
  heap[at] = box;
}

function heapTake(heap: Waiting[]): Waiting {
  const first = heap[0];
  const last = heap.pop()!;
  if (heap.length === 0) return first;
  let at = 0;
  for (let under = 1; under < heap.length; under = 2 * at + 1) {
    if (under + 1 < heap.length && heap[under + 1].bound > heap[under].bound) under++;
    if (heap[under].bound <= last.bound) break;
    heap[at] = heap[under];
    at = under;
  }
  heap[at] = last;
  return first;
}

/**
 * Of the origins with the most units, the one with the most slack. No way leads from such an origin
 * across any piece without losing units: one that gained some would have more than the most. So the
 * slack is the distance to the nearest piece of all, and what is sought is the largest circle within the
 * faces that have the most. `near` are the cell's pieces with their repeats out to `reach`; an answer
 * with all of `reach` may have more.
 *
 * Boxes outside which no origin has the most are halved, the best bound first. From a point with the most
 * units no origin is farther from the pieces than the planes through those near it allow; from a point
 * with fewer, the way to one with the most leads across a piece.
 */
export function mostPlay(
  near: NearPieces,
  reach: number,
  most: CellMost,
  stop?: () => boolean,
): CellChoice {
  const { x0, y0, x1, y1, family, height, radius, families } = near;
  let best = -1;
  let bestU = most.u;
  let bestV = most.v;
  const every = new Int32Array(near.count);
  for (let n = 0; n < near.count; n++) every[n] = n;
  const room = pieceGapsRoom(near.count);
  const climbRoom = pieceGapsRoom(near.count);
  const one = pieceGapsRoom(1);
  const list = new Int32Array(near.count);
  const order = new Int32Array(WEIGHED);
  const planes = planeEnvelope(WEIGHED);
  // Where many pieces are of few directions nearly all run right through, and their units do not matter.
  const strips = stripRoom(near, near.count < MANY_LISTED * (1 + families.nx.length));
  const heap: Waiting[] = [];
  const both = () => KEPT_OFF.both;

  /** How far the point is from the line of a straight piece, and so no farther than from the piece; 0 for an arc. */
  const lineOff = (n: number, u: number, v: number): number => {
    const f = family[n];
    if (f < 0) return 0;
    const off = height[n] - families.nx[f] * u - families.ny[f] * v;
    return off < 0 ? -off : off;
  };

  /** Distance from the point to the nearest listed piece, or `reach`. */
  const slackAt = (pieces: Int32Array, count: number, u: number, v: number): number => {
    let least = reach;
    for (let a = 0; a < count; a++) {
      if (lineOff(pieces[a], u, v) >= least) continue;
      pieceGap(near, pieces[a], u, v, one, 0);
      if (one.distance[0] < least) least = one.distance[0];
    }
    return least;
  };

  /**
   * The planes of the pieces nearest to a point, from their gaps. Within h of the point none of the
   * pieces is farther than its plane says; with h 0 that is so at the point only.
   */
  const planesAbout = (
    { distance, awayX, awayY }: PieceGaps,
    pieces: Int32Array,
    count: number,
    u: number,
    v: number,
    h: number,
  ) => {
    let held = 0;
    for (let at = 0; at < count; at++) {
      const d = distance[at];
      if (held === WEIGHED && d >= distance[order[held - 1]]) continue;
      // Of those that lie the same way the nearest tells.
      const gx = awayX[at];
      const gy = awayY[at];
      let twin = 0;
      while (twin < held && gx * awayX[order[twin]] + gy * awayY[order[twin]] < SAME_WAY) twin++;
      if (twin < held && distance[order[twin]] <= d) continue;
      let place = twin < held ? twin : held < WEIGHED ? held++ : held - 1;
      for (; place > 0 && distance[order[place - 1]] > d; place--) order[place] = order[place - 1];
      order[place] = at;
    }
    planes.count = 0;
    for (let m = 0; m < held; m++) {
      const at = order[m];
      const d = distance[at];
      // Anything farther is nowhere the nearest.
      if (h > 0 && d > distance[order[0]] + 2 * h) break;
      const n = pieces[at];
      const along = (u - x0[n]) * near.ux[n] + (v - y0[n]) * near.uy[n];
      const straight = radius[n] === 0 && along >= h && along <= near.length[n] - h;
      // The distance to a point bends upward: by so much at most.
      if (!straight && d <= h && h > 0) continue;
      const bend = straight || h === 0 ? 0 : (h * h) / (2 * (d - h));
      const to = planes.count++;
      planes.d[to] = d + bend;
      planes.gx[to] = awayX[at];
      planes.gy[to] = awayY[at];
    }
  };

  /** From an origin with the most units to where the slack about it is greatest, without leaving its face. */
  const climb = (startU: number, startV: number, startSlack: number) => {
    let u = startU;
    let v = startV;
    let slack = startSlack;
    let scope = 0;
    let count = 0;
    let aboutU = 0;
    let aboutV = 0;
    for (let round = 0; round < GREATEST_CLIMB && slack > 0; round++) {
      const far = CLIMB_SHARE * slack;
      if (round === 0 || Math.hypot(u - aboutU, v - aboutV) + slack + 4 * far > scope) {
        scope = 8 * slack;
        aboutU = u;
        aboutV = v;
        count = 0;
        for (let n = 0; n < near.count; n++) {
          if ((x0[n] < x1[n] ? x0[n] : x1[n]) > u + scope) continue;
          if ((x0[n] < x1[n] ? x1[n] : x0[n]) < u - scope) continue;
          if ((y0[n] < y1[n] ? y0[n] : y1[n]) > v + scope) continue;
          if ((y0[n] < y1[n] ? y1[n] : y0[n]) < v - scope) continue;
          if (lineOff(n, u, v) > scope) continue;
          list[count++] = n;
        }
      }
      for (let a = 0; a < count; a++) pieceGap(near, list[a], u, v, climbRoom, a);
      planesAbout(climbRoom, list, count, u, v, 0);
      let moved = false;
      for (let trust = far; trust > LEAST_GAIN_MM && !moved; trust /= 4) {
        const half = trust * Math.SQRT1_2;
        const top = envelopeTop(planes, -half, -half, half, half);
        if (top <= slack + LEAST_GAIN_MM) continue;
        const there = slackAt(list, count, u + planes.x, v + planes.y);
        if (there <= slack + LEAST_GAIN_MM) continue;
        u += planes.x;
        v += planes.y;
        slack = there;
        moved = true;
      }
      if (!moved) break;
    }
    if (slack <= best) return;
    best = slack;
    bestU = u;
    bestV = v;
  };

  const offer = (slack: number, u: number, v: number) => {
    if (slack > best) climb(u, v, slack);
  };
  const known = () => best + SLACK_TOLERANCE_MM;

  const own = new Int32Array(near.count);
  /**
   * Puts those of the pieces that come within `within` of the box in `own`, and how they stand to (u, v) in
   * `room`; returns how many. With `lines` distances to straight pieces are those to their lines: no more than the true ones.
   */
  const gathered = (
    source: Int32Array,
    total: number,
    within: number,
    { ax, ay, bx, by }: OriginBox,
    u: number,
    v: number,
    h: number,
    lines: boolean,
  ): number => {
    const mx = (ax + bx) / 2;
    const my = (ay + by) / 2;
    const hx = (bx - ax) / 2 + within;
    const hy = (by - ay) / 2 + within;
    let count = 0;
    for (let a = 0; a < total; a++) {
      const n = source[a];
      const px = x0[n];
      const py = y0[n];
      const qx = x1[n];
      const qy = y1[n];
      if (px < qx ? px > mx + hx || qx < mx - hx : qx > mx + hx || px < mx - hx) continue;
      if (py < qy ? py > my + hy || qy < my - hy : qy > my + hy || py < my - hy) continue;
      const f = family[n];
      if (f >= 0) {
        const nx = families.nx[f];
        const ny = families.ny[f];
        const half = (nx < 0 ? -nx : nx) * hx + (ny < 0 ? -ny : ny) * hy;
        const off = height[n] - nx * mx - ny * my;
        if (off > half || off < -half) continue;
        if (lines) {
          const far = height[n] - nx * u - ny * v;
          room.distance[count] = far < 0 ? -far : far;
          own[count++] = n;
          continue;
        }
      }
      pieceGap(near, n, u, v, room, count);
      if (room.distance[count] > within + h) continue;
      own[count++] = n;
    }
    return count;
  };

  /** Looks into a box; `source` has the pieces within `listed` of it, and no origin of it has more slack than `atMost`. */
  const look = (
    source: Int32Array,
    listed: number,
    atMost: number,
    refU: number,
    refV: number,
    refDepth: number,
    box: OriginBox,
  ) => {
    const { ax, ay, bx, by } = box;
    const u = ax + (bx - ax) * SPLIT;
    const v = ay + (by - ay) * SPLIT;
    const h = Math.hypot(Math.max(u - ax, bx - u), Math.max(v - ay, by - v));
    const depth = depthMoved(near, source, 0, source.length, refU, refV, u, v, refDepth);
    const has = depth === most.count;
    if (!has && h <= known()) return;
    // A way to an origin with the most crosses a piece in the box; from one that has it any piece may be the nearest.
    let within = 0;
    const lines = !has && source.length > MANY_LISTED;
    let count = gathered(source, source.length, Math.max(0, known()), box, u, v, h, lines);
    let nearest = Math.min(reach, atMost);
    for (let at = 0; at < count; at++) nearest = Math.min(nearest, room.distance[at]);
    let bound = h - nearest;
    if (has) {
      within = Math.min(reach, atMost, nearest + h);
      const all = listed >= within ? source : every;
      count = gathered(all, all.length, within, box, u, v, h, false);
      let gained = Infinity;
      for (let at = 0; at < count; at++) {
        nearest = Math.min(nearest, room.distance[at]);
        // In through an arc one may come from either side of it.
        if (room.side[at] < 0 || near.radius[own[at]] > 0)
          gained = Math.min(gained, room.distance[at]);
      }
      planesAbout(room, own, count, u, v, h);
      // The planes tell of the point's own face. Another face in the box lacks some of its units and has as many others:
      // the way there goes out through one piece and in through another, and has no more slack than beyond that one.
      const across = nearest < h ? h - gained : -Infinity;
      const top = envelopeTop(planes, ax - u, ay - v, bx - u, by - v);
      bound = Math.min(within, Math.max(top, across));
      if (nearest > best) offer(nearest, u, v);
    }
    if (bound <= known()) return;
    if (count > 0) {
      const fits = stripCount(
        near,
        own,
        0,
        count,
        box,
        u,
        v,
        depth,
        known(),
        room.distance,
        h,
        true,
        both,
        strips,
      );
      if (fits < most.count) return;
      const { found, nx, ny, at } = strips;
      const cross = found < 2 ? 0 : nx[0] * ny[1] - ny[0] * nx[1];
      if (Math.abs(cross) > 1e-6) {
        const toU = (at[0] * ny[1] - at[1] * ny[0]) / cross;
        const toV = (at[1] * nx[0] - at[0] * nx[1]) / cross;
        if (toU > ax && toU < bx && toV > ay && toV < by) {
          const there = depthMoved(near, own, 0, count, u, v, toU, toV, depth);
          if (there === most.count && slackAt(own, count, toU, toV) > best) {
            offer(slackAt(every, near.count, toU, toV), toU, toV);
            if (bound <= known()) return;
          }
        }
      }
    }
    if (bx - ax < SMALLEST_BOX_MM && by - ay < SMALLEST_BOX_MM) return;
    heapPut(heap, { bound, box, depth, list: own.slice(0, count), within });
  };

  // First the boxes known to hold origins with the most, the largest before the rest.
  const { boxes } = most;
  const size = (box: number) => (boxes.x1[box] - boxes.x0[box]) * (boxes.y1[box] - boxes.y0[box]);
  const rank = boxes.x0
    .map((_, box) => box)
    .sort(
      (m, n) =>
        Number(boxes.depth[n] === most.count) - Number(boxes.depth[m] === most.count) ||
        size(n) - size(m),
    );
  offer(slackAt(every, near.count, most.u, most.v), most.u, most.v);
  for (const n of rank) {
    if (stop?.()) break;
    const box = { ax: boxes.x0[n], ay: boxes.y0[n], bx: boxes.x1[n], by: boxes.y1[n] };
    const u = box.ax + (box.bx - box.ax) * SPLIT;
    const v = box.ay + (box.by - box.ay) * SPLIT;
    look(piecesHere(near, boxes.list[n]), 0, reach, u, v, boxes.depth[n], box);
  }
  while (heap.length > 0 && heap[0].bound > known() && !stop?.()) {
    const { bound, box, depth, list: meeting, within } = heapTake(heap);
    const { ax, ay, bx, by } = box;
    const u = ax + (bx - ax) * SPLIT;
    const v = ay + (by - ay) * SPLIT;
    if (bx - ax >= by - ay) {
      look(meeting, within, bound, u, v, depth, { ax, ay, bx: u, by });
      look(meeting, within, bound, u, v, depth, { ax: u, ay, bx, by });
    } else {
      look(meeting, within, bound, u, v, depth, { ax, ay, bx, by: v });
      look(meeting, within, bound, u, v, depth, { ax, ay: v, bx, by });
    }
  }
  return { count: most.count, slack: best, u: bestU, v: bestV };
}

/** The pieces that a cell's own pieces are part of, each once and in order. */
function piecesHere({ of }: NearPieces, own: Int32Array): Int32Array {
  const here = own.map((piece) => of[piece]).sort();
  let count = 0;
  for (let a = 0; a < here.length; a++) {
    if (count === 0 || here[a] !== here[count - 1]) here[count++] = here[a];
  }
  return here.subarray(0, count);
}
