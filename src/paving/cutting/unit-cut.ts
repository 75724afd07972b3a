import { arcPoints } from '@/geometry/arc';
import { ringHalf, type Box } from '@/geometry/box-clip';
import { regionClip, type Region } from '@/geometry/clipping';
import type { Point } from '@/geometry/point';
import { ringArea } from '@/geometry/ring';
import type { GroundWindow } from './ground-windows';

/** A window reaches so much further than the clearance, mm, that nothing that matters lies on its sides. */
const WINDOW_MARGIN_MM = 1;
/** Corners this near to a window's side, mm, lie on it. */
const ON_WINDOW_MM = 1e-6;
/** Coordinates of pieces are whole micrometres, as the clipping library's are. */
const GRID_PER_MM = 1000;

/** One polygon of what is left of a unit: outer ring anticlockwise, holes clockwise, mm. */
export type Part = readonly (readonly Point[])[];

/** What is left of a unit; null where the clipping library fails on it however it is asked. */
export type UnitCut = readonly Part[] | null;

/** The part of the ground that bears on a unit with these corners. */
export function unitWindow(corners: readonly Point[], clearance: number): Box {
  const reach = clearance + WINDOW_MARGIN_MM;
  const xs = corners.map(([x]) => x);
  const ys = corners.map(([, y]) => y);
  return {
    min: [Math.min(...xs) - reach, Math.min(...ys) - reach],
    max: [Math.max(...xs) + reach, Math.max(...ys) + reach],
  };
}

/** A chord of the boundary, the ground on its left. */
interface Chord {
  readonly a: Point;
  readonly b: Point;
}

/** A ring's true chords in the window, in order, null where the ring goes along the window's side instead. */
function windowChords(ring: readonly Point[], { min, max }: Box): (Chord | null)[] {
  const on = (axis: 0 | 1, at: number, a: Point, b: Point) =>
    Math.abs(a[axis] - at) < ON_WINDOW_MM && Math.abs(b[axis] - at) < ON_WINDOW_MM;
  return ring.map((a, n) => {
    const b = ring[n + 1 === ring.length ? 0 : n + 1];
    const alongSide =
      on(0, min[0], a, b) || on(0, max[0], a, b) || on(1, min[1], a, b) || on(1, max[1], a, b);
    return alongSide ? null : { a, b };
  });
}

const cross = ([ax, ay]: Point, [bx, by]: Point): number => ax * by - ay * bx;
const along = ({ a, b }: Chord): Point => [b[0] - a[0], b[1] - a[1]];
const leftNormal = (chord: Chord): Point => {
  const [dx, dy] = along(chord);
  const length = Math.hypot(dx, dy);
  return [-dy / length, dx / length];
};

/** True when the ring turns left at every corner, so that what it holds is convex. */
function turnsLeftOnly(ring: readonly Point[]): boolean {
  const { length } = ring;
  return ring.every((corner, n) => {
    const before = ring[(n + length - 1) % length];
    const after = ring[(n + 1) % length];
    const from: Point = [corner[0] - before[0], corner[1] - before[1]];
    const to: Point = [after[0] - corner[0], after[1] - corner[1]];
    const turn = cross(from, to);
    return turn > 0 || (turn === 0 && from[0] * to[0] + from[1] * to[1] >= 0);
  });
}

/** Where the ground round a unit is convex, what is left is the unit less half-planes, one a chord. */
function convexCut(
  corners: readonly Point[],
  chords: readonly (Chord | null)[],
  clearance: number,
): readonly Part[] {
  let left = corners;
  for (const chord of chords) {
    if (!chord) continue;
    const [nx, ny] = leftNormal(chord);
    const [ax, ay] = chord.a;
    left = ringHalf(left, ([x, y]) => (x - ax) * nx + (y - ay) * ny - clearance);
  }
  const ring = left.map(([x, y]): Point => [
    Math.round(x * GRID_PER_MM) / GRID_PER_MM,
    Math.round(y * GRID_PER_MM) / GRID_PER_MM,
  ]);
  const simple = ring.filter((point, n) => {
    const next = ring[(n + 1) % ring.length];
    return point[0] !== next[0] || point[1] !== next[1];
  });
  return simple.length < 3 ? [] : [[simple]];
}

/** A band goes on round corners until it has turned by this: so it never meets itself. */
const GREATEST_BAND_TURN_RAD = (5 / 6) * Math.PI;

const moved = ([x, y]: Point, [nx, ny]: Point, by: number): Point => [x + by * nx, y + by * ny];

/** How far the boundary turns from one chord to the next, radians: negative where a corner stands out into the ground. */
const turnBetween = (chord: Chord, next: Chord): number => {
  const [one, other] = [along(chord), along(next)];
  return Math.atan2(cross(one, other), one[0] * other[0] + one[1] * other[1]);
};

/**
 * The line that keeps the clearance from chords which turn into the ground at every corner: straight along each
 * chord, an arc round each corner. The arc is drawn outside the true one, by no more than the sagitta of all arcs, so
 * that no piece comes nearer than the clearance.
 */
function clearanceLine(chords: readonly Chord[], clearance: number): Point[] {
  return chords.flatMap((chord, n): Point[] => {
    const normal = leftNormal(chord);
    const from = moved(chord.a, normal, clearance);
    const to = moved(chord.b, normal, clearance);
    const next = chords[n + 1];
    if (!next) return [from, to];
    const round = arcPoints(
      to,
      moved(next.a, leftNormal(next), clearance),
      Math.tan(turnBetween(chord, next) / 4),
      'tangent',
    );
    return [from, ...round.slice(0, -1)];
  });
}

