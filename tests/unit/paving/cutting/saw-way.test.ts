import { describe, expect, test } from 'vitest';
import type { Point } from '@/geometry/point';
import { sawnEdges } from '@/paving/cutting/saw-cuts';
import { sawWay } from '@/paving/cutting/saw-way';
import type { PieceShape } from '@/paving/cutting/piece-shape';
import { convexHull } from '@/geometry/convex-hull';

// All figures worked out by hand for this project.

const HALF: Point = [200, 200];

/** A piece that lies in the unit as it was, with its own notches and curves. */
function shapeOf(ring: readonly Point[]): { shape: PieceShape; place: readonly Point[] } {
  const hull = convexHull(ring);
  const { sides, bent } = sawnEdges([ring], HALF, hull);
  return {
    shape: { half: HALF, sawnSides: sides, bent } as unknown as PieceShape,
    place: hull,
  };
}

function way(rings: readonly (readonly Point[])[], kerf = 3) {
  const pieces = rings.map(shapeOf);
  return sawWay(
    pieces.map(({ shape }) => shape),
    pieces.map(({ place }) => place),
    kerf,
  );
}

const block = (x0: number, y0: number, x1: number, y1: number): Point[] => [
  [x0, y0],
  [x1, y0],
  [x1, y1],
  [x0, y1],
];

describe('the way of the saw through a unit of 400 × 400 mm', () => {
  test('a corner takes one cut across the whole unit and one across what is left', () => {
    // 100 × 250 mm in a corner: across at 250 mm up, 400 mm, then 250 mm along; or along first, 400 mm, then 100 mm.
    const cut = way([block(-200, -200, -100, 50)]);
    expect(cut.cuts).toBe(2);
    expect(cut.length).toBeCloseTo(400 + 100, 9);
  });

  test('a strip takes one cut, and two with just the saw’s cut between them also one', () => {
    expect(way([block(-200, -200, 200, -50)])).toEqual({ cuts: 1, length: 400 });
    expect(way([block(-200, -200, 200, -1.5), block(-200, 1.5, 200, 200)])).toEqual({
      cuts: 1,
      length: 400,
    });
    expect(way([block(-200, -200, 200, -20), block(-200, 20, 200, 200)])).toEqual({
      cuts: 2,
      length: 800,
    });
  });

  test('four corners with just the saw’s cut between them take a cross', () => {
    const four = [
      block(-200, -200, -1.5, -1.5),
      block(1.5, -200, 200, -1.5),
      block(1.5, 1.5, 200, 200),
      block(-200, 1.5, -1.5, 200),
    ];
    const cut = way(four);
    expect(cut.cuts).toBe(3);
    // Right through, then through each half, which is narrower by half of the saw's cut.
    expect(cut.length).toBeCloseTo(400 + 2 * 198.5, 9);
  });

  test('a notch is sawn along its own two sides, not through the unit', () => {
    const cut = way([[[-200, -200], [200, -200], [200, 50], [80, 50], [80, 200], [-200, 200]]]); // prettier-ignore
    expect(cut).toEqual({ cuts: 2, length: 120 + 150 });
  });

  test('a curve is one cut along itself', () => {
    // A quarter of a circle of 300 mm about the unit's corner, in 30 chords.
    const arc = Array.from({ length: 31 }, (_, n): Point => {
      const angle = (n / 30) * (Math.PI / 2);
      return [-200 + 300 * Math.cos(angle), -200 + 300 * Math.sin(angle)];
    });
    const cut = way([[[-200, -200], ...arc]]);
    expect(cut.cuts).toBe(1);
    expect(cut.length).toBeCloseTo(30 * 2 * 300 * Math.sin(Math.PI / 120), 6);
  });

  test('a cut aslant goes from side to side, and a second one ends at the first', () => {
    // A corner cut off at 45°, 100 mm along each side, and a strip of 50 mm off the side that it meets.
    const cut = way([[[-200, -200], [150, -200], [150, 150], [100, 200], [-200, 200]]]); // prettier-ignore
    expect(cut.cuts).toBe(2);
    // Aslant first: 100 √2 and then 300 mm up to it; or up first, 400 mm, and then 50 √2.
    expect(cut.length).toBeCloseTo(Math.min(100 * Math.SQRT2 + 350, 400 + 50 * Math.SQRT2), 6);
  });
});
