import { latticeCell } from '@/geometry/lattice';
import type { Point } from '@/geometry/point';
import { pointTurned, rotation } from '@/geometry/rotation';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import type { Laying } from '../laying';

/**
 * The floor as strings see it: u along them, v square to them to the left, from the pattern's origin. A unit stands on the
 * line of its near side; lines of one set lie `rise` apart, and a bond may have several sets.
 */
export interface CourseFrame {
  readonly direction: Point;
  readonly normal: Point;
  /** From a unit to the next like it on its line; between the lines of a set; how far each line is shifted, mm. */
  readonly period: number;
  readonly rise: number;
  readonly shift: number;
  /** Whole steps along and across for an address: m = i·mi + j·mj, r = i·ri + j·rj; and back, i = m·im + r·ir … */
  readonly steps: {
    readonly mi: number;
    readonly mj: number;
    readonly ri: number;
    readonly rj: number;
  };
  readonly back: {
    readonly im: number;
    readonly ir: number;
    readonly jm: number;
    readonly jr: number;
  };
  /** Line of row 0 of each set, v. */
  readonly lines: readonly number[];
  readonly entries: readonly CourseEntry[];
}

/** One entry of the motif: where it touches the line, and its place among the units of a period. */
export interface CourseEntry {
  readonly set: number;
  /** The unit of row r touches line r + `rows` of its set. */
  readonly rows: number;
  /** Where it touches, u from the unit's centre; alike when it is a corner. */
  readonly from: number;
  readonly to: number;
  /** u of its centre in row 0, step 0. */
  readonly centre: number;
  /** On its line, the unit of step m is number (m + `turns`) · `inPeriod` + `rank`. */
  readonly turns: number;
  readonly rank: number;
  readonly inPeriod: number;
}

/** Steps of the lattice that are tried for the way of the strings, either way. */
const GREATEST_STEP = 6;
/** A way along the units' sides is taken unless its period is this many times longer than the lattice's own step. */
const GREATEST_PERIOD = 2;
/** Units whose near sides are this much out of line, mm, go by one string: no eye and no string is finer. */
export const SAME_STRING_MM = 1;
/** Sides nearer to the string's way than this sine are parallel to it. */
const PARALLEL_SINE = 1e-7;

/** What of a laying the frame hangs on. */
type Pattern = Pick<Laying, 'document' | 'lattice' | 'motif'>;

const dot = (one: Point, other: Point) => one[0] * other[0] + one[1] * other[1];
const cross = (one: Point, other: Point) => one[0] * other[1] - one[1] * other[0];

function commonDivisor(a: number, b: number): number {
  return b === 0 ? Math.abs(a) : commonDivisor(b, a % b);
}

/** The lattice step that strings follow: along a side of the first unit where one is short enough, else along `a`. */
function stringStep({ lattice, motif }: Pattern): readonly [number, number] {
  const size = (i: number, j: number) =>
    Math.hypot(i * lattice.a[0] + j * lattice.b[0], i * lattice.a[1] + j * lattice.b[1]);
  const limit = GREATEST_PERIOD * Math.hypot(...lattice.a) + LENGTH_TOLERANCE_MM;
  for (const side of motif.flatMap(({ halfLength, halfWidth }) => [halfLength, halfWidth])) {
    let best: readonly [number, number] | null = null;
    for (let i = -GREATEST_STEP; i <= GREATEST_STEP; i++) {
      for (let j = 0; j <= GREATEST_STEP; j++) {
        if (commonDivisor(i, j) !== 1) continue;
        const step: Point = [
          i * lattice.a[0] + j * lattice.b[0],
          i * lattice.a[1] + j * lattice.b[1],
        ];
        const length = size(i, j);
        if (length > limit) continue;
        if (Math.abs(cross(step, side)) > PARALLEL_SINE * length * Math.hypot(...side)) continue;
        if (!best || length < size(...best) - LENGTH_TOLERANCE_MM) best = [i, j];
      }
    }
    if (best) return best;
  }
  return [1, 0];
}

