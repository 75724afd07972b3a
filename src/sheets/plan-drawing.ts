import type { GroundEdge } from '@/paving/ground';
import { unitCorners } from '@/paving/laying';
import type { DrawCommand, Layer, PaperBox, PaperPoint, PathRing } from './drawing';
import { PENS, boxRing } from './drawing';
import type { DimensionedEdge, Outline } from './edge-dimensions';
import { edgeDimensions, readingTurn, tick } from './edge-dimensions';
import { cornerName, keepOutName } from '@/paving/edge-names';
import { figureText, rangeText } from './figures';
import type { FloorDrawing } from './floor-drawing';
import { floorDrawing } from './floor-drawing';
import { INK, PAPER, inkMix } from './inks';
import type { KeepOutPlace } from './keep-out-place';
import type { LabelSpace, Segment } from './label-space';
import { isInside, withLabels } from './label-space';
import type { LabelPlace, PlacedLabels, WantedLabel } from './plan-labels';
import { cornerLetters, labelPlaced, labelsPlaced, placesAlong, placesOff } from './plan-labels';
import { liftedCommands } from './lifted-marks';
import { PART_STROKE } from './part-stroke';
import { PLAN_PIECES } from './piece-drawing';
import type { PlanFacts } from './plan-panel';
import type { PlanPart } from './plan-parts';
import type { PlanView } from './plan-view';
import { paperChords, paperFromGround } from './plan-view';
import { LETTERING, textFitted, textWidth } from './text-measure';

/** More edges than this are figured in the table only: figures round such a ring could not be read. */
const MOST_FIGURED_EDGES = 80;
/** Above this many laid units, or below this side on paper, courses are drawn. */
const MOST_UNITS = 30_000;
const LEAST_SIDE = 0.7;
/** Smaller units on paper than this are outlined lighter, mm, or their lines would darken the whole floor. */
const SMALL_SIDE = 2;

export interface PlanDrawing {
  readonly layers: readonly Layer[];
  readonly asCourses: boolean;
}

/** The figured floor inside `frame`: floor, dimensions, letters, gaps and start. */
export function planDrawing(facts: PlanFacts, view: PlanView, frame: PaperBox): PlanDrawing {
  const { laying, report } = facts.input;
  const { display } = laying.document;
  const side = Math.min(...laying.motif.map(({ unit }) => Math.min(unit.length, unit.width)));
  const unitInk = side / view.scale < SMALL_SIDE ? 0.4 : 0.75;
  const floor = floorDrawing(laying, view, {
    mostUnits: MOST_UNITS,
    leastSide: LEAST_SIDE,
    outline: { width: PENS.thick, colour: INK },
    keepOutStroke: { width: PENS.medium, colour: INK },
    unitStroke: { width: PENS.fine, colour: inkMix(PAPER, INK, unitInk) },
    markTone: true,
    pieces: PLAN_PIECES,
    grain: { spacing: 1.8, size: 0.3 },
  });
  const [perimeter, ...keepOuts] = laying.ground.rings;
  const lines = floor.rings.flatMap((ring) => ring.segments);
  let space: LabelSpace = { frame, outlines: [], lines: [] };
  const figures: DrawCommand[] = [];
  const take = (placed: PlacedLabels | null) => {
    if (!placed) return;
    figures.push(...placed.commands);
    space = placed.space;
  };

  // Straight edges outside, longest first; then arcs, corners, gaps.
  const paperEdge = (edge: GroundEdge): DimensionedEdge => ({
    from: paperFromGround(view, edge.start),
    to: paperFromGround(view, edge.end),
    label: figureText(edge.length, display),
  });
  const figured = perimeter.edges.length <= MOST_FIGURED_EDGES ? perimeter.edges : [];
  const straight = figured.filter((edge) => edge.bulge === 0).map(paperEdge);
  const dimensions = edgeDimensions(straight, floor.rings[0], space);
  take(dimensions);
  space = withLabels(space, [], lines);
  // Where no dimension line finds room, the bare figure stands along its edge.
  take(
    labelsPlaced(
      dimensions.unplaced.map((n) => ({
        text: straight[n].label,
        places: alongEdge(straight[n], straight[n].label),
      })),
      space,
    ),
  );
  take(
    labelsPlaced(
      figured
        .filter((edge) => edge.bulge !== 0)
        .map((edge) => arcLabel(edge, view, floor.rings[0], display)),
      space,
    ),
  );
  take(
    cornerLetters(
      figured.map((edge, n) => letteredCorner(figured, n, view)),
      space,
    ),
  );
  take(keepOutLabels(facts, view, floor, space));
  take(startMark(facts, view, space, lines));
  take(
    labelsPlaced(
      report.edges
        .filter((edge) => edge.ring === 0 && edge.least !== null && edge.greatest !== null)
        .filter((edge) => edge.edge < figured.length)
        .map((edge): WantedLabel => {
          const text = `gap ${rangeText(edge.least!, edge.greatest!, display)}`;
          const drawn = figured[edge.edge];
          const places =
            drawn.bulge === 0
              ? alongEdge(paperEdge(drawn), text).filter(({ plate }) => !plate)
              : alongArc(paperChords(view, drawn), floor.rings[0]);
          return { text, places };
        }),
      space,
    ),
  );

  take(labelsPlaced(facts.parts.map(partLabel(view)), space));

  return {
    asCourses: floor.asCourses,
    layers: [
      { name: 'fill', commands: floor.fill },
      { name: 'units', commands: floor.units },
      { name: 'lifted', commands: liftedCommands(laying, view) },
      { name: 'ground', commands: floor.outline },
      { name: 'keep-outs', commands: keepOuts.flatMap((ring) => crossCommands(ring.edges, view)) },
      {
        name: 'parts',
        commands: partLines(facts.parts, floor.rings[0], view),
      },
      { name: 'figures', commands: figures },
    ],
  };
}

