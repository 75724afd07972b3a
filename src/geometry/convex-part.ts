import { planeHeight, type HalfPlane, type Plane } from './plane-pieces';
import type { Point } from './point';
import type { RegionBins } from './region-bins';
import { ringArea, ringHolds } from './ring';

/**
 * Parts of a region in convex pieces, and integrals over them. A region is rings whose signed areas
 * add up: outer ones anticlockwise, holes clockwise. A part is rings of the same kind, for integrals
 * alone: where a ring goes in and out of a piece several times, its part runs back along the piece's
 * side, which adds nothing to an area or an integral.
 */
export type SignedRings = readonly (readonly Point[])[];

/** The ring's part in a half plane (Sutherland and Hodgman), in the ring's own direction. */
export function ringInHalfPlane(ring: readonly Point[], side: HalfPlane): readonly Point[] {
  const heights = ring.map((point) => planeHeight(side, point));
  if (heights.every((height) => height >= 0)) return ring;
  const part: Point[] = [];
  for (let n = 0, m = ring.length - 1; n < ring.length; m = n++) {
    const [from, to] = [heights[m], heights[n]];
    if (from < 0 !== to < 0) {
      const t = from / (from - to);
      part.push([
        ring[m][0] + t * (ring[n][0] - ring[m][0]),
        ring[m][1] + t * (ring[n][1] - ring[m][1]),
      ]);
    }
    if (to >= 0) part.push(ring[n]);
  }
  return part.length < 3 ? [] : part;
}

/** The ring's part in every one of the half planes. */
const ringInSides = (ring: readonly Point[], sides: readonly HalfPlane[]): readonly Point[] =>
  sides.reduce((part, side) => (part.length === 0 ? part : ringInHalfPlane(part, side)), ring);

/** The box about a piece, parallel to the axes, mm. */
export interface PieceBox {
  readonly min: Point;
  readonly max: Point;
}

/** The least box that holds the points; upside down, from Infinity to -Infinity, without any. */
export function pointsBox(points: readonly Point[]): PieceBox {
  const min: [number, number] = [Infinity, Infinity];
  const max: [number, number] = [-Infinity, -Infinity];
  for (const [x, y] of points) {
    if (x < min[0]) min[0] = x;
    if (y < min[1]) min[1] = y;
    if (x > max[0]) max[0] = x;
    if (y > max[1]) max[1] = y;
  }
  return { min, max };
}

const boxRing = ({ min, max }: PieceBox): readonly Point[] => [
  min,
  [max[0], min[1]],
  max,
  [min[0], max[1]],
];

/** A convex part of the plane: its outline, anticlockwise, and the sides that bound it. */
export interface ConvexPiece {
  readonly outline: readonly Point[];
  readonly sides: readonly HalfPlane[];
}

/** Pieces of less than this, mm², are rounding where two borders fall together. */
const LEAST_PIECE_MM2 = 1e-6;

/** What of a box lies in every one of the sides; null where that is nothing. */
export function convexPiece(box: PieceBox, sides: readonly HalfPlane[]): ConvexPiece | null {
  const outline = ringInSides(boxRing(box), sides);
  return ringArea(outline) > LEAST_PIECE_MM2 ? { outline, sides } : null;
}

/** The part of a piece in a half plane; null where that is nothing. */
export function convexPieceIn(piece: ConvexPiece, side: HalfPlane): ConvexPiece | null {
  const outline = ringInHalfPlane(piece.outline, side);
  return ringArea(outline) > LEAST_PIECE_MM2 ? { outline, sides: [...piece.sides, side] } : null;
}

function meetsBox(ring: readonly Point[], { min, max }: PieceBox): boolean {
  for (let n = 0, m = ring.length - 1; n < ring.length; m = n++) {
    const [ax, ay] = ring[m];
    const [bx, by] = ring[n];
    if (
      Math.max(ax, bx) >= min[0] &&
      Math.min(ax, bx) <= max[0] &&
      Math.max(ay, by) >= min[1] &&
      Math.min(ay, by) <= max[1]
    )
      return true;
  }
  return false;
}

/** The region's part in a convex piece; quicker where many pieces are asked for with the region's bins. */
export function convexPart(
  region: SignedRings,
  { outline, sides }: ConvexPiece,
  bins?: RegionBins,
): SignedRings {
  const box = pointsBox(outline);
  const part: (readonly Point[])[] = [];
  for (const [n, ring] of region.entries()) {
    if (bins ? bins.meets(n, box) : meetsBox(ring, box)) {
      // By the sides themselves, not by the outline, whose short edges may have lost their direction.
      const within = ringInSides(ring, sides);
      if (within.length > 0) part.push(within);
    } else if (bins ? bins.holds(n, outline[0]) : ringHolds(ring, outline[0])) {
      // No chord comes near: the piece is all inside the ring.
      part.push(ringArea(ring) < 0 ? [...outline].reverse() : outline);
    }
  }
  return part;
}

/** What a plane comes to over a ring. */
export interface PlaneIntegral {
  /** Signed, mm². */
  readonly area: number;
  /** Of the plane's height over the area, mm³. */
  readonly volume: number;
}

/**
 * Area of a ring, and the volume between it and a plane over it: prisms over the triangles from its
 * first point, each its plan area times the mean of its three heights, which is exact for a plane.
 */
export function ringIntegral(ring: readonly Point[], plane: Plane): PlaneIntegral {
  let area = 0;
  let volume = 0;
  if (ring.length < 3) return { area, volume };
  const [x0, y0] = ring[0];
  const height0 = planeHeight(plane, ring[0]);
  let height1 = planeHeight(plane, ring[1]);
  for (let n = 1; n + 1 < ring.length; n++) {
    const [x1, y1] = ring[n];
    const [x2, y2] = ring[n + 1];
    const triangle = ((x1 - x0) * (y2 - y0) - (x2 - x0) * (y1 - y0)) / 2;
    const height2 = planeHeight(plane, ring[n + 1]);
    area += triangle;
    volume += (triangle * (height0 + height1 + height2)) / 3;
    height1 = height2;
  }
  return { area, volume };
}

/** The same over all rings of a region or a part. */
export function regionIntegral(rings: SignedRings, plane: Plane): PlaneIntegral {
  let area = 0;
  let volume = 0;
  for (const ring of rings) {
    const each = ringIntegral(ring, plane);
    area += each.area;
    volume += each.volume;
  }
  return { area, volume };
}
