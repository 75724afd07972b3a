import { describe, expect, test } from 'vitest';
import { cutPieces } from '@/paving/cutting/cut-pieces';
import { cutReport } from '@/paving/cutting/cut-report';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument, Vertex } from '@/paving/layout-document';
import { floorReport } from '@/paving/report';
import { documentOf, parsed, unitOf } from '../oracle/documents';
import { DIAGONAL_CELLS } from './diagonal-cells';

const SIDE = 100;

const squares = (perimeter: Vertex[], placement: LayoutDocument['placement']) =>
  layFloor(
    parsed(
      documentOf({
        ground: { perimeter, keepOuts: [] },
        units: [unitOf('a', SIDE)],
        bond: { kind: 'stack', unit: 'a', joint: 0 },
        placement,
        clearance: 0,
        cutting: 'edge',
      }),
    ),
  );

describe('squares at 45° in a rectangle of a × b diagonals', () => {
  // Worked out exactly for this project: along the sides 2(a − 1) + 2(b − 1) halves, in the corners
  // four quarters, together a + b − 1 tile areas.
  const d = SIDE * Math.SQRT2;

  test('are cut into 2(a − 1) + 2(b − 1) halves and 4 quarters, sawn from a + b − 1 tiles', () => {
    for (let a = 1; a <= 6; a++) {
      for (let b = 1; b <= 6; b++) {
        const laying = squares(
          [[0, 0], [a * d, 0], [a * d, b * d], [0, b * d]], // prettier-ignore
          { origin: [d / 2, d / 2], turn: 45 },
        );
        const made = cutPieces(laying);
        const tiles = made.pieces.map(
          ({ area }) => Math.round((area / (SIDE * SIDE)) * 1e10) / 1e4,
        );
        expect(tiles.filter((share) => share === 0.5).length).toBe(2 * (a - 1) + 2 * (b - 1));
        expect(tiles.filter((share) => share === 0.25).length).toBe(4);
        expect(tiles.length).toBe(2 * (a - 1) + 2 * (b - 1) + 4);
        // With a saw that takes nothing away no part of a tile is lost.
        const cut = cutReport(laying, made, 0);
        expect([cut.wholeUnits, cut.leastUnits]).toEqual([a + b - 1, a + b - 1]);
        expect(cut.area * 1e6).toBeCloseTo((a + b - 1) * SIDE * SIDE, 0);
        expect(cut.waste * 1e6).toBeCloseTo(0, 0);
        expect(cut.fillArea * 1e6).toBeCloseTo(0, 0);
        expect(cut.underThird).toBe(4);
        // Every tile is parted once along a diagonal, which makes a side of both halves; two of the halves are
        // parted once more, along half of one.
        expect(cut.sawLength).toBeCloseTo((a + b) * d, 1);
        expect(cut.cuts).toBe(a + b + 1);
        // A real saw takes its cut: no two halves come out of one tile any more.
        const sawn = cutReport(laying, made, 3);
        expect(sawn.leastUnits).toBeGreaterThanOrEqual(2 * (a - 1) + 2 * (b - 1));
        expect(sawn.wholeUnits).toBeGreaterThanOrEqual(sawn.leastUnits);
      }
    }
  });

  test('are cut in two again when each side is drawn in by half the saw’s cut', () => {
    // The half left of a tile is then short of its diagonal by the clearance, 1.5 mm: two such and 3 mm go into one.
    const laying = squares(
      [[0, 0], [4 * d, 0], [4 * d, 3 * d], [0, 3 * d]], // prettier-ignore
      { origin: [d / 2, d / 2], turn: 45 },
    );
    const drawnIn = layFloor({ ...laying.document, clearance: 1.5 });
    expect(drawnIn.laid.count).toBeLessThan(laying.laid.count);
    const halves = cutReport(drawnIn).pieces.filter(({ area }) => area * 1e6 < 0.5 * SIDE * SIDE);
    expect(halves.length).toBe(2 * 3 + 2 * 2 + 4);
  });
});

