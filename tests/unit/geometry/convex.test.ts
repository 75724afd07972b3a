import Coordinate from 'jsts/org/locationtech/jts/geom/Coordinate.js';
import GeometryFactory from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
import DistanceOp from 'jsts/org/locationtech/jts/operation/distance/DistanceOp.js';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { ringHalf, ringInBox } from '@/geometry/box-clip';
import { convexApart, convexGap } from '@/geometry/convex-gap';
import { convexHull, convexWidth } from '@/geometry/convex-hull';
import type { Point } from '@/geometry/point';
import { ringArea } from '@/geometry/ring';

const factory = new GeometryFactory();
const polygon = (ring: readonly Point[]) =>
  factory.createPolygon(
    factory.createLinearRing([...ring, ring[0]].map(([x, y]) => new Coordinate(x, y))),
  );
/** Whole micrometres, as pieces have them. */
const coordinate = fc
  .integer({ min: -100_000, max: 100_000 })
  .map((micrometres) => micrometres / 1000);
const hullOf = fc
  .array(fc.tuple(coordinate, coordinate), { minLength: 3, maxLength: 9 })
  .map((points) => convexHull(points))
  .filter((hull) => hull.length >= 3 && ringArea(hull) > 1);
const runs = { numRuns: 300, seed: 7 };

describe('the least width of a convex ring', () => {
  const regular = (sides: number, radius: number) =>
    Array.from({ length: sides }, (_, n): Point => {
      const angle = (2 * Math.PI * n) / sides;
      return [radius * Math.cos(angle), radius * Math.sin(angle)];
    });

  test('of regular polygons is their height, or for an even count twice the inradius', () => {
    // Elementary geometry: R(1 + cos π/n) for odd n, 2R cos π/n for even n.
    for (const n of [3, 5, 7, 9]) {
      expect(convexWidth(regular(n, 10))).toBeCloseTo(10 * (1 + Math.cos(Math.PI / n)), 9);
    }
    for (const n of [4, 6, 8, 12]) {
      expect(convexWidth(regular(n, 10))).toBeCloseTo(20 * Math.cos(Math.PI / n), 9);
    }
  });

  test('is the least reach over all directions, looked at one by one', () => {
    fc.assert(
      fc.property(hullOf, (hull) => {
        const width = convexWidth(hull);
        let least = Infinity;
        for (let degrees = 0; degrees < 180; degrees += 0.25) {
          const [nx, ny] = [
            Math.cos((degrees * Math.PI) / 180),
            Math.sin((degrees * Math.PI) / 180),
          ];
          const reach = hull.map(([x, y]) => x * nx + y * ny);
          least = Math.min(least, Math.max(...reach) - Math.min(...reach));
        }
        expect(width).toBeLessThanOrEqual(least + 1e-9);
        // Between two directions looked at, the reach falls by no more than the hull is long.
        expect(width).toBeGreaterThan(least - 300 * ((0.25 * Math.PI) / 180));
      }),
      runs,
    );
  });
});

test('the gap between convex rings is the distance that JSTS finds, and negative where they overlap', () => {
  fc.assert(
    fc.property(hullOf, hullOf, fc.tuple(coordinate, coordinate), (one, other, [dx, dy]) => {
      const moved = other.map(([x, y]): Point => [x + dx, y + dy]);
      const distance = DistanceOp.distance(polygon(one), polygon(moved));
      const gap = convexGap(one, moved);
      if (distance > 1e-9) expect(gap).toBeCloseTo(distance, 9);
      else expect(gap).toBeLessThanOrEqual(1e-9);
      for (const apart of [0, distance * 0.99, distance * 1.01 + 1e-6]) {
        if (Math.abs(apart - gap) > 1e-9) expect(convexApart(one, moved, apart)).toBe(gap >= apart);
      }
    }),
    runs,
  );
});

test('what lies in a box and what lies beside it make up the ring', () => {
  const star = fc
    .array(fc.double({ min: 5, max: 100, noNaN: true }), { minLength: 4, maxLength: 12 })
    .map((radii) =>
      radii.map((radius, n): Point => {
        const angle = (2 * Math.PI * n) / radii.length;
        return [radius * Math.cos(angle), radius * Math.sin(angle)];
      }),
    );
  fc.assert(
    fc.property(star, coordinate, coordinate, (ring, x, y) => {
      const left = ringHalf(ring, ([px]) => x - px);
      const right = ringHalf(ring, ([px]) => px - x);
      expect(ringArea(left) + ringArea(right)).toBeCloseTo(ringArea(ring), 6);
      const quarter = ringInBox(ring, { min: [-200, -200], max: [x, y] });
      const above = ringHalf(left, ([, py]) => py - y);
      expect(ringArea(quarter) + ringArea(above)).toBeCloseTo(ringArea(left), 6);
    }),
    runs,
  );
});
