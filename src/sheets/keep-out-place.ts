import type { Point } from '@/geometry/point';
import type { Ground, GroundRing } from '@/paving/ground';
import { ringCircle } from '@/paving/ring-circle';

/** A distance square from a straight perimeter edge to a point of a keep-out. */
export interface Offset {
  /** Index of the perimeter's edge. */
  readonly edge: number;
  readonly foot: Point;
  readonly to: Point;
  readonly distance: number;
}

/** How a keep-out is set out: one of its points by its distances from two edges. */
export interface KeepOutPlace {
  readonly ring: number;
  /** Index of the keep-out's corner; null for the centre of a round one. */
  readonly corner: number | null;
  readonly point: Point;
  /** Two where two straight edges face it, at an angle of 30° or more; else fewer. */
  readonly offsets: readonly Offset[];
  /** Straight to the two perimeter corners that fix it best: for where two edges do not. */
  readonly tapes: readonly { readonly corner: number; readonly distance: number }[];
  /** Length by width of a rectangle, radius of a circle; null for other outlines. */
  readonly size:
    | { readonly kind: 'rectangle'; readonly length: number; readonly width: number }
    | { readonly kind: 'circle'; readonly radius: number }
    | null;
}

/** Feet may lie this far beyond an edge's ends, mm: rounding, not a longer edge. */
const FOOT_TOLERANCE = 0.5;
/** Only the nearest corners are taped from. */
const MOST_TAPES = 12;
/** Edges nearer to parallel than this do not fix a point, radians. */
const LEAST_ANGLE = Math.PI / 6;
/** Two edges square to each other within 10° are taken before others: their tapes are easiest to hold. */
const NEARLY_SQUARE = (80 * Math.PI) / 180;

/** Where a keep-out is measured from: of its corners, or the middle of a round one, that with two edges nearest to it. */
export function keepOutPlace(ground: Ground, ring: GroundRing): KeepOutPlace {
  const circle = ringCircle(ring);
  const points = circle
    ? [{ corner: null, point: circle.centre }]
    : ring.edges.map((edge, corner) => ({ corner: corner as number | null, point: edge.start }));
  let best: KeepOutPlace | null = null;
  for (const { corner, point } of points) {
    const offsets = nearestPair(ground, point);
    const total = (list: readonly Offset[]) =>
      list.reduce((sum, { distance }) => sum + distance, 0);
    if (
      !best ||
      offsets.length > best.offsets.length ||
      (offsets.length === best.offsets.length && total(offsets) < total(best.offsets) - 1e-6)
    )
      best = { ring: ring.ring, corner, point, offsets, tapes: [], size: null };
  }
  const size = circle ? ({ kind: 'circle', radius: circle.radius } as const) : rectangleOf(ring);
  return { ...best!, tapes: tapePair(ground, best!.point), size };
}

function nearestPair(ground: Ground, point: Point): readonly Offset[] {
  const candidates = ground.rings[0].edges
    .filter((edge) => edge.bulge === 0)
    .flatMap((edge) => {
      const { start, end, length } = edge;
      const [ux, uy] = [(end[0] - start[0]) / length, (end[1] - start[1]) / length];
      const [dx, dy] = [point[0] - start[0], point[1] - start[1]];
      const along = dx * ux + dy * uy;
      const distance = dy * ux - dx * uy;
      if (along < -FOOT_TOLERANCE || along > length + FOOT_TOLERANCE || distance < 0) return [];
      const foot: Point = [start[0] + ux * along, start[1] + uy * along];
      return [{ edge: edge.edge, foot, to: point, distance, angle: Math.atan2(uy, ux) }];
    })
    .sort((p, q) => p.distance - q.distance);
  const [first] = candidates;
  if (!first) return [];
  const angled = (least: number) =>
    candidates.find(({ angle }) => Math.abs(Math.sin(angle - first.angle)) > Math.sin(least));
  const second = angled(NEARLY_SQUARE) ?? angled(LEAST_ANGLE);
  return second ? [first, second] : [first];
}

/** The two corners whose tapes cross nearest to square; the nearer pair of equals. */
function tapePair(ground: Ground, point: Point): KeepOutPlace['tapes'] {
  const tapes = ground.rings[0].edges
    .map(({ edge, start }) => ({
      corner: edge,
      distance: Math.hypot(start[0] - point[0], start[1] - point[1]),
      angle: Math.atan2(start[1] - point[1], start[0] - point[0]),
    }))
    .sort((p, q) => p.distance - q.distance)
    .slice(0, MOST_TAPES);
  let best: KeepOutPlace['tapes'] = [];
  let squarest = -1;
  tapes.forEach((first, n) => {
    for (const second of tapes.slice(n + 1)) {
      const sine = Math.abs(Math.sin(first.angle - second.angle));
      if (sine <= squarest + 1e-6) continue;
      squarest = sine;
      best = [first, second].map(({ corner, distance }) => ({ corner, distance }));
    }
  });
  return best;
}

function rectangleOf(ring: GroundRing): KeepOutPlace['size'] {
  const { edges } = ring;
  if (edges.length !== 4 || edges.some(({ bulge }) => bulge !== 0)) return null;
  const [p, q, r, s] = edges.map(({ length }) => length);
  const [a, b, c, d] = edges.map(({ start }) => start);
  const diagonals = [Math.hypot(c[0] - a[0], c[1] - a[1]), Math.hypot(d[0] - b[0], d[1] - b[1])];
  const square =
    Math.abs(p - r) < 0.5 && Math.abs(q - s) < 0.5 && Math.abs(diagonals[0] - diagonals[1]) < 0.5;
  return square ? { kind: 'rectangle', length: p, width: q } : null;
}
