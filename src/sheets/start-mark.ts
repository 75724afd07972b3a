import { unitCorners } from '@/paving/laying';
import type { PaperPoint } from './drawing';
import { PENS } from './drawing';
import { INK } from './inks';
import type { LabelSpace, Segment } from './label-space';
import { middleOf } from './paper-vectors';
import type { PlacedLabels } from './plan-labels';
import { labelPlaced, placesOff } from './plan-labels';
import type { PlanFacts } from './plan-panel';
import type { PlanView } from './plan-view';
import { paperFromGround } from './plan-view';
import { LETTERING } from './text-measure';

/** The first unit: drawn heavy, its measured corner dotted, and an S on it or beside it. */
export function startMark(
  { input, start }: PlanFacts,
  view: PlanView,
  space: LabelSpace,
  rings: readonly Segment[],
): PlacedLabels | null {
  if (!start) return null;
  const { laid, motif } = input.laying;
  const corners = unitCorners(
    motif[laid.k[start.unit]],
    laid.x[start.unit],
    laid.y[start.unit],
  ).map((corner) => paperFromGround(view, corner));
  const middle = middleOf(corners);
  const { unit } = motif[laid.k[start.unit]];
  const roomy = Math.min(unit.length, unit.width) / view.scale > LETTERING.small * 1.7;
  const places = [
    ...(roomy ? [{ middle, turnDeg: 0, plate: true }] : []),
    ...[
      [0.7, -0.7],
      [-0.7, -0.7],
      [0.7, 0.7],
      [-0.7, 0.7],
    ].flatMap((outward) =>
      placesOff(middle, outward as unknown as PaperPoint, 2.4, [5, 8, 12]).map((place) => ({
        ...place,
        plate: true,
        clearOf: rings,
      })),
    ),
  ];
  const label = labelPlaced({ text: 'S', weight: 700, places }, space);
  return {
    commands: [
      {
        kind: 'path',
        rings: [{ points: corners, closed: true }],
        stroke: { width: PENS.thick, colour: INK },
      },
      { kind: 'circle', centre: paperFromGround(view, start.corner), radius: 0.8, fill: INK },
      ...(label?.commands ?? []),
    ],
    space: label?.space ?? space,
  };
}
