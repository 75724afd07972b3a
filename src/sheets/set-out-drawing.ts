import type { Point } from '@/geometry/point';
import type { ControlPoint, Course, SetOut } from '@/paving/set-out/set-out-types';
import type { Laying } from '@/paving/laying';
import type { DrawCommand, Layer, PaperBox, PaperPoint, Stroke } from './drawing';
import { PENS } from './drawing';
import { floorDrawing } from './floor-drawing';
import { INK, PAPER, inkMix } from './inks';
import type { LabelSpace, Segment } from './label-space';
import type { WantedLabel } from './plan-labels';
import { labelsPlaced, placesOff } from './plan-labels';
import type { PlanView } from './plan-view';
import { paperFromGround } from './plan-view';
import { LETTERING, sheetText, textWidth } from './text-measure';

/** What stands on the bare floor: names of control points, or numbers of courses at their strings. */
export type SetOutFigures = 'points' | 'courses';

const MOST_UNITS = 30_000;
const LEAST_SIDE = 0.7;
/** Strings of courses. */
export const STRING_STROKE: Stroke = { width: PENS.thin, colour: INK };
/** Long and short dashes, as for the centre lines of ISO 128: it is measured from. */
export const BASELINE_STROKE: Stroke = { width: PENS.thin, colour: INK, dash: [6, 1.2, 1.2, 1.2] };
const DATUM_SIDE = 3.2;

/** The floor with its units in outline, the baseline between the datums, the strings, and what names them. */
export function setOutDrawing(
  laying: Laying,
  setOut: SetOut,
  view: PlanView,
  { figures, frame }: { readonly figures: SetOutFigures; readonly frame: PaperBox },
): readonly Layer[] {
  const grey = inkMix(PAPER, INK, 0.35);
  const floor = floorDrawing(laying, view, {
    mostUnits: MOST_UNITS,
    leastSide: LEAST_SIDE,
    outline: { width: PENS.thick, colour: INK },
    keepOutStroke: { width: PENS.medium, colour: INK },
    unitStroke: { width: PENS.fine, colour: grey },
    markTone: false,
    grain: { spacing: 1.8, size: 0.3 },
  });
  const onPaper = (point: Point) => paperFromGround(view, point);
  const [from, to] = setOut.datums.map(({ at }) => onPaper(at));
  const strings = setOut.courses.map((course): Segment => ({
    from: onPaper(course.from),
    to: onPaper(course.to),
  }));
  const outline = floor.rings.flatMap((ring) => ring.segments);
  const space: LabelSpace = { frame, outlines: [], lines: outline };
  const labels =
    figures === 'points' ? pointLabels(setOut, onPaper) : courseLabels(setOut.courses, strings);
  const placed = labelsPlaced(labels, space);
  return [
    { name: 'units', commands: floor.units.map((command) => inOutline(command, grey)) },
    {
      name: 'strings',
      commands: strings.map((line) => ({ kind: 'line', ...line, stroke: STRING_STROKE })),
    },
    { name: 'ground', commands: floor.outline },
    {
      name: 'control',
      commands: [
        ...(figures === 'points'
          ? [{ kind: 'line' as const, from, to, stroke: BASELINE_STROKE }]
          : []),
        ...firstUnit(setOut, onPaper),
        ...(figures === 'points'
          ? setOut.points.map((point) => pointMark(point, onPaper(point.at)))
          : []),
      ],
    },
    { name: 'figures', commands: placed.commands },
  ];
}

/** Units without their colours: marks and names must be read over them. */
const inOutline = (command: DrawCommand, colour: string): DrawCommand =>
  command.kind === 'path'
    ? { ...command, fill: undefined, stroke: { width: PENS.fine, colour } }
    : command;

function firstUnit(
  { firstUnit: first }: SetOut,
  onPaper: (point: Point) => PaperPoint,
): readonly DrawCommand[] {
  if (!first) return [];
  return [
    {
      kind: 'path',
      rings: [{ points: first.corners.map(onPaper), closed: true }],
      stroke: { width: PENS.thick, colour: INK },
    },
  ];
}

