import fc from 'fast-check';
import { describe, expect, it, test } from 'vitest';
import { fillParts } from '@/paving/fill-parts';
import type { Bond, LayoutDocument, Vertex } from '@/paving/layout-document';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import { anyDocument, asCustom, documentOf, parsed, unitOf } from '../oracle/documents';
import { oracleFillParts } from '../oracle/closing';

const partsOf = (document: LayoutDocument) => {
  const laying = layFloor(document);
  return { ...fillParts(laying), report: floorReport(laying) };
};

/** Any floor, laid in a bond with a joint that can be seen: tenths of a millimetre up to 20 mm. */
const anyJointed = fc
  .record({
    floor: anyDocument(),
    kind: fc.constantFrom('stack', 'running', 'chequer', 'basket', 'herringbone', 'pinwheel'),
    length: fc.integer({ min: 260, max: 700 }),
    width: fc.integer({ min: 160, max: 500 }),
    joint: fc.integer({ min: 2, max: 200 }).map((tenths) => tenths / 10),
    // Where the joints of two courses overlap, a crossing is shut although a unit about it is missing.
    shift: fc.integer({ min: 10, max: 90 }).map((percent) => percent / 100),
  })
  .map(({ floor, kind, length, width, joint, shift }) => {
    const halves = kind === 'basket' || kind === 'herringbone';
    const first = halves
      ? unitOf('a', 2 * width + joint, width)
      : unitOf('a', length, kind === 'pinwheel' ? length : width);
    const bond = { kind, unit: 'a', joint, shift, small: 'b' } as unknown as Bond;
    return parsed({ ...floor, units: [first, unitOf('b', Math.round(length * 0.4))], bond });
  });

const square = (side: number) => ({
  perimeter: [
    [0, 0],
    [side, 0],
    [side, side],
    [0, side],
  ] as [number, number][],
  keepOuts: [],
});

