import { expect, it } from 'vitest';
import { fitJoints } from '@/paving/fit/joint-range';
import type { LayoutDocument } from '@/paving/layout-document';
import { ROUND_TERRACE } from '@/server/demo-layouts';

/** Ten 300 mm units and nine joints have 10 mm to spare in 3,010 mm: they close up to a joint of 10 / 9 mm (arithmetic). */
const SQUARE: LayoutDocument = {
  schema: 'evenlay/layout@1',
  display: 'metric',
  ground: {
    perimeter: [
      [0, 0],
      [3010, 0],
      [3010, 3010],
      [0, 3010],
    ],
    keepOuts: [],
  },
  units: [{ id: 'a', name: 'Slab 300', length: 300, width: 300, thickness: 50 }],
  bond: { kind: 'stack', unit: 'a', joint: 3 },
  placement: { origin: [0, 0], turn: 0 },
  clearance: 0,
  lifted: [],
  cutting: 'none',
};

it('finds the widest joint at which one more row closes, and how many lie whole on either side of it', () => {
  const found = fitJoints(SQUARE, { from: 0, to: 3, step: 1 });
  if (!found.ok) throw new Error(found.message);
  const counts = found.joints.filter(({ closes }) => !closes);
  expect(counts.map(({ joint, wholeUnits }) => [joint, wholeUnits])).toEqual([
    [0, 100],
    [1, 100],
    [2, 81],
    [3, 81],
  ]);
  const [closing] = found.joints.filter(({ closes }) => closes);
  expect(closing.wholeUnits).toBe(100);
  // The lengths' tolerance of 0.01 mm at each end lets the joint be 0.02 / 9 mm wider; it is sought to 0.01 mm.
  expect(Math.abs(closing.joint - 10 / 9)).toBeLessThan(0.013);
});

it('keeps a row along an edge while it tries joints', () => {
  const found = fitJoints(SQUARE, { from: 2, to: 3, step: 1 }, [{ edge: [0, 0] }]);
  if (!found.ok) throw new Error(found.message);
  // With nothing to keep clear of, a row along the edge has no play.
  expect(found.joints.map(({ wholeUnits }) => wholeUnits)).toEqual([81, 81]);
  for (const { leastGap } of found.joints) expect(leastGap).toBeCloseTo(0, 3);
});

it('refuses bonds whose joint is not free, and ranges that are none', () => {
  expect(fitJoints(ROUND_TERRACE, { from: 0, to: 3, step: 1 })).toMatchObject({
    ok: false,
    message: expect.stringContaining('herringbone'),
  });
  expect(fitJoints(SQUARE, { from: 3, to: 2, step: 1 }).ok).toBe(false);
  expect(fitJoints(SQUARE, { from: 0, to: 500, step: 0.01 }).ok).toBe(false);
});
