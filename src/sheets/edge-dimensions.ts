import type { DrawCommand, PaperPoint } from './drawing';
import { PENS } from './drawing';
import { INK } from './inks';
import type { LabelSpace, Segment } from './label-space';
import {
  insideBox,
  isFree,
  isInside,
  pointGap,
  segmentGap,
  segmentsCross,
  withLabels,
} from './label-space';
import { LETTERING, lineCorners, textWidth } from './text-measure';

/** A straight edge to be dimensioned outside its ring, which runs anticlockwise as seen. */
export interface DimensionedEdge {
  readonly from: PaperPoint;
  readonly to: PaperPoint;
  readonly label: string;
}

/** The outline that dimension lines keep clear of. */
export interface Outline {
  readonly points: readonly PaperPoint[];
  readonly segments: readonly Segment[];
}

/** Dimensions that found room, and the room that is left. */
export interface PlacedDimensions {
  readonly commands: readonly DrawCommand[];
  readonly space: LabelSpace;
  /** Indices of the edges that found no room. */
  readonly unplaced: readonly number[];
}

/** A dimension line already drawn, so that the next can line up with it. */
interface DrawnLine extends Segment {
  readonly normal: PaperPoint;
}

/** Offsets of a dimension line from its edge, mm: room for a gap figure between, then a step at a time. */
const FIRST_OFFSET = 8.5;
const OFFSET_STEP = 2;
const OFFSETS = 60;
/** Distances kept between a dimension line and the ring, mm: the first if there is room. */
const RING_CLEARANCES = [7.5, 3];
/** Dimension lines side by side stand at least this far apart, mm. */
const LINE_DISTANCE = 5;
/** Two lines closer than this in the same direction may be drawn as one chain. */
const CHAIN_REACH = 4;
const EXTENSION_GAP = 1;
const EXTENSION_PAST = 1.4;
const TICK = 1.1;
const TEXT_GAP = 1.2;

/** Dimension lines outside the ring, clear of it and of each other, longest first. */
export function edgeDimensions(
  edges: readonly DimensionedEdge[],
  ring: Outline,
  start: LabelSpace,
): PlacedDimensions {
  const order = edges
    .map((edge, index) => ({ index, edge, length: edgeLength(edge) }))
    .sort((p, q) => q.length - p.length);
  let space = start;
  let drawn: readonly DrawnLine[] = [];
  const commands: DrawCommand[] = [];
  const unplaced: number[] = [];
  for (const { index, edge } of order) {
    const placed = dimensionPlaced(edge, ring, space, drawn);
    if (!placed) {
      unplaced.push(index);
      continue;
    }
    commands.push(...placed.commands);
    drawn = [...drawn, placed.line];
    space = withLabels(space, [placed.corners], placed.lines);
  }
  return { commands, space, unplaced };
}

const edgeLength = ({ from, to }: Segment): number => Math.hypot(to[0] - from[0], to[1] - from[1]);

const shifted = ([x, y]: PaperPoint, [ux, uy]: PaperPoint, by: number): PaperPoint => [
  x + ux * by,
  y + uy * by,
];

/** The turn at which a text along a direction is read from the foot or the right of the sheet. */
export function readingTurn([ux, uy]: PaperPoint): number {
  const turn = (Math.atan2(-uy, ux) * 180) / Math.PI;
  if (turn > 90 + 1e-6) return turn - 180;
  return turn <= -90 + 1e-6 ? turn + 180 : turn;
}

/** The baseline point of a text whose capitals are centred on `middle`. */
export function baselineCentred([x, y]: PaperPoint, height: number, turnDeg: number): PaperPoint {
  const turn = (turnDeg * Math.PI) / 180;
  return [x + (Math.sin(turn) * height) / 2, y + (Math.cos(turn) * height) / 2];
}

