import type { Point } from '@/geometry/point';
import { cornerName, keepOutName } from '@/paving/edge-names';
import { cutPieces } from '@/paving/cutting/cut-pieces';
import type { Laying, UnitSet } from '@/paving/laying';
import { unitCorners } from '@/paving/laying';
import type { SetOut } from '@/paving/set-out/set-out-types';

import type { DrawCommand, Drawing, Layer, TextAnchor } from './drawing';
import { PENS } from './drawing';
import { INK } from './inks';
import type { PlanView } from './plan-view';
import { paperFromGround, paperRing, pointsBounds } from './plan-view';
import { sheetText } from './text-measure';

/** The ground itself, a millimetre for a millimetre; y is flipped, as in every drawing. */
const FULL_SIZE: PlanView = { scale: 1, ground: [0, 0], at: [0, 0] };

const STROKE = { width: PENS.fine, colour: INK };
/** Lettering is this share of the ground's diagonal, within limits that read on any floor, mm. */
const LETTER_SHARE = 1 / 120;
const LETTER_LIMITS = [25, 200] as const;

/** The layers, by what the trade calls what is on them. */
export const MODEL_LAYERS = [
  'Perimeter',
  'Keep-outs',
  'Units',
  'Lifted units',
  'Cut pieces',
  'First unit',
  'Strings',
  'Control points',
  'Lettering',
] as const;

/**
 * The floor at full size, for programs that draw: perimeter and keep-outs with true arcs, every unit, strings
 * and control points with their names. Coordinates are the document's own.
 */
export function floorModel(laying: Laying, setOut: SetOut | null): Drawing {
  const { rings } = laying.ground;
  const bounds = pointsBounds(rings[0].edges.flatMap((edge) => edge.chords));
  const [width, height] = [0, 1].map((axis) => bounds.greatest[axis] - bounds.least[axis]);
  const [least, greatest] = LETTER_LIMITS;
  const letter = Math.min(greatest, Math.max(least, Math.hypot(width, height) * LETTER_SHARE));
  const [perimeter, ...keepOuts] = rings.map(({ edges }): DrawCommand => ({
    kind: 'path',
    rings: [paperRing(FULL_SIZE, edges)],
    stroke: STROKE,
  }));
  const text = (at: Point, words: string, anchor: TextAnchor = 'start'): DrawCommand => ({
    kind: 'text',
    at: paperFromGround(FULL_SIZE, at),
    text: sheetText(words),
    height: letter,
    weight: 400,
    anchor,
    turnDeg: 0,
    colour: INK,
    frame: 'model',
  });
  const first = setOut?.firstUnit;
  const commands: Record<(typeof MODEL_LAYERS)[number], readonly DrawCommand[]> = {
    Perimeter: [perimeter],
    'Keep-outs': keepOuts,
    Units: outlines(laying, laying.laid),
    'Lifted units': outlines(laying, laying.lifted),
    'Cut pieces':
      laying.document.cutting === 'edge'
        ? cutPieces(laying).pieces.map(({ polygon, holes = [] }): DrawCommand => ({
            kind: 'path',
            rings: [polygon, ...holes].map((ring) => ({
              points: ring.map((point) => paperFromGround(FULL_SIZE, point)),
              closed: true,
            })),
            stroke: STROKE,
          }))
        : [],
    'First unit': first ? [closed(first.corners)] : [],
    Strings: (setOut?.courses ?? []).map(({ from, to }) => ({
      kind: 'line',
      from: paperFromGround(FULL_SIZE, from),
      to: paperFromGround(FULL_SIZE, to),
      stroke: STROKE,
    })),
    'Control points': (setOut?.points ?? []).flatMap(({ at, name }) => [
      {
        kind: 'circle',
        centre: paperFromGround(FULL_SIZE, at),
        radius: letter / 4,
        stroke: STROKE,
      } as const,
      text([at[0] + letter / 2, at[1] + letter / 2], name),
    ]),
    Lettering: [
      ...(setOut ? [] : rings[0].edges.map(({ start }, n) => text(start, cornerName(0, n)))),
      ...rings.slice(1).map(({ ring, name, edges }) => {
        const { least: low, greatest: high } = pointsBounds(edges.flatMap(({ chords }) => chords));
        const middle: Point = [(low[0] + high[0]) / 2, (low[1] + high[1]) / 2];
        return text(middle, `${keepOutName(ring)} ${name ?? ''}`.trim(), 'middle');
      }),
    ],
  };
  const layers = MODEL_LAYERS.map((name): Layer => ({ name, commands: commands[name] }));
  return { width, height, layers };
}

const closed = (corners: readonly Point[]): DrawCommand => ({
  kind: 'path',
  rings: [{ points: corners.map((corner) => paperFromGround(FULL_SIZE, corner)), closed: true }],
  stroke: STROKE,
});

const outlines = ({ motif }: Laying, units: UnitSet): readonly DrawCommand[] =>
  Array.from({ length: units.count }, (_, n) =>
    closed(unitCorners(motif[units.k[n]], units.x[n], units.y[n])),
  );
