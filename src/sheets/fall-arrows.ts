import type { Point } from '@/geometry/point';
import { fallPlace, fallWays } from '@/paving/fall-ways';
import type { LayoutDocument } from '@/paving/layout-document';
import { ringHolds } from '@/geometry/ring';
import { documentLevels } from '@/paving/levels';
import type { DrawCommand, PaperPoint, Stroke } from './drawing';
import { PENS } from './drawing';
import { INK } from './inks';
import { paperFromGround, type PlanView } from './plan-view';

/** Paper mm. */
const LENGTH = 14;
const HEAD = 2.6;
/** White space between an arrow's head and the place that the fall leads to. */
const CLEAR = 2.5;
const STROKE: Stroke = { width: PENS.medium, colour: INK };
/** Long dashes and short: what is not built but measured to. */
const LINE_STROKE: Stroke = { width: PENS.medium, colour: INK, dash: [6, 1.2, 1.2, 1.2] };

/** Arrows down the falls, and how steep they are. */
export interface FallArrows {
  readonly commands: readonly DrawCommand[];
  /** What no figure may stand on. */
  readonly outlines: readonly (readonly PaperPoint[])[];
  /** Steepness, `2 %`, and where it may stand: texts about these places. Null on a level floor. */
  readonly figure: { readonly text: string; readonly places: readonly PaperPoint[] } | null;
}

/** An arrow from one point to another with a filled head. */
export function arrowCommands(from: PaperPoint, to: PaperPoint): readonly DrawCommand[] {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const [ux, uy] = [(to[0] - from[0]) / length, (to[1] - from[1]) / length];
  const [x, y] = [to[0] - HEAD * ux, to[1] - HEAD * uy];
  return [
    { kind: 'line', from, to: [x, y], stroke: STROKE },
    {
      kind: 'path',
      rings: [
        {
          points: [
            to,
            [x - uy * HEAD * 0.4, y + ux * HEAD * 0.4],
            [x + uy * HEAD * 0.4, y - ux * HEAD * 0.4],
          ],
          closed: true,
        },
      ],
      fill: INK,
    },
  ];
}

/**
 * Arrows down the fall: through the middle of the floor one way, else towards the point or line that it leads to,
 * from every side that lies within `outline`.
 */
export function fallArrows(
  document: LayoutDocument,
  outline: readonly Point[],
  view: PlanView,
): FallArrows {
  const { fall } = documentLevels(document);
  if (fall.kind === 'none') return { commands: [], outlines: [], figure: null };
  const place = fallPlace(document);
  const at = paperFromGround(view, place);
  const [start, end] =
    fall.kind === 'oneWay' ? [-LENGTH / 2, LENGTH / 2] : [-LENGTH - CLEAR, -CLEAR];
  const on = ([x, y]: PaperPoint, along: number, aside = 0): PaperPoint => [
    at[0] + x * along - y * aside,
    at[1] + y * along + x * aside,
  ];
  const ways = fallWays(fall)
    .filter(
      ([x, y]) =>
        fall.kind === 'oneWay' ||
        ringHolds(outline, [place[0] + start * view.scale * x, place[1] + start * view.scale * y]),
    )
    .map(([x, y]): PaperPoint => [x, -y]);
  return {
    commands: [
      ...(fall.kind === 'toLine'
        ? [
            {
              kind: 'line' as const,
              from: paperFromGround(view, fall.from),
              to: paperFromGround(view, fall.to),
              stroke: LINE_STROKE,
            },
          ]
        : []),
      ...ways.flatMap((way) => arrowCommands(on(way, start), on(way, end))),
    ],
    outlines: ways
      .map((way) =>
        ([-1, 1] as const).flatMap((side) => [on(way, start, side), on(way, end, side)]),
      )
      .map(([a, b, c, d]) => [a, b, d, c]),
    figure: {
      text: `${Number(fall.percent.toFixed(2))}\u2009%`,
      places: ways.flatMap((way) =>
        [6, -6, 8, -8].map((aside) => on(way, (start + end) / 2, aside)),
      ),
    },
  };
}
