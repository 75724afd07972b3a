import type { Point } from './point';

/**
 * A height over the plane: `height` at `at`, growing by `a` a millimetre along x and by `b` along y, mm.
 * Held at a place near by, so that nothing is lost far from the origin.
 */
export interface Plane {
  readonly a: number;
  readonly b: number;
  readonly at: Point;
  readonly height: number;
}

/** Where the height is nought or more. */
export type HalfPlane = Plane;

/** A plane over a convex part of the ground: the part that lies in every one of `sides`. */
export interface PlanePiece {
  readonly plane: Plane;
  readonly sides: readonly HalfPlane[];
}

/** A height everywhere: pieces that cover the whole plane and meet along their sides. */
export type PieceSurface = readonly PlanePiece[];

/** Height of a plane over a point, mm. */
export const planeHeight = ({ a, b, at, height }: Plane, [x, y]: Point): number =>
  height + a * (x - at[0]) + b * (y - at[1]);

/** The same height everywhere. */
export const levelPlane = (height: number): Plane => ({ a: 0, b: 0, at: [0, 0], height });

/** One plane less another. */
export const planeLess = (one: Plane, other: Plane): Plane => ({
  a: one.a - other.a,
  b: one.b - other.b,
  at: one.at,
  height: one.height - planeHeight(other, one.at),
});

/** The plane upside down; of a half plane its other side. */
export const planeTurned = ({ a, b, at, height }: Plane): Plane => ({
  a: -a,
  b: -b,
  at,
  height: -height,
});

/** The plane higher by `by` mm. */
export const planeRaised = (plane: Plane, by: number): Plane => ({
  ...plane,
  height: plane.height + by,
});

/** Beyond the line through `from` square to the way to `to`: the side that `to` lies on. */
export const beyond = (from: Point, to: Point): HalfPlane => ({
  a: to[0] - from[0],
  b: to[1] - from[1],
  at: from,
  height: 0,
});

/** Left of the line from `from` on through `to`. */
export const leftOf = (from: Point, to: Point): HalfPlane => ({
  a: from[1] - to[1],
  b: to[0] - from[0],
  at: from,
  height: 0,
});

/** How deep `point` lies inside the piece, in the sides' own measure; negative outside. */
const depth = ({ sides }: PlanePiece, point: Point): number =>
  sides.reduce(
    (least, side) => Math.min(least, planeHeight(side, point) / Math.hypot(side.a, side.b)),
    Infinity,
  );

/** The piece that `point` lies in; on a border any of those that meet there. */
function pieceAt(surface: PieceSurface, point: Point): PlanePiece {
  // Nearly every point lies well inside one piece; most others are ruled out by their first side.
  const around = surface.find(({ sides }) => sides.every((side) => planeHeight(side, point) > 0));
  if (around) return around;
  let best = surface[0];
  let deepest = -Infinity;
  for (const piece of surface) {
    const here = depth(piece, point);
    if (here > deepest) [best, deepest] = [piece, here];
    if (here > 0) break;
  }
  return best;
}

/** Height of the surface at `point`, mm. */
export const surfaceHeight = (surface: PieceSurface, point: Point): number =>
  planeHeight(pieceAt(surface, point).plane, point);
