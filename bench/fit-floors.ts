import type { Bond, KeepOut, LayoutDocument, Unit, Vertex } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';
import { COURT_CHEQUER, COURT_SQUARE, ROUND_TERRACE, SIDE_YARD } from '@/server/demo-layouts';
import { wavyRing } from './floors';

interface Parts {
  readonly ring: readonly Vertex[];
  readonly size: readonly [number, number];
  readonly bond: 'stack' | 'running' | 'herringbone';
  readonly joint?: number;
  readonly turn?: number;
  readonly clearance?: number;
  readonly keepOuts?: readonly KeepOut[];
}

function floorOf({ ring, size, bond, joint = 0, turn = 0, clearance = 0, keepOuts = [] }: Parts) {
  const unit: Unit = { id: 'a', name: 'Unit', length: size[0], width: size[1], thickness: 50 };
  const bonds: Record<Parts['bond'], Bond> = {
    stack: { kind: 'stack', unit: 'a', joint },
    running: { kind: 'running', unit: 'a', joint, shift: 0.5 },
    herringbone: { kind: 'herringbone', unit: 'a', joint },
  };
  const parsed = parseLayoutDocument({
    schema: 'evenlay/layout@1',
    display: 'metric',
    ground: { perimeter: ring, keepOuts },
    units: [unit],
    bond: bonds[bond],
    placement: { origin: [0, 0], turn },
    clearance,
  });
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems));
  return parsed.document;
}

const rectangle = (width: number, depth: number, x = 0, y = 0): Vertex[] => [
  [x, y],
  [x + width, y],
  [x + width, y + depth],
  [x, y + depth],
];

const turned = (ring: readonly Vertex[], turn: number): Vertex[] => {
  const [cos, sin] = [Math.cos((turn * Math.PI) / 180), Math.sin((turn * Math.PI) / 180)];
  return ring.map(([x, y]) => [x * cos - y * sin, x * sin + y * cos]);
};

const stretched = (ring: readonly Vertex[], x: number, y: number): Vertex[] =>
  ring.map((vertex) => [vertex[0] * x, vertex[1] * y]);

/** A plaza of 100 × 60 m in 200 × 100 running bond. */
const plaza = (ring: readonly Vertex[], turn: number) =>
  floorOf({ ring, size: [200, 100], bond: 'running', turn, clearance: 5 });

/** The floors that the fit is timed on, usual to hard. */
export const fitFloors: Readonly<Record<string, LayoutDocument>> = {
  'L court, stack': COURT_SQUARE,
  'L court, chequer at 45°': COURT_CHEQUER,
  'round terrace, herringbone': ROUND_TERRACE,
  'side yard, running': SIDE_YARD,
  'exact 10 × 10': floorOf({ ring: rectangle(3000, 3000), size: [300, 300], bond: 'stack' }),
  'exact 10 × 10 with joints at 17°': floorOf({
    ring: turned(rectangle(3039, 3039), 17),
    size: [300, 300],
    bond: 'stack',
    joint: 3,
    turn: 17,
    clearance: 6,
  }),
  'exact running bond': floorOf({
    ring: rectangle(4000, 1000),
    size: [200, 100],
    bond: 'running',
  }),
  'herringbone 200 × 100 at 45°': floorOf({
    ring: rectangle(6000, 4200),
    size: [200, 100],
    bond: 'herringbone',
    turn: 45,
    clearance: 4,
  }),
  '60 corners and five keep-outs': floorOf({
    ring: wavyRing(5200, 60),
    size: [200, 100],
    bond: 'herringbone',
    turn: 30,
    clearance: 5,
    keepOuts: Array.from({ length: 5 }, (_, n) => ({
      name: `Bed ${n + 1}`,
      ring: rectangle(400, 400, -2800 + n * 1100, -1400 + ((n * 700) % 2100)),
    })),
  }),
  'plaza, along its sides': plaza(rectangle(100_000, 60_000), 0),
  'plaza at 17°': plaza(rectangle(100_000, 60_000), 17),
  'plaza of 200 corners at 17°': plaza(stretched(wavyRing(46_000, 200), 1.09, 0.65), 17),
};

/** A square has more units than can be laid at once when its perimeter is more pitches than this. */
const SQUARE_PITCHES = 5_000;

/**
 * A square of 200 mm units at 17° whose boundary is that many times the pitch; a large one has a square
 * keep-out in its middle, which counts: 11 parts of the side to 14.
 */
export function squareFloor(pitches: number): LayoutDocument {
  const hollow = pitches > SQUARE_PITCHES;
  const side = (pitches * 200) / (hollow ? 4 * (1 + 11 / 14) : 4);
  const inner = (side * 11) / 14;
  const keepOuts: KeepOut[] = hollow
    ? [{ name: 'Pool', ring: rectangle(inner, inner, (side - inner) / 2, (side - inner) / 2) }]
    : [];
  return floorOf({
    ring: rectangle(side, side),
    size: [200, 200],
    bond: 'stack',
    turn: 17,
    keepOuts,
  });
}
