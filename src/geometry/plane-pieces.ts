import type { Point } from './point';

/** A height over the plane: `a·x + b·y + c`; x and y in mm, the height in mm. */
export interface Plane {
  readonly a: number;
  readonly b: number;
  readonly c: number;
}

/** Where `a·x + b·y + c` is nought or more. */
export type HalfPlane = Plane;

/** A plane over a convex part of the ground: the part that lies in every one of `sides`. */
export interface PlanePiece {
  readonly plane: Plane;
  readonly sides: readonly HalfPlane[];
}

/** A height everywhere: pieces that cover the whole plane and meet along their sides. */
export type PieceSurface = readonly PlanePiece[];

export const planeHeight = ({ a, b, c }: Plane, [x, y]: Point): number => a * x + b * y + c;

/** The plane with slopes `a` and `b` that has `height` at `at`. */
export const planeThrough = (a: number, b: number, at: Point, height: number): Plane => ({
  a,
  b,
  c: height - a * at[0] - b * at[1],
});

/** One plane less another. */
export const planeLess = (one: Plane, other: Plane): Plane => ({
  a: one.a - other.a,
  b: one.b - other.b,
  c: one.c - other.c,
});

/** Left of the line from `from` on through `to`. */
export function leftOf(from: Point, to: Point): HalfPlane {
  const [a, b] = [from[1] - to[1], to[0] - from[0]];
  return planeThrough(a, b, from, 0);
}

/** How deep `point` lies inside the piece, in the sides' own measure; negative outside. */
const depth = ({ sides }: PlanePiece, point: Point): number =>
  sides.reduce(
    (least, side) => Math.min(least, planeHeight(side, point) / Math.hypot(side.a, side.b)),
    Infinity,
  );

/** The piece that `point` lies in; on a border any of those that meet there. */
export function pieceAt(surface: PieceSurface, point: Point): PlanePiece {
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
