import type { CellPieces } from './cell-pieces';

/**
 * The pieces of a cell and their repeats as far as `reach` beyond it on every side, in the same
 * order: what may be near to an origin of the cell.
 */
export function nearPieces(
  pieces: CellPieces,
  pitch: number,
  rise: number,
  shift: number,
  reach: number,
): CellPieces {
  const { x0, y0, x1, y1, families, family, unitStep } = pieces;
  const from: number[] = [];
  const du: number[] = [];
  const dv: number[] = [];
  const offset: number[] = [];
  const rows = Math.ceil(reach / rise);
  for (let n = 0; n < pieces.count; n++) {
    const west = Math.min(x0[n], x1[n]);
    const east = Math.max(x0[n], x1[n]);
    const south = Math.min(y0[n], y1[n]);
    const north = Math.max(y0[n], y1[n]);
    for (let j = -rows; j <= rows; j++) {
      if (north + j * rise < -reach || south + j * rise > rise + reach) continue;
      const first = Math.ceil((-reach - east - j * shift) / pitch);
      const last = Math.floor((pitch + reach - west - j * shift) / pitch);
      for (let i = first; i <= last; i++) {
        from.push(n);
        du.push(i * pitch + j * shift);
        dv.push(j * rise);
        // The same place one lattice step on belongs to the unit one step back.
        offset.push(-(i * unitStep.along + j * unitStep.up));
      }
    }
  }
  const height = from.map((n, m) =>
    family[n] < 0
      ? 0
      : pieces.height[n] + du[m] * families.nx[family[n]] + dv[m] * families.ny[family[n]],
  );
  const order = from.map((_, m) => m);
  order.sort((m, n) => family[from[m]] - family[from[n]] || height[m] - height[n]);
  const moved = (values: Float64Array, by: readonly number[]) =>
    Float64Array.from(order, (m) => values[from[m]] + by[m]);
  const unitStart = new Int32Array(order.length + 1);
  let total = 0;
  order.forEach((m, n) => {
    total += pieces.unitStart[from[m] + 1] - pieces.unitStart[from[m]];
    unitStart[n + 1] = total;
  });
  const units = new Float64Array(total);
  order.forEach((m, n) => {
    const start = pieces.unitStart[from[m]];
    for (let at = unitStart[n]; at < unitStart[n + 1]; at++) {
      units[at] = pieces.units[start + at - unitStart[n]] + offset[m];
    }
  });
  return {
    count: order.length,
    x0: moved(x0, du),
    y0: moved(y0, dv),
    x1: moved(x1, du),
    y1: moved(y1, dv),
    cx: moved(pieces.cx, du),
    cy: moved(pieces.cy, dv),
    radius: Float64Array.from(order, (m) => pieces.radius[from[m]]),
    family: Int32Array.from(order, (m) => family[from[m]]),
    height: Float64Array.from(order, (m) => height[m]),
    step: Int32Array.from(order, (m) => pieces.step[from[m]]),
    unitStart,
    units,
    families,
    unitStep,
  };
}
