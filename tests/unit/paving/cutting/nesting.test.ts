import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { Point } from '@/geometry/point';
import { cutPieces } from '@/paving/cutting/cut-pieces';
import { cutReport } from '@/paving/cutting/cut-report';
import { groupPlaces, partedByCuts } from '@/paving/cutting/group-places';
import { nesting, sawnChecked } from '@/paving/cutting/nesting';
import { pieceShape, type PieceShape } from '@/paving/cutting/piece-shape';
import { layFloor } from '@/paving/laying';
import type { Vertex } from '@/paving/layout-document';
import { documentOf, parsed, real, unitOf } from '../../../oracle/documents';

/** Shapes of a floor's pieces, straight from the core: what is nested is what a floor leaves. */
function floorShapes(
  perimeter: Vertex[],
  length: number,
  width: number,
  turn: number,
  clearance: number,
) {
  const laying = layFloor(
    parsed(
      documentOf({
        ground: { perimeter, keepOuts: [] },
        units: [unitOf('a', length, width)],
        bond: { kind: 'stack', unit: 'a', joint: 3 },
        placement: { origin: [0, 0], turn },
        clearance,
      }),
    ),
  );
  const { lattice, origin, motif } = laying;
  return cutPieces(laying).pieces.map((piece) => {
    const [i, j] = piece.unit;
    const middle: Point = [
      origin[0] + i * lattice.a[0] + j * lattice.b[0],
      origin[1] + i * lattice.a[1] + j * lattice.b[1],
    ];
    return pieceShape(motif[0], middle, piece);
  });
}

/** The fewest units by trying every way to part the pieces into groups. */
function fewestUnits(shapes: readonly PieceShape[], kerf: number): number {
  const known = new Map<string, boolean>();
  const fits = (group: readonly number[]) => {
    const key = group.join();
    if (!known.has(key)) {
      known.set(
        key,
        groupPlaces(
          group.map((n) => shapes[n]),
          kerf,
        ) !== null,
      );
    }
    return known.get(key)!;
  };
  let best = shapes.length;
  const groups: number[][] = [];
  const place = (n: number) => {
    if (groups.length >= best) return;
    if (n === shapes.length) {
      best = groups.length;
      return;
    }
    for (const group of groups) {
      if (!fits([...group, n])) continue;
      group.push(n);
      place(n + 1);
      group.pop();
    }
    groups.push([n]);
    place(n + 1);
    groups.pop();
  };
  place(0);
  return best;
}

const smallFloor = fc.record({
  sides: fc.integer({ min: 3, max: 6 }),
  radius: real(500, 900),
  swing: fc.array(real(-0.3, 0.3), { minLength: 6, maxLength: 6 }),
  length: real(400, 700),
  width: real(300, 500),
  square: fc.boolean(),
  turn: real(0, 90),
  clearance: real(0, 20),
  kerf: fc.constantFrom(0, 3, 6),
});

describe('the fewest units', () => {
  test('lie between the bound and the nesting, and the nesting is seldom more than they are', () => {
    let floors = 0;
    let missed = 0;
    fc.assert(
      fc.property(
        smallFloor,
        ({ sides, radius, swing, length, width, square, turn, clearance, kerf }) => {
          const perimeter = Array.from({ length: sides }, (_, n): Vertex => {
            const angle = ((n + swing[n]) / sides) * 2 * Math.PI;
            return [radius * Math.cos(angle), radius * Math.sin(angle)];
          });
          const shapes = floorShapes(perimeter, length, square ? length : width, turn, clearance);
          fc.pre(shapes.length > 0 && shapes.length <= 9);
          const { units, leastUnits } = nesting(shapes, kerf);
          const fewest = fewestUnits(shapes, kerf);
          expect(leastUnits).toBeLessThanOrEqual(fewest);
          expect(units.length).toBeGreaterThanOrEqual(fewest);
          expect(units.length).toBeLessThanOrEqual(fewest + 1);
          floors += 1;
          if (units.length > fewest) missed += 1;
          // Every piece is sawn once.
          const sawn = units.flatMap(({ pieces }) => pieces).sort((m, n) => m - n);
          expect(sawn).toEqual(shapes.map((_, n) => n));
        },
      ),
      { numRuns: 150, seed: 5 },
    );
    expect(floors).toBeGreaterThan(100);
    expect(missed / floors).toBeLessThan(0.03);
  });
});