describe('a straight diagonal across a grid', () => {
  test('A074712: leaves a piece of each of the m + n − gcd(m, n) cells that it cuts', () => {
    DIAGONAL_CELLS.forEach((row, r) => {
      row.forEach((cells, c) => {
        const [m, n] = [r + 1, c + 1];
        const laying = squares(
          [[0, 0], [m * SIDE, 0], [0, n * SIDE]], // prettier-ignore
          { origin: [SIDE / 2, SIDE / 2], turn: 0 },
        );
        const cut = cutReport(laying);
        expect(cut.count).toBe(cells);
        // The saw goes once along the diagonal, whole cells and pieces fill the triangle.
        expect(cut.sawLength).toBeCloseTo(SIDE * Math.hypot(m, n), 1);
        expect(cut.area * 1e6 + laying.laid.count * SIDE * SIDE).toBeCloseTo(
          (m * n * SIDE * SIDE) / 2,
          0,
        );
        // The diagonal's two sides are alike: what it leaves and what it takes are the same pieces turned
        // half round, so with a saw that takes nothing away half as many cells do.
        const free = cutReport(laying, undefined, 0);
        expect(free.leastUnits).toBeGreaterThanOrEqual(cells / 2);
        expect(free.wholeUnits).toBe(Math.ceil(cells / 2));
      });
    });
  });
});

test('A242118: a circle of radius n round a corner of the grid cuts 8n − A046109(n) cells', () => {
  // A046109 (oeis.org), lattice points on a circle of radius n = 1 … 13: 4, but 12 at 5, 10 and 13. The
  // circle is 0.1 mm larger, so that cells which only touch it stay whole.
  for (let n = 1; n <= 13; n++) {
    const radius = n * SIDE + 0.1;
    const onCircle = [5, 10, 13].includes(n) ? 12 : 4;
    const laying = squares(
      [[-radius, 0, 1], [radius, 0, 1]], // prettier-ignore
      { origin: [SIDE / 2, SIDE / 2], turn: 0 },
    );
    const cut = cutReport(laying);
    expect([n, cut.count]).toEqual([n, 8 * n - onCircle]);
    // The chords part from the circle by 0.05 mm at most.
    const share = cut.area * 1e6 + laying.laid.count * SIDE * SIDE;
    expect(Math.PI * radius * radius - share).toBeGreaterThan(0);
    expect(Math.PI * radius * radius - share).toBeLessThan(2 * Math.PI * radius * 0.15);
  }
});

test('the report has the pieces where units are cut at the edge, and no word of them elsewhere', () => {
  const laying = squares([[0, 0], [1030, 0], [1030, 550], [0, 550]], { origin: [50, 50], turn: 0 }); // prettier-ignore
  const { cut, ...whole } = floorReport(laying);
  // Five strips of 30 mm at the end, ten of 50 mm along the top, and what is left in their corner.
  expect(cut).toMatchObject({ count: 16, underThird: 6, narrow: 0, notched: 0, failed: [] });
  expect(cut!.area).toBeCloseTo((5 * 30 * 100 + 10 * 50 * 100 + 30 * 50) / 1e6, 9);
  expect(cut!.fillArea).toBeCloseTo(0, 9);
  // Ten units: no two of 50 mm come out of one. Five give one of 50 and one of 30, two cuts each; four give one of
  // 50; one gives one of 50 and, of the 47 mm left beside it, the corner: across those 47 mm, then along its 50 mm.
  expect(cut).toMatchObject({ wholeUnits: 10, cuts: 5 * 2 + 4 + 3 });
  expect(cut!.sawLength).toBeCloseTo(5 * 200 + 4 * 100 + (100 + 47 + 50), 6);
  expect(floorReport(layFloor({ ...laying.document, cutting: 'none' }))).toEqual(whole);
  expect('cut' in whole).toBe(false);
});

test('a lifted unit at the edge is not cut', () => {
  const laying = squares([[0, 0], [1030, 0], [1030, 550], [0, 550]], { origin: [50, 50], turn: 0 }); // prettier-ignore
  const { unit } = cutReport(laying).pieces[0];
  const lifted = cutReport(layFloor({ ...laying.document, lifted: [[...unit]] }));
  expect(lifted.count).toBe(15);
  expect(lifted.pieces.map((piece) => piece.unit)).not.toContainEqual(unit);
});
