import type { CellPieces } from './cell-pieces';
import { depthMoved } from './most';
import { KEEP_OFF_MM, pieceGap, pieceGapsRoom, pointSlack, unitsApart } from './slack';

/** A place found on the way, with how many units it has more than the start. */
export interface SlackPlace {
  readonly u: number;
  readonly v: number;
  readonly gained: number;
  readonly slack: number;
}

/** What the pieces are complete for: origins of the cell, out to `reach`, mm. */
export interface PolishedWithin {
  readonly pitch: number;
  readonly rise: number;
  readonly reach: number;
}

const LEAST_STEP_MM = 1e-7;
const GREATEST_HELD = 10;

/**
 * Moves an origin to where the slack about it is greatest: again and again, to the place that would
 * be best were all near pieces straight, as far as the last steps were trusted. The last of the
 * places is the best with the start's own count; others may have other counts.
 */
export function slackPolished(
  pieces: CellPieces,
  list: Int32Array,
  startU: number,
  startV: number,
  startSlack: number,
  { pitch, rise, reach }: PolishedWithin,
): SlackPlace[] {
  const found: SlackPlace[] = [];
  let u = startU;
  let v = startV;
  let slack = startSlack;
  let trust = Math.max(slack, 0.05);
  // Pieces that can matter while the origin stays within `scope` of (aboutU, aboutV), with no more slack than that.
  let scope = 0;
  let aboutU = u;
  let aboutV = v;
  let local = new Int32Array(0);
  let room = pieceGapsRoom(0);
  let order = new Int32Array(0);
  const one = pieceGapsRoom(1);
  const gather = () => {
    scope = 1.5 * trust + 1.5 * slack;
    aboutU = u;
    aboutV = v;
    const nearest: number[] = [];
    for (let a = 0; a < list.length; a++) {
      const n = list[a];
      if (Math.min(pieces.x0[n], pieces.x1[n]) > u + 2 * scope) continue;
      if (Math.max(pieces.x0[n], pieces.x1[n]) < u - 2 * scope) continue;
      if (Math.min(pieces.y0[n], pieces.y1[n]) > v + 2 * scope) continue;
      if (Math.max(pieces.y0[n], pieces.y1[n]) < v - 2 * scope) continue;
      pieceGap(pieces, n, u, v, one, 0);
      if (one.distance[0] < 2 * scope) nearest.push(n);
    }
    local = Int32Array.from(nearest);
    room = pieceGapsRoom(local.length);
    order = new Int32Array(local.length);
  };
  gather();
  /** How far off pieces are known about a point, which may lie beyond the cell. */
  const knownAbout = (x: number, y: number) =>
    reach - Math.hypot(Math.max(0, -x, x - pitch), Math.max(0, -y, y - rise));
  const slackAt = (x: number, y: number) =>
    pointSlack(
      pieces,
      local,
      0,
      local.length,
      x,
      y,
      Math.min(scope, knownAbout(x, y)),
      room,
      order,
    );
  for (let round = 0; round < 60 && trust > LEAST_STEP_MM; round++) {
    // Held: pieces of units that the origin has. Shunned: pieces of those it has not.
    let count = 0;
    for (let a = 0; a < local.length; a++) {
      pieceGap(pieces, local[a], u, v, room, a);
      if (room.distance[a] > slack + 2.9 * trust) continue;
      let place = count++;
      for (; place > 0 && room.key[order[place - 1]] > room.key[a]; place--) {
        order[place] = order[place - 1];
      }
      order[place] = a;
    }
    const limits: Limit[] = [];
    const shunned: Limit[] = [];
    for (let m = 0; m < count; m++) {
      const at = order[m];
      if (unitsApart(pieces, local[at], local, order, m, 1) === 0 && room.side[at] < 0) continue;
      const d = room.distance[at];
      const nx = room.awayX[at];
      const ny = room.awayY[at];
      if (room.side[at] > 0) {
        if (limits.length >= GREATEST_HELD) continue;
        limits.push({ nx, ny, room: d, slack: 1 });
      } else if (d < 1.5 * trust && shunned.length < GREATEST_HELD) {
        shunned.push({ nx, ny, room: Math.max(0, d - 1.1 * KEEP_OFF_MM), slack: 0 });
      }
    }
    limits.push(...shunned);
    for (const [nx, ny] of [
      [1, 0],
      [-1, 0],
      [0, 1],
      [0, -1],
    ]) {
      limits.push({ nx, ny, room: trust, slack: 0 });
    }
    const step = limitedStep(limits);
    if (!step || step.slack <= slack + 1e-9) {
      trust /= 4;
      continue;
    }
    const nextU = u + step.x;
    const nextV = v + step.y;
    if (knownAbout(nextU, nextV) <= slack) break;
    if (Math.hypot(nextU - aboutU, nextV - aboutV) > scope || 1.2 * slack > scope) {
      // Too far for what was gathered: gather anew where it has come to.
      if (aboutU === u && aboutV === v) break;
      gather();
      continue;
    }
    const gained = depthMoved(pieces, local, 0, local.length, u, v, nextU, nextV, 0);
    const there = slackAt(nextU, nextV);
    if (gained !== 0) {
      if (there >= 0) found.push({ u: nextU, v: nextV, gained, slack: there });
      trust /= 4;
    } else if (there > slack) {
      const trusted = there - slack > 0.5 * (step.slack - slack);
      u = nextU;
      v = nextV;
      slack = there;
      if (!trusted) trust /= 2;
    } else {
      trust /= 4;
    }
  }
  found.push({ u, v, gained: 0, slack });
  return found;
}

