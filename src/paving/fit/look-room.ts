import { planeEnvelope, type PlaneEnvelope } from '@/geometry/plane-envelope';
import type { CellPieces } from './cell-pieces';
import { pieceGapsRoom, type PieceGaps } from './slack';
import { stripRoom, type OriginBox, type StripRoom } from './strip-bound';

/** So many of the nearest pieces that no origin of a box loses are weighed against each other. */
export const WEIGHED = 7;
/** So many units that must be lost, and as many that are held, are set against each other. */
export const MOST_WAYS = 5;
/** So many of the nearest pieces that origins of a box may lose are weighed one by one. */
export const MOST_LOSSES = 64;

/** What a look into a box has found. Lengths in mm. */
export interface BoxLook {
  readonly box: OriginBox;
  /** Pieces that can matter in it, in order; the room's distances are theirs, to (u, v). */
  readonly local: Int32Array;
  /** A point of it, and the units whole there. */
  readonly u: number;
  readonly v: number;
  readonly depth: number;
  /** How far an origin of it may be from that point. */
  readonly far: number;
  /** No origin of it has more slack. */
  readonly all: number;
  /** How many pieces are listed in the room through which units may be gained, and lost. */
  readonly gains: number;
  readonly losses: number;
  /** How many lines run right through it. */
  readonly through: number;
  /** True when each of the pieces is of one unit. */
  readonly alone: boolean;
}

/** What is written anew in each look into a box of the same pieces. */
export interface LookRoom {
  readonly near: CellPieces;
  readonly strips: StripRoom;
  /** How the box's point stands to the pieces. */
  readonly gaps: PieceGaps;
  /** The same for other places of it. */
  readonly other: PieceGaps;
  readonly order: Int32Array;
  /** Planes of pieces that no origin of the box loses. */
  readonly planes: PlaneEnvelope;
  readonly ways: PlaneEnvelope;
  /** Pieces through which units may be gained, by the slack that an origin beyond them may have, most first. */
  readonly gainPiece: Int32Array;
  readonly gainSlack: Float64Array;
  /** Places in the list of pieces whose units may be lost, how many units, and the slack of an origin that keeps them. */
  readonly lossAt: Int32Array;
  readonly lossWeight: Int32Array;
  readonly lossSlack: Float64Array;
  /** For each unit that a piece has to itself, when it was last seen, and in how many pieces of the list. */
  readonly seenAt: Int32Array;
  readonly seen: Int32Array;
  /** Number of the look; and, downward, of the counts of gains. */
  looks: number;
  counts: number;
  readonly others: Int32Array;
}

export function lookRoom(near: CellPieces): LookRoom {
  const size = Math.max(64, near.count);
  const strips = stripRoom(near);
  return {
    near,
    strips,
    gaps: pieceGapsRoom(size),
    other: pieceGapsRoom(size),
    order: new Int32Array(size),
    planes: planeEnvelope(WEIGHED),
    ways: planeEnvelope(2 * MOST_WAYS),
    gainPiece: new Int32Array(near.count),
    gainSlack: new Float64Array(near.count),
    lossAt: new Int32Array(MOST_LOSSES),
    lossWeight: new Int32Array(MOST_LOSSES),
    lossSlack: new Float64Array(MOST_LOSSES),
    seenAt: new Int32Array(strips.stamp.length),
    seen: new Int32Array(strips.stamp.length),
    looks: 0,
    counts: 0,
    others: new Int32Array(near.count),
  };
}

/** Puts a piece among the gains; returns how many there are. */
export function gainPut(
  { gainPiece, gainSlack }: LookRoom,
  count: number,
  n: number,
  slack: number,
): number {
  let place = count;
  for (; place > 0 && gainSlack[place - 1] < slack; place--) {
    gainSlack[place] = gainSlack[place - 1];
    gainPiece[place] = gainPiece[place - 1];
  }
  gainSlack[place] = slack;
  gainPiece[place] = n;
  return count + 1;
}

/** Counts one more piece of a listed piece's unit; false when it has more units than one. */
export function unitSeen({ strips, seenAt, seen, looks }: LookRoom, n: number): boolean {
  const unit = strips.unit[n];
  if (unit < 0) return false;
  if (seenAt[unit] === looks) seen[unit]++;
  else {
    seenAt[unit] = looks;
    seen[unit] = 1;
  }
  return true;
}

/** Tells anew which units are in one listed piece only; true when each of the pieces is of one unit. */
export function unitsSeen(room: LookRoom, local: Int32Array): boolean {
  let alone = true;
  room.looks++;
  for (const n of local) alone = unitSeen(room, n) && alone;
  return alone;
}

/** Puts the listed pieces nearer than `within` in `order`, nearest first, `most` of them at most. */
export function nearestFirst(
  { gaps, order }: LookRoom,
  listed: number,
  within: number,
  most: number,
): number {
  const { distance, key: keys } = gaps;
  let count = 0;
  for (let at = 0; at < listed; at++) {
    if (distance[at] >= within) continue;
    const key = keys[at];
    const full = count === most;
    if (full && key >= keys[order[count - 1]]) continue;
    let place = full ? count - 1 : count++;
    for (; place > 0 && keys[order[place - 1]] > key; place--) order[place] = order[place - 1];
    order[place] = at;
  }
  return count;
}

/** True when every point within h of (u, v) has its foot on the straight piece. */
export function straightBefore(
  { x0, y0, ux, uy, radius, length }: CellPieces,
  n: number,
  u: number,
  v: number,
  h: number,
): boolean {
  if (radius[n] > 0) return false;
  const along = (u - x0[n]) * ux[n] + (v - y0[n]) * uy[n];
  return along >= h && along <= length[n] - h;
}
