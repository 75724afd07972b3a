import fc from 'fast-check';
import { expect, test } from 'vitest';
import { groundRing } from '@/paving/ground';
import type { Vertex } from '@/paving/layout-document';
import { ringCircle } from '@/paving/ring-circle';
import { real } from '../../oracle/documents';

const ring = (vertices: readonly Vertex[]) => groundRing(vertices, 1, 'Bed');

test('corners on a circle, joined by its own arcs, are that circle, however many there are', () => {
  // By the inscribed angle an arc rises over half its chord by tan(sweep / 4): its bulge.
  fc.assert(
    fc.property(
      real(-50_000, 50_000),
      real(-50_000, 50_000),
      real(100, 20_000),
      fc.uniqueArray(fc.integer({ min: 0, max: 35 }), { minLength: 2, maxLength: 8 }),
      (x, y, radius, tens) => {
        const turns = [...tens].sort((a, b) => a - b).map((n) => (n * Math.PI) / 18);
        const sweeps = turns.map((turn, n) => {
          const next = turns[(n + 1) % turns.length];
          return next > turn ? next - turn : next - turn + 2 * Math.PI;
        });
        const circle = ringCircle(
          ring(
            turns.map((turn, n) => [
              x + radius * Math.cos(turn),
              y + radius * Math.sin(turn),
              Math.tan(sweeps[n] / 4),
            ]),
          ),
        );
        expect(circle).not.toBeNull();
        expect(circle!.radius).toBeCloseTo(radius, 3);
        expect(circle!.centre[0]).toBeCloseTo(x, 3);
        expect(circle!.centre[1]).toBeCloseTo(y, 3);
      },
    ),
  );
});

test('a ring with a straight side, an arc inward or another radius is no circle', () => {
  const quarter = Math.tan(Math.PI / 8);
  const round: Vertex[] = [
    [1000, 0, quarter],
    [0, 1000, quarter],
    [-1000, 0, quarter],
    [0, -1000, quarter],
  ];
  expect(ringCircle(ring(round))!.radius).toBeCloseTo(1000, 6);
  for (const bulge of [0, -quarter, 0.5 * quarter])
    expect(ringCircle(ring([[1000, 0, bulge], ...round.slice(1)]))).toBeNull();
});
