import type { Point } from '@/geometry/point';

/** The middle of the named points. */
function middle(points: readonly number[], at: (point: number) => Point): Point {
  let x = 0;
  let y = 0;
  for (const point of points) {
    x += at(point)[0];
    y += at(point)[1];
  }
  return [x / points.length, y / points.length];
}

/**
 * `places` moved and turned, neither scaled nor mirrored, so that the named points come as near as can be
 * to where `target` has them: the least sum of squares, which in the plane has this closed form (the
 * orthogonal Procrustes problem). One point is moved only; with none nothing is.
 */
export function placesAligned(
  places: readonly Point[],
  points: readonly number[],
  target: (point: number) => Point,
): Point[] {
  if (points.length === 0) return places.map(([x, y]) => [x, y]);
  const [mx, my] = middle(points, (point) => places[point]);
  const [tx, ty] = middle(points, target);
  let along = 0;
  let across = 0;
  for (const point of points) {
    const [x, y] = [places[point][0] - mx, places[point][1] - my];
    const [u, v] = [target(point)[0] - tx, target(point)[1] - ty];
    along += x * u + y * v;
    across += x * v - y * u;
  }
  const size = Math.hypot(along, across);
  const [cos, sin] = size > 0 ? [along / size, across / size] : [1, 0];
  return places.map(([x, y]) => [
    tx + cos * (x - mx) - sin * (y - my),
    ty + sin * (x - mx) + cos * (y - my),
  ]);
}

/** Root of the mean square of the distances between the same points of two lists. */
export function rmsApart(one: readonly Point[], other: readonly Point[]): number {
  const sum = one.reduce(
    (squares, [x, y], n) => squares + (x - other[n][0]) ** 2 + (y - other[n][1]) ** 2,
    0,
  );
  return one.length > 0 ? Math.sqrt(sum / one.length) : 0;
}
