/**
 * Area of a region inside the rectangle |x| ≤ hx, |y| ≤ hy, from the region's boundary near the
 * rectangle alone. Each boundary chord (region on its left) adds what it changes: the columns
 * above it, and, where it crosses the bottom side, the columns right of the crossing. The sum is
 * the area when the bottom left corner is outside the region, and the area less the rectangle's
 * when that corner is inside; chords that miss the rectangle add nothing.
 */
export function rectangleCoverPart(
  hx: number,
  hy: number,
  x0: number,
  y0: number,
  x1: number,
  y1: number,
): number {
  const low0 = y0 < -hy;
  const low1 = y1 < -hy;
  let sum = 0;
  let ax = x0;
  let ay = y0;
  let bx = x1;
  let by = y1;
  if (low0 && low1) return 0;
  if (low0 !== low1) {
    const x = x0 + ((-hy - y0) / (y1 - y0)) * (x1 - x0);
    if (x >= -hx && x < hx) sum += (low1 ? 1 : -1) * (hx - x) * 2 * hy;
    if (low0) {
      ax = x;
      ay = -hy;
    } else {
      bx = x;
      by = -hy;
    }
  }
  if (ax === bx || Math.max(ax, bx) <= -hx || Math.min(ax, bx) >= hx) return sum;
  const slope = (by - ay) / (bx - ax);
  const from = Math.max(-hx, Math.min(hx, ax));
  const to = Math.max(-hx, Math.min(hx, bx));
  const depthFrom = from === ax ? hy - ay : hy - (ay + (from - ax) * slope);
  const depthTo = to === bx ? hy - by : hy - (ay + (to - ax) * slope);
  if (depthFrom >= 0 && depthTo >= 0) return sum + ((depthFrom + depthTo) / 2) * (to - from);
  if (depthFrom <= 0 && depthTo <= 0) return sum;
  const width = ((to - from) * Math.max(depthFrom, depthTo)) / Math.abs(depthFrom - depthTo);
  return sum + (Math.max(depthFrom, depthTo) / 2) * width;
}