function dimensionPlaced(
  edge: DimensionedEdge,
  ring: Outline,
  space: LabelSpace,
  drawn: readonly DrawnLine[],
) {
  const length = edgeLength(edge);
  if (length < 0.2) return null;
  const u: PaperPoint = [
    (edge.to[0] - edge.from[0]) / length,
    (edge.to[1] - edge.from[1]) / length,
  ];
  const outward: PaperPoint = [-u[1], u[0]];
  const height = LETTERING.small;
  const width = textWidth(edge.label, height);
  const turnDeg = readingTurn(u);
  const offsets = candidateOffsets(edge, outward, drawn);
  const tries = RING_CLEARANCES.flatMap((clearance) =>
    offsets.map((offset) => ({ clearance, offset })),
  );
  for (const { clearance, offset } of tries) {
    const line: DrawnLine = {
      from: shifted(edge.from, outward, offset),
      to: shifted(edge.to, outward, offset),
      normal: outward,
    };
    if (!insideBox(space.frame, [line.from, line.to])) continue;
    if (!lineIsClear(line, ring, drawn, clearance)) continue;
    const extensions = [edge.from, edge.to].map((corner) =>
      extensionLine(corner, outward, offset, ring),
    );
    if (extensions.some((extension) => extension === 'inside')) continue;
    const extensionLines = extensions.filter(
      (e): e is Segment => typeof e === 'object' && e !== null,
    );
    if (extensionLines.some((extension) => drawn.some((other) => segmentsCross(extension, other))))
      continue;
    if (space.lines.some((other) => segmentsCross(line, other))) continue;
    for (const { middle, centre, reach } of textPlaces(line, u, outward, length, width)) {
      const at = baselineCentred(middle, height, turnDeg);
      const corners = lineCorners({ at, height, anchor: 'middle', turnDeg }, width);
      const others = { ...space, lines: [...space.lines, ...ring.segments, ...extensionLines] };
      if (!isFree(others, corners)) continue;
      const stretches = lineStretches(line, u, centre, width / 2 + TEXT_GAP, reach);
      if (!stretches.every(({ from, to }) => lineAvoidsTexts({ from, to }, space))) continue;
      if (!extensionLines.every((extension) => lineAvoidsTexts(extension, space))) continue;
      const fine = { width: PENS.fine, colour: INK };
      const strokes: DrawCommand[] = [...stretches, ...extensionLines].map(({ from, to }) => ({
        kind: 'line',
        from,
        to,
        stroke: fine,
      }));
      return {
        line,
        corners,
        lines: [...stretches, ...extensionLines],
        commands: [
          ...strokes,
          tick(line.from, u, outward),
          tick(line.to, u, outward),
          {
            kind: 'text',
            at,
            text: edge.label,
            height,
            weight: 400,
            anchor: 'middle',
            turnDeg,
            colour: INK,
            frame: 'drawing',
          } satisfies DrawCommand,
        ],
      };
    }
  }
  return null;
}

/** Steps outward, but on a line already drawn that way where one is near. */
function candidateOffsets(
  edge: DimensionedEdge,
  outward: PaperPoint,
  drawn: readonly DrawnLine[],
): readonly number[] {
  const along = (point: PaperPoint) => point[0] * outward[0] + point[1] * outward[1];
  const aligned = drawn
    .filter(({ normal }) => normal[0] * outward[0] + normal[1] * outward[1] > 1 - 1e-6)
    .map((line) => along(line.from) - along(edge.from))
    .filter((offset) => offset >= FIRST_OFFSET - 2.5);
  const steps = Array.from({ length: OFFSETS }, (_, n) => FIRST_OFFSET + n * OFFSET_STEP).filter(
    (offset) => !aligned.some((other) => Math.abs(other - offset) < CHAIN_REACH),
  );
  return [...aligned, ...steps].sort((p, q) => p - q);
}

function lineIsClear(
  line: Segment,
  ring: Outline,
  drawn: readonly DrawnLine[],
  clearance: number,
): boolean {
  const middle: PaperPoint = [(line.from[0] + line.to[0]) / 2, (line.from[1] + line.to[1]) / 2];
  return (
    !isInside(middle, ring.points) &&
    !ring.segments.some((chord) => segmentGap(chord, line) < clearance) &&
    !drawn.some((other) => linesClash(line, other))
  );
}

/** Crossing, or side by side and too near; end to end in a chain is well. */
function linesClash(line: Segment, other: Segment): boolean {
  if (segmentsCross(line, other)) return true;
  const length = Math.max(1e-9, edgeLength(line));
  const u = [(line.to[0] - line.from[0]) / length, (line.to[1] - line.from[1]) / length];
  const place = (p: PaperPoint) => {
    const [x, y] = [p[0] - line.from[0], p[1] - line.from[1]];
    return { along: x * u[0] + y * u[1], across: Math.abs(x * u[1] - y * u[0]) };
  };
  const [from, to] = [place(other.from), place(other.to)];
  const overlap =
    Math.min(length, Math.max(from.along, to.along)) - Math.max(0, Math.min(from.along, to.along));
  return overlap > 0.3 && Math.min(from.across, to.across) < LINE_DISTANCE;
}

/**
 * From a corner outward to the dimension line: from beyond the last touch of the ring. `inside` when it would
 * cross the floor; null when there is nothing to draw.
 */
