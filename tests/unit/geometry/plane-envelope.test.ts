import fc from 'fast-check';
import { expect, test } from 'vitest';
import { envelopeTop, planeEnvelope } from '@/geometry/plane-envelope';

// By the meaning of the words: the height at any point is no more than the highest, and the highest is there.

const plane = fc.tuple(
  fc.double({ min: -50, max: 50, noNaN: true }),
  fc.oneof(
    fc.double({ min: 0, max: 2 * Math.PI, noNaN: true }),
    // Square to each other, and facing each other, as walls do.
    fc.nat(15).map((n) => 0.1 + (n * Math.PI) / 8),
  ),
);

test('no point of the rectangle is higher on the lowest plane than the top, and one is as high', () => {
  fc.assert(
    fc.property(
      fc.array(plane, { minLength: 1, maxLength: 8 }),
      fc.double({ min: 0.01, max: 40, noNaN: true }),
      fc.double({ min: 0.01, max: 40, noNaN: true }),
      (planes, width, depth) => {
        const room = planeEnvelope(8);
        for (const [d, angle] of planes) {
          room.d[room.count] = d;
          room.gx[room.count] = Math.cos(angle);
          room.gy[room.count++] = Math.sin(angle);
        }
        const [x0, y0, x1, y1] = [-0.4 * width, -0.7 * depth, 0.6 * width, 0.3 * depth];
        const height = (x: number, y: number) =>
          Math.min(...planes.map(([d, a]) => d + Math.cos(a) * x + Math.sin(a) * y));
        const top = envelopeTop(room, x0, y0, x1, y1);
        for (let i = 0; i <= 12; i++) {
          for (let j = 0; j <= 12; j++) {
            const at = height(x0 + (i / 12) * (x1 - x0), y0 + (j / 12) * (y1 - y0));
            expect(at).toBeLessThanOrEqual(top + 1e-6);
          }
        }
        expect(room.x).toBeGreaterThanOrEqual(x0);
        expect(room.x).toBeLessThanOrEqual(x1);
        expect(room.y).toBeGreaterThanOrEqual(y0);
        expect(room.y).toBeLessThanOrEqual(y1);
        // Planes that are all but parallel meet nowhere in particular, and those level along a side are
        // highest all along it.
        const apart = planes.every(
          ([, one], n) =>
            Math.abs(Math.sin(2 * one)) > 1e-3 &&
            planes.every(([, other], m) => {
              const sine = Math.abs(Math.sin(one - other));
              return n === m || sine > 1e-3 || sine < 1e-14;
            }),
        );
        if (apart) expect(height(room.x, room.y)).toBeGreaterThanOrEqual(top - 1e-5);
      },
    ),
    { seed: 3, numRuns: 500 },
  );
});
