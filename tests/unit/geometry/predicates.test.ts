import { expect, test } from 'vitest';
import { orientation } from '@/geometry/predicates';
import type { Point } from '@/geometry/point';

test('a left turn is positive, a right turn negative, y growing up', () => {
  expect(orientation([0, 0], [1, 0], [1, 1])).toBeGreaterThan(0);
  expect(orientation([0, 0], [1, 0], [1, -1])).toBeLessThan(0);
  expect(orientation([0, 0], [1, 1], [2, 2])).toBe(0);
});

test('points off a line by one step of a double are told from points on it', () => {
  // The grid around (0.5, 0.5) against the line through (12, 12) and (24, 24), on which plain
  // arithmetic errs: Kettner et al., "Classroom examples of robustness problems in geometric
  // computations", 2008 (the reference from memory).
  const step = 2 ** -53;
  const a: Point = [12, 12];
  const b: Point = [24, 24];
  for (let x = 0; x < 64; x++) {
    for (let y = 0; y < 64; y++) {
      const sign = Math.sign(orientation([0.5 + x * step, 0.5 + y * step], a, b));
      const real = Math.sign(0.5 + y * step - (0.5 + x * step));
      expect(sign + 0).toBe(real + 0);
    }
  }
});
