import {
  planeRaised,
  surfaceHeight,
  type HalfPlane,
  type PieceSurface,
} from '@/geometry/plane-pieces';
import type { Point } from '@/geometry/point';
import { rotation } from '@/geometry/rotation';
import { groundRing } from './ground';
import type { LayoutDocument } from './layout-document';
import { documentLevels, type Fall } from './levels';

type Levelled = Pick<LayoutDocument, 'ground' | 'levels'>;

/** Directions that a fall runs up in, one a plane, each with where its plane holds. */
interface Rise {
  /** Unit vector straight up the fall. */
  readonly up: Point;
  readonly sides: readonly HalfPlane[];
}

/** The planes of a fall, all nought at `foot`; one without a place of its own is held at `near`. */
function fallRises(
  fall: Fall,
  near: Point,
): { readonly foot: Point; readonly rises: readonly Rise[] } {
  switch (fall.kind) {
    case 'none':
      return { foot: near, rises: [{ up: [0, 0], sides: [] }] };
    case 'oneWay': {
      const [cos, sin] = rotation(fall.direction);
      return { foot: near, rises: [{ up: [-cos, -sin], sides: [] }] };
    }
    case 'toLine': {
      const { from, to } = fall;
      const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
      const left: Point = [(from[1] - to[1]) / length, (to[0] - from[0]) / length];
      const right: Point = [-left[0], -left[1]];
      return {
        foot: from,
        rises: [left, right].map((up) => ({
          up,
          sides: [{ a: up[0], b: up[1], at: from, height: 0 }],
        })),
      };
    }
    case 'toPoint': {
      const [cos, sin] = rotation(fall.direction);
      const ways: Point[] = [
        [cos, sin],
        [-sin, cos],
        [-cos, -sin],
        [sin, -cos],
      ];
      return {
        foot: fall.at,
        rises: ways.map((up, n) => {
          // The plane holds where its own way counts for no less than the ways beside it.
          const [before, after] = [ways[(n + 3) % 4], ways[(n + 1) % 4]];
          const sides = [before, after].map((beside) => ({
            a: up[0] - beside[0],
            b: up[1] - beside[1],
            at: fall.at,
            height: 0,
          }));
          return { up, sides };
        }),
      };
    }
  }
}

/**
 * The finished floor, compacted, as planes, mm above the datum. The finish level that the document
 * states is the highest of the floor: with a fall that is somewhere on the perimeter.
 */
export function finishSurface(document: Levelled): PieceSurface {
  const { finish, fall } = documentLevels(document);
  const { outline } = groundRing(document.ground.perimeter, 0, null);
  const { foot, rises } = fallRises(fall, outline[0]);
  const slope = fall.kind === 'none' ? 0 : fall.percent / 100;
  const surface = rises.map(({ up, sides }) => ({
    plane: { a: slope * up[0], b: slope * up[1], at: foot, height: 0 },
    sides,
  }));
  // Nowhere between two places is a fall higher than at the higher of them: its highest is a corner of the outline.
  const highest = outline.reduce(
    (most, point) => Math.max(most, surfaceHeight(surface, point)),
    -Infinity,
  );
  return surface.map(({ plane, sides }) => ({
    plane: planeRaised(plane, finish - highest),
    sides,
  }));
}

/** Level of the finished floor at a place, compacted, mm above the datum. */
export const finishLevel = (document: Levelled, point: Point): number =>
  surfaceHeight(finishSurface(document), point);
