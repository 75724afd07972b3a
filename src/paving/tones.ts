import type { LayoutDocument } from './layout-document';

/** 32 bits that depend evenly on four whole numbers (rounds of the murmur3 finaliser). */
function scattered(a: number, b: number, c: number, d: number): number {
  let bits = 0x9e3779b9;
  for (const value of [a, b, c, d]) {
    bits = Math.imul(bits ^ (value | 0), 0x85ebca6b);
    bits = Math.imul(bits ^ (bits >>> 13), 0xc2b2ae35);
    bits ^= bits >>> 16;
  }
  return bits >>> 0;
}

/** Order in which the places of a 4 × 4 block take the second tone, so that each few lie far apart. */
const SPREAD = [0, 8, 2, 10, 12, 4, 14, 6, 3, 11, 1, 9, 15, 7, 13, 5];

/**
 * A spread that knows only address and seed: the lattice in blocks of 4 × 4, each block taking
 * the second tone in an ordered-dither order, turned, mirrored and shifted by the seed. Every
 * block keeps the share to the nearest unit, rounded up or down by the seed in proportion.
 */
function randomTone(i: number, j: number, k: number, share: number, seed: number): 0 | 1 {
  const blockI = Math.floor(i / 4);
  const blockJ = Math.floor(j / 4);
  const bits = scattered(blockI, blockJ, k, seed);
  let x = (i - blockI * 4 + (bits & 3)) & 3;
  let y = (j - blockJ * 4 + ((bits >> 2) & 3)) & 3;
  if (bits & 16) x = 3 - x;
  if (bits & 32) y = 3 - y;
  if (bits & 64) [x, y] = [y, x];
  const rank = SPREAD[y * 4 + x];
  const jitter = (bits >>> 8) / 2 ** 24;
  return rank + jitter < share * 16 ? 1 : 0;
}

const odd = (value: number): 0 | 1 => ((value & 1) === 0 ? 0 : 1);

/**
 * Tone of the unit with address [i, j, k]: 0 the unit's own colour, 1 the second.
 *
 * `alternate` by bond: units of stack, running, stepping and custom alternate along the course
 * and across it (with half-shifted courses one of the two units across is always alike); of
 * chequer all four neighbours at the corners differ; of basket the pairs differ, each from all
 * four pairs around it; of herringbone the two directions differ; of pinwheel each large unit
 * differs from the four large units around it, and the small unit goes with its large one.
 */
export function unitTone(document: LayoutDocument, i: number, j: number, k: number): 0 | 1 {
  const { tones, bond } = document;
  switch (tones?.rule) {
    case 'alternate':
      if (bond.kind === 'chequer') return odd(j);
      if (bond.kind === 'basket') return k < 2 ? 0 : 1;
      if (bond.kind === 'herringbone') return odd(k);
      return odd(i + j + (bond.kind === 'custom' ? k : 0));
    case 'course':
      return odd(j);
    case 'random':
      return randomTone(i, j, k, tones.share, tones.seed);
    default:
      return 0;
  }
}
