import { orientation } from './predicates';
import type { Point } from './point';

/** A segment with the ring and the edge of that ring that it belongs to. */
export interface OwnedSegment {
  readonly a: Point;
  readonly b: Point;
  readonly ring: number;
  readonly edge: number;
}

/**
 * Calls `visit` with every pair of segments whose boxes come within `margin` of each other, until
 * it returns true. Sorts along the longer side of their common box and looks only at boxes that
 * overlap along it.
 */
export function segmentPairs(
  segments: readonly OwnedSegment[],
  margin: number,
  visit: (one: number, other: number) => boolean,
): void {
  const total = segments.length;
  const least = [new Float64Array(total), new Float64Array(total)];
  const greatest = [new Float64Array(total), new Float64Array(total)];
  segments.forEach(({ a, b }, n) => {
    for (const axis of [0, 1]) {
      least[axis][n] = Math.min(a[axis], b[axis]) - margin / 2;
      greatest[axis][n] = Math.max(a[axis], b[axis]) + margin / 2;
    }
  });
  // The axis along which the boxes are shortest, added up, has the fewest overlaps.
  const spread = [0, 1].map((axis) => {
    let sum = 0;
    let low = Infinity;
    let high = -Infinity;
    for (let n = 0; n < total; n++) {
      sum += greatest[axis][n] - least[axis][n];
      low = Math.min(low, least[axis][n]);
      high = Math.max(high, greatest[axis][n]);
    }
    return sum / (high - low || 1);
  });
  const main = spread[0] <= spread[1] ? 0 : 1;
  const [low, high] = [least[main], greatest[main]];
  const [crossLow, crossHigh] = [least[1 - main], greatest[1 - main]];
  const order = Array.from({ length: total }, (_, n) => n).sort((m, n) => low[m] - low[n]);
  const sortedLow = Float64Array.from(order, (n) => low[n]);
  for (let m = 0; m < total; m++) {
    const one = order[m];
    const until = high[one];
    const bottom = crossLow[one];
    const top = crossHigh[one];
    for (let n = m + 1; n < total && sortedLow[n] <= until; n++) {
      const other = order[n];
      if (crossLow[other] > top || crossHigh[other] < bottom) continue;
      if (visit(one, other)) return;
    }
  }
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
