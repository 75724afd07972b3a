import type { Point } from './point';

/** An upright rectangle: `[left, bottom]` and `[right, top]`, mm. */
export interface Box {
  readonly min: Point;
  readonly max: Point;
}

/** What of a ring lies where `inside` is 0 or more; `inside` must be linear in the point. */
export function ringHalf(ring: readonly Point[], inside: (point: Point) => number): Point[] {
  const kept: Point[] = [];
  for (let n = 0; n < ring.length; n++) {
    const from = ring[n];
    const to = ring[n + 1 === ring.length ? 0 : n + 1];
    const [a, b] = [inside(from), inside(to)];
    if (a >= 0) kept.push(from);
    if ((a > 0 && b < 0) || (a < 0 && b > 0)) {
      const share = a / (a - b);
      kept.push([from[0] + share * (to[0] - from[0]), from[1] + share * (to[1] - from[1])]);
    }
  }
  return kept;
}

/**
 * What of a ring lies in a box (Sutherland and Hodgman). Parts that the box separates stay joined along
 * its sides, there and back, so that the signed area is right but the ring is simple only inside the box.
 */
export function ringInBox(ring: readonly Point[], { min, max }: Box): Point[] {
  let left = true;
  let part: readonly Point[] = ring;
  const keep = (reaches: boolean, inside: (point: Point) => number) => {
    if (left && reaches) part = ringHalf(part, inside);
    left = part.length > 0;
  };
  let [x0, y0, x1, y1] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [x, y] of ring) {
    if (x < x0) x0 = x;
    if (x > x1) x1 = x;
    if (y < y0) y0 = y;
    if (y > y1) y1 = y;
  }
  if (x1 < min[0] || x0 > max[0] || y1 < min[1] || y0 > max[1]) return [];
  keep(x0 < min[0], ([x]) => x - min[0]);
  keep(x1 > max[0], ([x]) => max[0] - x);
  keep(y0 < min[1], ([, y]) => y - min[1]);
  keep(y1 > max[1], ([, y]) => max[1] - y);
  return part as Point[];
}
