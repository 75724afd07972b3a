import type { Point } from '@/geometry/point';
import { keepOutName } from '../edge-names';
import type { Laying } from '../laying';
import { unitFind } from '../unit-rows';
import { courseFrame, type CourseFrame } from './course-frame';
import type { Course, CourseRun } from './set-out-types';
import { stringStretches, type Stretch } from './string-crossings';

/** A unit may reach over an edge by the tolerance, and its string with it; more than this is a fault, mm. */
const OFF_STRING_MM = 0.1;

/** A course's units, by place along it. */
interface CourseUnits {
  readonly set: number;
  readonly line: number;
  readonly units: number[];
}

/** The courses by rows, numbered alike; and which of them each laid unit is in, by its row less one, -1 for none. */
export interface CourseIndex {
  readonly courses: readonly Course[];
  readonly courseOf: Int32Array;
}

/** Every unit's line, and its number along it, from its address alone. */
function unitLines({ laid }: Laying, frame: CourseFrame) {
  const line = new Int32Array(laid.count);
  const place = new Float64Array(laid.count);
  const { mi, mj, ri, rj } = frame.steps;
  for (let n = 0; n < laid.count; n++) {
    const entry = frame.entries[laid.k[n]];
    const m = laid.i[n] * mi + laid.j[n] * mj;
    line[n] = laid.i[n] * ri + laid.j[n] * rj + entry.rows;
    place[n] = (m + entry.turns) * entry.inPeriod + entry.rank;
  }
  return { line, place };
}

function gathered(laying: Laying, frame: CourseFrame, line: Int32Array, place: Float64Array) {
  const { laid } = laying;
  const bySet = frame.lines.map(() => new Map<number, number[]>());
  for (let n = 0; n < laid.count; n++) {
    const lines = bySet[frame.entries[laid.k[n]].set];
    const units = lines.get(line[n]);
    if (units) units.push(n);
    else lines.set(line[n], [n]);
  }
  const courses: (CourseUnits & { v: number })[] = [];
  bySet.forEach((lines, set) => {
    for (const [at, units] of lines) {
      units.sort((one, other) => place[one] - place[other]);
      courses.push({ set, line: at, units, v: frame.lines[set] + at * frame.rise });
    }
  });
  return courses.sort((one, other) => one.v - other.v);
}

/** Address of the unit that is number `place` of the line. */
function addressAt(
  frame: CourseFrame,
  set: number,
  line: number,
  place: number,
): [number, number, number] {
  const k = frame.entries.findIndex(
    (entry) =>
      entry.set === set &&
      entry.rank === place - Math.floor(place / entry.inPeriod) * entry.inPeriod,
  );
  const entry = frame.entries[k];
  const m = Math.floor(place / entry.inPeriod) - entry.turns;
  const r = line - entry.rows;
  const { im, ir, jm, jr } = frame.back;
  return [m * im + r * ir + 0, m * jm + r * jr + 0, k];
}

/** Missing units looked at to tell whether they were all lifted. */
const MOST_MISSING = 10_000;

/** The stretch that holds u, or else the nearest. */
function stretchAt(stretches: readonly Stretch[], u: number): number {
  let nearest = -1;
  let least = Infinity;
  stretches.forEach(({ from, to }, n) => {
    const off = Math.max(0, from - u, u - to);
    if (off < least) {
      least = off;
      nearest = n;
    }
  });
  return least <= OFF_STRING_MM ? nearest : -1;
}

/**
 * The floor course by course: see `Course`. Units are told apart by their addresses, so that no rounding puts one
 * in the wrong course. Throws, with the place, when a string does not lie in the ground: a fault of the program.
 */
export function layingCourses(laying: Laying): CourseIndex {
  const { laid, ground, origin, motif } = laying;
  const courseOf = new Int32Array(laid.count).fill(-1);
  if (laid.count === 0) return { courses: [], courseOf };
  const frame = courseFrame(laying);
  const [dx, dy] = frame.direction;
  const { line, place } = unitLines(laying, frame);
  const groups = gathered(laying, frame, line, place);
  const stretchesOf = stringStretches(
    ground,
    origin,
    frame.direction,
    groups.map(({ v }) => v),
  );
  const onGround = (u: number, v: number): Point => [
    origin[0] + u * dx - v * dy,
    origin[1] + u * dy + v * dx,
  ];
  const touch = (unit: number): readonly [number, number] => {
    const entry = frame.entries[laid.k[unit]];
    const u = (laid.x[unit] - origin[0]) * dx + (laid.y[unit] - origin[1]) * dy;
    return [u + entry.from, u + entry.to];
  };
  const courses = groups.map(({ set, line: at, units, v }, n): Course => {
    const stretches = stretchesOf[n];
    const touches = units.map(touch);
    const middle = ([from, to]: readonly [number, number]) => (from + to) / 2;
    const first = stretchAt(stretches, middle(touches[0]));
    const last = stretchAt(stretches, middle(touches[touches.length - 1]));
    if (first < 0 || last < 0) {
      const [x, y] = onGround(touches[0][0], v);
      throw new Error(`the string of course ${n + 1} does not lie in the ground at [${x}, ${y}]`);
    }
    const start = Math.min(stretches[first].from, touches[0][0]);
    const end = Math.max(stretches[last].to, touches[touches.length - 1][1]);
    const outside = stretches.slice(first, last).map(({ to, toRing }, m) => ({
      from: to - start,
      to: stretches[first + m + 1].from - start,
      over: toRing === 0 ? 'the edge' : keepOutName(toRing),
    }));
    const byUnit: Record<string, number> = {};
    const runs: { after: CourseRun['after']; ticks: [number, number][]; laid: number[] }[] = [];
    units.forEach((unit, m) => {
      courseOf[unit] = n;
      const { id } = motif[laid.k[unit]].unit;
      byUnit[id] = (byUnit[id] ?? 0) + 1;
      const [from, to] = [touches[m][0] - start, touches[m][1] - start];
      const before = units[m - 1];
      if (m === 0 || place[unit] !== place[before] + 1) {
        runs.push({ after: m === 0 ? 'start' : breakBefore(m), ticks: [], laid: [] });
      }
      const run = runs[runs.length - 1];
      run.ticks.push([from, to]);
      run.laid.push(unit);
    });

    function breakBefore(m: number): CourseRun['after'] {
      const [before, after] = [units[m - 1], units[m]];
      const from = middle(touches[m - 1]) - start;
      const to = middle(touches[m]) - start;
      if (outside.some((gap) => gap.from >= from && gap.to <= to)) return 'outside';
      const missing = place[after] - place[before] - 1;
      if (missing > MOST_MISSING) return 'left-out';
      for (let p = place[before] + 1; p < place[after]; p++) {
        if (unitFind(laying.rows, laying.index.lifted, addressAt(frame, set, at, p)) < 0) {
          return 'left-out';
        }
      }
      return 'lifted';
    }

    return {
      number: n + 1,
      row: n + 1,
      from: onGround(start, v),
      to: onGround(end, v),
      length: end - start,
      units: units.length,
      byUnit,
      startGap: touches[0][0] - start,
      endGap: end - touches[touches.length - 1][1],
      step: n === 0 ? null : v - groups[n - 1].v,
      runs: runs.map(({ after, ticks, laid: members }) => ({
        from: ticks[0][0],
        to: ticks[ticks.length - 1][1],
        units: ticks.length,
        ticks,
        laid: members,
        after,
      })),
      outside,
    };
  });
  return { courses, courseOf };
}