const partRing = ({ ground: { least, greatest } }: PlanPart, view: PlanView): PathRing => {
  const [left, bottom] = paperFromGround(view, least);
  const [right, top] = paperFromGround(view, greatest);
  return boxRing({ left, top, right, bottom });
};

/** Between parts, as far as the ground reaches. */
function partLines(
  parts: readonly PlanPart[],
  { points }: Outline,
  view: PlanView,
): readonly DrawCommand[] {
  const [xs, ys] = [points.map(([x]) => x), points.map(([, y]) => y)];
  const within = (value: number, all: readonly number[]) =>
    Math.min(Math.max(value, Math.min(...all)), Math.max(...all));
  return parts.flatMap((part): DrawCommand[] => {
    const [from, , to] = partRing(part, view).points;
    const [left, right] = [within(from[0], xs), within(to[0], xs)];
    const [top, bottom] = [within(from[1], ys), within(to[1], ys)];
    const line = (start: PaperPoint, end: PaperPoint): DrawCommand => ({
      kind: 'line',
      from: start,
      to: end,
      stroke: PART_STROKE,
    });
    return [
      ...(part.right === null ? [] : [line([right, top], [right, bottom])]),
      ...(part.below === null ? [] : [line([left, bottom], [right, bottom])]),
    ];
  });
}

/** A part's name about its middle. */
const partLabel =
  (view: PlanView) =>
  (part: PlanPart): WantedLabel => {
    const { points } = partRing(part, view);
    const [left, top] = points[0];
    const [right, bottom] = points[2];
    const shares = [0.5, 0.35, 0.65, 0.2, 0.8];
    return {
      text: part.name,
      weight: 700,
      places: shares.flatMap((down) =>
        shares.map((along): LabelPlace => ({
          middle: [left + (right - left) * along, top + (bottom - top) * down],
          turnDeg: 0,
          plate: true,
        })),
      ),
    };
  };

/** Places along an edge that is long enough for the text: outside, then inside on a plate. */
function alongEdge(edge: DimensionedEdge, text: string): readonly LabelPlace[] {
  const room = Math.hypot(edge.to[0] - edge.from[0], edge.to[1] - edge.from[1]);
  return textWidth(text, LETTERING.small) <= room
    ? [...placesAlong(edge, 3, false), ...placesAlong(edge, -3, true)]
    : [];
}

/** Places along the outside of an arc, turned with it; the text's ends decide whether it clears the ring. */
function alongArc(chords: readonly PaperPoint[], ring: Outline): readonly LabelPlace[] {
  return [0.3, 0.7, 0.4, 0.6, 0.15, 0.85].flatMap((share) => {
    const n = Math.min(chords.length - 2, Math.floor(share * (chords.length - 1)));
    const [from, to] = [chords[n], chords[n + 1]];
    const along = unitVector([to[0] - from[0], to[1] - from[1]]);
    return [3, 3.8, 5]
      .map((distance): LabelPlace => ({
        middle: [from[0] - along[1] * distance, from[1] + along[0] * distance],
        turnDeg: readingTurn(along),
      }))
      .filter(({ middle }) => !isInside(middle, ring.points));
  });
}

