import { orientation } from './predicates';
import type { Point } from './point';

/** A segment with the ring and the edge of that ring that it belongs to. */
export interface OwnedSegment {
  readonly a: Point;
  readonly b: Point;
  readonly ring: number;
  readonly edge: number;
}

/** Directions tried for the sweep, evenly over a half turn. */
const DIRECTIONS = 8;
/** Comparisons of places along the sweep, and of boxes that meet, before an outline is given up. */
const GREATEST_COMPARISONS = 300_000_000;
const GREATEST_MEETINGS = 5_000_000;

/**
 * Calls `visit` with every pair of segments whose boxes come within `margin` of each other, until
 * it returns true. Sweeps in the direction along which the segments are shortest, boxes lying
 * along and across it, and looks only at boxes that overlap. Returns false when it gave up: tens
 * of thousands of long edges side by side in many directions, which no floor has.
 */
export function segmentPairs(
  segments: readonly OwnedSegment[],
  margin: number,
  visit: (one: number, other: number) => boolean,
): boolean {
  const total = segments.length;
  if (total === 0) return true;
  const from = segments[0].a;
  const placed = (turn: number) => {
    const cos = Math.cos(turn);
    const sin = Math.sin(turn);
    const low = new Float64Array(total);
    const high = new Float64Array(total);
    for (let n = 0; n < total; n++) {
      const { a, b } = segments[n];
      const p = (a[0] - from[0]) * cos + (a[1] - from[1]) * sin;
      const q = (b[0] - from[0]) * cos + (b[1] - from[1]) * sin;
      low[n] = Math.min(p, q) - margin;
      high[n] = Math.max(p, q) + margin;
    }
    return { low, high };
  };
  let turn = 0;
  let best = Infinity;
  for (let n = 0; n < DIRECTIONS; n++) {
    const { low, high } = placed((n * Math.PI) / DIRECTIONS);
    let sum = 0;
    let least = Infinity;
    let greatest = -Infinity;
    for (let m = 0; m < total; m++) {
      sum += high[m] - low[m];
      least = Math.min(least, low[m]);
      greatest = Math.max(greatest, high[m]);
    }
    const crowding = sum / (greatest - least || 1);
    if (crowding < best) {
      best = crowding;
      turn = (n * Math.PI) / DIRECTIONS;
    }
  }
  const { low, high } = placed(turn);
  const across = placed(turn + Math.PI / 2);
  const order = Array.from({ length: total }, (_, n) => n).sort((m, n) => low[m] - low[n]);
  const sortedLow = Float64Array.from(order, (n) => low[n]);
  let compared = 0;
  let met = 0;
  for (let m = 0; m < total; m++) {
    const one = order[m];
    const until = high[one];
    const bottom = across.low[one];
    const top = across.high[one];
    let n = m + 1;
    for (; n < total && sortedLow[n] <= until; n++) {
      const other = order[n];
      if (across.low[other] > top || across.high[other] < bottom) continue;
      if (++met > GREATEST_MEETINGS) return false;
      if (visit(one, other)) return true;
    }
    compared += n - m;
    if (compared > GREATEST_COMPARISONS) return false;
  }
  return true;
}

/** Where two segments cross, each passing to the other side of the other, decided exactly; else null. */
export function segmentsCross(a: Point, b: Point, c: Point, d: Point): Point | null {
  const c1 = orientation(a, b, c);
  const d1 = orientation(a, b, d);
  if (!((c1 > 0 && d1 < 0) || (c1 < 0 && d1 > 0))) return null;
  const a1 = orientation(c, d, a);
  const b1 = orientation(c, d, b);
  if (!((a1 > 0 && b1 < 0) || (a1 < 0 && b1 > 0))) return null;
  const share = a1 / (a1 - b1);
  return [a[0] + share * (b[0] - a[0]), a[1] + share * (b[1] - a[1])];
}

/** Distance from a point to a segment, mm. */
export function pointSegmentDistance([x, y]: Point, a: Point, b: Point): number {
  const dx = b[0] - a[0];
  const dy = b[1] - a[1];
  const square = dx * dx + dy * dy;
  const along = square > 0 ? ((x - a[0]) * dx + (y - a[1]) * dy) / square : 0;
  const at = Math.max(0, Math.min(1, along));
  return Math.hypot(x - a[0] - at * dx, y - a[1] - at * dy);
}

/** Where two segments that do not cross come within `tolerance` of each other, or null. */
export function segmentsTouch(
  a: Point,
  b: Point,
  c: Point,
  d: Point,
  tolerance: number,
): Point | null {
  if (pointSegmentDistance(c, a, b) <= tolerance) return c;
  if (pointSegmentDistance(d, a, b) <= tolerance) return d;
  if (pointSegmentDistance(a, c, d) <= tolerance) return a;
  if (pointSegmentDistance(b, c, d) <= tolerance) return b;
  return null;
}
