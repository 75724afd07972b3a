import {
  beyond,
  leftOf,
  levelPlane,
  planeTurned,
  type PieceSurface,
  type Plane,
  type PlanePiece,
} from '@/geometry/plane-pieces';
import type { Point } from '@/geometry/point';
import { triangulation } from '@/geometry/triangulation';
import type { Spot } from '@/paving/levels';

/**
 * The existing ground between the spots and beyond them, mm above the datum.
 *
 * Between the spots it is their Delaunay triangles. Beyond them each place takes the level of the
 * **nearest place among them**: a strip along each side of the rim, level across it, and a wedge of
 * one level at each of its corners. So nothing is ever higher or lower than what was measured, the
 * surface has no step, and it is planes throughout. Spots in one line give strips along the line.
 */
export interface ExistingGround {
  /** As joined: their places on a grid of micrometres. */
  readonly spots: readonly Spot[];
  readonly surface: PieceSurface;
  /** Pieces of `surface` between the spots; those after them lie beyond. */
  readonly within: number;
  /** Corners of each triangle as indices of spots, in the order of the first pieces. */
  readonly triangles: readonly (readonly [number, number, number])[];
  /** Indices of spots round the triangles, anticlockwise; in order along the line where there are none. */
  readonly rim: readonly number[];
  /** What the spots came to: triangles, one line, or nothing measured. */
  readonly shape: 'triangles' | 'line' | 'none';
}

/** The level that ground without spots is reckoned at: the datum's. */
const ASSUMED_GROUND_MM = 0;

/** Spots are joined on a grid of whole micrometres, on which spots in one line are exactly so. */
const GRID_PER_MM = 1000;

const level = (height: number, sides: PlanePiece['sides'] = []): PlanePiece => ({
  plane: levelPlane(height),
  sides,
});

/** A plane along the line from one spot to another, level across it. */
function alongPlane(from: Spot, to: Spot): Plane {
  const [dx, dy] = [to.at[0] - from.at[0], to.at[1] - from.at[1]];
  const slope = (to.level - from.level) / (dx * dx + dy * dy);
  return { a: slope * dx, b: slope * dy, at: from.at, height: from.level };
}

/** A strip along the line from one spot to another, as wide as `sides` leave it. */
const strip = (from: Spot, to: Spot, sides: PlanePiece['sides'] = []): PlanePiece => ({
  plane: alongPlane(from, to),
  sides: [beyond(from.at, to.at), beyond(to.at, from.at), ...sides],
});

/** Past `here` as seen from `from`, at its level. */
const before = (here: Spot, from: Spot): Plane => planeTurned(beyond(here.at, from.at));

function lineSurface(spots: readonly Spot[]): PieceSurface {
  if (spots.length === 1) return [level(spots[0].level)];
  const [first, last] = [spots[0], spots[spots.length - 1]];
  return [
    ...spots.slice(1).map((to, n) => strip(spots[n], to)),
    level(first.level, [before(first, spots[1])]),
    level(last.level, [before(last, spots[spots.length - 2])]),
  ];
}

/** The existing ground by its spots, which must be apart from one another. */
export function existingGround(measured: readonly Spot[]): ExistingGround {
  if (measured.length === 0) {
    return {
      spots: [],
      surface: [level(ASSUMED_GROUND_MM)],
      within: 0,
      triangles: [],
      rim: [],
      shape: 'none',
    };
  }
  const [x0, y0] = measured[0].at;
  const grid = measured.map(({ at: [x, y] }): Point => [
    Math.round((x - x0) * GRID_PER_MM),
    Math.round((y - y0) * GRID_PER_MM),
  ]);
  const spots = measured.map((spot, n): Spot => ({
    ...spot,
    at: [x0 + grid[n][0] / GRID_PER_MM, y0 + grid[n][1] / GRID_PER_MM],
  }));
  const joined = triangulation(grid);
  if (joined.kind === 'line') {
    const surface = lineSurface(joined.order.map((n) => spots[n]));
    return { spots, surface, within: 0, triangles: [], rim: joined.order, shape: 'line' };
  }
  const { triangles, rim } = joined;
  const inside = triangles.map(([p, q, r]): PlanePiece => {
    // Slopes from whole micrometres: of a thin triangle they would be lost in rounding.
    const [ux, uy] = [grid[q][0] - grid[p][0], grid[q][1] - grid[p][1]];
    const [vx, vy] = [grid[r][0] - grid[p][0], grid[r][1] - grid[p][1]];
    const [uz, vz] = [spots[q].level - spots[p].level, spots[r].level - spots[p].level];
    const scale = GRID_PER_MM / (ux * vy - uy * vx);
    return {
      plane: {
        a: (uz * vy - uy * vz) * scale,
        b: (ux * vz - uz * vx) * scale,
        at: spots[p].at,
        height: spots[p].level,
      },
      sides: [
        leftOf(spots[p].at, spots[q].at),
        leftOf(spots[q].at, spots[r].at),
        leftOf(spots[r].at, spots[p].at),
      ],
    };
  });
  const outside = rim.flatMap((n, place): PlanePiece[] => {
    const last = spots[rim[(place + rim.length - 1) % rim.length]];
    const [here, next] = [spots[n], spots[rim[(place + 1) % rim.length]]];
    return [
      // Round the corner: past this spot as seen along both sides that meet in it.
      level(here.level, [before(here, next), before(here, last)]),
      strip(here, next, [leftOf(next.at, here.at)]),
    ];
  });
  const surface = [...inside, ...outside];
  return { spots, surface, within: inside.length, triangles, rim, shape: 'triangles' };
}