/** Diagonals of a four-cornered keep-out; nothing on others. */
function crossCommands(edges: readonly GroundEdge[], view: PlanView): readonly DrawCommand[] {
  if (edges.length !== 4 || edges.some(({ bulge }) => bulge !== 0)) return [];
  const corners = edges.map(({ start }) => paperFromGround(view, start));
  return [0, 1].map((n) => ({
    kind: 'line',
    from: corners[n],
    to: corners[n + 2],
    stroke: { width: PENS.fine, colour: inkMix(PAPER, INK, 0.4) },
  }));
}

function unitVector([dx, dy]: PaperPoint): PaperPoint {
  const length = Math.hypot(dx, dy);
  return length < 1e-9 ? [0, -1] : [dx / length, dy / length];
}

/** The corner at the start of edge n, and the way out of the ring that halves its angle. */
function letteredCorner(edges: readonly GroundEdge[], n: number, view: PlanView) {
  const before = paperChords(view, edges[(n + edges.length - 1) % edges.length]);
  const after = paperChords(view, edges[n]);
  const at = after[0];
  const inward = unitVector([
    at[0] - before[before.length - 2][0],
    at[1] - before[before.length - 2][1],
  ]);
  const onward = unitVector([after[1][0] - at[0], after[1][1] - at[1]]);
  // The right-hand normals of both edges point out of a ring that runs anticlockwise.
  const outward = unitVector([-inward[1] - onward[1], inward[0] + onward[0]]);
  return { at, outward, name: cornerName(0, n) };
}

function arcLabel(
  edge: GroundEdge,
  view: PlanView,
  ring: Outline,
  display: 'metric' | 'imperial',
): WantedLabel {
  const chords = paperChords(view, edge);
  const chord = Math.hypot(edge.end[0] - edge.start[0], edge.end[1] - edge.start[1]);
  const radius = (chord * (1 + edge.bulge ** 2)) / (4 * Math.abs(edge.bulge));
  const text = `R ${figureText(radius, display)}, arc ${figureText(edge.length, display)}`;
  const width = textWidth(text, LETTERING.small);
  const places = [0.5, 0.35, 0.65, 0.2, 0.8].flatMap((share) => {
    const n = Math.min(chords.length - 2, Math.floor(share * (chords.length - 1)));
    const [from, to] = [chords[n], chords[n + 1]];
    const along = unitVector([to[0] - from[0], to[1] - from[1]]);
    const outward: PaperPoint = [-along[1], along[0]];
    return placesOff(from, outward, width, [3, 5, 8, 12]).filter(
      ({ middle }) => !isInside(middle, ring.points),
    );
  });
  return { text, places };
}

/** Keep-outs: name inside or on a leader, sizes along the inside of their edges, and the two placing dimensions. */
function keepOutLabels(
  { input, keepOuts }: PlanFacts,
  view: PlanView,
  floor: FloorDrawing,
  start: LabelSpace,
): PlacedLabels {
  const { laying } = input;
  const { display } = laying.document;
  let space = start;
  const commands: DrawCommand[] = [];
  const take = (placed: PlacedLabels | null): boolean => {
    if (!placed) return false;
    commands.push(...placed.commands);
    space = placed.space;
    return true;
  };
  for (const place of keepOuts) {
    const ring = laying.ground.rings[place.ring];
    const outline = floor.rings[place.ring].points;
    const middle = middleOf(outline);
    const code = keepOutName(place.ring);
    const full = textFitted(`${code} ${ring.name ?? ''}`.trim(), 60, LETTERING.small, 600);
    const inside = (text: string): WantedLabel => ({
      text,
      weight: 600,
      places: [{ middle, turnDeg: 0, plate: true }],
    });
    const contained = (text: string) => {
      const half = textWidth(text, LETTERING.small, 600) / 2 + 1;
      return [
        [-half, -2.2],
        [half, -2.2],
        [half, 2.2],
        [-half, 2.2],
      ].every(([dx, dy]) => isInside([middle[0] + dx, middle[1] + dy], outline));
    };
    const named = [full, code].find(contained);
    if (!named || !take(labelPlaced(inside(named), space)))
      take(
        labelPlaced(
          {
            text: code,
            weight: 600,
            places: [
              [0.7, -0.7],
              [-0.7, -0.7],
              [0.7, 0.7],
              [-0.7, 0.7],
            ].flatMap((outward) =>
              placesOff(
                middle,
                outward as unknown as PaperPoint,
                textWidth(code, LETTERING.small, 600),
                [6, 10, 15],
              ).map((spot) => ({ ...spot, plate: true })),
            ),
          },
          space,
        ),
      );
    if (place.size?.kind === 'circle') {
      const text = `R ${figureText(place.size.radius, display)}`;
      if (2 * (place.size.radius / view.scale) > textWidth(text, LETTERING.small) + 4)
        take(
          labelPlaced(
            { text, places: [{ middle: [middle[0], middle[1] + 4.6], turnDeg: 0, plate: true }] },
            space,
          ),
        );
    } else {
      take(labelsPlaced(sizeLabels(ring.edges, view, display, outline), space));
      take(labelsPlaced(cornerNames(ring.edges, place, view, outline), space));
    }
    for (const offset of place.offsets) take(placingDimension(offset, view, display, space));
  }
  return { commands, space };
}

