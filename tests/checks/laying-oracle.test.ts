import fc from 'fast-check';
import { expect, test } from 'vitest';
import { gapProfile } from '@/paving/gap-profile';
import { layFloor, type UnitSet } from '@/paving/laying';
import { parseLayoutDocument } from '@/paving/layout-validation';
import type { LayoutDocument } from '@/paving/layout-document';
import { floorReport } from '@/paving/report';
import { oracleFacing, oracleFloor } from '../oracle/brute-force';
import { anyDocument, gridDocument, parsed } from '../oracle/documents';

// The oracle (tests/oracle/brute-force.ts) follows the words of the layout document with JSTS,
// unit by unit, and shares no code with the core.

const addresses = (set: UnitSet) =>
  new Set(Array.from({ length: set.count }, (_, n) => `${set.i[n]},${set.j[n]},${set.k[n]}`));

function without(set: ReadonlySet<string>, doubtful: ReadonlySet<string>): string[] {
  return [...set].filter((address) => !doubtful.has(address)).sort();
}

function decisionsAgree(document: LayoutDocument, arcs: boolean): void {
  const laying = layFloor(document);
  const report = floorReport(laying);
  const oracle = oracleFloor(document);
  const { undecided } = oracle;
  expect(without(addresses(laying.laid), undecided)).toEqual(
    without(new Set(oracle.laid.keys()), undecided),
  );
  expect(without(addresses(laying.leftOut), undecided)).toEqual(without(oracle.leftOut, undecided));
  expect(without(addresses(laying.lifted), undecided)).toEqual(without(oracle.lifted, undecided));
  expect(report.groundArea * 1e6).toBeCloseTo(oracle.groundArea, arcs ? -4 : 1);
  if (undecided.size > 0) return;
  expect(report.coveredArea * 1e6).toBeCloseTo(oracle.coveredArea, 1);
  if (oracle.leastGap === null) expect(report.leastGap).toBeNull();
  else expect(Math.abs(report.leastGap! - oracle.leastGap)).toBeLessThan(arcs ? 0.06 : 1e-6);
}

test('whatever the floor, each unit is laid, left out or lifted as JSTS decides it alone', () => {
  fc.assert(
    fc.property(anyDocument(), (document) => decisionsAgree(document, false)),
    { numRuns: 60 },
  );
});

test('with arcs in the perimeter, units are decided as on the finely flattened arc', () => {
  fc.assert(
    fc.property(anyDocument({ arcs: true }), (document) => decisionsAgree(document, true)),
    { numRuns: 25 },
  );
});

test('where units touch edges and corners exactly, they are decided as JSTS decides them', () => {
  fc.assert(
    fc.property(gridDocument, (document) => {
      fc.pre(parseLayoutDocument(document).ok);
      decisionsAgree(parsed(document), false);
    }),
    { numRuns: 60 },
  );
});

function facingAgrees(document: LayoutDocument, step: number): void {
  const oracle = oracleFloor(document);
  fc.pre(oracle.undecided.size === 0);
  const laying = layFloor(document);
  const { laid } = laying;
  gapProfile(laying).forEach((profile, n) => {
    const rays = oracleFacing(oracle, oracle.edges[n], step);
    const stretch = new Map<number, number>();
    for (const { unit, from, to } of profile.stretches) {
      stretch.set(unit, (stretch.get(unit) ?? 0) + to - from);
    }
    const facing = new Map(
      profile.units.map(({ unit, gap }) => [
        `${laid.i[unit]},${laid.j[unit]},${laid.k[unit]}`,
        { gap, stretch: stretch.get(unit)! },
      ]),
    );
    for (const [address, { gap, stretch: long }] of facing) {
      expect(rays.get(address)?.gap).toBeCloseTo(gap, 6);
      const pieces = profile.stretches.filter(
        ({ unit }) => `${laid.i[unit]},${laid.j[unit]},${laid.k[unit]}` === address,
      ).length;
      // Rays a step apart measure each piece of a stretch to within a step; those that meet
      // two units at once may count for either.
      const { rays: alone, tied } = rays.get(address)!;
      const slack = step * pieces + 1e-6;
      expect(long).toBeGreaterThanOrEqual(alone * step - slack);
      expect(long).toBeLessThanOrEqual((alone + tied) * step + slack);
    }
    for (const [address, { rays: count }] of rays) {
      if (count > 0) expect([...facing.keys()]).toContain(address);
    }
  });
}

test('the units that face each edge and their gaps are those that densely cast rays find', () => {
  fc.assert(
    fc.property(anyDocument(), (document) => facingAgrees(document, 1)),
    { numRuns: 25 },
  );
});

test('the same on a grid, where units stand exactly side by side and on the edge', () => {
  fc.assert(
    fc.property(gridDocument, (document) => {
      fc.pre(parseLayoutDocument(document).ok);
      // Rays of this step never run along a side that stands on the grid.
      facingAgrees(parsed(document), 3.1);
    }),
    { numRuns: 15 },
  );
});
