import { neverTogether } from './group-places';
import { mostPairs } from './matching';
import type { PieceShape } from './piece-shape';

/** Up to so many pieces are paired off exactly; of more, only their shares are held against one another. */
const PAIRED_EXACTLY = 320;
/** What rounding may add to a sum of shares. */
const SHARE_ROUNDING = 1e-6;

/**
 * No nesting of the pieces takes fewer units than this: the greatest of several bounds, each of which
 * holds for every nesting whatever.
 *
 * A share is what a piece takes of a unit wherever it lies: of its area, of its corners, of its factory
 * edges, or of a mean of these. Shares in one unit add up to 1 at most. So there are at least as many
 * units as the shares' sum. And of the pieces whose share is over a third no unit gives more than two,
 * and two only where they can lie in one unit at all: the most pairs that can be made of them, found
 * exactly, are the most units that can be saved.
 */
export function leastUnits(
  shapes: readonly PieceShape[],
  kerf: number,
  together: (one: number, other: number) => boolean = (one, other) =>
    !neverTogether(shapes[one], shapes[other], kerf),
): number {
  const measures: ((shape: PieceShape) => number)[] = [
    ({ shares: [area] }) => area,
    ({ shares: [, corners] }) => corners,
    ({ shares: [, , edges] }) => edges,
    ({ shares: [area, corners] }) => (area + corners) / 2,
    ({ shares: [area, , edges] }) => (area + edges) / 2,
  ];
  let least = shapes.length > 0 ? 1 : 0;
  const seen = new Set<string>();
  for (const measure of measures) {
    const share = shapes.map(measure);
    const sum = share.reduce((total, part) => total + part, 0);
    least = Math.max(least, Math.ceil(sum - SHARE_ROUNDING * Math.max(1, sum)));
    const large = share.flatMap((part, n) => (part > 1 / 3 + SHARE_ROUNDING ? [n] : []));
    const key = large.join();
    // The same large pieces give the same exact answer, whatever they were measured by.
    if (large.length <= PAIRED_EXACTLY && seen.has(key)) continue;
    seen.add(key);
    if (large.length <= least) continue;
    const pairs =
      large.length <= PAIRED_EXACTLY ? exactPairs(large, together) : sharePairs(large, share);
    least = Math.max(least, large.length - pairs);
  }
  return least;
}

function exactPairs(
  pieces: readonly number[],
  together: (one: number, other: number) => boolean,
): number {
  const near: number[][] = pieces.map(() => []);
  for (let m = 0; m < pieces.length; m++) {
    for (let n = m + 1; n < pieces.length; n++) {
      if (!together(pieces[m], pieces[n])) continue;
      near[m].push(n);
      near[n].push(m);
    }
  }
  return mostPairs(near).reduce((sum, mate) => sum + (mate >= 0 ? 0.5 : 0), 0);
}

/** The most pairs whose shares are 1 at most: the largest with the smallest that are left. */
function sharePairs(pieces: readonly number[], share: readonly number[]): number {
  const order = [...pieces].sort((m, n) => share[m] - share[n]);
  let pairs = 0;
  for (let low = 0, high = order.length - 1; low < high; high--) {
    if (share[order[low]] + share[order[high]] > 1 + SHARE_ROUNDING) continue;
    low++;
    pairs++;
  }
  return pairs;
}
