import { ringInBox } from '@/geometry/box-clip';
import { rectangleClip } from '@/geometry/rectangle';
import { edgeName } from '@/paving/edge-names';
import type { Laying, UnitSet } from '@/paving/laying';
import { unitCorners } from '@/paving/laying';
import type { DrawCommand, Layer, PaperBox, PaperPoint } from './drawing';
import { PENS, boxHeight, boxWidth } from './drawing';
import type { DimensionedEdge } from './edge-dimensions';
import { baselineCentred } from './edge-dimensions';
import { figureText } from './figures';
import { INK, KEEP_OUT_COLOUR, PAPER, inkMix } from './inks';
import type { LabelSpace, Segment } from './label-space';
import { insideBox } from './label-space';
import { liftedCommands } from './lifted-marks';
import type { LabelPlace, WantedLabel } from './plan-labels';
import { labelsPlaced, placesAlong, placesOff } from './plan-labels';
import type { PlanPart, PlanParts } from './plan-parts';
import type { PlanView } from './plan-view';
import { paperChords, paperFromGround } from './plan-view';
import type { StartPoint } from './start-point';
import { LETTERING, textWidth } from './text-measure';
import { aggregateColour, unitCommands } from './unit-drawing';

/** A point of the set-out that a part names where it lies in it. */
export interface NamedPoint {
  readonly name: string;
  readonly at: readonly [number, number];
}

/** What all parts of a plan share. */
export interface PartFacts {
  readonly laying: Laying;
  readonly start: StartPoint | null;
  readonly points: readonly NamedPoint[];
}

const MATCH_STROKE = { width: PENS.medium, colour: INK, dash: [8, 1.5, 1.5, 1.5] };
const FRAME = 'part';

/** One part of a plan: its units, edges and points, match lines and what goes on beyond them. */
export function partDrawing(
  facts: PartFacts,
  part: PlanPart,
  { scale, window, overlap }: PlanParts,
): readonly Layer[] {
  const { laying } = facts;
  const { display } = laying.document;
  const view = partView(part, scale, window);
  const shown = { ...laying, laid: unitsIn(laying, laying.laid, view, window) };
  const lifted = { ...laying, lifted: unitsIn(laying, laying.lifted, view, window) };
  const rings = laying.ground.rings.map(({ edges }) =>
    edges.map((edge) => paperChords(view, edge)),
  );
  const clipped = rings.map((edges) =>
    ringInBox(
      edges.flatMap((chords) => chords.slice(0, -1)),
      { min: [window.left, window.top], max: [window.right, window.bottom] },
    ),
  );
  const outlines = rings.map((edges) => edges.map((chords) => segmentsIn(chords, window)));
  const areas = clipped
    .filter((points) => points.length > 2)
    .map((points) => ({ points, closed: true }));
  const lines = matchLines(part, window, overlap / scale);
  const labels = labelsPlaced(
    [
      ...pointLabels(facts.points, view, window),
      ...startLabel(facts, view, window),
      ...edgeLabels(laying, outlines, display),
    ],
    { frame: window, outlines: [], lines: outlines.flat(2) } satisfies LabelSpace,
  );
  return [
    {
      name: 'fill',
      commands: [
        { kind: 'path', rings: areas, fill: inkMix(aggregateColour(laying), PAPER, 0.25) },
      ],
    },
    {
      name: 'units',
      commands: unitCommands(shown, view, {
        stroke: { width: PENS.fine, colour: inkMix(PAPER, INK, 0.75) },
        markTone: true,
      }),
    },
    { name: 'lifted', commands: liftedCommands(lifted, view) },
    {
      name: 'ground',
      commands: [
        ...clipped.slice(1).map((points): DrawCommand => ({
          kind: 'path',
          rings: points.length > 2 ? [{ points, closed: true }] : [],
          fill: KEEP_OUT_COLOUR,
        })),
        ...outlines.flatMap((edges, ring) =>
          edges.flat().map((line): DrawCommand => ({
            kind: 'line',
            ...line,
            stroke: { width: ring === 0 ? PENS.thick : PENS.medium, colour: INK },
          })),
        ),
      ],
    },
    { name: 'match lines', commands: lines },
    {
      name: 'figures',
      commands: [
        ...startOutline(facts, view, window),
        ...facts.points
          .map(({ at }) => paperFromGround(view, at))
          .filter((at) => insideBox(window, [at]))
          .map((centre): DrawCommand => ({
            kind: 'circle',
            centre,
            radius: 0.8,
            fill: PAPER,
            stroke: { width: PENS.thin, colour: INK },
          })),
        ...labels.commands.map((command) =>
          command.kind === 'text' ? { ...command, frame: FRAME } : command,
        ),
      ],
    },
  ];
}

function partView({ ground }: PlanPart, scale: number, window: PaperBox): PlanView {
  const { least, greatest } = ground;
  return {
    scale,
    ground: [(least[0] + greatest[0]) / 2, (least[1] + greatest[1]) / 2],
    at: [(window.left + window.right) / 2, (window.top + window.bottom) / 2],
  };
}

/** Units that stand in the window whole: a neighbour has those that do not. */
function unitsIn({ motif }: Laying, units: UnitSet, view: PlanView, window: PaperBox): UnitSet {
  const kept: number[] = [];
  for (let n = 0; n < units.count; n += 1) {
    const corners = unitCorners(motif[units.k[n]], units.x[n], units.y[n]);
    if (
      insideBox(
        window,
        corners.map((corner) => paperFromGround(view, corner)),
      )
    )
      kept.push(n);
  }
  return {
    count: kept.length,
    i: Int32Array.from(kept, (n) => units.i[n]),
    j: Int32Array.from(kept, (n) => units.j[n]),
    k: Uint8Array.from(kept, (n) => units.k[n]),
    x: Float64Array.from(kept, (n) => units.x[n]),
    y: Float64Array.from(kept, (n) => units.y[n]),
  };
}

