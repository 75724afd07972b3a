import type { Point } from './point';

/** How far `ring` lies beyond the line from `a` to `b`, to its right, mm: the least over its corners; negative where it reaches over. */
function beyondLine(a: Point, b: Point, ring: readonly Point[]): number {
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
  let least = Infinity;
  for (const [x, y] of ring) {
    const right = ((b[1] - a[1]) * (x - a[0]) - (b[0] - a[0]) * (y - a[1])) / length;
    if (right < least) least = right;
  }
  return least;
}

function segmentDistance([px, py]: Point, [ax, ay]: Point, [bx, by]: Point): number {
  const [ex, ey] = [bx - ax, by - ay];
  const along = ((px - ax) * ex + (py - ay) * ey) / (ex * ex + ey * ey);
  const at = Math.max(0, Math.min(1, along));
  return Math.hypot(px - ax - at * ex, py - ay - at * ey);
}

/** The widest gap that a line along a side of either ring opens between them, mm; negative when they overlap. */
function sideGap(one: readonly Point[], other: readonly Point[]): number {
  let widest = -Infinity;
  for (const [own, far] of [
    [one, other],
    [other, one],
  ]) {
    own.forEach((corner, n) => {
      widest = Math.max(widest, beyondLine(corner, own[(n + 1) % own.length], far));
    });
  }
  return widest;
}

/**
 * Distance between two convex anticlockwise rings, mm; 0 where they touch. Where they overlap, less
 * the way that would part them, so that a hair's overlap is told from a deep one.
 */
export function convexGap(one: readonly Point[], other: readonly Point[]): number {
  const gap = sideGap(one, other);
  if (gap <= 0) return gap;
  let least = Infinity;
  for (const [own, far] of [
    [one, other],
    [other, one],
  ]) {
    for (const corner of own) {
      far.forEach((from, n) => {
        least = Math.min(least, segmentDistance(corner, from, far[(n + 1) % far.length]));
      });
    }
  }
  return least;
}

/** True when two convex anticlockwise rings are at least `gap` mm apart; quicker than the distance itself. */
export function convexApart(one: readonly Point[], other: readonly Point[], gap: number): boolean {
  const side = sideGap(one, other);
  if (side >= gap) return true;
  return side > 0 && convexGap(one, other) >= gap;
}
