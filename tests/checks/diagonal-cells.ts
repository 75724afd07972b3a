/** A074712 (oeis.org) for m, n = 1..8: the unit cells that the diagonal of an m × n rectangle cuts, m + n − gcd(m, n). */
export const DIAGONAL_CELLS: readonly (readonly number[])[] = [
  [1, 2, 3, 4, 5, 6, 7, 8],
  [2, 2, 4, 4, 6, 6, 8, 8],
  [3, 4, 3, 6, 7, 6, 9, 10],
  [4, 4, 6, 4, 8, 8, 10, 8],
  [5, 6, 7, 8, 5, 10, 11, 12],
  [6, 6, 6, 8, 10, 6, 12, 12],
  [7, 8, 9, 10, 11, 12, 7, 14],
  [8, 8, 10, 8, 12, 12, 14, 8],
];
