import type { Point } from './point';

/**
 * Signed area of a ring that is not closed by repeating its first point, mm²: positive when it
 * runs anticlockwise. Taken from the first point, so that it loses nothing far from the origin.
 */
export function ringArea(ring: readonly Point[]): number {
  if (ring.length < 3) return 0;
  const [x0, y0] = ring[0];
  let twice = 0;
  for (let n = 1; n + 1 < ring.length; n++) {
    twice += (ring[n][0] - x0) * (ring[n + 1][1] - y0) - (ring[n + 1][0] - x0) * (ring[n][1] - y0);
  }
  return twice / 2;
}

/** True when `point` is inside the ring; on its boundary either answer may come. */
export function ringHolds(ring: readonly Point[], [x, y]: Point): boolean {
  let inside = false;
  for (let n = 0, m = ring.length - 1; n < ring.length; m = n++) {
    const [ax, ay] = ring[m];
    const [bx, by] = ring[n];
    if (ay < y !== by < y && x < ax + ((y - ay) / (by - ay)) * (bx - ax)) inside = !inside;
  }
  return inside;
}
