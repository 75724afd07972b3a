import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Point } from '@/geometry/point';
import { triangulation } from '@/geometry/triangulation';

/** Points of a grid of 1 m, so that none are nearly one and many lie on one circle or in one line. */
const gridPoints = fc.uniqueArray(
  fc.tuple(fc.integer({ min: -6, max: 6 }), fc.integer({ min: -6, max: 6 })),
  { minLength: 3, maxLength: 40, selector: ([x, y]) => `${x} ${y}` },
);

const twiceArea = ([a, b, c]: readonly Point[]): number =>
  (b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0]);

/** Positive when d lies inside the circle through a, b and c, anticlockwise: the determinant of Delaunay's own test. */
function inCircle([a, b, c]: readonly Point[], d: Point): number {
  const row = ([x, y]: Point) => [x - d[0], y - d[1], (x - d[0]) ** 2 + (y - d[1]) ** 2];
  const [p, q, r] = [row(a), row(b), row(c)];
  return (
    p[0] * (q[1] * r[2] - q[2] * r[1]) -
    p[1] * (q[0] * r[2] - q[2] * r[0]) +
    p[2] * (q[0] * r[1] - q[1] * r[0])
  );
}

test('the circle through the corners of each triangle holds no other point (Delaunay, 1934)', () => {
  fc.assert(
    fc.property(gridPoints, (points) => {
      const found = triangulation(points);
      if (found.kind === 'line') return;
      for (const triangle of found.triangles) {
        const corners = triangle.map((n) => points[n]);
        expect(twiceArea(corners)).toBeGreaterThan(0);
        for (const point of points) expect(inCircle(corners, point)).toBeLessThanOrEqual(0);
      }
    }),
  );
});

test('n points with h on the rim make 2n − 2 − h triangles (Euler), which fill the rim', () => {
  fc.assert(
    fc.property(gridPoints, (points) => {
      const found = triangulation(points);
      if (found.kind === 'line') {
        for (const point of points)
          expect(twiceArea([points[found.order[0]], points[found.order[1]], point])).toBe(0);
        return;
      }
      const { triangles, rim } = found;
      expect(triangles.length).toBe(2 * points.length - 2 - rim.length);
      const outer = rim.reduce((sum, n, k) => {
        const [x, y] = points[n];
        const [u, v] = points[rim[(k + 1) % rim.length]];
        return sum + x * v - y * u;
      }, 0);
      const inner = triangles.reduce((sum, t) => sum + twiceArea(t.map((n) => points[n])), 0);
      expect(inner).toBe(outer);
    }),
  );
});

test('no point, one, two, and many in one line are a line in order', () => {
  expect(triangulation([])).toEqual({ kind: 'line', order: [] });
  expect(triangulation([[5, 5]])).toEqual({ kind: 'line', order: [0] });
  expect(
    triangulation([
      [2, 2],
      [0, 0],
      [3, 3],
      [1, 1],
    ]),
  ).toEqual({ kind: 'line', order: [1, 3, 0, 2] });
});
