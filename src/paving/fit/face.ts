import type { Point } from '@/geometry/point';
import { arcPoints } from '@/geometry/arc';
import type { CellPieces } from './cell-pieces';
import type { FitFrame } from './fit-frame';
import { nearPieces } from './near-pieces';

/** Crossings nearer than this to where one stands on a piece, mm, are that very place. */
const SAME_PLACE_MM = 1e-7;

interface Walk {
  readonly ax: number;
  readonly ay: number;
  readonly bx: number;
  readonly by: number;
}

/**
 * The outline, anticlockwise, of the origins about (u, v) that have the same units whole: arcs as
 * chords. Goes out from the point to the first piece and along the pieces, always taking the turn
 * nearest to the left. Null when the way does not close, which rounding can bring about in a face of
 * no width to speak of.
 */
export function cellFace(
  pieces: CellPieces,
  { pitch, rise, shift }: FitFrame,
  u: number,
  v: number,
): Point[] | null {
  const near = nearPieces(pieces, pitch, rise, shift, pitch);
  const segments: Walk[] = [];
  for (let n = 0; n < near.count; n++) {
    const start: Point = [near.x0[n], near.y0[n]];
    const end: Point = [near.x1[n], near.y1[n]];
    if (near.radius[n] === 0) {
      segments.push({ ax: start[0], ay: start[1], bx: end[0], by: end[1] });
      continue;
    }
    const chord = Math.hypot(end[0] - start[0], end[1] - start[1]);
    const sweep = 2 * Math.asin(Math.min(1, chord / (2 * near.radius[n])));
    const chain = arcPoints(start, end, -Math.tan(sweep / 4), 'inscribed');
    for (let m = 0; m + 1 < chain.length; m++) {
      segments.push({ ax: chain[m][0], ay: chain[m][1], bx: chain[m + 1][0], by: chain[m + 1][1] });
    }
  }
  // The first piece to the right of the point: the face lies on its left when it runs upward.
  let first = -1;
  let reach = Infinity;
  segments.forEach(({ ax, ay, bx, by }, n) => {
    if (ay > v === by > v) return;
    const x = ax + ((v - ay) / (by - ay)) * (bx - ax);
    if (x > u && x < reach) {
      reach = x;
      first = n;
    }
  });
  if (first < 0) return null;
  const upward = segments[first].by > segments[first].ay;
  let at: Point = [reach, v];
  let on = first;
  let forward = upward;
  const start = at;
  const outline: Point[] = [];
  for (let steps = 0; steps < 4 * segments.length; steps++) {
    const { ax, ay, bx, by } = segments[on];
    const [tx, ty] = forward ? [bx, by] : [ax, ay];
    const length = Math.hypot(tx - at[0], ty - at[1]);
    if (length > SAME_PLACE_MM) {
      const dx = (tx - at[0]) / length;
      const dy = (ty - at[1]) / length;
      // The next place on the way at which another piece sets off to the left, or where this one ends.
      const next = nextTurn(segments, on, at, dx, dy, length);
      if (steps > 0 && on === first) {
        const back = (start[0] - at[0]) * dx + (start[1] - at[1]) * dy;
        const off = Math.abs((start[0] - at[0]) * dy - (start[1] - at[1]) * dx);
        if (off < SAME_PLACE_MM && back > 0 && back <= next.distance) return outline;
      }
      at = [at[0] + next.distance * dx, at[1] + next.distance * dy];
      outline.push(at);
      if (next.segment < 0) return null;
      on = next.segment;
      forward = next.forward;
      continue;
    }
    const turn = turnAt(segments, on, at, forward ? [bx - ax, by - ay] : [ax - bx, ay - by]);
    if (!turn) return null;
    on = turn.segment;
    forward = turn.forward;
  }
  return null;
}

/** Where, along the way, the first piece leads off to the left, or at the way's end the leftmost. */
function nextTurn(
  segments: readonly Walk[],
  own: number,
  [x, y]: Point,
  dx: number,
  dy: number,
  length: number,
): { distance: number; segment: number; forward: boolean } {
  let distance = length;
  segments.forEach(({ ax, ay, bx, by }, n) => {
    if (n === own) return;
    const sa = dx * (ay - y) - dy * (ax - x);
    const sb = dx * (by - y) - dy * (bx - x);
    if (sa <= SAME_PLACE_MM && sb <= SAME_PLACE_MM) return;
    if (Math.min(sa, sb) > SAME_PLACE_MM) return;
    const share = sa === sb ? 0 : Math.max(0, Math.min(1, sa / (sa - sb)));
    const px = ax + share * (bx - ax);
    const py = ay + share * (by - ay);
    const t = dx * (px - x) + dy * (py - y);
    if (t > SAME_PLACE_MM && t < distance) distance = t;
  });
  const at: Point = [x + distance * dx, y + distance * dy];
  const turn = turnAt(segments, own, at, [dx, dy]);
  return { distance, segment: turn?.segment ?? -1, forward: turn?.forward ?? true };
}

/** Of the ways out of a place, the one farthest to the left of the direction that led there. */
function turnAt(
  segments: readonly Walk[],
  own: number,
  [x, y]: Point,
  [dx, dy]: Point,
): { segment: number; forward: boolean } | null {
  let best: { segment: number; forward: boolean } | null = null;
  let most = -Infinity;
  segments.forEach(({ ax, ay, bx, by }, n) => {
    const ex = bx - ax;
    const ey = by - ay;
    const size = Math.hypot(ex, ey);
    if (size === 0) return;
    const off = Math.abs(ex * (y - ay) - ey * (x - ax)) / size;
    const along = (ex * (x - ax) + ey * (y - ay)) / size;
    if (off > 2 * SAME_PLACE_MM || along < -2 * SAME_PLACE_MM || along > size + 2 * SAME_PLACE_MM)
      return;
    for (const forward of [true, false]) {
      const left = forward ? size - along : along;
      if (left <= 2 * SAME_PLACE_MM) continue;
      const sign = forward ? 1 : -1;
      const turn = Math.atan2(dx * sign * ey - dy * sign * ex, dx * sign * ex + dy * sign * ey);
      // Straight back is no way on.
      if (Math.abs(turn) > Math.PI - 1e-6) continue;
      if (turn > most + 1e-12 || (turn > most - 1e-12 && n === own)) {
        most = turn;
        best = { segment: n, forward };
      }
    }
  });
  return best;
}
