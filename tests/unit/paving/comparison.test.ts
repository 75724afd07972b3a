import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { floorComparison, MOVED_MM, UNIT_FATE } from '@/paving/comparison';
import { layFloor, unitCorners, type Laying } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { floorReport } from '@/paving/report';
import { unitKind } from '@/paving/unit-matching';
import { bondOf, documentOf, parsed, real, unitOf } from '../../oracle/documents';

const floor = (parts: Partial<LayoutDocument>): Laying => layFloor(parsed(documentOf(parts)));

const square = (side: number): LayoutDocument['ground'] => ({
  perimeter: [
    [0, 0],
    [side, 0],
    [side, side],
    [0, side],
  ],
  keepOuts: [],
});

/** The very same units, all pushed by the same way: nothing is laid anew. */
const pushed = (laying: Laying, dx: number, dy: number): Laying => ({
  ...laying,
  laid: {
    ...laying.laid,
    x: laying.laid.x.map((x) => x + dx),
    y: laying.laid.y.map((y) => y + dy),
  },
});

const laying = fc
  .record({ bond: bondOf, turn: real(0, 360), x: real(-500, 500), y: real(-500, 500) })
  .map(({ bond, turn, x, y }) => floor({ ...bond, placement: { origin: [x, y], turn } }))
  .filter(({ laid }) => laid.count > 0);

const counts = ({ kept, moved, gone, added }: ReturnType<typeof floorComparison>) => ({
  kept,
  moved,
  gone,
  added,
});

/** Ten rows of ten slabs of 450 with 3 mm joints, 3 mm and a half off every side of their square. */
const TEN = { ground: square(10 * 453 + 4), clearance: 3, units: [unitOf('a', 450)] };
const tenByTen = (parts: Partial<LayoutDocument> = {}) =>
  floor({ ...TEN, placement: { origin: [228.5, 228.5], turn: 0 }, ...parts });

describe('what becomes of the units', () => {
  test('on the same floor all are kept', () => {
    fc.assert(
      fc.property(laying, (one) => {
        const comparison = floorComparison(one, one);
        expect(counts(comparison)).toEqual({ kept: one.laid.count, moved: 0, gone: 0, added: 0 });
        expect([...comparison.partnerOfA]).toEqual([...comparison.partnerOfA.keys()]);
        expect(comparison.furthest).toBe(0);
      }),
      { numRuns: 60 },
    );
  });

  test('a push of up to 1 mm keeps every unit', () => {
    fc.assert(
      fc.property(laying, real(0, MOVED_MM), real(0, 2 * Math.PI), (one, by, way) => {
        const other = pushed(one, by * Math.cos(way), by * Math.sin(way));
        const comparison = floorComparison(one, other);
        expect(counts(comparison)).toEqual({ kept: one.laid.count, moved: 0, gone: 0, added: 0 });
        expect(comparison.furthest).toBeCloseTo(by, 6);
      }),
      { numRuns: 60 },
    );
  });

  test('a push of more than 1 mm moves every unit, and each is matched with itself', () => {
    fc.assert(
      // Units of these bonds are 100 mm wide at least, so that within 45 mm nothing else of a kind lies nearer.
      fc.property(laying, real(1.02, 45), real(0, 2 * Math.PI), (one, by, way) => {
        const other = pushed(one, by * Math.cos(way), by * Math.sin(way));
        const comparison = floorComparison(one, other);
        expect(counts(comparison)).toEqual({ kept: 0, moved: one.laid.count, gone: 0, added: 0 });
        expect([...comparison.partnerOfA]).toEqual([...comparison.partnerOfA.keys()]);
        expect(comparison.furthest).toBeCloseTo(by, 6);
      }),
      { numRuns: 60 },
    );
  });

  test('from the other floor’s side gone and new change places and the pairs are the same', () => {
    fc.assert(
      fc.property(laying, laying, (one, other) => {
        const there = floorComparison(one, other);
        const back = floorComparison(other, one);
        expect(counts(back)).toEqual({
          kept: there.kept,
          moved: there.moved,
          gone: there.added,
          added: there.gone,
        });
        expect(back.partnerOfA).toEqual(there.partnerOfB);
        expect(back.partnerOfB).toEqual(there.partnerOfA);
        expect(back.furthest).toBeCloseTo(there.furthest, 9);
      }),
      { numRuns: 60 },
    );
  });

  test('no unit is matched twice, partners name each other and are of one kind, and counts add up', () => {
    fc.assert(
      fc.property(laying, laying, (one, other) => {
        const { partnerOfA, partnerOfB, fateOfA, fateOfB, ...rest } = floorComparison(one, other);
        partnerOfA.forEach((m, n) => {
          expect(fateOfA[n] === UNIT_FATE.single).toBe(m < 0);
          if (m < 0) return;
          expect(partnerOfB[m]).toBe(n);
          expect(fateOfB[m]).toBe(fateOfA[n]);
          expect(unitKind(one.motif[one.laid.k[n]].unit)).toBe(
            unitKind(other.motif[other.laid.k[m]].unit),
          );
        });
        expect(rest.kept + rest.moved + rest.gone).toBe(one.laid.count);
        expect(rest.kept + rest.moved + rest.added).toBe(other.laid.count);
      }),
      { numRuns: 40 },
    );
  });

  /** Every unit against every other, corner by corner: the definition, without any cells or order. */
  const keptByBruteForce = (one: Laying, other: Laying): number => {
    const cornersOf = (of: Laying) =>
      Array.from({ length: of.laid.count }, (_, n) => ({
        kind: unitKind(of.motif[of.laid.k[n]].unit),
        corners: unitCorners(of.motif[of.laid.k[n]], of.laid.x[n], of.laid.y[n]),
      }));
    const others = cornersOf(other);
    return cornersOf(one).filter(({ kind, corners }) =>
      others.some(
        (candidate) =>
          candidate.kind === kind &&
          [0, 1, 2, 3].some((first) =>
            corners.every(([x, y], n) => {
              const [u, v] = candidate.corners[(first + n) % 4];
              return Math.hypot(x - u, y - v) <= MOVED_MM + 0.01;
            }),
          ),
      ),
    ).length;
  };

  test('as many are kept as there are with a unit of their kind corner on corner', () => {
    const near = fc.record({ by: real(0, 1.4), way: real(0, 6.28), turn: real(-0.1, 0.1) });
    fc.assert(
      fc.property(laying, near, (one, { by, way, turn }) => {
        const { origin, turn: before } = one.document.placement;
        const other = floor({
          ...one.document,
          placement: {
            origin: [origin[0] + by * Math.cos(way), origin[1] + by * Math.sin(way)],
            turn: before + turn,
          },
        });
        expect(floorComparison(one, other).kept).toBe(keptByBruteForce(one, other));
      }),
      { numRuns: 60 },
    );
  });
});

