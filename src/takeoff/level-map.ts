import { convexPieceIn, pointsBox } from '@/geometry/convex-part';
import { planeHeight, planeTurned, type HalfPlane } from '@/geometry/plane-pieces';
import type { Point } from '@/geometry/point';
import {
  contourInPiece,
  segmentInPiece,
  segmentParts,
  type Segment,
} from '@/geometry/region-segments';
import { MM_PER_INCH, type Display } from '@/paving/length';
import type { EarthModel } from './earth-cells';

/** A line of one level on the existing ground. */
export interface Contour {
  /** Above the datum, mm. */
  readonly level: number;
  readonly segments: readonly Segment[];
}

/** The ground and what becomes of it, as lines on the ground, all within what is dug. */
export interface LevelMap {
  readonly contours: readonly Contour[];
  /** From one contour to the next, mm. */
  readonly interval: number;
  /** Where ground and formation meet: earth is dug on one side and base filled on the other. */
  readonly meeting: readonly Segment[];
  /** Hatching of what is dug, and of what is filled: lines one way and the other, told apart without colour. */
  readonly cut: readonly Segment[];
  readonly fill: readonly Segment[];
  /** Round the spots; outside it the ground is reckoned, not measured. */
  readonly rim: readonly Segment[];
}

const STEPS_MM = [1, 2, 5, 10, 20, 25, 50, 100, 200, 250, 500, 1000, 2000];
const STEPS_INCHES = [1 / 8, 1 / 4, 1 / 2, 1, 2, 3, 6, 12, 24, 48, 96];
/** A map of more contours than this is not read. */
const MOST_CONTOURS = 10;

/** The interval that people can reckon with and that keeps the contours few. */
export function contourInterval(range: number, display: Display): number {
  const steps = display === 'metric' ? STEPS_MM : STEPS_INCHES.map((step) => step * MM_PER_INCH);
  return steps.find((step) => range / step <= MOST_CONTOURS) ?? steps[steps.length - 1];
}

/** Hatching is so much apart, as a share of the ground's diagonal. */
const HATCH_SHARE = 1 / 55;
/** What is filled is hatched more closely, the other way. */
const FILL_CLOSER = 0.5;

/** Stretches that follow one another along a line, as one: pieces meet within a line of hatching. */
function joined(segments: readonly Segment[]): Segment[] {
  const sorted = [...segments].sort((p, q) => p.from[0] - q.from[0]);
  const all: Segment[] = [];
  for (const segment of sorted) {
    const last = all[all.length - 1];
    if (last && Math.abs(last.to[0] - segment.from[0]) < 1e-3)
      all[all.length - 1] = { from: last.from, to: segment.to };
    else all.push(segment);
  }
  return all;
}

/**
 * The hatching of what is dug (`sign` 1), in lines at 45° up, or filled (−1), at 45° down, `apart` mm from one
 * to the next. Each piece is hatched by the lines that cross it; what follows on along a line is one stretch.
 */
function hatching({ cells, dug, dugBins }: EarthModel, apart: number, sign: 1 | -1): Segment[] {
  const step = apart * Math.SQRT2;
  const lines = new Map<number, Segment[]>();
  for (const { piece, depth } of cells) {
    const part = convexPieceIn(piece, sign === 1 ? depth : planeTurned(depth));
    if (!part) continue;
    const { min, max } = pointsBox(part.outline);
    // A line is known by where it would cross y = 0.
    const [low, high] = span(part.outline.map(([x, y]) => x - sign * y));
    for (let n = Math.ceil(low / step); n * step <= high; n++) {
      const foot = n * step;
      const at = (x: number): Point => [x, sign * (x - foot)];
      const within = segmentInPiece({ from: at(min[0]), to: at(max[0]) }, part);
      if (!within) continue;
      const line = lines.get(n);
      if (line) line.push(within);
      else lines.set(n, [within]);
    }
  }
  return [...lines.values()].flatMap((line) =>
    joined(line).flatMap((stretch) => segmentParts(dug, stretch, dugBins)),
  );
}

const span = (values: readonly number[]): readonly [number, number] =>
  values.reduce(
    ([low, high], value) => [Math.min(low, value), Math.max(high, value)],
    [Infinity, -Infinity],
  );

function rimSegments({ existing: { spots, rim, shape } }: EarthModel): Segment[] {
  const closed = shape === 'triangles' ? rim : rim.slice(0, -1);
  return closed.map((n, place) => ({
    from: spots[n].at,
    to: spots[rim[(place + 1) % rim.length]].at,
  }));
}

/** A corner this near to a cell's border, mm, is in it. */
const BORDER_MM = 1e-3;

const sideDistance = (side: HalfPlane, point: Point): number =>
  planeHeight(side, point) / Math.hypot(side.a, side.b);

/** The level map of a floor's earth; without its hatching where it is drawn in haste. */
export function levelMap(model: EarthModel, display: Display, hatched = true): LevelMap {
  const { cells, dug, floorBins, dugBins, existing } = model;
  const points = dug.flat();
  const { min, max } = pointsBox(points);
  const heights = cells.flatMap(({ piece, existing: plane }) =>
    dugBins
      .cornersIn(pointsBox(piece.outline))
      .filter((point) => piece.sides.every((side) => sideDistance(side, point) >= -BORDER_MM))
      .map((point) => planeHeight(plane, point)),
  );
  const inside = existing.spots.filter(({ at }) => floorBins.holds(0, at));
  const [low, high] = span([...heights, ...inside.map(({ level }) => level)]);
  const interval = contourInterval(high - low, display);
  // Between spots outside, the ground may be higher or lower at the edge than at any corner.
  const [lowest, highest] = span([low, high, ...existing.spots.map(({ level }) => level)]);
  const from = Math.max(lowest, low - MOST_CONTOURS * interval);
  const to = Math.min(highest, high + MOST_CONTOURS * interval);
  const contours: Contour[] = [];
  for (let n = Math.ceil(from / interval); n * interval <= to; n++) {
    const level = n * interval;
    const segments = cells.flatMap(({ piece, existing: plane }) => {
      const across = contourInPiece(piece, plane, level);
      return across ? segmentParts(dug, across, dugBins) : [];
    });
    if (segments.length > 0) contours.push({ level, segments });
  }
  const meeting = cells.flatMap(({ piece, depth }) => {
    const across = contourInPiece(piece, depth, 0);
    return across ? segmentParts(dug, across, dugBins) : [];
  });
  const apart = Math.hypot(max[0] - min[0], max[1] - min[1]) * HATCH_SHARE;
  return {
    contours,
    interval,
    meeting,
    cut: hatched ? hatching(model, apart, 1) : [],
    fill: hatched ? hatching(model, apart * FILL_CLOSER, -1) : [],
    rim: rimSegments(model).flatMap((segment) => segmentParts(dug, segment, dugBins)),
  };
}