/**
 * What lies nearer to the boundary than the clearance: bands along the ground's side of the chords, one for each run
 * of chords that turns into the ground. At corners that turn the other way two bands overlap.
 */
function clearanceBands(chords: readonly (Chord | null)[], clearance: number): Region[] {
  if (clearance === 0) return [];
  const turns = chords.map((chord, n) => {
    const next = chords[(n + 1) % chords.length];
    return chord && next ? turnBetween(chord, next) : 0;
  });
  // Begin where a run does, so that none is broken by where the ring begins.
  const first = Math.max(
    0,
    turns.findIndex((turn) => turn >= 0),
  );
  const runs: Chord[][] = [];
  let turned = 0;
  for (let step = 1; step <= chords.length; step++) {
    const n = (first + step) % chords.length;
    const chord = chords[n];
    const turn = turns[(n + chords.length - 1) % chords.length];
    const goesOn = step > 1 && chord && turn < 0 && turned - turn < GREATEST_BAND_TURN_RAD;
    if (goesOn) {
      runs[runs.length - 1].push(chord);
      turned -= turn;
      continue;
    }
    // Where a run was cut short the corner's arc goes with a chord of both.
    if (chord && turn < 0 && step > 1 && runs.length > 0) {
      runs.push([runs[runs.length - 1][runs[runs.length - 1].length - 1], chord]);
      turned = -turn;
    } else if (chord) {
      runs.push([chord]);
      turned = 0;
    }
  }
  return runs.map((run): Region => {
    const back = [run[run.length - 1].b, ...run.map(({ a }) => a).reverse()];
    return [[[...clearanceLine(run, clearance), ...back]]];
  });
}

/** A convex keep-out and all that is nearer to it than the clearance, as one ring. */
function grownKeepOut(ring: readonly Point[], clearance: number): Region {
  if (clearance === 0) return [[ring]];
  // The ground is right of its edges; taken the other way round it turns into the ground at every corner.
  const corners = [...ring].reverse();
  const chords = corners.map((a, n): Chord => ({ a, b: corners[(n + 1) % corners.length] }));
  return [[clearanceLine([...chords, chords[0]], clearance).slice(0, -2)]];
}

/** Signed area of the ring inside the unit, mm²: right also where the ring runs there and back. */
function areaInside(ring: readonly Point[], corners: readonly Point[]): number {
  const left = corners.reduce<readonly Point[]>((part, a, n) => {
    const b = corners[(n + 1) % corners.length];
    return ringHalf(part, ([x, y]) => cross([b[0] - a[0], b[1] - a[1]], [x - a[0], y - a[1]]));
  }, ring);
  return ringArea(left);
}

/** Coordinates from another place on, so that the grid falls elsewhere and the library meets other numbers. */
const NUDGES_MM = [0, 0.0005, 0.00025] as const;

/**
 * What is left of a unit when it is cut to the ground less everything nearer to the boundary than
 * the clearance. The area within the ground is checked against one worked out without the library.
 */
export function unitCut(
  corners: readonly Point[],
  window: GroundWindow,
  clearance: number,
): UnitCut {
  const { box, perimeter } = window;
  if (perimeter.length < 3) return [];
  const keepOuts = window.keepOuts.map(distinct).filter((ring) => ring.length >= 3);
  const outer = windowChords(perimeter, box);
  const convex = turnsLeftOnly(perimeter);
  const kept = convex ? convexCut(corners, outer, clearance) : null;
  if (kept && (keepOuts.length === 0 || kept.length === 0)) return kept;
  const taken = keepOuts.flatMap((ring): Region[] => {
    if (turnsLeftOnly(ring)) return [grownKeepOut(ring, clearance)];
    return [[[ring]], ...clearanceBands(windowChords([...ring].reverse(), box), clearance)];
  });
  if (!convex) taken.push(...clearanceBands(outer, clearance));
  const inside = areaInside(perimeter, corners);
  const open = keepOuts.reduce((sum, ring) => sum - areaInside(ring, corners), inside);
  for (const nudge of NUDGES_MM) {
    const shift = (ring: readonly Point[]) => ring.map(([x, y]): Point => [x + nudge, y + nudge]);
    let within: Region;
    if (kept) within = kept.map((part) => part.map(shift));
    else {
      const met = regionClip('intersection', [[shift(corners)]], [[[perimeter]]], inside);
      if (!met.ok) continue;
      within = met.region;
    }
    if (taken.length === 0 || within.length === 0) return partsOf(within);
    // Keep-outs along an arc part from it by a sagitta, so that only floors without clearance add up.
    const rest = regionClip(
      'difference',
      within,
      taken,
      clearance === 0 && keepOuts.length === 1 ? open : undefined,
    );
    if (rest.ok) return partsOf(rest.region);
  }
  return null;
}

/** A ring without corners that lie on one another. */
function distinct(ring: readonly Point[]): readonly Point[] {
  return ring.filter(([x, y], n) => {
    const [px, py] = ring[(n + ring.length - 1) % ring.length];
    return Math.hypot(x - px, y - py) > ON_WINDOW_MM;
  });
}

const partsOf = (region: Region): readonly Part[] =>
  region.map((polygon) =>
    polygon.map((ring, n) => (ringArea(ring) > 0 === (n === 0) ? ring : [...ring].reverse())),
  );
