import type { Point } from '@/geometry/point';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import type { GroundEdge } from '../ground';

/**
 * How far a unit's part in front of an edge is from it, square to the edge, mm; below 0 where it reaches over. Null when no
 * part of it stands in front of the edge.
 */
export function edgeGap(edge: GroundEdge, corners: readonly Point[]): number | null {
  let least: number | null = null;
  for (let n = 0; n + 1 < edge.chords.length; n++) {
    const [ax, ay] = edge.chords[n];
    const [bx, by] = edge.chords[n + 1];
    const length = Math.hypot(bx - ax, by - ay);
    if (!(length > 0)) continue;
    const dx = (bx - ax) / length;
    const dy = (by - ay) / length;
    const inward = edge.ring === 0 ? 1 : -1;
    const placed = corners.map(([x, y]): Point => [
      (x - ax) * dx + (y - ay) * dy,
      inward * ((y - ay) * dx - (x - ax) * dy),
    ]);
    const before = strip(strip(placed, 0, 1), length, -1);
    if (before.length < 2) continue;
    const along = before.map(([s]) => s);
    if (Math.max(...along) - Math.min(...along) <= LENGTH_TOLERANCE_MM) continue;
    const heights = before.map(([, t]) => t);
    // All of it behind the edge: a unit at the far side of a keep-out.
    if (Math.max(...heights) <= 0) continue;
    const gap = Math.min(...heights);
    if (least === null || gap < least) least = gap;
  }
  return least;
}

/** The part of a convex ring with s ≥ `at` (`way` 1) or s ≤ `at` (`way` −1). */
function strip(ring: readonly Point[], at: number, way: 1 | -1): Point[] {
  const kept: Point[] = [];
  for (let n = 0; n < ring.length; n++) {
    const p = ring[n];
    const q = ring[(n + 1) % ring.length];
    const inP = way * (p[0] - at) >= 0;
    const inQ = way * (q[0] - at) >= 0;
    if (inP) kept.push(p);
    if (inP !== inQ) {
      const share = (at - p[0]) / (q[0] - p[0]);
      kept.push([at, p[1] + share * (q[1] - p[1])]);
    }
  }
  return kept;
}