function segmentsIn(chords: readonly PaperPoint[], window: PaperBox): readonly Segment[] {
  const [cx, cy] = [(window.left + window.right) / 2, (window.top + window.bottom) / 2];
  return chords.slice(1).flatMap(([x1, y1], n): Segment[] => {
    const [x0, y0] = chords[n];
    const range = rectangleClip(
      boxWidth(window) / 2,
      boxHeight(window) / 2,
      x0 - cx,
      y0 - cy,
      x1 - cx,
      y1 - cy,
    );
    if (!range || range[1] - range[0] < 1e-9) return [];
    const at = (t: number): PaperPoint => [x0 + (x1 - x0) * t, y0 + (y1 - y0) * t];
    return [{ from: at(range[0]), to: at(range[1]) }];
  });
}

/** Where neighbours begin, each named beside its line, outside the window. */
function matchLines(part: PlanPart, window: PaperBox, overlap: number): readonly DrawCommand[] {
  const { left, top, right, bottom } = window;
  const inner = {
    left: left + overlap,
    top: top + overlap,
    right: right - overlap,
    bottom: bottom - overlap,
  };
  const middle = [(left + right) / 2, (top + bottom) / 2] as const;
  const away = 3.2;
  const sides: readonly (readonly [string | null, PaperPoint, PaperPoint, PaperPoint, number])[] = [
    [part.left, [inner.left, top], [inner.left, bottom], [left - away, middle[1]], 90],
    [part.right, [inner.right, top], [inner.right, bottom], [right + away, middle[1]], 90],
    [part.above, [left, inner.top], [right, inner.top], [middle[0], top - away], 0],
    [part.below, [left, inner.bottom], [right, inner.bottom], [middle[0], bottom + away], 0],
  ];
  return sides.flatMap(([name, from, to, at, turnDeg]): readonly DrawCommand[] =>
    name === null
      ? []
      : [
          { kind: 'line', from, to, stroke: MATCH_STROKE },
          {
            kind: 'text',
            at: baselineCentred(at, LETTERING.small, turnDeg),
            text: `Match line: goes on at part ${name}. What is beyond the line is on both.`,
            height: LETTERING.small,
            weight: 600,
            anchor: 'middle',
            turnDeg,
            colour: INK,
            frame: FRAME,
          },
        ],
  );
}

function pointLabels(
  points: readonly NamedPoint[],
  view: PlanView,
  window: PaperBox,
): readonly WantedLabel[] {
  return points.flatMap(({ name, at }): WantedLabel[] => {
    const place = paperFromGround(view, at);
    if (!insideBox(window, [place])) return [];
    const width = textWidth(name, LETTERING.small, 700);
    const ways = [
      [0.7, -0.7],
      [-0.7, -0.7],
      [0.7, 0.7],
      [-0.7, 0.7],
    ] as const;
    const places = ways.flatMap((way) => placesOff(place, way, width, [1.4, 3, 5]));
    return [{ text: name, weight: 700, places: places.map((one) => ({ ...one, plate: true })) }];
  });
}

const startCorners = ({ laying, start }: PartFacts, view: PlanView): readonly PaperPoint[] => {
  if (!start) return [];
  const { laid, motif } = laying;
  return unitCorners(motif[laid.k[start.unit]], laid.x[start.unit], laid.y[start.unit]).map(
    (corner) => paperFromGround(view, corner),
  );
};

function startOutline(facts: PartFacts, view: PlanView, window: PaperBox): readonly DrawCommand[] {
  const points = startCorners(facts, view);
  return points.length > 0 && insideBox(window, points)
    ? [
        {
          kind: 'path',
          rings: [{ points, closed: true }],
          stroke: { width: PENS.thick, colour: INK },
        },
      ]
    : [];
}

function startLabel(facts: PartFacts, view: PlanView, window: PaperBox): readonly WantedLabel[] {
  const corners = startCorners(facts, view);
  if (corners.length === 0 || !insideBox(window, corners)) return [];
  const middle: PaperPoint = [
    (corners[0][0] + corners[2][0]) / 2,
    (corners[0][1] + corners[2][1]) / 2,
  ];
  const places: LabelPlace[] = [
    { middle, turnDeg: 0, plate: true },
    ...placesOff(middle, [0.7, -0.7], 2.4, [5, 8, 12]).map((one) => ({ ...one, plate: true })),
  ];
  return [{ text: 'S', weight: 700, places }];
}

/** Names and lengths along the edges of the perimeter, where enough of one is seen. */
function edgeLabels(
  laying: Laying,
  outlines: readonly (readonly (readonly Segment[])[])[],
  display: 'metric' | 'imperial',
): readonly WantedLabel[] {
  const { edges } = laying.ground.rings[0];
  return outlines[0].flatMap((segments, n): WantedLabel[] => {
    const longest = segments.reduce<Segment | null>(
      (best, one) => (best && length(best) >= length(one) ? best : one),
      null,
    );
    const text = `${edgeName(0, n, edges.length)} ${figureText(edges[n].length, display)}`;
    if (!longest || length(longest) < textWidth(text, LETTERING.small) + 2) return [];
    const edge: DimensionedEdge = { ...longest, label: text };
    return [{ text, places: [...placesAlong(edge, 3, false), ...placesAlong(edge, -3, true)] }];
  });
}

const length = ({ from, to }: Segment): number => Math.hypot(to[0] - from[0], to[1] - from[1]);
