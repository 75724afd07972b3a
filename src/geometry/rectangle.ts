import type { Point } from './point';

/** Where a rectangle and a segment are nearest, both points in the rectangle's own frame. */
export interface Nearest {
  readonly distance: number;
  readonly onRectangle: Point;
  readonly onSegment: Point;
}

const clamp = (value: number, half: number) => Math.max(-half, Math.min(half, value));

/**
 * Part of the segment inside the closed rectangle |x| ≤ hx, |y| ≤ hy as a range of its parameter
 * (Liang and Barsky), or null when it misses.
 */
export function rectangleClip(
  hx: number,
  hy: number,
  x0: number,
  y0: number,
  x1: number,
  y1: number,
): readonly [number, number] | null {
  let from = 0;
  let to = 1;
  const dx = x1 - x0;
  const dy = y1 - y0;
  for (const [d, gap] of [
    [-dx, x0 + hx],
    [dx, hx - x0],
    [-dy, y0 + hy],
    [dy, hy - y0],
  ]) {
    if (d === 0) {
      if (gap < 0) return null;
    } else if (d < 0) {
      from = Math.max(from, gap / d);
    } else {
      to = Math.min(to, gap / d);
    }
    if (from > to) return null;
  }
  return [from, to];
}

/** Nearest points of the rectangle |x| ≤ hx, |y| ≤ hy and a segment; distance 0 where they meet. */
export function rectangleNearest(hx: number, hy: number, start: Point, end: Point): Nearest {
  const [x0, y0] = start;
  const [x1, y1] = end;
  const inside = rectangleClip(hx, hy, x0, y0, x1, y1);
  if (inside) {
    const at: Point = [x0 + inside[0] * (x1 - x0), y0 + inside[0] * (y1 - y0)];
    return { distance: 0, onRectangle: at, onSegment: at };
  }
  let best: Nearest = { distance: Infinity, onRectangle: start, onSegment: start };
  const offer = (onRectangle: Point, onSegment: Point) => {
    const distance = Math.hypot(onSegment[0] - onRectangle[0], onSegment[1] - onRectangle[1]);
    if (distance < best.distance) best = { distance, onRectangle, onSegment };
  };
  offer([clamp(x0, hx), clamp(y0, hy)], start);
  offer([clamp(x1, hx), clamp(y1, hy)], end);
  const dx = x1 - x0;
  const dy = y1 - y0;
  const square = dx * dx + dy * dy;
  for (const corner of [
    [-hx, -hy],
    [hx, -hy],
    [hx, hy],
    [-hx, hy],
  ] as const) {
    const along = ((corner[0] - x0) * dx + (corner[1] - y0) * dy) / square;
    if (along > 0 && along < 1) offer(corner, [x0 + along * dx, y0 + along * dy]);
  }
  return best;
}

/** A rectangle anywhere: its centre, and half its length and half its width as vectors. */
export interface PlacedRectangle {
  readonly centre: Point;
  readonly halfLength: Point;
  readonly halfWidth: Point;
}

/**
 * How far two rectangles would have to be moved apart to part them, mm (separating axes):
 * positive when they overlap, 0 when they touch, negative (the gap along the best axis) when
 * they are apart.
 */
export function rectangleOverlap(one: PlacedRectangle, other: PlacedRectangle): number {
  const dx = other.centre[0] - one.centre[0];
  const dy = other.centre[1] - one.centre[1];
  let depth = Infinity;
  for (const axis of [one.halfLength, one.halfWidth, other.halfLength, other.halfWidth]) {
    const size = Math.hypot(axis[0], axis[1]);
    const ux = axis[0] / size;
    const uy = axis[1] / size;
    let reach = -Math.abs(dx * ux + dy * uy);
    for (const half of [one.halfLength, one.halfWidth, other.halfLength, other.halfWidth]) {
      reach += Math.abs(half[0] * ux + half[1] * uy);
    }
    depth = Math.min(depth, reach);
  }
  return depth;
}