describe('strips along a straight side', () => {
  const strips = (across: number) =>
    cutReport(
      layFloor(
        parsed(
          documentOf({
            ground: { perimeter: [[0, 0], [4000, 0], [4000, across], [0, across]], keepOuts: [] }, // prettier-ignore
            units: [unitOf('a', 400)],
            bond: { kind: 'stack', unit: 'a', joint: 0 },
            placement: { origin: [200, 200], turn: 0 },
            clearance: 0,
          }),
        ),
      ),
    );

  test('two to a unit when they and the saw’s cut go into it, and each one cut of its length', () => {
    // Ten strips 190 mm of 400 mm: 190 + 190 + 3 ≤ 400.
    const cut = strips(400 + 190);
    expect([cut.count, cut.wholeUnits, cut.leastUnits]).toEqual([10, 5, 5]);
    expect([cut.cuts, cut.sawLength]).toEqual([10, 4000]);
    expect(cut.waste).toBeCloseTo(5 * 0.16 - 10 * 0.4 * 0.19, 9);
  });

  test('where just the saw’s cut lies between two of them it is one cut', () => {
    // 198.5 + 3 + 198.5 = 400.
    const cut = strips(400 + 198.5);
    expect([cut.count, cut.wholeUnits]).toEqual([10, 5]);
    expect([cut.cuts, cut.sawLength]).toEqual([5, 2000]);
  });

  test('one to a unit when the saw’s cut is what is too much', () => {
    const cut = strips(400 + 199);
    expect([cut.count, cut.wholeUnits, cut.leastUnits]).toEqual([10, 10, 10]);
  });

  test('never three, however thin: each has a maker’s edge along its length, and a unit has two', () => {
    const cut = strips(400 + 60);
    expect([cut.count, cut.wholeUnits, cut.leastUnits]).toEqual([10, 5, 5]);
    expect([cut.underThird, cut.narrow]).toEqual([10, 0]);
    expect(strips(400 + 9).narrow).toBe(10);
  });

  test('what is narrower than the saw’s own cut is left to aggregate', () => {
    expect(strips(400 + 2.9).count).toBe(0);
    expect(strips(400 + 3.1).count).toBe(10);
  });

  test('a strip of exactly a third is not smaller than a third', () => {
    expect(strips(400 + 400 / 3).underThird).toBe(0);
    expect(strips(400 + 400 / 3 - 0.1).underThird).toBe(10);
  });
});

describe('what one unit is sawn into', () => {
  const square = (x: number, y: number, size: number): Point[] => [
    [x, y],
    [x + size, y],
    [x + size, y + size],
    [x, y + size],
  ];

  test('four squares in a row and in a block part by cuts right through', () => {
    expect(
      partedByCuts(
        [0, 11, 22, 33].map((x) => square(x, 0, 10)),
        1,
      ),
    ).toBe(true);
    expect(
      partedByCuts([square(0, 0, 10), square(11, 0, 10), square(0, 11, 10), square(11, 11, 10)], 1),
    ).toBe(true);
  });

  test('a wheel of four strips round a middle does not', () => {
    const strip = (x: number, y: number, w: number, h: number): Point[] => [
      [x, y],
      [x + w, y],
      [x + w, y + h],
      [x, y + h],
    ];
    const wheel = [
      strip(0, 0, 19, 10),
      strip(20, 0, 10, 19),
      strip(11, 20, 19, 10),
      strip(0, 11, 10, 19),
    ];
    expect(partedByCuts(wheel, 1)).toBe(false);
    expect(partedByCuts(wheel.slice(0, 3), 1)).toBe(true);
  });

  test('is thrown out when pieces overlap or leave the unit', () => {
    const shape = { half: [50, 50] } as unknown as PieceShape;
    const unit = (places: Point[][]) => ({ pieces: places.map((_, n) => n), places });
    const ok = unit([square(-50, -50, 40), square(0, 0, 40)]);
    expect(() => sawnChecked([shape, shape], ok, 3)).not.toThrow();
    expect(() => sawnChecked([shape, shape], unit([square(-50, -50, 49), square(0, 0, 40)]), 3)).toThrow(/one unit/); // prettier-ignore
    expect(() => sawnChecked([shape], unit([square(20, 20, 40)]), 3)).toThrow(/one unit/);
  });
});
