import type { CellPieces } from './cell-pieces';
import { depthMoved } from './most';
import type { PieceFinder } from './piece-grid';
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
  /** Steps down to this are tried, mm; the smallest that tell unless given. */
  readonly leastStep?: number;
  /** Finds the listed pieces, where there are so many that this is quicker than to go through the list. */
  readonly about?: PieceFinder;
}

const LEAST_STEP_MM = 1e-7;
const GREATEST_HELD = 10;
const SIDES = [
  [1, 0],
  [-1, 0],
  [0, 1],
  [0, -1],
] as const;
/** Limits broken by no more than this, mm, are kept. */
const LIMIT_HAIR_MM = 1e-9;
const LEAST_DETERMINANT = 1e-9;

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
  { pitch, rise, reach, leastStep = LEAST_STEP_MM, about }: PolishedWithin,
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
    const far = 2 * scope;
    const some = about ? about(u - far, v - far, u + far, v + far) : list;
    for (let a = 0; a < some.length; a++) {
      const n = some[a];
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
  for (let round = 0; round < 60 && trust > leastStep; round++) {
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
      if (room.side[at] < 0 && unitsApart(pieces, local[at], local, order, m, 1) === 0) continue;
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
    if (limits.length === 0) break;
    limits.push(...shunned);
    const around = SIDES.map(([nx, ny]): Limit => ({ nx, ny, room: trust, slack: 0 }));
    const step = limitedStep(around, limits);
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

interface Step {
  readonly x: number;
  readonly y: number;
  readonly slack: number;
}

/**
 * The step with the greatest s that keeps within all limits: a small linear programme. `within` bounds the step on
 * every side, the first of the others has slack. Limits are taken in one by one, the one most broken first; the best step
 * within one limit more lies on that limit.
 */
function limitedStep(within: readonly Limit[], others: readonly Limit[]): Step | null {
  const kept: Limit[] = [...within];
  const limits = [...within, ...others];
  let next = others[0];
  for (;;) {
    const best = stepOnLimit(next, kept);
    if (!best) return null;
    kept.push(next);
    let least = -LIMIT_HAIR_MM;
    let broken: Limit | null = null;
    for (const limit of limits) {
      const left = limit.room + limit.nx * best.x + limit.ny * best.y - limit.slack * best.slack;
      if (left >= least || kept.includes(limit)) continue;
      least = left;
      broken = limit;
    }
    if (!broken) return best;
    next = broken;
  }
}

/** The best step on a limit that keeps within the rest of them: where two of these meet it. */
function stepOnLimit(p: Limit, rest: readonly Limit[]): Step | null {
  let best: Step | null = null;
  for (let b = 0; b < rest.length; b++) {
    const q = rest[b];
    for (let c = b + 1; c < rest.length; c++) {
      const r = rest[c];
      // room + n·x − slack·s = 0 for all three.
      const qr = q.nx * r.ny - q.ny * r.nx;
      const rp = r.nx * p.ny - r.ny * p.nx;
      const pq = p.nx * q.ny - p.ny * q.nx;
      const det = p.slack * qr + q.slack * rp + r.slack * pq;
      if (Math.abs(det) < LEAST_DETERMINANT) continue;
      const s = (p.room * qr + q.room * rp + r.room * pq) / det;
      if (best && s <= best.slack) continue;
      const pk = p.room - p.slack * s;
      const qk = q.room - q.slack * s;
      const rk = r.room - r.slack * s;
      // From the two that cross most squarely.
      let x: number;
      let y: number;
      if (Math.abs(qr) >= Math.abs(rp) && Math.abs(qr) >= Math.abs(pq)) {
        x = (q.ny * rk - r.ny * qk) / qr;
        y = (r.nx * qk - q.nx * rk) / qr;
      } else if (Math.abs(rp) >= Math.abs(pq)) {
        x = (r.ny * pk - p.ny * rk) / rp;
        y = (p.nx * rk - r.nx * pk) / rp;
      } else {
        x = (p.ny * qk - q.ny * pk) / pq;
        y = (q.nx * pk - p.nx * qk) / pq;
      }
      let within = true;
      for (let n = 0; n < rest.length && within; n++) {
        const l = rest[n];
        within = l.room + l.nx * x + l.ny * y - l.slack * s >= -LIMIT_HAIR_MM;
      }
      if (within) best = { x, y, slack: s };
    }
  }
  return best;
}
