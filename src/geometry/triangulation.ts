import Delaunator from 'delaunator';
import type { Point } from './point';
import { orientation } from './predicates';

/** Points joined to triangles that cover their convex hull (Delaunay), or in one line. */
export type Triangulation =
  | {
      readonly kind: 'triangles';
      /** Indices of each triangle's corners, anticlockwise. */
      readonly triangles: readonly (readonly [number, number, number])[];
      /** Indices round the outside, anticlockwise. */
      readonly rim: readonly number[];
    }
  /** Indices in order along the line; one point, or none, is a line too. */
  | { readonly kind: 'line'; readonly order: readonly number[] };

/** The one way to the triangulation library. Points must be apart from one another. */
export function triangulation(points: readonly Point[]): Triangulation {
  if (points.length < 3) return pointsInLine(points);
  // From the first point on, so that nothing is lost far from the origin.
  const [[x0, y0]] = points;
  const near = points.map(([x, y]): Point => [x - x0, y - y0]);
  const { triangles: flat } = new Delaunator(Float64Array.from(near.flat()));
  const triangles: [number, number, number][] = [];
  for (let n = 0; n < flat.length; n += 3) {
    const [p, q, r] = [flat[n], flat[n + 1], flat[n + 2]];
    const turn = orientation(near[p], near[q], near[r]);
    if (turn !== 0) triangles.push(turn > 0 ? [p, q, r] : [p, r, q]);
  }
  if (triangles.length === 0) return pointsInLine(points);
  return { kind: 'triangles', triangles, rim: rimOf(triangles) };
}

function pointsInLine(points: readonly Point[]): Triangulation {
  const order = points.map((_, n) => n);
  order.sort((p, q) => points[p][0] - points[q][0] || points[p][1] - points[q][1]);
  return { kind: 'line', order };
}

/** Sides that only one triangle has, one after another. */
function rimOf(triangles: readonly (readonly [number, number, number])[]): number[] {
  const next = new Map<number, number>();
  const sides = new Set<string>();
  for (const triangle of triangles)
    triangle.forEach((from, n) => sides.add(`${from},${triangle[(n + 1) % 3]}`));
  for (const triangle of triangles)
    triangle.forEach((from, n) => {
      const to = triangle[(n + 1) % 3];
      if (!sides.has(`${to},${from}`)) next.set(from, to);
    });
  const [start] = next.keys();
  const rim = [start];
  for (let at = next.get(start)!; at !== start; at = next.get(at)!) {
    rim.push(at);
    if (rim.length > next.size) throw new Error(`the rim of the triangles does not close at ${at}`);
  }
  return rim;
}
