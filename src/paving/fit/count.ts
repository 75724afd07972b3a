import type { FitFrame } from './fit-frame';

/** Where an arc, within one quarter, crosses the line at v; arcs and lines as in `ClearBoundary`. */
export function pieceCrossing(
  v: number,
  x0: number,
  y0: number,
  x1: number,
  y1: number,
  cx: number,
  cy: number,
  radius: number,
): number {
  if (radius === 0) return x0 + ((v - y0) / (y1 - y0)) * (x1 - x0);
  const away = v - cy;
  const reach = Math.sqrt(Math.max(0, radius * radius - away * away));
  return (x0 + x1) / 2 >= cx ? cx + reach : cx - reach;
}

/**
 * How many units are whole with the origin at (u, v) of the frame, without laying them. Each row of
 * units crosses the boundary of the clear region; a crossing at x on the way out of it adds the
 * units up to x, one on the way in takes off those before. Work grows with the rows that each
 * piece of the boundary spans.
 */
export function unitCount({ clear, pitch, rise, shift }: FitFrame, u: number, v: number): number {
  let sum = 0;
  for (const { count, x0, y0, x1, y1, cx, cy, radius } of clear) {
    for (let n = 0; n < count; n++) {
      const start = (y0[n] - v) / rise;
      const end = (y1[n] - v) / rise;
      // Going up, the clear region is on the left: the row leaves it here.
      const up = end > start;
      let row = Math.ceil(up ? start : end);
      const last = Math.ceil(up ? end : start);
      if (row >= last) continue;
      let part = 0;
      if (radius[n] === 0) {
        const slope = (x1[n] - x0[n]) / (y1[n] - y0[n]);
        // In pitches: where the crossing lies along its row, and how that changes row by row.
        const step = (rise * slope - shift) / pitch;
        const first = (x0[n] + (v - y0[n]) * slope - u) / pitch;
        for (; row < last; row++) part += Math.floor(first + row * step);
      } else {
        for (; row < last; row++) {
          const x = pieceCrossing(
            v + row * rise,
            x0[n],
            y0[n],
            x1[n],
            y1[n],
            cx[n],
            cy[n],
            radius[n],
          );
          part += Math.floor((x - u - row * shift) / pitch);
        }
      }
      sum += up ? part : -part;
    }
  }
  return sum;
}
