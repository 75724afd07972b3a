import type { Point } from '@/geometry/point';
import { rectangleNearest } from '@/geometry/rectangle';
import { ringHolds } from '@/geometry/ring';
import type { Ground } from '../ground';
import type { LaidMotif } from '../laying';

/** Chords of the ground that are near enough to matter, by number. */
export type NearChords = readonly number[];

/** Distance from a point to chord n, mm. */
function centreDistance({ chords }: Ground, x: number, y: number, n: number): number {
  const ax = chords.ax[n] - x;
  const ay = chords.ay[n] - y;
  const dx = chords.bx[n] - chords.ax[n];
  const dy = chords.by[n] - chords.ay[n];
  const share = Math.max(0, Math.min(1, -(ax * dx + ay * dy) / (dx * dx + dy * dy || 1)));
  return Math.hypot(ax + share * dx, ay + share * dy);
}

/** The chords that come within `reach` of a unit of that half diagonal at (x, y). */
export function chordsNear(
  ground: Ground,
  x: number,
  y: number,
  halfDiagonal: number,
  reach: number,
): number[] {
  const near: number[] = [];
  for (let n = 0; n < ground.chords.count; n++)
    if (centreDistance(ground, x, y, n) <= halfDiagonal + reach) near.push(n);
  return near;
}

/** Distance from a unit of the motif with its centre at (x, y) to chord n of the ground, mm; 0 where they meet. */
export function chordDistance(
  { chords }: Ground,
  entry: LaidMotif,
  [x, y]: Point,
  n: number,
): number {
  const hx = entry.unit.length / 2;
  const hy = entry.unit.width / 2;
  const ex = entry.halfLength[0] / hx;
  const ey = entry.halfLength[1] / hx;
  const into = (px: number, py: number): Point => [
    (px - x) * ex + (py - y) * ey,
    (py - y) * ex - (px - x) * ey,
  ];
  return rectangleNearest(
    hx,
    hy,
    into(chords.ax[n], chords.ay[n]),
    into(chords.bx[n], chords.by[n]),
  ).distance;
}

/** The nearest of those chords to a unit with its centre at `at`, and how far it is, mm. */
export function nearestChord(
  ground: Ground,
  entry: LaidMotif,
  at: Point,
  near: NearChords,
): { readonly chord: number; readonly distance: number } {
  const half = Math.hypot(entry.unit.length, entry.unit.width) / 2;
  let chord = -1;
  let distance = Infinity;
  for (const n of near) {
    if (centreDistance(ground, at[0], at[1], n) - half >= distance) continue;
    const own = chordDistance(ground, entry, at, n);
    if (own >= distance) continue;
    distance = own;
    chord = n;
    if (own === 0) break;
  }
  return { chord, distance };
}

/** Whether a point lies inside the perimeter and outside every keep-out. */
export const inGround = ({ rings }: Ground, at: Point): boolean =>
  rings.every(({ ring, outline }) => ringHolds(outline, at) === (ring === 0));

/**
 * Distance from a unit of the motif with its centre at `at` to the nearest of those chords, mm; Infinity where there are none, and 0
 * where it meets one or does not lie in the ground.
 */
export function unitClearance(
  ground: Ground,
  entry: LaidMotif,
  at: Point,
  near: NearChords,
): number {
  const { distance } = nearestChord(ground, entry, at, near);
  return distance > 0 && inGround(ground, at) ? distance : 0;
}
