import fc from 'fast-check';
import Coordinate from 'jsts/org/locationtech/jts/geom/Coordinate.js';
import GeometryFactory from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
import DistanceOp from 'jsts/org/locationtech/jts/operation/distance/DistanceOp.js';
import SnapIfNeededOverlayOp from 'jsts/org/locationtech/jts/operation/overlay/snap/SnapIfNeededOverlayOp.js';
import { describe, expect, test } from 'vitest';
import { rectangleCoverPart } from '@/geometry/rectangle-cover';
import { rectangleNearest, rectangleOverlap } from '@/geometry/rectangle';
import { sweepSegment, sweptSection, sweptSegmentRoom } from '@/geometry/row-section';
import { pointTurned, rotation } from '@/geometry/rotation';
import type { Point } from '@/geometry/point';
import { real } from '../../oracle/documents';

const factory = new GeometryFactory();
const path = (points: readonly Point[]) => points.map(([x, y]) => new Coordinate(x, y));
const polygon = (ring: readonly Point[]) =>
  factory.createPolygon(factory.createLinearRing(path([...ring, ring[0]])));
const box = (hx: number, hy: number): Point[] => [
  [-hx, -hy],
  [hx, -hy],
  [hx, hy],
  [-hx, hy],
];
const half = fc.oneof(real(50, 450), fc.constant(100));
const place = fc.tuple(
  fc.oneof(real(-900, 900), fc.constantFrom(-100, 0, 100)),
  fc.oneof(real(-900, 900), fc.constantFrom(-100, 0, 100)),
);

test('the nearest points of a rectangle and a segment are as far apart as JSTS says', () => {
  fc.assert(
    fc.property(half, half, place, place, (hx, hy, start, end) => {
      fc.pre(Math.hypot(start[0] - end[0], start[1] - end[1]) > 1);
      const { distance, onRectangle, onSegment } = rectangleNearest(hx, hy, start, end);
      const line = factory.createLineString(path([start, end]));
      expect(distance).toBeCloseTo(DistanceOp.distance(polygon(box(hx, hy)), line), 6);
      expect(Math.hypot(onRectangle[0] - onSegment[0], onRectangle[1] - onSegment[1])).toBeCloseTo(
        distance,
        9,
      );
    }),
    { numRuns: 300 },
  );
});

test('a ring’s chords add up to the area of the ring within a rectangle, or that less the rectangle', () => {
  const ring = fc.array(real(30, 800), { minLength: 3, maxLength: 9 }).map((radii) =>
    radii.map((radius, n): Point => {
      const angle = (n / radii.length) * 2 * Math.PI;
      return [radius * Math.cos(angle), radius * Math.sin(angle)];
    }),
  );
  fc.assert(
    fc.property(half, half, ring, place, (hx, hy, shape, [x, y]) => {
      const moved = shape.map(([px, py]): Point => [px + x, py + y]);
      const sum = moved.reduce((total, [x0, y0], n) => {
        const [x1, y1] = moved[(n + 1) % moved.length];
        return total + rectangleCoverPart(hx, hy, x0, y0, x1, y1);
      }, 0);
      const area = SnapIfNeededOverlayOp.intersection(
        polygon(box(hx, hy)),
        polygon(moved),
      ).getArea();
      const whole = 4 * hx * hy;
      const ours =
        Math.abs(sum) < 1e-6 ? (area > whole / 2 ? whole : 0) : sum < 0 ? whole + sum : sum;
      expect(ours).toBeCloseTo(area, 3);
    }),
    { numRuns: 300 },
  );
});

describe('a segment swept by a rectangle and a disc', () => {
  test('holds just those centres along a row at which the rectangle is within the radius', () => {
    const turns = real(0, 180);
    fc.assert(
      fc.property(
        half,
        half,
        turns,
        place,
        place,
        real(0, 300),
        real(-1200, 1200),
        (hx, hy, turn, start, end, radius, row) => {
          fc.pre(Math.hypot(start[0] - end[0], start[1] - end[1]) > 1);
          const own = rotation(turn);
          const room = sweptSegmentRoom();
          const [eu, ev] = pointTurned([hx, 0], own);
          const [fu, fv] = pointTurned([0, hy], own);
          sweepSegment(room, ...start, ...end, eu, ev, fu, fv, radius);
          const cut = new Float64Array(2);
          const meets = sweptSection(room, row, cut);
          const back = rotation(-turn);
          const distance = (u: number) =>
            rectangleNearest(
              hx,
              hy,
              pointTurned([start[0] - u, start[1] - row], back),
              pointTurned([end[0] - u, end[1] - row], back),
            ).distance;
          if (meets) {
            const middle = (cut[0] + cut[1]) / 2;
            const inside = (cut[1] - cut[0]) / 2 - 1e-6;
            for (const share of [-1, -0.4, 0, 0.7, 1]) {
              if (inside > 0) {
                expect(distance(middle + share * inside)).toBeLessThanOrEqual(radius + 1e-6);
              }
            }
            expect(distance(cut[0] - 0.01)).toBeGreaterThanOrEqual(radius - 1e-6);
            expect(distance(cut[1] + 0.01)).toBeGreaterThanOrEqual(radius - 1e-6);
          } else {
            for (let u = -2000; u <= 2000; u += 50) {
              expect(distance(u)).toBeGreaterThanOrEqual(radius - 1e-6);
            }
          }
        },
      ),
      { numRuns: 300 },
    );
  });
});

test('rectangles overlap by as much as they must be moved to part', () => {
  const at = (x: number, y: number, turn: number) => ({
    centre: [x, y] as const,
    halfLength: pointTurned([200, 0], rotation(turn)),
    halfWidth: pointTurned([0, 100], rotation(turn)),
  });
  expect(rectangleOverlap(at(0, 0, 0), at(390, 0, 0))).toBeCloseTo(10, 9);
  expect(rectangleOverlap(at(0, 0, 0), at(403, 0, 0))).toBeCloseTo(-3, 9);
  expect(rectangleOverlap(at(0, 0, 0), at(0, 299, 90))).toBeCloseTo(1, 9);
  const corner = 100 * Math.SQRT1_2 + 200 * Math.SQRT1_2;
  expect(rectangleOverlap(at(0, 0, 0), at(200 + corner, 0, 45))).toBeCloseTo(0, 9);
});
