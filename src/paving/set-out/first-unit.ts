import type { Point } from '@/geometry/point';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import { unitCorners, type Laying } from '../laying';
import type { CourseIndex } from './courses';
import type { FirstUnit } from './set-out-types';

/** A corner of a laid unit; `nearest` is which of its four. */
export interface UnitCorner {
  readonly unit: number;
  readonly nearest: number;
  readonly at: Point;
}

/** The laid units' corners that are nearest to a point: one, or several that are as near to 0.01 mm. */
export function nearestCorners({ laid, motif }: Laying, [px, py]: Point): UnitCorner[] {
  // Corners lie within half a diagonal of the centre: few units need theirs looked at.
  const far = new Float64Array(laid.count);
  let centre = Infinity;
  for (let n = 0; n < laid.count; n++) {
    far[n] = Math.hypot(laid.x[n] - px, laid.y[n] - py);
    centre = Math.min(centre, far[n]);
  }
  const reach = Math.max(0, ...motif.map(({ unit }) => Math.hypot(unit.length, unit.width)));
  const found: (UnitCorner & { distance: number })[] = [];
  for (let n = 0; n < laid.count; n++) {
    if (far[n] > centre + reach) continue;
    unitCorners(motif[laid.k[n]], laid.x[n], laid.y[n]).forEach((at, nearest) => {
      found.push({ unit: n, nearest, at, distance: Math.hypot(at[0] - px, at[1] - py) });
    });
  }
  const least = found.reduce((min, { distance }) => Math.min(min, distance), Infinity);
  return found
    .filter(({ distance }) => distance <= least + LENGTH_TOLERANCE_MM)
    .map(({ unit, nearest, at }) => ({ unit, nearest, at }));
}

/** Of corners as near, the one furthest along the baseline. */
export function cornerChosen(
  corners: readonly UnitCorner[],
  first: Point,
  second: Point,
): UnitCorner | null {
  const along = ({ at }: UnitCorner) =>
    (at[0] - first[0]) * (second[0] - first[0]) + (at[1] - first[1]) * (second[1] - first[1]);
  return corners.reduce<UnitCorner | null>(
    (best, corner) => (!best || along(corner) > along(best) ? corner : best),
    null,
  );
}

/**
 * The unit to lay first: that with the corner nearest to the first datum, in a tie the one further along
 * the baseline. Null when nothing is laid.
 */
export function firstUnit(
  laying: Laying,
  { courses, courseOf }: CourseIndex,
  first: Point,
  second: Point,
): FirstUnit | null {
  const { laid, motif } = laying;
  const chosen = cornerChosen(nearestCorners(laying, first), first, second);
  if (!chosen) return null;
  const { unit, nearest } = chosen;
  const course = courses[courseOf[unit]];
  const bearing = (from: Point, to: Point) => Math.atan2(to[1] - from[1], to[0] - from[0]);
  const turn = ((bearing(course.from, course.to) - bearing(first, second)) * 180) / Math.PI;
  const members = course.runs.flatMap((run) => run.laid);
  return {
    unit,
    unitId: motif[laid.k[unit]].unit.id,
    course: course.number,
    place: members.indexOf(unit) + 1,
    corners: unitCorners(motif[laid.k[unit]], laid.x[unit], laid.y[unit]),
    nearest,
    turnDeg: 90 - ((((90 - turn) % 180) + 180) % 180),
  };
}
