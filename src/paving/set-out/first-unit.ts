import type { Point } from '@/geometry/point';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import { unitCorners, type Laying } from '../laying';
import type { WorkStart } from './course-numbers';
import type { CourseIndex } from './courses';
import type { Course, FirstUnit } from './set-out-types';

/** A corner of a laid unit; `nearest` is which of its four. */
export interface UnitCorner {
  readonly unit: number;
  readonly nearest: number;
  readonly at: Point;
}

const courseUnits = ({ runs }: Course) => runs.flatMap((run) => run.laid);

/**
 * The units that work may start with: those of the two outermost courses, so that it goes through the floor one way.
 */
export function outermostUnits({ courses }: CourseIndex): readonly number[] {
  if (courses.length === 0) return [];
  const last = courses.length > 1 ? courseUnits(courses[courses.length - 1]) : [];
  return [...courseUnits(courses[0]), ...last];
}

/** Of those units' corners the nearest to a point: one, or several that are as near to 0.01 mm. */
export function nearestCorners(
  { laid, motif }: Laying,
  units: readonly number[],
  [px, py]: Point,
): UnitCorner[] {
  const found = units.flatMap((unit) =>
    unitCorners(motif[laid.k[unit]], laid.x[unit], laid.y[unit]).map((at, nearest) => ({
      unit,
      nearest,
      at,
      distance: Math.hypot(at[0] - px, at[1] - py),
    })),
  );
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

/** The outermost course that the corner's unit is in. */
export const workStart = (
  { courses, courseOf }: CourseIndex,
  corner: UnitCorner | null,
): WorkStart =>
  corner && courseOf[corner.unit] === courses.length - 1 && courses.length > 1
    ? 'last-row'
    : 'first-row';

/** The unit to lay first, given its corner nearest to the first datum and the courses in the order of the work. */
export function firstUnit(
  laying: Laying,
  courses: readonly Course[],
  { unit, nearest }: UnitCorner,
  first: Point,
  second: Point,
): FirstUnit {
  const { laid, motif } = laying;
  const [course] = courses;
  const bearing = (from: Point, to: Point) => Math.atan2(to[1] - from[1], to[0] - from[0]);
  const turn = ((bearing(course.from, course.to) - bearing(first, second)) * 180) / Math.PI;
  return {
    unit,
    unitId: motif[laid.k[unit]].unit.id,
    course: course.number,
    place: courseUnits(course).indexOf(unit) + 1,
    corners: unitCorners(motif[laid.k[unit]], laid.x[unit], laid.y[unit]),
    nearest,
    turnDeg: 90 - ((((90 - turn) % 180) + 180) % 180),
  };
}
