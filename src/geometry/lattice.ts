import type { Point } from './point';

/** A lattice in the plane: all i·a + j·b for whole i and j. */
export interface Lattice {
  readonly a: Point;
  readonly b: Point;
}

/**
 * Another basis of the same lattice: `a` and `b` are the new vectors, and the point at new
 * address (m, n) has the old address (m·i.a + n·i.b, m·j.a + n·j.b).
 */
export interface LatticeBasis extends Lattice {
  readonly i: { readonly a: number; readonly b: number };
  readonly j: { readonly a: number; readonly b: number };
}

/** Signed area of the lattice's cell, mm². */
export function latticeCell({ a, b }: Lattice): number {
  return a[0] * b[1] - a[1] * b[0];
}

/**
 * The shortest basis (Lagrange and Gauss), with |a| ≤ |b| and the angle from a to b between 60°
 * and 120° anticlockwise. The lattice must not be degenerate.
 */
export function latticeReduced(lattice: Lattice): LatticeBasis {
  let a = { v: lattice.a, i: 1, j: 0 };
  let b = { v: lattice.b, i: 0, j: 1 };
  const square = (p: Point) => p[0] * p[0] + p[1] * p[1];
  for (let round = 0; round < 200; round++) {
    if (square(b.v) < square(a.v)) [a, b] = [b, a];
    const times = Math.round((a.v[0] * b.v[0] + a.v[1] * b.v[1]) / square(a.v));
    if (times === 0 || !Number.isFinite(times)) break;
    b = {
      v: [b.v[0] - times * a.v[0], b.v[1] - times * a.v[1]],
      i: b.i - times * a.i,
      j: b.j - times * a.j,
    };
  }
  if (a.v[0] * b.v[1] - a.v[1] * b.v[0] < 0) {
    b = { v: [-b.v[0], -b.v[1]], i: -b.i, j: -b.j };
  }
  return { a: a.v, b: b.v, i: { a: a.i, b: b.i }, j: { a: a.j, b: b.j } };
}

/** How far from square a lattice may be before its rows are taken along a shorter basis. */
const GREATEST_SKEW = 4;

/**
 * The basis whose rows (along `a`) a floor is laid by: the lattice's own where that is near
 * enough to square, else the shortest, so that no lattice needs more rows than it has units.
 */
export function latticeRows(lattice: Lattice): LatticeBasis {
  const { a, b } = lattice;
  const cell = latticeCell(lattice);
  const long = Math.hypot(a[0], a[1]);
  const high = Math.hypot(b[0], b[1]);
  if (long * high <= GREATEST_SKEW * Math.abs(cell) && long <= GREATEST_SKEW * 2 * high) {
    return cell > 0
      ? { a, b, i: { a: 1, b: 0 }, j: { a: 0, b: 1 } }
      : { a, b: [-b[0], -b[1]], i: { a: 1, b: 0 }, j: { a: 0, b: -1 } };
  }
  return latticeReduced(lattice);
}