function extensionLine(
  corner: PaperPoint,
  outward: PaperPoint,
  offset: number,
  ring: Outline,
): Segment | 'inside' | null {
  const whole: Segment = { from: corner, to: shifted(corner, outward, offset) };
  const touches = [0];
  for (const chord of ring.segments) {
    for (const end of [chord.from, chord.to])
      if (pointGap(end, whole) < 0.05) touches.push(alongFrom(corner, outward, end));
    const crossing = crossingAlong(whole, chord, offset);
    if (crossing !== null) touches.push(crossing);
  }
  const stops = [...touches, offset].sort((p, q) => p - q);
  let begin = 0;
  for (let n = 1; n < stops.length; n += 1) {
    const [from, to] = [stops[n - 1], stops[n]];
    if (to - from < 0.1) {
      begin = n < stops.length - 1 ? to : begin;
      continue;
    }
    const middle = shifted(corner, outward, (from + to) / 2);
    const onRing = ring.segments.some((chord) => pointGap(middle, chord) < 0.05);
    if (onRing) begin = to;
    else if (isInside(middle, ring.points)) return 'inside';
    else if (n < stops.length - 1) begin = to;
  }
  return offset - begin < EXTENSION_GAP + 0.2
    ? null
    : {
        from: shifted(corner, outward, begin + EXTENSION_GAP),
        to: shifted(corner, outward, offset + EXTENSION_PAST),
      };
}

const alongFrom = (corner: PaperPoint, [ux, uy]: PaperPoint, point: PaperPoint): number =>
  (point[0] - corner[0]) * ux + (point[1] - corner[1]) * uy;

function crossingAlong(whole: Segment, chord: Segment, length: number): number | null {
  const [dx, dy] = [whole.to[0] - whole.from[0], whole.to[1] - whole.from[1]];
  const [ex, ey] = [chord.to[0] - chord.from[0], chord.to[1] - chord.from[1]];
  const cross = dx * ey - dy * ex;
  if (Math.abs(cross) < 1e-9) return null;
  const [fx, fy] = [chord.from[0] - whole.from[0], chord.from[1] - whole.from[1]];
  const t = (fx * ey - fy * ex) / cross;
  const s = (fx * dy - fy * dx) / cross;
  return t > 0 && t < 1 && s >= 0 && s <= 1 ? t * length : null;
}

/** Where the figure may stand: in a break of the line, outside it, or past either end. */
function textPlaces(
  line: Segment,
  u: PaperPoint,
  outward: PaperPoint,
  length: number,
  width: number,
) {
  const at = (along: number, out: number) => shifted(shifted(line.from, u, along), outward, out);
  const room = length - width - 2 * (TEXT_GAP + 1.6);
  const broken = [0.5, 0.36, 0.64]
    .filter((share) => room >= 0 && (share === 0.5 || Math.abs(share - 0.5) * length < room / 2))
    .map((share) => ({ middle: at(share * length, 0), centre: share * length, reach: 0 }));
  const past = TEXT_GAP + 1 + width / 2;
  return [
    ...broken,
    { middle: at(length / 2, 3.4), centre: null, reach: 0 },
    { middle: at(length + past, 0), centre: null, reach: TEXT_GAP + 0.4 },
    { middle: at(-past, 0), centre: null, reach: -TEXT_GAP - 0.4 },
  ];
}

/** The dimension line, broken for a figure centred `centre` along it, or run past an end. */
function lineStretches(
  { from, to }: Segment,
  u: PaperPoint,
  centre: number | null,
  half: number,
  reach: number,
): readonly Segment[] {
  if (centre === null)
    return [
      {
        from: reach < 0 ? shifted(from, u, reach) : from,
        to: reach > 0 ? shifted(to, u, reach) : to,
      },
    ];
  return [
    { from, to: shifted(from, u, centre - half) },
    { from: shifted(from, u, centre + half), to },
  ];
}

/** Whether a line runs clear of every figure placed so far. */
export function lineAvoidsTexts(line: Segment, space: LabelSpace): boolean {
  return isFree({ ...space, lines: [] }, [line.from, line.to]);
}

/** The oblique stroke that ends a dimension line. */
export function tick([x, y]: PaperPoint, [ux, uy]: PaperPoint, [nx, ny]: PaperPoint): DrawCommand {
  const [dx, dy] = [(ux - nx) * TICK * 0.707, (uy - ny) * TICK * 0.707];
  return {
    kind: 'line',
    from: [x - dx, y - dy],
    to: [x + dx, y + dy],
    stroke: { width: PENS.medium, colour: INK },
  };
}
