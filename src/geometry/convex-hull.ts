import type { Point } from './point';

/** The convex hull of points, mm: Andrew's monotone chain, anticlockwise, without collinear points. */
export function convexHull(points: readonly Point[]): Point[] {
  const sorted = [...points].sort((p, q) => p[0] - q[0] || p[1] - q[1]);
  const half = (ordered: readonly Point[]): Point[] => {
    const chain: Point[] = [];
    for (const point of ordered) {
      while (
        chain.length > 1 &&
        turnsRight(chain[chain.length - 2], chain[chain.length - 1], point)
      )
        chain.pop();
      chain.push(point);
    }
    return chain.slice(0, -1);
  };
  return [...half(sorted), ...half([...sorted].reverse())];
}

const turnsRight = (p: Point, q: Point, r: Point): boolean =>
  (q[0] - p[0]) * (r[1] - p[1]) - (q[1] - p[1]) * (r[0] - p[0]) <= 0;

/**
 * Least distance between two parallel lines that hold a convex anticlockwise ring between them, mm
 * (rotating calipers: one of the two runs along a side). 0 for fewer than three corners.
 */
export function convexWidth(hull: readonly Point[]): number {
  const count = hull.length;
  if (count < 3) return 0;
  let least = Infinity;
  let far = 1;
  for (let n = 0; n < count; n++) {
    const [ax, ay] = hull[n];
    const [bx, by] = hull[(n + 1) % count];
    const length = Math.hypot(bx - ax, by - ay);
    const away = (m: number) => {
      const [x, y] = hull[m % count];
      return ((bx - ax) * (y - ay) - (by - ay) * (x - ax)) / length;
    };
    // The corner farthest from a side only ever moves on as the sides go round.
    while (away(far + 1) > away(far)) far++;
    least = Math.min(least, away(far));
  }
  return least;
}
