import type { CellPieces } from './cell-pieces';
import { pieceHasUnit } from './slack';

/** Boundaries that miss a strip by less than this, mm, are taken to come into it. */
const HAIR_MM = 1e-6;

/**
 * For each straight piece a stretch of it, from … to mm along it, empty for an arc or where none is known. The strip on
 * the left of the stretch, out to `reach`, is square to the piece, and no other boundary of one of the piece's units
 * comes into it. So that unit is whole at every origin in the strip, and the origin is no farther from
 * losing it than it is from the piece.
 */
export function clearStrips(
  near: CellPieces,
  reach: number,
): { readonly from: Float64Array; readonly to: Float64Array } {
  const { count, radius, length, unitStart, units } = near;
  const from = new Float64Array(count);
  const to = new Float64Array(count);
  // Pieces of one unit by that unit, and those of several.
  const single = new Map<number, number[]>();
  const several: number[] = [];
  for (let n = 0; n < count; n++) {
    if (unitStart[n + 1] - unitStart[n] > 1) {
      several.push(n);
      continue;
    }
    const unit = units[unitStart[n]];
    const others = single.get(unit);
    if (others) others.push(n);
    else single.set(unit, [n]);
  }
  for (let n = 0; n < count; n++) {
    if (radius[n] > 0) continue;
    to[n] = length[n];
    // Of several the middle one: units at the ends of a run share corners.
    const unit = units[(unitStart[n] + unitStart[n + 1]) >> 1];
    for (const other of single.get(unit) ?? []) {
      if (other !== n && to[n] > from[n]) stretchCut(near, n, other, reach, from, to);
    }
    for (const other of several) {
      if (other === n || to[n] <= from[n] || !pieceHasUnit(near, other, unit)) continue;
      stretchCut(near, n, other, reach, from, to);
    }
  }
  return { from, to };
}

/** Shortens the stretch of piece n to the longer of the parts that the other piece leaves. */
function stretchCut(
  { x0, y0, x1, y1, cx, cy, radius, ux, uy }: CellPieces,
  n: number,
  other: number,
  reach: number,
  from: Float64Array,
  to: Float64Array,
): void {
  const ox = x0[n];
  const oy = y0[n];
  const dx = ux[n];
  const dy = uy[n];
  const along = (x: number, y: number) => (x - ox) * dx + (y - oy) * dy;
  const off = (x: number, y: number) => (y - oy) * dx - (x - ox) * dy;
  let a = along(x0[other], y0[other]);
  let b = along(x1[other], y1[other]);
  let s = off(x0[other], y0[other]);
  let t = off(x1[other], y1[other]);
  if (radius[other] > 0) {
    // An arc of a quarter or less lies in the triangle of its ends and where its tangents meet.
    const mx = (x0[other] + x1[other]) / 2 - cx[other];
    const my = (y0[other] + y1[other]) / 2 - cy[other];
    const out = (radius[other] * radius[other]) / (mx * mx + my * my);
    const c = along(cx[other] + mx * out, cy[other] + my * out);
    const w = off(cx[other] + mx * out, cy[other] + my * out);
    if (Math.max(s, t, w) < -HAIR_MM || Math.min(s, t, w) > reach + HAIR_MM) return;
    const low = Math.min(a, b, c);
    b = Math.max(a, b, c);
    a = low;
  } else {
    if (s > t) {
      [a, b] = [b, a];
      [s, t] = [t, s];
    }
    if (t < -HAIR_MM || s > reach + HAIR_MM) return;
    // Only what of it is in the strip.
    const lean = t > s ? (b - a) / (t - s) : 0;
    const low = s;
    const first = a;
    if (s < -HAIR_MM) a = first + (-HAIR_MM - low) * lean;
    if (t > reach + HAIR_MM) b = first + (reach + HAIR_MM - low) * lean;
  }
  const begin = Math.min(a, b) - HAIR_MM;
  const end = Math.max(a, b) + HAIR_MM;
  if (end <= from[n] || begin >= to[n]) return;
  if (begin - from[n] > to[n] - end) to[n] = begin;
  else from[n] = end;
}
