import { describe, expect, test } from 'vitest';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument, Vertex } from '@/paving/layout-document';
import { floorReport } from '@/paving/report';
import { documentOf, parsed, unitOf } from '../oracle/documents';
import { DIAGONAL_CELLS } from './diagonal-cells';

const SIDE = 100;

function squares(perimeter: Vertex[], placement: LayoutDocument['placement']) {
  return layFloor(
    parsed(
      documentOf({
        ground: { perimeter, keepOuts: [] },
        units: [unitOf('a', SIDE)],
        bond: { kind: 'stack', unit: 'a', joint: 0 },
        placement,
        clearance: 0,
      }),
    ),
  );
}

describe('squares at 45° in a rectangle of a × b diagonals', () => {
  // Closed forms worked out exactly for this project (a whole unit's middle is at least half a
  // diagonal from each side) and tied to published sequences: a = b gives the centred squares
  // A001844, and the shifted ones A083487 (oeis.org).
  const d = SIDE * Math.SQRT2;
  const rectangle = (a: number, b: number): Vertex[] => [
    [0, 0],
    [a * d, 0],
    [a * d, b * d],
    [0, b * d],
  ];
  const centredSquares = [1, 5, 13, 25, 41, 61, 85, 113];
  const sizes = [1, 2, 3, 4, 5, 6, 7, 8];

  test('with points touching the sides, 2ab − a − b + 1 are whole and a + b − 1 areas are left', () => {
    for (const a of sizes) {
      for (const b of sizes) {
        const laying = squares(rectangle(a, b), { origin: [d / 2, d / 2], turn: 45 });
        expect(laying.laid.count).toBe(2 * a * b - a - b + 1);
        // Half units along the sides and quarters in the corners.
        expect(laying.leftOut.count).toBe(2 * (a - 1) + 2 * (b - 1) + 4);
        const { fillArea, leastGap } = floorReport(laying);
        expect(fillArea * 1e6).toBeCloseTo((a + b - 1) * SIDE * SIDE, 3);
        expect(leastGap).toBeCloseTo(0, 6);
      }
    }
    sizes.forEach((n) => {
      const laying = squares(rectangle(n, n), { origin: [d / 2, d / 2], turn: 45 });
      expect(laying.laid.count).toBe(centredSquares[n - 1]);
    });
  });

  test('shifted by half a diagonal, 2ab − a − b are whole', () => {
    for (const a of sizes) {
      for (const b of sizes) {
        const laying = squares(rectangle(a, b), { origin: [0, d / 2], turn: 45 });
        expect(laying.laid.count).toBe(2 * a * b - a - b);
      }
    }
  });

  test('every other one laid (a chequer) gives ab, or (a − 1)(b − 1)', () => {
    for (const a of sizes) {
      for (const b of sizes) {
        const chequer = (origin: [number, number]) =>
          layFloor(
            parsed(
              documentOf({
                ground: { perimeter: rectangle(a, b), keepOuts: [] },
                units: [unitOf('a', SIDE)],
                bond: { kind: 'chequer', unit: 'a', joint: 0 },
                placement: { origin, turn: 45 },
                clearance: 0,
              }),
            ),
          ).laid.count;
        expect(chequer([d / 2, d / 2])).toBe(a * b);
        expect(chequer([d, d])).toBe((a - 1) * (b - 1));
      }
    }
  });
});

test('an Aztec diamond of order n holds 2n(n + 1) cells: 4, 12, 24, 40, 60, 84, 112', () => {
  // A046092, 4 times the triangular numbers (oeis.org): cells within |x| + |y| ≤ n + 1.
  [4, 12, 24, 40, 60, 84, 112].forEach((cells, index) => {
    const half = (index + 2) * SIDE;
    const diamond: Vertex[] = [
      [half, 0],
      [0, half],
      [-half, 0],
      [0, -half],
    ];
    const { laid } = squares(diamond, { origin: [SIDE / 2, SIDE / 2], turn: 0 });
    expect(laid.count).toBe(cells);
  });
});

describe('a straight diagonal across a grid', () => {
  const gcd = (m: number, n: number): number => (n === 0 ? m : gcd(n, m % n));

  test('A074712: it cuts m + n − gcd(m, n) cells, and leaves the closed form whole', () => {
    // The whole cells of the triangle follow from those that are cut.
    DIAGONAL_CELLS.forEach((row, r) => {
      row.forEach((cut, c) => {
        const [m, n] = [r + 1, c + 1];
        const triangle: Vertex[] = [
          [0, 0],
          [m * SIDE, 0],
          [0, n * SIDE],
        ];
        const { laid, leftOut } = squares(triangle, { origin: [SIDE / 2, SIDE / 2], turn: 0 });
        expect(leftOut.count).toBe(cut);
        expect(laid.count).toBe((m * n - m - n + gcd(m, n)) / 2);
      });
    });
  });
});
