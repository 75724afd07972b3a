import { cornerLabel } from './marks';
import type { Ground } from '../ground';
import type { Datum, Diagonal } from './set-out-types';

/** Lengths that differ by less than this are to read the same, mm. */
const SAME_LENGTH_MM = 0.5;
/** An outline of more corners is checked by this many of its diagonals, the longest. */
const MOST_DIAGONALS = 12;

/**
 * Diagonals of the perimeter: enough to fix its shape with the edges known, and one more to prove it. Of four
 * corners, both; of more, from the first datum to each corner beyond its neighbours (they part the outline into
 * triangles, and with the edges fix it), and the longest that is not among them.
 */
export function groundDiagonals(ground: Ground, [first]: readonly [Datum, Datum]): Diagonal[] {
  const corners = ground.rings[0].edges.map(({ start }) => start);
  const count = corners.length;
  if (count < 4) return [];
  const length = (n: number, m: number) =>
    Math.hypot(corners[m][0] - corners[n][0], corners[m][1] - corners[n][1]);
  const beside = (n: number, m: number) => (n + 1) % count === m || (m + 1) % count === n;
  const from = first.ring === 0 ? first.vertex : 0;
  let pairs: [number, number][] = [];
  if (count === 4)
    pairs = [
      [0, 2],
      [1, 3],
    ];
  else {
    for (let m = 0; m < count; m++) if (m !== from && !beside(from, m)) pairs.push([from, m]);
    pairs.sort((one, other) => length(...other) - length(...one));
    pairs = pairs.slice(0, MOST_DIAGONALS - 1);
    let proof: [number, number] | null = null;
    for (let n = 0; n < count; n++) {
      for (let m = n + 2; m < count; m++) {
        if (n === from || m === from || beside(n, m)) continue;
        if (!proof || length(n, m) > length(...proof)) proof = [n, m];
      }
    }
    if (proof) pairs.push(proof);
  }
  const named = pairs.map(([n, m]) => ({
    from: cornerLabel(0, n),
    to: cornerLabel(0, m),
    length: length(n, m),
  }));
  return named.map((diagonal, n): Diagonal => {
    const twin =
      count === 4 && Math.abs(named[0].length - named[1].length) < SAME_LENGTH_MM
        ? named[1 - n]
        : null;
    return { ...diagonal, sameAs: twin && [twin.from, twin.to] };
  });
}