function middleOf(points: readonly PaperPoint[]): PaperPoint {
  let [area, x, y] = [0, 0, 0];
  const [ox, oy] = points[0];
  points.forEach(([px, py], n) => {
    const [qx, qy] = points[(n + 1) % points.length];
    const cross = (px - ox) * (qy - oy) - (qx - ox) * (py - oy);
    area += cross;
    x += (px + qx - 2 * ox) * cross;
    y += (py + qy - 2 * oy) * cross;
  });
  return Math.abs(area) < 1e-9 ? points[0] : [ox + x / (3 * area), oy + y / (3 * area)];
}

/** Lengths along the inside of a keep-out's edges; the second of two equal ones is not repeated. */
function sizeLabels(
  edges: readonly GroundEdge[],
  view: PlanView,
  display: 'metric' | 'imperial',
  outline: readonly PaperPoint[],
): readonly WantedLabel[] {
  const rectangle = edges.length === 4;
  return (rectangle ? edges.slice(0, 2) : edges)
    .filter((edge) => edge.bulge === 0)
    .map((edge) => {
      const along = {
        from: paperFromGround(view, edge.start),
        to: paperFromGround(view, edge.end),
        label: figureText(edge.length, display),
      };
      const room = Math.hypot(along.to[0] - along.from[0], along.to[1] - along.from[1]);
      const fits = textWidth(along.label, LETTERING.small) + 2 <= room;
      const places = placesAlong(along, -2.6, true).filter(({ middle }) =>
        isInside(middle, outline),
      );
      return { text: along.label, places: fits ? places : [] };
    });
}

/** Small letters of a keep-out's corners, just inside them; the one that is measured to first. */
function cornerNames(
  edges: readonly GroundEdge[],
  { ring, corner }: KeepOutPlace,
  view: PlanView,
  outline: readonly PaperPoint[],
): readonly WantedLabel[] {
  const order = edges.map((_, n) => n).sort((p, q) => Number(q === corner) - Number(p === corner));
  return order.map((n) => {
    const { at, outward } = letteredCorner(edges, n, view);
    const places = [3.4, 4.4]
      .map((distance): PaperPoint => [at[0] - outward[0] * distance, at[1] - outward[1] * distance])
      .filter((middle) => isInside(middle, outline));
    return {
      text: cornerName(ring, n),
      places: places.map((middle) => ({ middle, turnDeg: 0, plate: true })),
    };
  });
}

/** A dimension over the floor, square from an edge to a keep-out's point. */
function placingDimension(
  offset: KeepOutPlace['offsets'][number],
  view: PlanView,
  display: 'metric' | 'imperial',
  space: LabelSpace,
): PlacedLabels | null {
  const [from, to] = [paperFromGround(view, offset.foot), paperFromGround(view, offset.to)];
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const text = figureText(offset.distance, display);
  if (length < textWidth(text, LETTERING.small) + 3) return null;
  const u = unitVector([to[0] - from[0], to[1] - from[1]]);
  const normal: PaperPoint = [-u[1], u[0]];
  const line = { from, to };
  const label = labelPlaced(
    { text, places: placesAlong({ from, to, label: text }, 0, true) },
    space,
  );
  if (!label) return null;
  return {
    commands: [
      { kind: 'line', ...line, stroke: { width: PENS.thin, colour: INK } },
      tick(from, u, normal),
      tick(to, u, normal),
      ...label.commands,
    ],
    space: withLabels(label.space, [], [line]),
  };
}

/** The first unit: drawn heavy, its measured corner dotted, and an S on it or beside it. */
function startMark(
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
