import type { Point } from '@/geometry/point';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import type { Side, TapeCross } from './set-out-types';

/** A tape is read to this, either way, mm. */
export const TAPE_READING_MM = 2;
/** Tapes that meet flatter or sharper than this do not fix a point well, degrees. */
const LEAST_CROSSING_DEG = 30;

/** Rounding of an angle that is just 30° or 150°, degrees. */
const ANGLE_ROUNDING_DEG = 1e-7;

/** Distance along the line from `first` to `second`, and square to it, positive to the left, mm. */
export function runningOffsets(first: Point, second: Point, at: Point): Point {
  const dx = second[0] - first[0];
  const dy = second[1] - first[1];
  const length = Math.hypot(dx, dy);
  const px = at[0] - first[0];
  const py = at[1] - first[1];
  return [(px * dx + py * dy) / length + 0, (py * dx - px * dy) / length + 0];
}

/** The angle at which two tapes to `at` meet, degrees, 0 to 180. */
export function crossingAngle(first: Point, second: Point, at: Point): number {
  const ax = first[0] - at[0];
  const ay = first[1] - at[1];
  const bx = second[0] - at[0];
  const by = second[1] - at[1];
  return (Math.atan2(Math.abs(ax * by - ay * bx), ax * bx + ay * by) * 180) / Math.PI;
}

/**
 * How far from (along, square) the two arcs can cross when each tape, of true lengths `p` and `q`, is read
 * wrong by up to `reading`: the distance to the farthest of the four crossings with both tapes wrong by all of it; null when some do not cross.
 *
 * That this is the farthest of all errors: let the datums be at (0, 0) and (d, 0), s = p², t = q². The crossing has
 * x = (s − t + d²) / 2d and y = √(s − x²), and lies, squared, s − 2·x·x₀ − 2·y·y₀ + x₀² + y₀² from (x₀, y₀). x is linear
 * in s and t, so s − x² is concave and so is its root y; with y₀ > 0 the sum is convex, and a convex function on
 * a rectangle of s and t is greatest at a corner. To first order it is `reading` / min(sin γ/2, cos γ/2), γ the angle of crossing.
 */
export function tapeUncertainty(
  baseline: number,
  along: number,
  square: number,
  reading = TAPE_READING_MM,
): number | null {
  const height = Math.abs(square);
  const p = Math.hypot(along, height);
  const q = Math.hypot(along - baseline, height);
  let farthest = 0;
  for (const [dp, dq] of [
    [reading, reading],
    [reading, -reading],
    [-reading, reading],
    [-reading, -reading],
  ]) {
    if (p + dp < 0 || q + dq < 0) return null;
    // What the errors add to s and t is small beside them: kept apart, nothing is lost far out.
    const ds = dp * (2 * p + dp);
    const dt = dq * (2 * q + dq);
    const dx = (ds - dt) / (2 * baseline);
    const rise = height * height + ds - dx * (2 * along + dx);
    if (rise < 0) return null;
    farthest = Math.max(farthest, Math.hypot(dx, Math.sqrt(rise) - height));
  }
  return farthest;
}

/** How the point `at` lies to two corners that tapes are hooked on. All mm and degrees. */
export function tapeCross(first: Point, second: Point, at: Point): TapeCross {
  const baseline = Math.hypot(second[0] - first[0], second[1] - first[1]);
  const [along, square] = runningOffsets(first, second, at);
  const crossingDeg = crossingAngle(first, second, at);
  const side: Side = Math.abs(square) <= LENGTH_TOLERANCE_MM ? 'on' : square > 0 ? 'left' : 'right';
  const tapes = [
    Math.hypot(at[0] - first[0], at[1] - first[1]),
    Math.hypot(at[0] - second[0], at[1] - second[1]),
  ] as const;
  const uncertainty = tapeUncertainty(baseline, along, square);
  return {
    tapes,
    crossingDeg,
    side,
    uncertainty,
    clean: uncertainty !== null && tapesMeetCleanly(first, second, at),
  };
}

/** Across over along where two tapes meet at 30°. */
export const CLEAN_SLOPE = Math.tan(((LEAST_CROSSING_DEG - ANGLE_ROUNDING_DEG) * Math.PI) / 180);

/**
 * Tapes from there meet at `at` between 30° and 150°. The cross product of the ways back is |p||q| sin γ, the dot product
 * |p||q| cos γ, and 150° is 30° the other way: a comparison of the two, without an angle.
 */
export function tapesMeetCleanly(first: Point, second: Point, at: Point): boolean {
  const ax = first[0] - at[0];
  const ay = first[1] - at[1];
  const bx = second[0] - at[0];
  const by = second[1] - at[1];
  const across = Math.abs(ax * by - ay * bx);
  return across > 0 && across >= CLEAN_SLOPE * Math.abs(ax * bx + ay * by);
}
