import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { layFloor } from '@/paving/laying';
import type { Bond, LayoutDocument, Tones, Unit } from '@/paving/layout-document';
import { rectangleOverlap } from '@/geometry/rectangle';
import { unitTone } from '@/paving/tones';
import { documentOf, parsed, unitOf } from '../../oracle/documents';

const tones = (parts: Partial<Tones>): Tones => ({
  rule: 'random',
  second: '#776655',
  share: 0.5,
  seed: 1,
  ...parts,
});

/** Laid units of a floor 6 m square with their tone, and the pairs of units a joint apart. */
function toned(units: Unit[], bond: Bond, rule: Tones['rule']) {
  const document = parsed(
    documentOf({
      ground: {
        perimeter: [
          [0, 0],
          [6000, 0],
          [6000, 6000],
          [0, 6000],
        ],
        keepOuts: [],
      },
      units,
      bond,
      tones: tones({ rule }),
      clearance: 0,
    }),
  );
  const { laid, motif } = layFloor(document);
  const all = Array.from({ length: laid.count }, (_, n) => ({
    k: laid.k[n],
    tone: unitTone(document, laid.i[n], laid.j[n], laid.k[n]),
    centre: [laid.x[n], laid.y[n]] as const,
    ...motif[laid.k[n]],
  }));
  const pairs = all.flatMap((one, n) =>
    all
      .slice(n + 1)
      .filter((other) => rectangleOverlap(one, other) > -4)
      .map((other) => [one, other] as const),
  );
  return { all, pairs };
}

const alike = (pairs: readonly (readonly [{ tone: number }, { tone: number }])[]) =>
  pairs.filter(([one, other]) => one.tone === other.tone).length;

/** Pairs that meet along a side, not at a corner alone. */
const beside = ({ pairs }: ReturnType<typeof toned>) =>
  pairs.filter(([one, other]) => {
    const longer = (entry: typeof one) => ({
      ...entry,
      halfLength: [entry.halfLength[0] * 0.9, entry.halfLength[1] * 0.9] as const,
    });
    const wider = (entry: typeof one) => ({
      ...entry,
      halfWidth: [entry.halfWidth[0] * 0.9, entry.halfWidth[1] * 0.9] as const,
    });
    return (
      rectangleOverlap(longer(one), longer(other)) > -4 ||
      rectangleOverlap(wider(one), wider(other)) > -4
    );
  });

describe('alternate: neighbours differ as well as the lattice allows', () => {
  test('in stack bond every two units side by side differ', () => {
    const floor = toned([unitOf('a', 450)], { kind: 'stack', unit: 'a', joint: 3 }, 'alternate');
    expect(beside(floor).length).toBeGreaterThan(200);
    expect(alike(beside(floor))).toBe(0);
  });

  test('in a chequer every two units corner to corner differ', () => {
    const floor = toned([unitOf('a', 450)], { kind: 'chequer', unit: 'a', joint: 3 }, 'alternate');
    expect(floor.pairs.length).toBeGreaterThan(80);
    expect(alike(floor.pairs)).toBe(0);
  });

  test('in running bond units along a course differ', () => {
    const bond: Bond = { kind: 'running', unit: 'a', joint: 3, shift: 0.5 };
    const floor = toned([unitOf('a', 450)], bond, 'alternate');
    const along = floor.pairs.filter(([one, other]) => one.centre[1] === other.centre[1]);
    expect(along.length).toBeGreaterThan(100);
    expect(alike(along)).toBe(0);
  });

  test('in a basket only the two of a pair are alike', () => {
    const bond: Bond = { kind: 'basket', unit: 'a', joint: 3 };
    const floor = toned([unitOf('a', 403, 200)], bond, 'alternate');
    const sides = beside(floor);
    const same = sides.filter(([one, other]) => one.tone === other.tone);
    expect(same.length).toBeGreaterThan(20);
    for (const [one, other] of same) {
      expect(
        Math.hypot(one.centre[0] - other.centre[0], one.centre[1] - other.centre[1]),
      ).toBeCloseTo(203, 6);
    }
  });

  test('in a pinwheel the large units that meet differ', () => {
    const bond: Bond = { kind: 'pinwheel', unit: 'a', small: 'b', joint: 3 };
    const floor = toned([unitOf('a', 400), unitOf('b', 200)], bond, 'alternate');
    const large = beside(floor).filter(([one, other]) => one.k === 0 && other.k === 0);
    expect(large.length).toBeGreaterThan(50);
    expect(alike(large)).toBe(0);
  });
});

test('course: a course is of one tone and the next of the other', () => {
  const bond: Bond = { kind: 'running', unit: 'a', joint: 3, shift: 0.5 };
  const { all } = toned([unitOf('a', 450)], bond, 'course');
  const courses = new Map<number, Set<number>>();
  for (const { centre, tone } of all) {
    const row = Math.round(centre[1] / 453);
    courses.set(row, (courses.get(row) ?? new Set()).add(tone));
  }
  for (const [row, seen] of courses) {
    expect(seen.size).toBe(1);
    const next = courses.get(row + 1);
    if (next) expect([...next][0]).not.toBe([...seen][0]);
  }
});

describe('random', () => {
  const bond: Bond = { kind: 'stack', unit: 'a', joint: 3 };
  const floorOf = (share: number, seed: number): LayoutDocument =>
    documentOf({ bond, tones: tones({ share, seed }) });

  test('keeps the share within a few per cent on any floor of a few hundred units', () => {
    const places = fc.record({
      share: fc.double({ min: 0, max: 1, noNaN: true }),
      seed: fc.nat(999_999),
      from: fc.tuple(fc.integer({ min: -500, max: 500 }), fc.integer({ min: -500, max: 500 })),
      size: fc.tuple(fc.integer({ min: 16, max: 40 }), fc.integer({ min: 16, max: 40 })),
    });
    fc.assert(
      fc.property(places, ({ share, seed, from, size }) => {
        const document = floorOf(share, seed);
        let second = 0;
        for (let i = 0; i < size[0]; i++) {
          for (let j = 0; j < size[1]; j++)
            second += unitTone(document, from[0] + i, from[1] + j, 0);
        }
        expect(Math.abs(second / (size[0] * size[1]) - share)).toBeLessThan(0.05);
      }),
    );
  });

  test('has fewer clumps than chance: at half and half no 3 × 3 units are alike', () => {
    // By chance alone 2 of 512 such squares are of one tone: about 38 in 100 × 100 of them.
    let clumps = 0;
    const document = floorOf(0.5, 7);
    for (let i = 0; i < 100; i++) {
      for (let j = 0; j < 100; j++) {
        let second = 0;
        for (let n = 0; n < 9; n++)
          second += unitTone(document, i + (n % 3), j + Math.floor(n / 3), 0);
        if (second === 0 || second === 9) clumps++;
      }
    }
    expect(clumps).toBe(0);
  });

  test('depends on the seed, and on nothing but address and seed', () => {
    const row = (document: LayoutDocument) =>
      Array.from({ length: 400 }, (_, n) => unitTone(document, n % 20, Math.floor(n / 20), 0)).join(
        '',
      );
    expect(row(floorOf(0.5, 1))).not.toBe(row(floorOf(0.5, 2)));
    expect(
      row({ ...floorOf(0.5, 1), placement: { origin: [77, 5], turn: 12 }, clearance: 40 }),
    ).toBe(row(floorOf(0.5, 1)));
  });
});
