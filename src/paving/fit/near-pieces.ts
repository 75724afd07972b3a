import { familyOrder, type CellPieces } from './cell-pieces';

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
  const size = from.length;
  const pieceHeight = new Float64Array(size);
  const pieceFamily = new Int32Array(size);
  for (let m = 0; m < size; m++) {
    const f = family[from[m]];
    pieceFamily[m] = f;
    if (f >= 0)
      pieceHeight[m] = pieces.height[from[m]] + du[m] * families.nx[f] + dv[m] * families.ny[f];
  }
  const order = familyOrder(
    pieceFamily,
    families.nx.length,
    (m, n) => pieceHeight[m] - pieceHeight[n],
  );
  const near = {
    count: size,
    x0: new Float64Array(size),
    y0: new Float64Array(size),
    x1: new Float64Array(size),
    y1: new Float64Array(size),
    cx: new Float64Array(size),
    cy: new Float64Array(size),
    radius: new Float64Array(size),
    ux: new Float64Array(size),
    uy: new Float64Array(size),
    length: new Float64Array(size),
    family: new Int32Array(size),
    height: new Float64Array(size),
    step: new Int32Array(size),
    stride: new Float64Array(size),
    unitStart: new Int32Array(size + 1),
  };
  let total = 0;
  for (let m = 0; m < size; m++) {
    const at = order[m];
    const n = from[at];
    near.x0[m] = x0[n] + du[at];
    near.y0[m] = y0[n] + dv[at];
    near.x1[m] = x1[n] + du[at];
    near.y1[m] = y1[n] + dv[at];
    near.cx[m] = pieces.cx[n] + du[at];
    near.cy[m] = pieces.cy[n] + dv[at];
    near.radius[m] = pieces.radius[n];
    near.ux[m] = pieces.ux[n];
    near.uy[m] = pieces.uy[n];
    near.length[m] = pieces.length[n];
    near.family[m] = pieceFamily[at];
    near.height[m] = pieceHeight[at];
    near.step[m] = pieces.step[n];
    near.stride[m] = pieces.stride[n];
    total += pieces.unitStart[n + 1] - pieces.unitStart[n];
    near.unitStart[m + 1] = total;
  }
  const units = new Float64Array(total);
  for (let m = 0; m < size; m++) {
    const at = order[m];
    let unit = pieces.unitStart[from[at]];
    for (let to = near.unitStart[m]; to < near.unitStart[m + 1]; to++) {
      units[to] = pieces.units[unit++] + offset[at];
    }
  }
  return { ...near, units, families, unitStep };
}
