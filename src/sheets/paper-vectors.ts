import type { PaperPoint } from './drawing';

/** Along a direction, 1 long; up the paper where there is none. */
export function unitVector([dx, dy]: PaperPoint): PaperPoint {
  const length = Math.hypot(dx, dy);
  return length < 1e-9 ? [0, -1] : [dx / length, dy / length];
}

/** The centre of an outline’s area. */
export function middleOf(points: readonly PaperPoint[]): PaperPoint {
  let [area, x, y] = [0, 0, 0];
  const [ox, oy] = points[0];
  points.forEach(([px, py], n) => {
    const [qx, qy] = points[(n + 1) % points.length];
    const cross = (px - ox) * (qy - oy) - (qx - ox) * (py - oy);
    area += cross;
    x += (px + qx - 2 * ox) * cross;
    y += (py + qy - 2 * oy) * cross;
  });
  return Math.abs(area) < 1e-9 ? points[0] : [ox + x / (3 * area), oy + y / (3 * area)];
}
