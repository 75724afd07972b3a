import type { Display } from '@/api-types/people';
import { INCH_BUILD_UP } from '@/paving/build-up';
import type { LayoutDocument } from '@/paving/layout-document';
import { MM_PER_INCH } from '@/paving/length';

const rectangle = (width: number, depth: number): [number, number][] => [
  [0, 0],
  [width, 0],
  [width, depth],
  [0, depth],
];

const FOOT = 12 * MM_PER_INCH;

/** What a new layout begins from: a plain rectangle with one common square slab, in the person's own measures. */
export const startingDocument = (display: Display): LayoutDocument => {
  const metric = display === 'metric';
  const side = metric ? 450 : 18 * MM_PER_INCH;
  return {
    schema: 'evenlay/layout@1',
    display,
    ground: {
      perimeter: metric ? rectangle(4800, 3600) : rectangle(16 * FOOT, 12 * FOOT),
      keepOuts: [],
    },
    units: [
      {
        id: 'a',
        name: metric ? 'Slab 450 × 450' : 'Slab 18 × 18 in',
        length: side,
        width: side,
        thickness: metric ? 50 : 2 * MM_PER_INCH,
        colour: '#c9c2b2',
      },
    ],
    bond: { kind: 'stack', unit: 'a', joint: metric ? 5 : MM_PER_INCH / 4 },
    placement: { origin: metric ? [300, 300] : [FOOT, FOOT], turn: 0 },
    clearance: metric ? 6 : MM_PER_INCH / 4,
    lifted: [],
    cutting: 'none',
    aggregate: { name: 'Gravel 10 mm', colour: '#d8d2c4' },
    ...(metric ? {} : { buildUp: INCH_BUILD_UP }),
  };
};
