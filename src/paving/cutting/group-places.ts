import { convexApart } from '@/geometry/convex-gap';
import type { Point } from '@/geometry/point';
import type { PieceShape, Place } from './piece-shape';

/** Pieces may come nearer to one another than the saw's cut by this, mm: shapes are rounded by about as much. */
export const PLACE_TOLERANCE_MM = 0.02;

/** Shares of a unit that add up to no more than this fit as far as shares go; it absorbs rounding only. */
const WHOLE_SHARE = 1 + 1e-6;

/** True when no share of a unit is spoken for more than once. */
export function sharesFit(shapes: readonly PieceShape[]): boolean {
  for (let share = 0; share < 3; share++) {
    let sum = 0;
    for (const shape of shapes) sum += shape.shares[share];
    if (sum > WHOLE_SHARE) return false;
  }
  return true;
}

/** Reach of a ring along a direction: least and greatest. */
function reach(ring: Place, [nx, ny]: Point): readonly [number, number] {
  let [least, greatest] = [Infinity, -Infinity];
  for (const [x, y] of ring) {
    const at = x * nx + y * ny;
    if (at < least) least = at;
    if (at > greatest) greatest = at;
  }
  return [least, greatest];
}

/** Directions square to the sides of all pieces. */
function sideNormals(places: readonly Place[]): Point[] {
  return places.flatMap((place) =>
    place.map(([ax, ay], n): Point => {
      const [bx, by] = place[(n + 1) % place.length];
      const length = Math.hypot(bx - ax, by - ay);
      return [(by - ay) / length, -(bx - ax) / length];
    }),
  );
}

/**
 * True when straight cuts right through, each a saw's width, part the pieces one after another. Pieces
 * in twos part whenever they are far enough apart; of more, only cuts along some piece's side are tried.
 */
export function partedByCuts(places: readonly Place[], kerf: number): boolean {
  const gap = kerf - PLACE_TOLERANCE_MM;
  if (places.length < 2) return true;
  if (places.length === 2) return convexApart(places[0], places[1], gap);
  for (const normal of sideNormals(places)) {
    const order = places
      .map((place) => ({ place, at: reach(place, normal) }))
      .sort((one, other) => one.at[0] - other.at[0]);
    let high = -Infinity;
    for (let n = 0; n + 1 < order.length; n++) {
      high = Math.max(high, order[n].at[1]);
      if (order[n + 1].at[0] < high + gap) continue;
      const near = order.slice(0, n + 1).map(({ place }) => place);
      const far = order.slice(n + 1).map(({ place }) => place);
      return partedByCuts(near, kerf) && partedByCuts(far, kerf);
    }
  }
  return false;
}

/**
 * Places for all the pieces in one unit, each at least the saw's cut from the others, or null when none
 * is found. For two pieces that are not loose every way is tried, so that null means that there is none.
 */
export function groupPlaces(shapes: readonly PieceShape[], kerf: number): Place[] | null {
  if (!sharesFit(shapes)) return null;
  const chosen: Place[] = [];
  const place = (n: number): boolean => {
    if (n === shapes.length) return partedByCuts(chosen, kerf);
    for (const next of shapes[n].places) {
      if (!chosen.every((other) => convexApart(other, next, kerf - PLACE_TOLERANCE_MM))) continue;
      chosen.push(next);
      if (place(n + 1)) return true;
      chosen.pop();
    }
    return false;
  };
  return place(0) ? chosen : null;
}

/** True when two pieces cannot come from one unit, whatever is tried. */
export function neverTogether(one: PieceShape, other: PieceShape, kerf: number): boolean {
  if (!sharesFit([one, other])) return true;
  return !one.loose && !other.loose && groupPlaces([one, other], kerf) === null;
}
