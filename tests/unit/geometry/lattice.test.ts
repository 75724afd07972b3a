import fc from 'fast-check';
import { expect, test } from 'vitest';
import { latticeCell, latticeReduced, latticeRows } from '@/geometry/lattice';
import type { Point } from '@/geometry/point';
import { real } from '../../oracle/documents';

const vector = fc.tuple(real(-3000, 3000), real(-3000, 3000));

test('a reduced basis spans the same lattice with its two shortest vectors', () => {
  fc.assert(
    fc.property(vector, vector, (a, b) => {
      const cell = Math.abs(latticeCell({ a, b }));
      fc.pre(cell > 1000);
      for (const basis of [latticeReduced({ a, b }), latticeRows({ a, b })]) {
        const whole = basis.i.a * basis.j.b - basis.i.b * basis.j.a;
        expect(Math.abs(whole)).toBe(1);
        expect(latticeCell(basis)).toBeCloseTo(cell, 3);
        for (const [to, of] of [
          [basis.a, [basis.i.a, basis.j.a]],
          [basis.b, [basis.i.b, basis.j.b]],
        ] as const) {
          expect(to[0]).toBeCloseTo(of[0] * a[0] + of[1] * b[0], 3);
          expect(to[1]).toBeCloseTo(of[0] * a[1] + of[1] * b[1], 3);
        }
      }
      const { a: short, b: next } = latticeReduced({ a, b });
      const size = ([x, y]: Point) => Math.hypot(x, y);
      expect(size(short)).toBeLessThanOrEqual(size(next) + 1e-9);
      for (let m = -4; m <= 4; m++) {
        for (let n = -4; n <= 4; n++) {
          if (m === 0 && n === 0) continue;
          const other: Point = [m * short[0] + n * next[0], m * short[1] + n * next[1]];
          expect(size(other)).toBeGreaterThanOrEqual(size(short) - 1e-6);
          if (n !== 0) expect(size(other)).toBeGreaterThanOrEqual(size(next) - 1e-6);
        }
      }
    }),
  );
});

test('a lattice near enough to square keeps its own rows', () => {
  const { a, b, i, j } = latticeRows({ a: [453, 0], b: [226.5, 453] });
  expect([a, b, i, j]).toEqual([[453, 0], [226.5, 453], { a: 1, b: 0 }, { a: 0, b: 1 }]);
});