// Worked by hand, on a square of ten by ten slabs.
describe('cases worked by hand', () => {
  test('half a stack’s slabs stand where its chequer’s stand; the rest are gone', () => {
    const chequer = tenByTen({ bond: { kind: 'chequer', unit: 'a', joint: 3 } });
    expect(counts(floorComparison(tenByTen(), chequer))).toEqual({
      kept: 50,
      moved: 0,
      gone: 50,
      added: 0,
    });
  });

  test('from stack to half bond every second course has moved by half a slab, less the slab that found no room', () => {
    const running = tenByTen({ bond: { kind: 'running', unit: 'a', joint: 3, shift: 0.5 } });
    const comparison = floorComparison(tenByTen(), running);
    expect(counts(comparison)).toEqual({ kept: 50, moved: 45, gone: 5, added: 0 });
    expect(comparison.furthest).toBeCloseTo(226.5, 9);
  });

  test('a field pushed by a whole pitch along itself is kept but for one row at either end', () => {
    const one = tenByTen();
    expect(counts(floorComparison(one, pushed(one, 453, 0)))).toEqual({
      kept: 90,
      moved: 0,
      gone: 10,
      added: 10,
    });
  });

  test('a field pushed by just half a pitch has moved, every slab of it, though each has two near it', () => {
    for (const [dx, dy] of [
      [226.5, 0],
      [0, -226.5],
    ]) {
      const one = tenByTen();
      expect(counts(floorComparison(one, pushed(one, dx, dy)))).toEqual({
        kept: 0,
        moved: 100,
        gone: 0,
        added: 0,
      });
    }
  });

  // What lies within half a diagonal of a slab after an eighth of a turn is chance: no slab of a hundred is "the same, moved".
  test('a field turned by an eighth is laid anew: none has moved', () => {
    const comparison = floorComparison(
      tenByTen(),
      tenByTen({ placement: { origin: [228.5, 228.5], turn: 45 } }),
    );
    expect(comparison.anew).toBe(true);
    expect([comparison.kept, comparison.moved]).toEqual([0, 0]);
    expect([comparison.gone, comparison.added]).toEqual([
      comparison.fateOfA.length,
      comparison.fateOfB.length,
    ]);
    expect(new Set([...comparison.partnerOfA, ...comparison.partnerOfB])).toEqual(new Set([-1]));
    expect(comparison.furthest).toBe(0);
  });

  // At 5 m from the pivot a turn of 0.5° moves a slab by 44 mm, a tenth of its width.
  test('a field turned by half a degree has moved', () => {
    const comparison = floorComparison(
      tenByTen(),
      tenByTen({ placement: { origin: [228.5, 228.5], turn: 0.5 } }),
    );
    expect(comparison.anew).toBe(false);
    expect(comparison.moved).toBe(comparison.fateOfB.length);
  });

  test('a field pushed aslant by nearly half a pitch both ways has moved: all go the same way', () => {
    const one = tenByTen();
    const comparison = floorComparison(one, pushed(one, 200, -200));
    expect([comparison.anew, comparison.moved]).toEqual([false, 100]);
  });

  test('a slab lifted is gone, and nothing else changes', () => {
    expect(counts(floorComparison(tenByTen(), tenByTen({ lifted: [[4, 5, 0]] })))).toEqual({
      kept: 99,
      moved: 0,
      gone: 1,
      added: 0,
    });
  });

  const alone = (length: number, width: number, turn: number, thickness = 50) =>
    floor({
      ground: square(600),
      units: [{ ...unitOf('a', length, width), thickness }],
      bond: { kind: 'stepping', unit: 'a', pitch: [1000, 1000], shift: 0 },
      placement: { origin: [300, 300], turn },
    });

  test.each([
    ['a square by a quarter turn is kept', alone(300, 300, 0), alone(300, 300, 90), 1, 0],
    ['a rectangle by half a turn is kept', alone(300, 150, 20), alone(300, 150, 200), 1, 0],
    [
      'a rectangle typed the other way about is kept',
      alone(300, 150, 0),
      alone(150, 300, 90),
      1,
      0,
    ],
    // Half sides 150 and 75: the corner (150, 75) comes to (75, −150) or (−75, 150).
    [
      'a rectangle by a quarter turn has moved',
      alone(300, 150, 0),
      alone(300, 150, 90),
      0,
      Math.hypot(75, 225),
    ],
    // A chord of 45° about the half diagonal.
    [
      'a square by an eighth has moved',
      alone(300, 300, 0),
      alone(300, 300, 45),
      0,
      2 * Math.hypot(150, 150) * Math.sin(Math.PI / 8),
    ],
  ])('turned where it stands, %s', (_, one, other, kept, furthest) => {
    const comparison = floorComparison(one, other);
    expect(counts(comparison)).toEqual({ kept, moved: 1 - kept, gone: 0, added: 0 });
    expect(comparison.furthest).toBeCloseTo(furthest, 9);
  });

  test.each([
    ['wider', alone(300, 150, 0), alone(300, 151, 0)],
    ['thicker', alone(300, 150, 0), alone(300, 150, 0, 60)],
  ])('a unit %s is another kind, however it lies', (_, one, other) => {
    expect(counts(floorComparison(one, other))).toEqual({ kept: 0, moved: 0, gone: 1, added: 1 });
  });

  test('a floor without units compares with anything', () => {
    const bare = floor({ ground: square(400) });
    expect(counts(floorComparison(bare, tenByTen()))).toMatchObject({ gone: 0, added: 100 });
    expect(counts(floorComparison(tenByTen(), bare))).toMatchObject({ gone: 100, added: 0 });
    expect(counts(floorComparison(bare, bare))).toEqual({ kept: 0, moved: 0, gone: 0, added: 0 });
  });
});

