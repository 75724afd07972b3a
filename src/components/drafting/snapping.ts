import type { Point } from '@/geometry/point';
import { MM_PER_FOOT, MM_PER_INCH, type Display } from '@/paving/length';
import type { Guide } from './table-store';

/** A line to snap to: through `anchor` along the unit vector `along`. */
export interface SnapLine {
  readonly anchor: Point;
  readonly along: Point;
}

export interface Snapped {
  readonly point: Point;
  readonly guides: readonly Guide[];
}

const METRIC_STEPS = [1, 5, 10, 50, 100, 500, 1000, 5000];
const IMPERIAL_STEPS = [
  MM_PER_INCH / 4,
  MM_PER_INCH,
  3 * MM_PER_INCH,
  6 * MM_PER_INCH,
  MM_PER_FOOT,
  5 * MM_PER_FOOT,
  10 * MM_PER_FOOT,
];
/** The grid is never finer than this on the screen, px. */
const LEAST_GRID_PX = 7;

/** The grid that the hand can aim at with this zoom, mm. */
export function gridStep(display: Display, scale: number): number {
  const steps = display === 'metric' ? METRIC_STEPS : IMPERIAL_STEPS;
  return steps.find((step) => step * scale >= LEAST_GRID_PX) ?? steps[steps.length - 1];
}

const onGrid = (value: number, step: number): number => {
  const snapped = Math.round(value / step) * step;
  return Math.round(snapped * 1e6) / 1e6;
};

export const gridPoint = ([x, y]: Point, step: number): Point => [onGrid(x, step), onGrid(y, step)];
export const gridLength = onGrid;

/** The axes, and along and square to a direction, as unit vectors. */
export function squareDirections(...directions: readonly Point[]): readonly Point[] {
  const found: Point[] = [
    [1, 0],
    [0, 1],
  ];
  for (const [x, y] of directions) {
    const length = Math.hypot(x, y);
    if (length === 0) continue;
    const [ux, uy] = [x / length, y / length];
    if (Math.min(Math.abs(ux), Math.abs(uy)) < 1e-9) continue;
    found.push([ux, uy], [-uy, ux]);
  }
  return found;
}

const offLine = (line: SnapLine, [x, y]: Point): number =>
  (x - line.anchor[0]) * -line.along[1] + (y - line.anchor[1]) * line.along[0];

const alongLine = (line: SnapLine, [x, y]: Point): number =>
  (x - line.anchor[0]) * line.along[0] + (y - line.anchor[1]) * line.along[1];

const atLine = (line: SnapLine, s: number): Point => [
  line.anchor[0] + line.along[0] * s,
  line.anchor[1] + line.along[1] * s,
];

function crossing(a: SnapLine, b: SnapLine): Point | null {
  const turn = a.along[0] * b.along[1] - a.along[1] * b.along[0];
  if (Math.abs(turn) < 0.1) return null;
  const [dx, dy] = [b.anchor[0] - a.anchor[0], b.anchor[1] - a.anchor[1]];
  return atLine(a, (dx * b.along[1] - dy * b.along[0]) / turn);
}

/**
 * Where the hand means, near `raw`: on a vertex; where two snap lines cross; on one line, at a whole
 * step of the grid along it; or on the grid.
 */
export function snapPoint(
  raw: Point,
  {
    vertices,
    lines,
    grid,
    reachMm,
  }: {
    readonly vertices: readonly Point[];
    readonly lines: readonly SnapLine[];
    readonly grid: number;
    readonly reachMm: number;
  },
): Snapped {
  const distance = (p: Point) => Math.hypot(p[0] - raw[0], p[1] - raw[1]);
  const vertex = vertices
    .filter((v) => distance(v) <= reachMm)
    .sort((a, b) => distance(a) - distance(b))[0];
  if (vertex) return { point: vertex, guides: [] };

  const near = lines
    .filter((line) => Math.abs(offLine(line, raw)) <= reachMm)
    .sort((a, b) => Math.abs(offLine(a, raw)) - Math.abs(offLine(b, raw)));
  if (near.length === 0) return { point: gridPoint(raw, grid), guides: [] };

  for (const second of near.slice(1)) {
    const point = crossing(near[0], second);
    if (point && distance(point) <= 1.5 * reachMm)
      return { point, guides: [near[0], second].map((line) => ({ from: line.anchor, to: point })) };
  }
  const point = atLine(near[0], onGrid(alongLine(near[0], raw), grid));
  return { point, guides: [{ from: near[0].anchor, to: point }] };
}
