import type { SignedRings } from '@/geometry/convex-part';
import { regionClip, type Region } from '@/geometry/clipping';
import type { Point } from '@/geometry/point';
import { orientation } from '@/geometry/predicates';
import { ringArea } from '@/geometry/ring';
import type { Ground } from '@/paving/ground';

/** At a corner sharper than this the overdig is cut off square, at its own distance from the corner. */
const SHARPEST_MITRE = Math.cos((60 * Math.PI) / 180);

/** The ground as rings whose areas add up: the perimeter, and the keep-outs run backwards. */
export const groundRegion = (ground: Ground): SignedRings =>
  ground.rings.map(({ ring, outline }) => (ring === 0 ? outline : [...outline].reverse()));

/** What a digger takes outside one corner of the outline: square to both edges, to a point where they meet. */
function cornerOverdig(
  before: Point,
  corner: Point,
  after: Point,
  overdig: number,
): Point[] | null {
  if (orientation(before, corner, after) <= 0) return null;
  const outward = (from: Point, to: Point): Point => {
    const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
    return [(to[1] - from[1]) / length, (from[0] - to[0]) / length];
  };
  const [p, q] = [outward(before, corner), outward(corner, after)];
  const at = ([x, y]: Point, by: number): Point => [corner[0] + x * by, corner[1] + y * by];
  const cosine = p[0] * q[0] + p[1] * q[1];
  const middle: Point = [p[0] + q[0], p[1] + q[1]];
  const tip =
    cosine > -SHARPEST_MITRE
      ? [at(middle, overdig / (1 + cosine))]
      : [at([p[0] - p[1], p[1] + p[0]], overdig), at([q[0] + q[1], q[1] - q[0]], overdig)];
  return [corner, at(p, overdig), ...tip, at(q, overdig)];
}

/**
 * What is dug: the perimeter and a strip of `overdig` mm round it, less the keep-outs. Null when
 * the clipping library cannot join them.
 */
export function dugRegion(ground: Ground, overdig: number): SignedRings | null {
  if (overdig === 0) return groundRegion(ground);
  const [{ outline }, ...keepOuts] = ground.rings;
  const strips: Region[] = [];
  outline.forEach((from, n) => {
    const before = outline[(n + outline.length - 1) % outline.length];
    const to = outline[(n + 1) % outline.length];
    const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
    const out: Point = [
      ((to[1] - from[1]) / length) * overdig,
      ((from[0] - to[0]) / length) * overdig,
    ];
    strips.push([
      [[from, [from[0] + out[0], from[1] + out[1]], [to[0] + out[0], to[1] + out[1]], to]],
    ]);
    const corner = cornerOverdig(before, from, to, overdig);
    if (corner) strips.push([[corner]]);
  });
  const joined = regionClip('union', [[outline]], strips);
  if (!joined.ok) return null;
  const direct = (ring: readonly Point[], hole: boolean) =>
    ringArea(ring) > 0 !== hole ? ring : [...ring].reverse();
  return [
    ...joined.region.flatMap((polygon) => polygon.map((ring, n) => direct(ring, n > 0))),
    ...keepOuts.map((keepOut) => [...keepOut.outline].reverse()),
  ];
}
