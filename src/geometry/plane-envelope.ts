/**
 * Planes z = d + gx·x + gy·y over a rectangle, and the highest point of the lowest of them. What an
 * origin has of room, when each boundary near it is straight, is such an envelope.
 */
export interface PlaneEnvelope {
  /** How many planes there are. */
  count: number;
  readonly d: Float64Array;
  readonly gx: Float64Array;
  readonly gy: Float64Array;
  /** Highest point of the envelope, where `envelopeTop` has put it. */
  x: number;
  y: number;
}

/** Room for so many planes. */
export function planeEnvelope(most: number): PlaneEnvelope {
  return {
    count: 0,
    d: new Float64Array(most),
    gx: new Float64Array(most),
    gy: new Float64Array(most),
    x: 0,
    y: 0,
  };
}

const LEAST_CROSS = 1e-9;

/**
 * Height of the highest point of the envelope over x0 ≤ x ≤ x1, y0 ≤ y ≤ y1, 0 within it; writes the point.
 * No plane makes Infinity. A linear programme in three unknowns, by its dual: some one, two or three
 * planes, weighed so that the sum is level but for what the rectangle's sides hold, bound the rest.
 * What it returns is never less than the truth, but for rounding.
 */
export function envelopeTop(
  room: PlaneEnvelope,
  x0: number,
  y0: number,
  x1: number,
  y1: number,
): number {
  const { count, d, gx, gy } = room;
  let top = Infinity;
  let atX = 0;
  let atY = 0;
  for (let i = 0; i < count; i++) {
    const x = gx[i] > 0 ? x1 : x0;
    const y = gy[i] > 0 ? y1 : y0;
    const z = d[i] + gx[i] * x + gy[i] * y;
    if (z < top) {
      top = z;
      atX = x;
      atY = y;
    }
    for (let j = i + 1; j < count; j++) {
      const dx = gx[i] - gx[j];
      const dy = gy[i] - gy[j];
      const rise = d[j] - d[i];
      // Level along y, held by a side in x; and the other way.
      if (gy[i] * gy[j] < 0) {
        const share = gy[j] / (gy[j] - gy[i]);
        const lean = share * gx[i] + (1 - share) * gx[j];
        const level = share * d[i] + (1 - share) * d[j];
        const side = Math.abs(lean) < LEAST_CROSS ? 0 : lean > 0 ? x1 : x0;
        const height = level + lean * side;
        if (height < top) {
          top = height;
          atX = side;
          atY = (rise - dx * side) / dy;
        }
      }
      if (gx[i] * gx[j] < 0) {
        const share = gx[j] / (gx[j] - gx[i]);
        const lean = share * gy[i] + (1 - share) * gy[j];
        const level = share * d[i] + (1 - share) * d[j];
        const side = Math.abs(lean) < LEAST_CROSS ? 0 : lean > 0 ? y1 : y0;
        const height = level + lean * side;
        if (height < top) {
          top = height;
          atY = side;
          atX = (rise - dy * side) / dx;
        }
      }
      const ij = gx[i] * gy[j] - gy[i] * gx[j];
      for (let k = j + 1; k < count; k++) {
        const jk = gx[j] * gy[k] - gy[j] * gx[k];
        const ki = gx[k] * gy[i] - gy[k] * gx[i];
        const sum = ij + jk + ki;
        if (Math.abs(sum) < LEAST_CROSS || jk / sum < 0 || ki / sum < 0 || ij / sum < 0) continue;
        const height = (jk * d[i] + ki * d[j] + ij * d[k]) / sum;
        if (height >= top) continue;
        const ex = gx[i] - gx[k];
        const ey = gy[i] - gy[k];
        const other = d[k] - d[i];
        const cross = dx * ey - dy * ex;
        top = height;
        atX = (rise * ey - other * dy) / cross;
        atY = (other * dx - rise * ex) / cross;
      }
    }
  }
  room.x = atX < x0 ? x0 : atX > x1 ? x1 : atX;
  room.y = atY < y0 ? y0 : atY > y1 ? y1 : atY;
  return top;
}
