import fc from 'fast-check';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument, Vertex } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';
import { floorReport } from '@/paving/report';
import { NO_STAMP, type PlanInput } from '@/sheets/plan-input';

const SLAB = { id: 'a', name: 'Slab 450 × 450', length: 450, width: 450, thickness: 50 };

export const floor = (
  perimeter: readonly Vertex[],
  change: Partial<LayoutDocument> = {},
): LayoutDocument => {
  const parsed = parseLayoutDocument({
    schema: 'evenlay/layout@1',
    display: 'metric',
    ground: { perimeter, keepOuts: [] },
    units: [SLAB],
    bond: { kind: 'running', unit: 'a', joint: 5, shift: 0.5 },
    placement: { origin: [240, 240], turn: 0 },
    clearance: 6,
    aggregate: { name: 'Buff gravel 10 mm', colour: '#d9c7a0' },
    ...change,
  });
  if (!parsed.ok) throw new Error(parsed.problems.map(({ message }) => message).join(' '));
  return parsed.document;
};

export const rectangle = (x: number, y: number, width: number, depth: number): Vertex[] => [
  [x, y],
  [x + width, y],
  [x + width, y + depth],
  [x, y + depth],
];

export const COURT = floor(
  [
    [0, 0],
    [7200, 0],
    [7200, 3100],
    [4300, 3100],
    [4300, 5400],
    [0, 5400],
  ],
  {
    ground: {
      perimeter: [
        [0, 0],
        [7200, 0],
        [7200, 3100],
        [4300, 3100],
        [4300, 5400],
        [0, 5400],
      ],
      keepOuts: [{ name: 'Tree pit', ring: rectangle(1500, 3600, 1000, 1000) }],
    },
    bond: { kind: 'chequer', unit: 'a', joint: 3 },
    placement: { origin: [396.8, 515.7], turn: 45 },
  },
);

export const TERRACE = floor(
  [
    [2300, 0, Math.SQRT2 - 1],
    [0, 2300, Math.SQRT2 - 1],
    [-2300, 0, Math.SQRT2 - 1],
    [0, -2300, Math.SQRT2 - 1],
  ],
  {
    units: [{ ...SLAB, name: 'Block 200 × 100', length: 200, width: 100, thickness: 60 }],
    bond: { kind: 'herringbone', unit: 'a', joint: 0 },
    tones: { rule: 'random', second: '#7d4a3a', share: 0.3, seed: 7 },
  },
);

/** 24 ft by 20 ft with a bay, a skew corner and two keep-outs, in feet and inches. */
export const BAY = floor(
  [
    [0, 0],
    [20 * 304.8, 0],
    [24 * 304.8, 8 * 304.8, -0.2],
    [24 * 304.8, 14 * 304.8],
    [9 * 304.8 + 57, 14 * 304.8],
    [9 * 304.8, 20 * 304.8],
    [0, 20 * 304.8],
  ],
  { display: 'imperial', units: [{ ...SLAB, length: 457.2, width: 457.2, thickness: 50.8 }] },
);

/** 30 m by 1 m. */
export const PATH = floor(rectangle(0, 0, 30_000, 1000));

export const STAR = floor(
  Array.from({ length: 40 }, (_, n): Vertex => {
    const radius = n % 2 === 0 ? 4200 : 3200;
    const angle = (2 * Math.PI * n) / 40;
    return [Math.round(radius * Math.cos(angle)), Math.round(radius * Math.sin(angle))];
  }),
  { placement: { origin: [0, 0], turn: 12 } },
);

/** Treads of 900 by 700 up one side. */
export const STAIRS = floor(
  [
    [0, 0],
    ...Array.from({ length: 6 }, (_, n): Vertex[] => [
      [6000 - n * 900, n * 700],
      [6000 - n * 900, (n + 1) * 700],
    ]).flat(),
    [0, 4200],
  ],
  {
    units: [
      { ...SLAB, length: 300, width: 300 },
      { ...SLAB, id: 'b', name: 'Sett', length: 150, width: 150 },
    ],
    bond: { kind: 'pinwheel', unit: 'a', small: 'b', joint: 4 },
  },
);

/** A ring round a point, so that it never crosses itself; some edges bowed, a keep-out in the middle or not. */
export const randomFloor: fc.Arbitrary<LayoutDocument> = fc
  .record({
    radii: fc.array(fc.integer({ min: 1500, max: 9000 }), { minLength: 4, maxLength: 16 }),
    bows: fc.array(fc.constantFrom(0, 0, 0, 0.12, -0.06), { minLength: 16, maxLength: 16 }),
    keepOut: fc.boolean(),
    imperial: fc.boolean(),
    turn: fc.integer({ min: 0, max: 90 }),
    name: fc.constantFrom('Tree pit', 'Inspection cover of the main drain', 'Ø'),
  })
  .map(({ radii, bows, keepOut, imperial, turn, name }) => {
    const ring = (withBows: boolean) =>
      radii.map((radius, n): Vertex => {
        const angle = (2 * Math.PI * n) / radii.length;
        const [x, y] = [Math.round(radius * Math.cos(angle)), Math.round(radius * Math.sin(angle))];
        return withBows && bows[n] !== 0 ? [x, y, bows[n]] : [x, y];
      });
    const change: Partial<LayoutDocument> = {
      display: imperial ? 'imperial' : 'metric',
      placement: { origin: [0, 0], turn },
    };
    const keepOuts = keepOut ? [{ name, ring: rectangle(-300, -200, 600, 400) }] : [];
    const made = (perimeter: Vertex[], out: typeof keepOuts) =>
      parseLayoutDocument({
        ...floor(rectangle(0, 0, 2000, 2000), change),
        ground: { perimeter, keepOuts: out },
      });
    // Bowed edges may meet where the ring is narrow: then the same ring is taken straight.
    const tries = [made(ring(true), keepOuts), made(ring(false), keepOuts), made(ring(false), [])];
    const parsed = tries.find((one) => one.ok);
    if (!parsed?.ok) throw new Error('A ring round a point is always a floor.');
    return parsed.document;
  });

export function planInput(
  document: LayoutDocument,
  change: Partial<Omit<PlanInput, 'laying' | 'report'>> = {},
): PlanInput {
  const laying = layFloor(document);
  return {
    laying,
    report: floorReport(laying),
    firm: 'Hollin & Sedge Paving',
    project: 'Court behind the dairy',
    layout: 'Diamond chequer',
    version: 3,
    label: 'Most slabs',
    creator: 'Tess Aldine',
    documentNumber: 'P-4K2M7-3',
    date: '2026-10-14T09:30:00.000Z',
    fingerprint: 'a1b2c3d4e5f60718293a',
    state: 'shared',
    stamp: NO_STAMP,
    paper: 'auto',
    ...change,
  };
}
