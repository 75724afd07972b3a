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

/**
 * What lies nearer to the boundary than the clearance: a strip along the ground's side of each chord
 * and, at corners that stand out into the ground, a part of a disc. Its arc is drawn outside the true
 * one, by no more than the sagitta of all arcs, so that no piece comes nearer than the clearance.
 */
function clearanceStrips(chords: readonly (Chord | null)[], clearance: number): Region[] {
  if (clearance === 0) return [];
  const moved = ([x, y]: Point, [nx, ny]: Point): Point => [x + clearance * nx, y + clearance * ny];
  return chords.flatMap((chord, n): Region[] => {
    if (!chord) return [];
    const { a, b } = chord;
    const normal = leftNormal(chord);
    const strip: Region = [[[a, b, moved(b, normal), moved(a, normal)]]];
    const next = chords[(n + 1) % chords.length];
    if (!next) return [strip];
    const turn = Math.atan2(
      cross(along(chord), along(next)),
      along(chord)[0] * along(next)[0] + along(chord)[1] * along(next)[1],
    );
    if (turn >= 0) return [strip];
    const from = moved(b, normal);
    const to = moved(b, leftNormal(next));
    return [strip, [[[b, ...arcPoints(from, to, Math.tan(turn / 4), 'tangent')]]]];
  });
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
  const { box, perimeter, keepOuts } = window;
  if (perimeter.length < 3) return [];
  const outer = windowChords(perimeter, box);
  if (keepOuts.length === 0 && turnsLeftOnly(perimeter)) {
    return convexCut(corners, outer, clearance);
  }
  // A keep-out's ground is outside it: taken the other way round, its ground is left of it too.
  const taken = keepOuts.map((ring): Region => [[ring]]);
  const strips = [perimeter, ...keepOuts.map((ring) => [...ring].reverse())].flatMap((ring) =>
    clearanceStrips(windowChords(ring, box), clearance),
  );
  const inside = areaInside(perimeter, corners);
  const open = keepOuts.reduce((sum, ring) => sum - areaInside(ring, corners), inside);
  for (const nudge of NUDGES_MM) {
    const shifted = corners.map(([x, y]): Point => [x + nudge, y + nudge]);
    const within = regionClip('intersection', [[shifted]], [[[perimeter]]], inside);
    if (!within.ok) continue;
    if (taken.length + strips.length === 0) return partsOf(within.region);
    // Keep-outs along an arc part from it by a sagitta, so that only floors without clearance add up.
    const rest = regionClip(
      'difference',
      within.region,
      [...taken, ...strips],
      clearance === 0 && keepOuts.length === 1 ? open : undefined,
    );
    if (rest.ok) return partsOf(rest.region);
  }
  return null;
}

const partsOf = (region: Region): readonly Part[] =>
  region.map((polygon) =>
    polygon.map((ring, n) => (ringArea(ring) > 0 === (n === 0) ? ring : [...ring].reverse())),
  );
