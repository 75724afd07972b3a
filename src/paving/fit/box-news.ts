import { envelopeTop } from '@/geometry/plane-envelope';
import { choiceOffered, newsStair, type KnownChoices } from './known-choices';
import { MOST_WAYS, type BoxLook, type LookRoom } from './look-room';
import { depthMoved } from './most';
import { KEEP_OFF_MM, pointSlack, unitsApart } from './slack';
import { KEPT_OFF, stripCount, type KeptOff } from './strip-bound';

/** With fewer lines right through a box, of many directions, strips are not looked at. */
const FEW_LINES = 24;
/** Directions whose sine is less are too nearly the same to cross. */
const LEAST_CROSS = 1e-6;
/** Boxes smaller than the slack by this are looked into where the slack should be greatest. */
const SMALL_SHARE = 8;
/** How much more steeply than a piece's own a plane rises that stands for having to be beyond it. */
const STEEP = 1000;

/**
 * False when no origin of the box is news. For each step of the stair the origins with more slack are bounded: units that
 * none of them can keep are lost, and those that none can be so far beyond the edge of are not gained; the ways to
 * lose them must not contradict each other; and the strips must have room. Good places met on the way are taken in.
 */
export function boxIsNews(room: LookRoom, look: BoxLook, known: KnownChoices): boolean {
  const { gainPiece, gainSlack, lossWeight, lossSlack, seenAt, strips } = room;
  const { step } = room.near;
  const { depth, gains, losses, through } = look;
  for (const { slack, fewest } of newsStair(known)) {
    if (slack >= look.all) continue;
    let count = depth;
    for (let m = 0; m < losses; m++) if (lossSlack[m] <= slack) count -= lossWeight[m];
    const counted = --room.counts;
    for (let m = 0; m < gains && count < fewest && gainSlack[m] > slack; m++) {
      const unit = strips.unit[gainPiece[m]];
      if (unit >= 0) {
        if (seenAt[unit] === counted) continue;
        seenAt[unit] = counted;
      }
      count += Math.abs(step[gainPiece[m]]);
    }
    if (count < fewest || !waysAgree(room, look, known, slack)) continue;
    // Few lines of many directions leave no strips that tell.
    if (through === 0 || (strips.bundles && through < FEW_LINES)) return true;
    if (stripsBound(room, look, slack) < fewest) continue;
    stripsTried(room, look, known);
    return true;
  }
  return false;
}

/** False when the strips alone show that no origin of the box is news. */
export function stripsAreNews(room: LookRoom, look: BoxLook, known: KnownChoices): boolean {
  for (const { slack, fewest } of newsStair(known)) {
    if (slack >= look.all || stripsBound(room, look, slack) < fewest) continue;
    stripsTried(room, look, known);
    return true;
  }
  return false;
}

/** The count that an origin of the box with more slack can have by its strips; the gaps' distances are true, or less. */
function stripsBound(room: LookRoom, look: BoxLook, slack: number): number {
  const { near, strips, gaps, seen, others } = room;
  const { box, local, u, v, depth, far, alone } = look;
  // A unit whose only piece near enough is this one is whole right up to it.
  const nearby = slack + far;
  const keptOff = (at: number): KeptOff => {
    const unit = strips.unit[local[at]];
    if (alone && seen[unit] === 1) return KEPT_OFF.held;
    let count = 0;
    for (let n = 0; n < local.length; n++) {
      if (n === at || gaps.distance[n] > nearby) continue;
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
    gaps.distance,
    far,
    false,
    keptOff,
    strips,
  );
}

/** Takes a place of the box in. */
function placeTried(
  { near, other, order }: LookRoom,
  { local, u, v, depth, all }: BoxLook,
  known: KnownChoices,
  toU: number,
  toV: number,
): void {
  const there = depthMoved(near, local, 0, local.length, u, v, toU, toV, depth);
  const at = Math.min(there, known.most) - known.least;
  if (at < 0 || known.atLeast[at] >= all) return;
  const slack = pointSlack(near, local, 0, local.length, toU, toV, all, other, order);
  if (slack < all) choiceOffered(known, there, slack, toU, toV);
}

/** Tries where the strips that allow the most, of the two families with most lines, cross. */
function stripsTried(room: LookRoom, look: BoxLook, known: KnownChoices): void {
  const { found, nx, ny, at } = room.strips;
  const { ax, ay, bx, by } = look.box;
  const cross = found < 2 ? 0 : nx[0] * ny[1] - ny[0] * nx[1];
  if (Math.abs(cross) < LEAST_CROSS) return;
  const toU = (at[0] * ny[1] - at[1] * ny[0]) / cross;
  const toV = (at[1] * nx[0] - at[0] * nx[1]) / cross;
  if (toU > ax && toU < bx && toV > ay && toV < by) placeTried(room, look, known, toU, toV);
}

/**
 * False when no origin of the box is beyond the edges of all the units that must be lost for the slack and
 * off those of the units that are held by as much. An origin that has lost a unit has gone out through some
 * piece of it, and is beyond that piece's line; and not far from beyond the nearest one's, where they bend little.
 */
function waysAgree(room: LookRoom, look: BoxLook, known: KnownChoices, slack: number): boolean {
  const { near, strips, gaps, planes, ways, seen, lossAt, lossSlack } = room;
  const { x0, y0, ux, uy, radius } = near;
  const { box, local, u, v, far, losses } = look;
  const [west, south, east, north] = [box.ax - u, box.ay - v, box.bx - u, box.by - v];
  ways.count = 0;
  for (let m = 0; m < losses && ways.count < MOST_WAYS; m++) {
    if (lossSlack[m] > slack) continue;
    const n = local[lossAt[m]];
    const unit = strips.unit[n];
    if (unit < 0 || radius[n] > 0) continue;
    const off = ux[n] * (v - y0[n]) - uy[n] * (u - x0[n]);
    let bend = 0;
    for (let a = 0, left = seen[unit] - 1; left > 0 && a < local.length; a++) {
      const o = local[a];
      if (o === n || strips.unit[o] !== unit) continue;
      left--;
      if (gaps.distance[a] > far) continue;
      if (radius[o] > 0) bend = Infinity;
      const other = ux[o] * (v - y0[o]) - uy[o] * (u - x0[o]);
      const turn = Math.hypot(ux[n] - ux[o], uy[n] - uy[o]);
      bend = Math.max(bend, off - other + turn * far);
    }
    if (bend > far) continue;
    const to = ways.count++;
    ways.d[to] = bend - off;
    ways.gx[to] = uy[n];
    ways.gy[to] = -ux[n];
  }
  if (ways.count === 0) return true;
  const lines = ways.count;
  for (let m = 0; m < planes.count && m < MOST_WAYS; m++) {
    const to = ways.count++;
    ways.d[to] = planes.d[m] - slack;
    ways.gx[to] = planes.gx[m];
    ways.gy[to] = planes.gy[m];
  }
  if (envelopeTop(ways, west, south, east, north) < 0) return false;
  if (far * SMALL_SHARE > slack) return true;
  // In a small box, try where the slack is greatest just beyond those lines.
  for (let to = 0; to < lines; to++) {
    ways.d[to] = (ways.d[to] - 2 * KEEP_OFF_MM) * STEEP;
    ways.gx[to] *= STEEP;
    ways.gy[to] *= STEEP;
  }
  if (envelopeTop(ways, west, south, east, north) > 0)
    placeTried(room, look, known, u + ways.x, v + ways.y);
  return true;
}
