import type { Bond, LayoutDocument, Unit } from '@/paving/layout-document';
import { layoutDocumentSchema } from '@/paving/layout-document';

/** Floors that the guide's pictures are drawn from, by the program's own sheets. */

const SLAB: Unit = {
  id: 'slab',
  name: 'Slab 450 × 450',
  length: 450,
  width: 450,
  thickness: 50,
  colour: '#e6dfce',
};

export const COURT: LayoutDocument = layoutDocumentSchema.parse({
  schema: 'evenlay/layout@1',
  display: 'metric',
  ground: {
    perimeter: [
      [0, 0],
      [6400, 0],
      [6400, 2900],
      [4100, 2900],
      [4100, 4700],
      [0, 4700],
    ],
    keepOuts: [
      {
        name: 'Tree pit',
        ring: [
          [1300, 3000],
          [2200, 3000],
          [2200, 3900],
          [1300, 3900],
        ],
      },
    ],
  },
  units: [SLAB],
  bond: { kind: 'running', unit: 'slab', joint: 5, shift: 0.5 },
  placement: { origin: [250, 240], turn: 0 },
  clearance: 8,
  aggregate: { name: 'Buff gravel 10 mm', colour: '#d3bf95' },
});

/** The same ground with a unit too large to lie on it: nothing is laid. */
export const BARE_GROUND: LayoutDocument = {
  ...COURT,
  units: [{ ...SLAB, length: 9000, width: 9000 }],
};

export const startedAt = (x: number, y: number): LayoutDocument => ({
  ...COURT,
  bond: { kind: 'stack', unit: 'slab', joint: 5 },
  placement: { origin: [x, y], turn: 0 },
});

const BRICK: Unit = {
  id: 'brick',
  name: 'Brick 203 × 100',
  length: 203,
  width: 100,
  thickness: 65,
  colour: '#b9735a',
};
const SMALL: Unit = {
  ...SLAB,
  id: 'small',
  name: 'Sett',
  length: 200,
  width: 200,
  colour: '#a59c8b',
};

const patch = (
  units: readonly Unit[],
  bond: Bond,
  origin: readonly [number, number],
  turn = 0,
): LayoutDocument => ({
  ...COURT,
  ground: {
    perimeter: [
      [0, 0],
      [1500, 0],
      [1500, 1000],
      [0, 1000],
    ],
    keepOuts: [],
  },
  units: [...units],
  bond,
  placement: { origin: [...origin], turn },
  clearance: 4,
});
const tile: Unit = { ...SLAB, id: 'tile', length: 240, width: 160 };
const square: Unit = { ...SLAB, id: 'square', length: 200, width: 200 };

export const BOND_PATCHES: readonly (readonly [name: string, document: LayoutDocument])[] = [
  ['Stack', patch([tile], { kind: 'stack', unit: 'tile', joint: 6 }, [135, 250])],
  ['Running', patch([tile], { kind: 'running', unit: 'tile', joint: 6, shift: 0.5 }, [15, 250])],
  ['Chequer', patch([square], { kind: 'chequer', unit: 'square', joint: 3 }, [180, 185], 45)],
  [
    'Stepping',
    patch([tile], { kind: 'stepping', unit: 'tile', pitch: [320, 240], shift: 0.5 }, [20, 140]),
  ],
  ['Basket', patch([BRICK], { kind: 'basket', unit: 'brick', joint: 3 }, [130, 35])],
  ['Herringbone', patch([BRICK], { kind: 'herringbone', unit: 'brick', joint: 3 }, [240, 100], 45)],
  [
    'Pinwheel',
    patch(
      [
        { ...square, length: 240, width: 240 },
        { ...SMALL, length: 110, width: 110 },
      ],
      { kind: 'pinwheel', unit: 'square', small: 'small', joint: 6 },
      [5, 30],
    ),
  ],
];
