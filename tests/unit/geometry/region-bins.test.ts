import { describe, expect, test } from 'vitest';
import { convexPart, convexPiece, pointsBox } from '@/geometry/convex-part';
import { leftOf } from '@/geometry/plane-pieces';
import type { Point } from '@/geometry/point';
import { regionBins } from '@/geometry/region-bins';
import { segmentParts } from '@/geometry/region-segments';
import { ringHolds } from '@/geometry/ring';

/** Numbers that look random and are the same each time (Park and Miller, 1988). */
function numbers(seed: number) {
  let state = seed;
  return () => (state = (state * 16807) % 2147483647) / 2147483647;
}

const star = (corners: number, [cx, cy]: Point, next: () => number): Point[] =>
  Array.from({ length: corners }, (_, n): Point => {
    const [angle, far] = [(2 * Math.PI * n) / corners, 500 + 4000 * next()];
    return [cx + far * Math.cos(angle), cy + far * Math.sin(angle)];
  });

describe('a region with its chords in bins', () => {
  const next = numbers(20260301);
  const regions = [
    [star(7, [0, 0], next)],
    [star(400, [1e6, -3000], next), star(40, [1e6, -3000], next).map(([x, y]): Point => [1e6 + (x - 1e6) / 20, -3000 + (y + 3000) / 20]).reverse()], // prettier-ignore
    [[[0, 0], [9000, 0], [9000, 4000], [0, 4000]] as Point[]], // prettier-ignore
  ];

  test('answers as one whose chords are gone through one by one', () => {
    for (const region of regions) {
      const bins = regionBins(region);
      const { min, max } = pointsBox(region.flat());
      const place = (): Point => [
        min[0] - 500 + next() * (max[0] - min[0] + 1000),
        min[1] - 500 + next() * (max[1] - min[1] + 1000),
      ];
      for (let n = 0; n < 400; n++) {
        const at = place();
        region.forEach((ring, which) => expect(bins.holds(which, at)).toBe(ringHolds(ring, at)));
        const [bx, by] = [at[0] + 300 * next(), at[1] + 300 * next()];
        const corner: Point[] = [at, [bx, at[1]], [bx, by], [at[0], by]];
        const sides = corner.map((from, k) => leftOf(from, corner[(k + 1) % 4]));
        const piece = convexPiece(pointsBox(corner), sides);
        if (piece) expect(convexPart(region, piece, bins)).toEqual(convexPart(region, piece));
        const segment = { from: at, to: n % 2 === 0 ? place() : ([bx, by] as Point) };
        expect(segmentParts(region, segment, bins)).toEqual(segmentParts(region, segment));
        const box = pointsBox(corner);
        const inBox = region.flat().filter(([x, y]) => x >= box.min[0] && x <= box.max[0] && y >= box.min[1] && y <= box.max[1]); // prettier-ignore
        expect(new Set(bins.cornersIn(box))).toEqual(new Set(inBox));
      }
    }
  });
});
