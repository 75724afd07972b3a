import fc from 'fast-check';
import { expect, test } from 'vitest';
import { arcLength, arcPoints, arcSegmentArea } from '@/geometry/arc';
import type { Point } from '@/geometry/point';
import { pointSegmentDistance } from '@/geometry/segment-pairs';
import { real } from '../../oracle/documents';

const anyArc = fc.record({
  start: fc.tuple(real(-5000, 5000), real(-5000, 5000)),
  length: real(20, 9000),
  heading: real(0, 2 * Math.PI),
  bulge: fc.oneof(real(0.001, 3), real(-3, -0.001)),
});

/** Centre and radius by the usual formula for polyline arcs: apex and both ends are on the circle. */
function circle(start: Point, end: Point, bulge: number): { centre: Point; radius: number } {
  const chord = Math.hypot(end[0] - start[0], end[1] - start[1]);
  const radius = (chord * (1 + bulge * bulge)) / (4 * Math.abs(bulge));
  const away = (chord * (1 - bulge * bulge)) / (4 * bulge);
  const centre: Point = [
    (start[0] + end[0]) / 2 - ((end[1] - start[1]) / chord) * away,
    (start[1] + end[1]) / 2 + ((end[0] - start[0]) / chord) * away,
  ];
  return { centre, radius };
}

test('chords keep to their side of the arc and within 0.05 mm of it', () => {
  fc.assert(
    fc.property(anyArc, ({ start, length, heading, bulge }) => {
      const end: Point = [
        start[0] + length * Math.cos(heading),
        start[1] + length * Math.sin(heading),
      ];
      const { centre, radius } = circle(start, end, bulge);
      const rounding = 1e-7 * (1 + radius / 1000);
      const away = ([x, y]: Point) => Math.hypot(x - centre[0], y - centre[1]);
      for (const kind of ['inscribed', 'tangent'] as const) {
        const points = arcPoints(start, end, bulge, kind);
        expect(points[0]).toEqual(start);
        expect(points[points.length - 1]).toEqual(end);
        points.slice(1).forEach((point, n) => {
          const nearest = pointSegmentDistance(centre, points[n], point);
          if (kind === 'inscribed') {
            expect(away(point)).toBeCloseTo(radius, 3);
            expect(nearest).toBeGreaterThan(radius - 0.05 - rounding);
          } else {
            expect(nearest).toBeGreaterThan(radius - rounding);
            expect(away(point)).toBeLessThan(radius + 0.05 + rounding);
          }
        });
      }
    }),
  );
});

test('a half circle and a quarter have the lengths and areas of the textbook', () => {
  // Length πr and rπ/2; area between arc and chord πr²/2 and r²(π/2 − 1)/2.
  expect(arcLength([-1000, 0], [1000, 0], 1)).toBeCloseTo(1000 * Math.PI, 6);
  expect(arcSegmentArea([-1000, 0], [1000, 0], 1)).toBeCloseTo((1e6 * Math.PI) / 2, 3);
  const quarter = Math.tan(Math.PI / 8);
  expect(arcLength([1000, 0], [0, 1000], quarter)).toBeCloseTo(500 * Math.PI, 6);
  expect(arcSegmentArea([1000, 0], [0, 1000], quarter)).toBeCloseTo(5e5 * (Math.PI / 2 - 1), 3);
  expect(arcSegmentArea([0, 1000], [1000, 0], -quarter)).toBeCloseTo(-5e5 * (Math.PI / 2 - 1), 3);
});

test('a positive bulge runs anticlockwise, right of its chord', () => {
  const [, y] = arcPoints([0, 0], [1000, 0], 0.5, 'inscribed')[1];
  expect(y).toBeLessThan(0);
});

test('an arc that is flat to a millionth of a millimetre is one chord', () => {
  expect(arcPoints([0, 0], [1000, 0], 1e-10, 'tangent')).toHaveLength(2);
  expect(arcPoints([0, 0], [1000, 0], 0, 'inscribed')).toHaveLength(2);
});
