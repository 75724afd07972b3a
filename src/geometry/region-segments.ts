import { pointsBox, type ConvexPiece, type SignedRings } from './convex-part';
import { planeHeight, type Plane } from './plane-pieces';
import type { Point } from './point';
import type { RegionBins } from './region-bins';

/** A straight piece, mm. */
export interface Segment {
  readonly from: Point;
  readonly to: Point;
}

/** Parts shorter than this, mm, are touches. */
const SHORTEST_PART_MM = 1e-3;

const along = ({ from, to }: Segment, t: number): Point => [
  from[0] + t * (to[0] - from[0]),
  from[1] + t * (to[1] - from[1]),
];

const part = (segment: Segment, [start, end]: readonly [number, number]): Segment => ({
  from: start <= 0 ? segment.from : along(segment, start),
  to: end >= 1 ? segment.to : along(segment, end),
});

/** The stretches `[from, to]` of a segment, as shares of its length, that lie in the region (even-odd). */
function stretchesIn(region: SignedRings, segment: Segment): [number, number][] {
  const { from, to } = segment;
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const crossings: number[] = [];
  for (const ring of region)
    for (let n = 0, m = ring.length - 1; n < ring.length; m = n++) {
      const [ax, ay] = [ring[m][0] - from[0], ring[m][1] - from[1]];
      const [bx, by] = [ring[n][0] - from[0], ring[n][1] - from[1]];
      const a = dx * ay - dy * ax;
      const b = dx * by - dy * bx;
      if (a < 0 === b < 0) continue;
      const s = a / (a - b);
      const [x, y] = [ax + s * (bx - ax), ay + s * (by - ay)];
      crossings.push((x * dx + y * dy) / (dx * dx + dy * dy));
    }
  crossings.sort((p, q) => p - q);
  const stretches: [number, number][] = [];
  for (let n = 0; n + 1 < crossings.length; n += 2) {
    const [start, end] = [Math.max(0, crossings[n]), Math.min(1, crossings[n + 1])];
    if (end > start) stretches.push([start, end]);
  }
  return stretches;
}

/** The parts of a segment that lie in the region; quicker where many are asked for with the region's bins. */
export function segmentParts(region: SignedRings, segment: Segment, bins?: RegionBins): Segment[] {
  const { from, to } = segment;
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  if (length === 0) return [];
  if (bins) {
    const box = pointsBox([from, to]);
    if (!region.some((_, n) => bins.meets(n, box))) {
      // No chord comes near: it lies inside as a whole, or outside.
      const inside = region.filter((_, n) => bins.holds(n, from)).length % 2 === 1;
      return inside && length > SHORTEST_PART_MM ? [segment] : [];
    }
  }
  return stretchesIn(region, segment)
    .filter(([start, end]) => (end - start) * length > SHORTEST_PART_MM)
    .map((stretch) => part(segment, stretch));
}

/** The part of a segment in a convex piece; null where they do not meet. */
export function segmentInPiece(
  segment: Segment,
  { sides }: Pick<ConvexPiece, 'sides'>,
): Segment | null {
  let [start, end] = [0, 1];
  for (const side of sides) {
    const [a, b] = [planeHeight(side, segment.from), planeHeight(side, segment.to)];
    if (a < 0 && b < 0) return null;
    if (a < 0) start = Math.max(start, a / (a - b));
    else if (b < 0) end = Math.min(end, a / (a - b));
  }
  return end > start ? part(segment, [start, end]) : null;
}

/** Where a plane over a piece is at `height`: a segment across the piece, or null. */
export function contourInPiece(
  { outline }: ConvexPiece,
  plane: Plane,
  height: number,
): Segment | null {
  const ends: Point[] = [];
  outline.forEach((to, n) => {
    const from = outline[(n + outline.length - 1) % outline.length];
    const [a, b] = [planeHeight(plane, from) - height, planeHeight(plane, to) - height];
    if (a < 0 !== b < 0) ends.push(along({ from, to }, a / (a - b)));
  });
  return ends.length === 2 ? { from: ends[0], to: ends[1] } : null;
}