describe('joints, voids and margin', () => {
  test('add up to the fill area, and none is negative, whatever the floor', () => {
    fc.assert(
      fc.property(anyDocument({ arcs: true }), (document) => {
        const { joints, voids, margin, report } = partsOf(document);
        expect(joints + voids + margin).toBeCloseTo(report.fillArea, 9);
        for (const part of [joints, voids, margin]) expect(part).toBeGreaterThanOrEqual(0);
      }),
      { numRuns: 80, seed: 20260301 },
    );
  });

  // The oracle (tests/oracle/closing.ts) grows and shrinks the units with JSTS; it knows no pieces.
  test('are what JSTS finds by closing the units and the places with a square', () => {
    let seen = 0;
    fc.assert(
      fc.property(anyJointed, (document) => {
        const oracle = oracleFillParts(document);
        fc.pre(oracle.undecided === 0);
        const found = partsOf(document);
        expect(found.joints * 1e6).toBeCloseTo(oracle.joints, -1);
        expect(found.voids * 1e6).toBeCloseTo(oracle.voids, -1);
        expect(found.margin * 1e6).toBeCloseTo(oracle.margin, -1);
        if (found.joints > 0) seen += 1;
      }),
      { numRuns: 18, seed: 20260301, endOnFailure: true },
    );
    expect(seen).toBeGreaterThan(8);
  }, 120_000);

  test('are the same for a bond written out as one’s own, and wherever the floor lies', () => {
    fc.assert(
      fc.property(anyJointed, fc.integer({ min: -5, max: 5 }), (document, i) => {
        // In a chequer that is written out nothing says that what it leaves open are places.
        fc.pre(document.bond.kind !== 'chequer');
        const there = partsOf(document);
        const custom = partsOf(asCustom(document));
        expect(custom.toldApart).toBe(true);
        expect(custom.joints).toBeCloseTo(there.joints, 6);
        expect(custom.voids).toBeCloseTo(there.voids, 6);
        const { perimeter, keepOuts } = document.ground;
        const moved = ([x, y, ...bulge]: Vertex): Vertex =>
          [x + i * 1000, y - i * 3000, ...bulge] as Vertex;
        const [ox, oy] = document.placement.origin;
        const away = partsOf({
          ...document,
          ground: {
            perimeter: perimeter.map(moved),
            keepOuts: keepOuts.map(({ name, ring }) => ({ name, ring: ring.map(moved) })),
          },
          placement: { ...document.placement, origin: [ox + i * 1000, oy - i * 3000] },
        });
        fc.pre(away.report.wholeUnits === there.report.wholeUnits);
        expect(away.joints).toBeCloseTo(there.joints, 6);
        expect(away.voids).toBeCloseTo(there.voids, 6);
      }),
      { numRuns: 40, seed: 20260301, endOnFailure: true },
    );
  });

  it('of a stack are its strips and crossings: m × n units have (m−1)n + m(n−1) strips and (m−1)(n−1) crossings', () => {
    const document = documentOf({
      ground: square(3100),
      units: [unitOf('a', 300)],
      bond: { kind: 'stack', unit: 'a', joint: 5 },
      placement: { origin: [180, 180], turn: 0 },
      clearance: 20,
    });
    const { joints, voids, margin, report } = partsOf(document);
    expect(report.wholeUnits).toBe(100);
    expect(joints * 1e6).toBeCloseTo(2 * 9 * 10 * 300 * 5 + 81 * 25, 4);
    expect(voids).toBe(0);
    expect(margin * 1e6).toBeCloseTo(3100 ** 2 - 3045 ** 2, 3);
  });

  // Squares at 45° in an a·d by b·d rectangle, d their diagonal: alternate ones are two classes of ab and
  // (a−1)(b−1), and what is left at the edge is (a+b−1) squares' area; with all of them laid the count is
  // 2ab − a − b + 1, for a = b OEIS A001844. The classes and the leftover are brute-forced identities.
  it.each([
    [2, 2],
    [3, 4],
    [5, 5],
    [7, 3],
  ])('of a diagonal chequer in %i × %i diagonals are closed forms', (a, b) => {
    const side = 300;
    const d = side * Math.SQRT2;
    const document = documentOf({
      ground: {
        perimeter: [
          [0, 0],
          [a * d, 0],
          [a * d, b * d],
          [0, b * d],
        ],
        keepOuts: [],
      },
      units: [unitOf('a', side)],
      bond: { kind: 'chequer', unit: 'a', joint: 0 },
      placement: { origin: [d / 2, d / 2], turn: 45 },
      clearance: 0,
    });
    const { joints, voids, margin, openPlaces, report } = partsOf(parsed(document));
    expect(report.wholeUnits).toBe(a * b);
    expect(openPlaces).toBe((a - 1) * (b - 1));
    expect(joints).toBe(0);
    expect(voids * 1e6).toBeCloseTo((a - 1) * (b - 1) * side * side, 3);
    expect(margin * 1e6).toBeCloseTo((a + b - 1) * side * side, 2);
  });

  it('of stepping between m × n slabs at pitches p and q fill (m−1)p + L by (n−1)q + W less the slabs', () => {
    const document = documentOf({
      ground: square(4000),
      units: [unitOf('a', 600, 400)],
      bond: { kind: 'stepping', unit: 'a', pitch: [750, 520], shift: 0 },
      placement: { origin: [400, 300], turn: 0 },
      clearance: 60,
    });
    const { joints, voids, report } = partsOf(document);
    const [m, n] = [5, 7];
    expect(report.wholeUnits).toBe(m * n);
    expect(joints).toBe(0);
    expect(voids * 1e6).toBeCloseTo(
      ((m - 1) * 750 + 600) * ((n - 1) * 520 + 400) - m * n * 600 * 400,
      3,
    );
  });

  it('a lifted unit is a void as large as its place and the joints about it', () => {
    const whole = documentOf({
      ground: square(3100),
      units: [unitOf('a', 300)],
      bond: { kind: 'stack', unit: 'a', joint: 5 },
      placement: { origin: [180, 180], turn: 0 },
      clearance: 20,
    });
    const before = partsOf(whole);
    const after = partsOf({ ...whole, lifted: [[4, 4, 0]] });
    expect(after.liftedPlaces).toBe(1);
    expect(after.voids * 1e6).toBeCloseTo(310 * 310, 4);
    expect((before.joints - after.joints) * 1e6).toBeCloseTo(310 * 310 - 300 * 300, 4);
    expect(after.margin).toBeCloseTo(before.margin, 9);
  });

  it('a post in a void of a chequer takes its own area from it', () => {
    const plain = documentOf({
      ground: square(3000),
      units: [unitOf('a', 300)],
      bond: { kind: 'chequer', unit: 'a', joint: 0 },
      placement: { origin: [150, 150], turn: 0 },
      clearance: 0,
    });
    const post = (x: number): LayoutDocument => ({
      ...plain,
      ground: {
        ...plain.ground,
        keepOuts: [
          {
            name: 'Post',
            ring: [
              [x, 400],
              [x + 100, 400],
              [x + 100, 500],
              [x, 500],
            ],
          },
        ],
      },
    });
    expect(partsOf(plain).openPlaces).toBe(50);
    // The void at (0 to 300, 300 to 600) is no whole place once a post stands in it: it is margin.
    const held = partsOf(post(100));
    expect(held.openPlaces).toBe(49);
    expect(held.voids).toBeCloseTo(49 * 0.09, 9);
    expect(held.margin).toBeCloseTo(0.09 - 0.01, 9);
  });

  it('the joints of every closed bond are the cell less its units, many units on', () => {
    const bonds: [LayoutDocument['units'], LayoutDocument['bond']][] = [
      [[unitOf('a', 203, 100)], { kind: 'basket', unit: 'a', joint: 3 }],
      [[unitOf('a', 203, 100)], { kind: 'herringbone', unit: 'a', joint: 3 }],
      [[unitOf('a', 200), unitOf('b', 100)], { kind: 'pinwheel', unit: 'a', small: 'b', joint: 4 }],
      [[unitOf('a', 200, 100)], { kind: 'running', unit: 'a', joint: 3, shift: 0.37 }],
    ];
    for (const [units, bond] of bonds) {
      const document = documentOf({
        ground: square(20_000),
        units,
        bond,
        placement: { origin: [7, 11], turn: 31 },
        clearance: 5,
      });
      const { joints, report } = partsOf(parsed(document));
      const g = (bond as { joint: number }).joint;
      // Share of joint in the field, from sizes alone: the grown unit less the unit.
      const grown = units.reduce((sum, { length, width }) => sum + (length + g) * (width + g), 0);
      const faces = units.reduce((sum, { length, width }) => sum + length * width, 0);
      const share = (grown - faces) / faces;
      expect(joints / report.coveredArea).toBeLessThan(share);
      expect(joints / report.coveredArea).toBeGreaterThan(share * 0.98);
    }
  });
});
