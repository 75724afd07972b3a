import { pointsBox } from '@/geometry/convex-part';
import type { Point } from '@/geometry/point';

/** Width of a small plan in its own units; letters and lines are sized in these. */
export const PLAN_WIDE = 440;
const MARGIN = 34;
const HEIGHT = { least: 150, most: 330 };

/** Ground to a small plan: y down, all points in view. */
export function planView(points: readonly Point[]): {
  readonly height: number;
  readonly at: (point: Point) => Point;
} {
  const {
    min: [left, low],
    max: [right, high],
  } = pointsBox(points);
  const scale = Math.min(
    (PLAN_WIDE - 2 * MARGIN) / Math.max(right - left, 1),
    (HEIGHT.most - 2 * MARGIN) / Math.max(high - low, 1),
  );
  const height = Math.max(HEIGHT.least, (high - low) * scale + 2 * MARGIN);
  const offX = (PLAN_WIDE - (right - left) * scale) / 2 - left * scale;
  const offY = (height - (high - low) * scale) / 2 + high * scale;
  return { height, at: ([x, y]) => [offX + x * scale, offY - y * scale] };
}

export const planPath = (points: readonly Point[]): string =>
  points.map(([x, y], n) => `${n === 0 ? 'M' : 'L'}${x.toFixed(1)} ${y.toFixed(1)}`).join(' ') +
  ' Z';