describe('figures', () => {
  test('units are counted by size, under the names of both documents', () => {
    const renamed = tenByTen({
      units: [{ ...unitOf('slab', 450), name: 'Flag 450' }],
      bond: { kind: 'chequer', unit: 'slab', joint: 3 },
    });
    const small = tenByTen({
      units: [unitOf('a', 220)],
      bond: { kind: 'stack', unit: 'a', joint: 6.5 },
    });
    expect(floorComparison(tenByTen(), renamed).figures.kinds).toEqual([
      {
        length: 450,
        width: 450,
        thickness: 50,
        names: ['Unit a', 'Flag 450'],
        a: 100,
        b: 50,
        change: -50,
      },
    ]);
    expect(
      floorComparison(tenByTen(), small).figures.kinds.map(({ length, a, b }) => [length, a, b]),
    ).toEqual([
      [450, 100, 0],
      [220, 0, small.laid.count],
    ]);
  });

  test('each difference is the second floor’s figure less the first’s, by hand for a chequer', () => {
    const { figures } = floorComparison(
      tenByTen(),
      tenByTen({ bond: { kind: 'chequer', unit: 'a', joint: 3 } }),
    );
    expect(figures.wholeUnits).toEqual({ a: 100, b: 50, change: -50 });
    // Fifty slabs of 0.45 m by 0.45 m.
    expect(figures.coveredArea.change).toBeCloseTo(-50 * 0.2025, 9);
    expect(figures.fillArea.change).toBeCloseTo(50 * 0.2025, 9);
    expect(figures.groundArea.change).toBe(0);
    expect(figures.leastGap.a).toBeCloseTo(3.5, 9);
    expect(figures.play.change).toBeCloseTo(0, 9);
  });

  test('a figure that one floor has not has no difference', () => {
    const bare = floor({ ground: square(400) });
    const { figures } = floorComparison(bare, tenByTen());
    expect(figures.leastGap).toMatchObject({ a: null, change: null });
    expect(figures.leastGap.b).toBeCloseTo(3.5, 9);
  });

  test('figures handed in are used, and give what working them out gives', () => {
    fc.assert(
      fc.property(laying, laying, (one, other) => {
        expect(floorComparison(one, other, [floorReport(one), floorReport(other)]).figures).toEqual(
          floorComparison(one, other).figures,
        );
      }),
      { numRuns: 10 },
    );
  });
});
