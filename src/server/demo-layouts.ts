import type { LayoutDocument, Placement, Vertex } from '@/paving/layout-document';
import type { Spot } from '@/paving/levels';

/** A quarter circle's bulge, tan(90° / 4). */
const QUARTER = Math.SQRT2 - 1;

const circle = (radius: number): Vertex[] => [
  [radius, 0, QUARTER],
  [0, radius, QUARTER],
  [-radius, 0, QUARTER],
  [0, -radius, QUARTER],
];

const rectangle = (x: number, y: number, width: number, depth: number): Vertex[] => [
  [x, y],
  [x + width, y],
  [x + width, y + depth],
  [x, y + depth],
];

/** Levels measured from the edge's top down to the ground, mm: a place, then its level. */
const measured = (spots: readonly (readonly [x: number, y: number, level: number])[]): Spot[] =>
  spots.map(([x, y, level]) => ({ at: [x, y], level }));

const slab = {
  id: 'slab',
  name: 'Slab 450 × 450',
  length: 450,
  width: 450,
  thickness: 50,
  colour: '#cdc5b4',
};

const court: Omit<LayoutDocument, 'bond' | 'placement'> = {
  schema: 'evenlay/layout@1',
  display: 'metric',
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
  units: [slab],
  clearance: 6,
  lifted: [],
  cutting: 'none',
  aggregate: { name: 'River gravel 10 mm', colour: '#a89f8d' },
  buildUp: { use: 'foot', frost: false, bedding: 25, base: 100, geotextile: true, overdig: 0 },
  levels: {
    finish: 0,
    fall: { kind: 'oneWay', direction: 270, percent: 2 },
    proud: 3,
    spots: measured([
      [0, 0, -305],
      [3600, 0, -330],
      [7200, 0, -290],
      [7200, 3100, -205],
      [4300, 3100, -190],
      [4300, 5400, -95],
      [2000, 5400, -60],
      [0, 5400, -85],
      [900, 2600, -215],
      [2800, 3300, -150],
    ]),
  },
  notes:
    'Edge: 150 mm sawn kerb, set level. The tree stays; its pit keeps a 1 m square of open ground.',
};

const courtPlan = (bond: LayoutDocument['bond'], placement: Placement): LayoutDocument => ({
  ...court,
  bond,
  placement,
});

/**
 * Origins below were found with the project's own laying, over a grid of the lattice cell and then closer
 * around the best: the most whole units, and of those the most play. The choice is written down; what it
 * comes to is computed when the version is saved.
 */
export const COURT_SQUARE = courtPlan(
  { kind: 'stack', unit: 'slab', joint: 5 },
  { origin: [295, 3.4], turn: 0 },
);
/** Chequer started at a corner: what looking for the start is measured against. */
export const COURT_FIRST_CHEQUER = courtPlan(
  { kind: 'chequer', unit: 'slab', joint: 3 },
  { origin: [0, 0], turn: 45 },
);
/** Chequer from the start with most whole units. */
export const COURT_CHEQUER = courtPlan(
  { kind: 'chequer', unit: 'slab', joint: 3 },
  { origin: [396.8, 515.7], turn: 45 },
);

/** A round terrace in herringbone about a fire bowl. */
export const ROUND_TERRACE: LayoutDocument = {
  schema: 'evenlay/layout@1',
  display: 'metric',
  ground: {
    perimeter: circle(2300),
    keepOuts: [{ name: 'Fire bowl', ring: circle(380) }],
  },
  units: [
    {
      id: 'block',
      name: 'Block 200 × 98',
      length: 200,
      width: 98,
      thickness: 60,
      colour: '#a9694f',
    },
  ],
  bond: { kind: 'herringbone', unit: 'block', joint: 4 },
  placement: { origin: [25.7, 46.4], turn: 45 },
  clearance: 4,
  lifted: [],
  cutting: 'none',
  tones: { rule: 'random', second: '#7d4a3a', share: 0.35, seed: 7 },
  aggregate: { name: 'Slate chippings 6 mm', colour: '#6d7273' },
  buildUp: { use: 'foot', frost: false, bedding: 25, base: 100, geotextile: false, overdig: 0 },
  levels: {
    finish: 0,
    fall: { kind: 'oneWay', direction: 225, percent: 2 },
    proud: 4,
    spots: measured([
      [2600, 0, -120],
      [1850, 1850, -90],
      [0, 2600, -105],
      [-1850, 1850, -140],
      [-2600, 0, -185],
      [-1850, -1850, -260],
      [0, -2600, -230],
      [1850, -1850, -160],
    ]),
  },
  notes: 'Edge: steel strip rolled to a radius of 2.3 m. The fire bowl stands on its own pad.',
};

/** A long side yard in running bond, with a gully and a gate post. */
export const SIDE_YARD: LayoutDocument = {
  schema: 'evenlay/layout@1',
  display: 'metric',
  ground: {
    perimeter: [
      [0, 0],
      [10_400, 0],
      [10_400, 2450],
      [7900, 2450],
      [7100, 1750],
      [0, 1750],
    ],
    keepOuts: [
      { name: 'Gully', ring: rectangle(2650, 150, 300, 300) },
      { name: 'Gate post', ring: rectangle(8700, 1500, 200, 200) },
    ],
  },
  units: [
    {
      id: 'plank',
      name: 'Plank 600 × 200',
      length: 600,
      width: 200,
      thickness: 50,
      colour: '#b9bcb6',
    },
  ],
  bond: { kind: 'running', unit: 'plank', joint: 5, shift: 0.5 },
  placement: { origin: [390.3, 187.5], turn: 0 },
  clearance: 5,
  lifted: [],
  cutting: 'none',
  tones: { rule: 'course', second: '#8f9591', share: 0.5, seed: 1 },
  aggregate: { name: 'Limestone grit 4 mm', colour: '#d9d3c3' },
  buildUp: { use: 'foot', frost: false, bedding: 25, base: 100, geotextile: false, overdig: 0 },
  levels: {
    finish: 0,
    fall: { kind: 'toPoint', at: [2800, 300], direction: 0, percent: 2 },
    proud: 0,
    spots: measured([
      [0, 0, -190],
      [2800, 0, -260],
      [5200, 0, -215],
      [10_400, 0, -120],
      [10_400, 2450, -95],
      [7900, 2450, -110],
      [7100, 1750, -150],
      [3400, 1750, -240],
      [0, 1750, -175],
    ]),
  },
};