/** The point (x, y) must keep room + nx·x + ny·y at or above slack · s, where s is to be greatest. */
interface Limit {
  readonly nx: number;
  readonly ny: number;
  readonly room: number;
  readonly slack: 0 | 1;
}

/** Those with slack come first. The step with the greatest s that keeps within all limits: a small linear programme, corner by corner. */
function limitedStep(limits: readonly Limit[]): { x: number; y: number; slack: number } | null {
  let best: { x: number; y: number; slack: number } | null = null;
  const size = limits.length;
  for (let a = 0; a < size; a++) {
    if (limits[a].slack === 0) break;
    for (let b = a + 1; b < size; b++) {
      for (let c = b + 1; c < size; c++) {
        const p = limits[a];
        const q = limits[b];
        const r = limits[c];
        // room + n·x − slack·s = 0 for all three.
        const m00 = p.nx;
        const m01 = p.ny;
        const m02 = -p.slack;
        const m10 = q.nx;
        const m11 = q.ny;
        const m12 = -q.slack;
        const m20 = r.nx;
        const m21 = r.ny;
        const m22 = -r.slack;
        const det =
          m00 * (m11 * m22 - m12 * m21) -
          m01 * (m10 * m22 - m12 * m20) +
          m02 * (m10 * m21 - m11 * m20);
        if (Math.abs(det) < 1e-9) continue;
        const k0 = -p.room;
        const k1 = -q.room;
        const k2 = -r.room;
        const x =
          (k0 * (m11 * m22 - m12 * m21) -
            m01 * (k1 * m22 - m12 * k2) +
            m02 * (k1 * m21 - m11 * k2)) /
          det;
        const y =
          (m00 * (k1 * m22 - m12 * k2) -
            k0 * (m10 * m22 - m12 * m20) +
            m02 * (m10 * k2 - k1 * m20)) /
          det;
        const s =
          (m00 * (m11 * k2 - k1 * m21) -
            m01 * (m10 * k2 - k1 * m20) +
            k0 * (m10 * m21 - m11 * m20)) /
          det;
        if (best && s <= best.slack) continue;
        let kept = true;
        for (let n = 0; n < size && kept; n++) {
          const l = limits[n];
          kept = l.room + l.nx * x + l.ny * y - l.slack * s >= -1e-9;
        }
        if (kept) best = { x, y, slack: s };
      }
    }
  }
  return best;
}
