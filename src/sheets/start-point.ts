import type { Point } from '@/geometry/point';
import type { Laying } from '@/paving/laying';
import { unitCorners } from '@/paving/laying';

/** Where the first unit goes, measured from corner A of the perimeter. */
export interface StartPoint {
  /** Index into the laid units. */
  readonly unit: number;
  /** The corner of that unit nearest to A. */
  readonly corner: Point;
  /** From A along AB, mm; negative beyond A. For an arc AB, along its chord. */
  readonly along: number;
  /** Square to AB, to the inside, mm. */
  readonly square: number;
  /** Turn of the rows from AB, degrees anticlockwise, more than −90 and at most 90: a row runs both ways. */
  readonly turnDeg: number;
  readonly chord: boolean;
}

/** The laid unit with the corner nearest to the datum corner A; null when none is laid. */
export function startPoint(laying: Laying): StartPoint | null {
  const { laid, motif, document } = laying;
  const first = laying.ground.rings[0].edges[0];
  const [ax, ay] = first.start;
  const length = Math.hypot(first.end[0] - ax, first.end[1] - ay);
  const u: Point = [(first.end[0] - ax) / length, (first.end[1] - ay) / length];
  // Corners lie within half a diagonal of the centre, so that few units need their corners looked at.
  let nearest = Infinity;
  for (let n = 0; n < laid.count; n += 1)
    nearest = Math.min(nearest, Math.hypot(laid.x[n] - ax, laid.y[n] - ay));
  const reach = Math.max(0, ...motif.map(({ unit }) => Math.hypot(unit.length, unit.width)));
  let best: { unit: number; corner: Point; distance: number } | null = null;
  for (let n = 0; n < laid.count; n += 1) {
    if (Math.hypot(laid.x[n] - ax, laid.y[n] - ay) > nearest + reach) continue;
    for (const corner of unitCorners(motif[laid.k[n]], laid.x[n], laid.y[n])) {
      const distance = Math.hypot(corner[0] - ax, corner[1] - ay);
      // A tie within a thousandth of a millimetre goes to the corner further along AB.
      const gain = best ? best.distance - distance : Infinity;
      const further = best
        ? (corner[0] - best.corner[0]) * u[0] + (corner[1] - best.corner[1]) * u[1]
        : 0;
      if (gain > 1e-3 || (Math.abs(gain) <= 1e-3 && further > 1e-3))
        best = { unit: n, corner, distance };
    }
  }
  if (!best) return null;
  const [dx, dy] = [best.corner[0] - ax, best.corner[1] - ay];
  const turn = document.placement.turn - (Math.atan2(u[1], u[0]) * 180) / Math.PI;
  return {
    unit: best.unit,
    corner: best.corner,
    along: dx * u[0] + dy * u[1],
    square: dy * u[0] - dx * u[1],
    turnDeg: 90 - ((((90 - turn) % 180) + 180) % 180),
    chord: first.bulge !== 0,
  };
}