/** A step that with (i, j) makes a basis of all whole steps: i·q − j·p = 1, by Euclid's algorithm. */
function otherStep(i: number, j: number): readonly [number, number] {
  let [r0, r1] = [i, j];
  let [s0, s1, t0, t1] = [1, 0, 0, 1];
  while (r1 !== 0) {
    const times = Math.trunc(r0 / r1);
    [r0, r1] = [r1, r0 - times * r1];
    [s0, s1] = [s1, s0 - times * s1];
    [t0, t1] = [t1, t0 - times * t1];
  }
  // s0·i + t0·j = r0 = ±1
  return [-t0 * r0 + 0, s0 * r0 + 0];
}

/** The frame of a laying's courses. */
export function courseFrame(laying: Pattern): CourseFrame {
  const { lattice, motif } = laying;
  let [ci, cj] = stringStep(laying);
  const at = (i: number, j: number): Point => [
    i * lattice.a[0] + j * lattice.b[0],
    i * lattice.a[1] + j * lattice.b[1],
  ];
  const way = at(ci, cj);
  const size = Math.hypot(...way);
  // From left to right on the plan, upwards where upright.
  const upright = Math.abs(way[0]) <= 1e-9 * size;
  if (upright ? way[1] < 0 : way[0] < 0) [ci, cj] = [-ci + 0, -cj + 0];
  const along = at(ci, cj);
  const period = Math.hypot(...along);
  const direction: Point = [along[0] / period, along[1] / period];
  const normal: Point = [-direction[1], direction[0]];
  let [di, dj] = otherStep(ci, cj);
  if (dot(at(di, dj), normal) < 0) [di, dj] = [-di + 0, -dj + 0];
  const across = at(di, dj);
  const rise = Math.abs(latticeCell(lattice)) / period;
  const shift = dot(across, direction);
  const determinant = ci * dj - cj * di;

  const turned = rotation(laying.document.placement.turn);
  const feet = motif.map((entry) => {
    const own = pointTurned(entry.at, turned);
    const sides = [entry.halfLength, entry.halfWidth];
    const parallel = sides.find(
      (side) => Math.abs(dot(side, normal)) <= PARALLEL_SINE * Math.hypot(...side),
    );
    const reach = sides.reduce((sum, side) => sum + Math.abs(dot(side, normal)), 0);
    const half = parallel ? Math.abs(dot(parallel, direction)) : 0;
    // Its lowest corner: each half side taken the way that leads down.
    const corner = sides.reduce((sum, side) => {
      const down = dot(side, normal) > 0 ? -1 : 1;
      return sum + down * dot(side, direction);
    }, 0);
    const middle = parallel ? 0 : corner;
    return {
      line: dot(own, normal) - reach,
      centre: dot(own, direction),
      from: middle - half,
      to: middle + half,
    };
  });

  const firsts: number[] = [];
  const placed = feet.map(({ line }) => {
    for (let set = 0; set < firsts.length; set++) {
      const rows = Math.round((line - firsts[set]) / rise);
      if (Math.abs(line - firsts[set] - rows * rise) <= SAME_STRING_MM) return { set, rows };
    }
    firsts.push(line);
    return { set: firsts.length - 1, rows: 0 };
  });
  // The string runs by the lowest of its units, so that none lies over it.
  const lines = firsts.map((_, set) =>
    Math.min(
      ...feet.flatMap(({ line }, k) =>
        placed[k].set === set ? [line - placed[k].rows * rise] : [],
      ),
    ),
  );
  const starts = feet.map(({ centre, from }, k) => centre + from - placed[k].rows * shift);
  const entries = feet.map(({ centre, from, to }, k): CourseEntry => {
    const { set, rows } = placed[k];
    // A start that rounding puts just short of a whole period belongs to the next.
    const turns = Math.floor(starts[k] / period + 1e-9);
    const own = starts[k] - turns * period;
    const mates = starts.filter((_, other) => placed[other].set === set);
    const rank = starts.filter((start, other) => {
      if (placed[other].set !== set || other === k) return false;
      const theirs = start - Math.floor(start / period + 1e-9) * period;
      return theirs < own || (theirs === own && other < k);
    }).length;
    return { set, rows, from, to, centre, turns, rank, inPeriod: mates.length };
  });
  return {
    direction,
    normal,
    period,
    rise,
    shift,
    steps: {
      mi: dj / determinant + 0,
      mj: -di / determinant + 0,
      ri: -cj / determinant + 0,
      rj: ci / determinant + 0,
    },
    back: { im: ci, ir: di, jm: cj, jr: dj },
    lines,
    entries,
  };
}