/** A square for a datum, a ring for what is pegged, a dot for what is marked on the floor. */
export function pointMark({ by, kind }: ControlPoint, centre: PaperPoint): DrawCommand {
  const [x, y] = centre;
  if (by === 'datum') {
    const half = DATUM_SIDE / 2;
    return {
      kind: 'path',
      rings: [
        {
          points: [
            [x - half, y - half],
            [x + half, y - half],
            [x + half, y + half],
            [x - half, y + half],
          ],
          closed: true,
        },
      ],
      fill: INK,
    };
  }
  return kind === 'unit'
    ? { kind: 'circle', centre, radius: 0.6, fill: INK }
    : {
        kind: 'circle',
        centre,
        radius: 0.9,
        fill: PAPER,
        stroke: { width: PENS.thin, colour: INK },
      };
}

/** Those that all else hangs on first: who comes late may find no room, and is in the table. */
const ORDER: Readonly<Record<ControlPoint['kind'], number>> = {
  corner: 0,
  unit: 1,
  'keep-out': 2,
  arc: 3,
  string: 4,
};

function pointLabels(
  { points, datums }: SetOut,
  onPaper: (point: Point) => PaperPoint,
): readonly WantedLabel[] {
  const middle = middleOf(points.map(({ at }) => at));
  const units = middleOf(points.filter(({ kind }) => kind === 'unit').map(({ at }) => at));
  const isDatum = ({ name }: ControlPoint) => datums.some((datum) => datum.name === name);
  return [...points]
    .sort((p, q) => Number(isDatum(q)) - Number(isDatum(p)) || ORDER[p.kind] - ORDER[q.kind])
    .map((point) => {
      const at = onPaper(point.at);
      const [mx, my] = onPaper(point.kind === 'unit' ? units : middle);
      const name = sheetText(point.name);
      const weight = isDatum(point) ? 700 : point.kind === 'string' ? 400 : 600;
      return {
        text: name,
        weight,
        places: placesOff(
          at,
          away([at[0] - mx, at[1] - my]),
          textWidth(name, LETTERING.small, weight),
          [1.6, 2.6, 4, 6, 9],
        ).map((place) => ({
          ...place,
          // Over units and strings, but not over the edge.
          plate: point.kind === 'unit' || point.kind === 'keep-out',
        })),
      };
    });
}

const away = ([dx, dy]: PaperPoint): PaperPoint => {
  const length = Math.hypot(dx, dy);
  return length < 1e-6 ? [0.707, -0.707] : [dx / length, dy / length];
};

const middleOf = (points: readonly Point[]): Point => {
  const sum = points.reduce(([x, y], [px, py]) => [x + px, y + py], [0, 0]);
  return [sum[0] / Math.max(1, points.length), sum[1] / Math.max(1, points.length)];
};

/** Numbers before the strings' starts, or behind their ends where there is no room: first and last, then round ones, then the rest where there is room. */
function courseLabels(
  courses: readonly Course[],
  strings: readonly Segment[],
): readonly WantedLabel[] {
  const rank = (number: number): number => {
    if (number === 1 || number === courses.length) return 0;
    return number % 10 === 0 ? 1 : number % 5 === 0 ? 2 : 3;
  };
  return courses
    .map((course, n) => ({ course, line: strings[n] }))
    .sort((p, q) => rank(p.course.number) - rank(q.course.number))
    .map(({ course, line }) => {
      const text = String(course.number);
      const weight = 600;
      const width = textWidth(text, LETTERING.small, weight);
      const back = away([line.from[0] - line.to[0], line.from[1] - line.to[1]]);
      const on = away([-back[0], -back[1]]);
      return {
        text,
        weight,
        places: [
          ...placesOff(line.from, back, width, [1.6, 3, 5]),
          ...placesOff(line.to, on, width, [1.6, 3, 5]),
        ],
      };
    });
}
