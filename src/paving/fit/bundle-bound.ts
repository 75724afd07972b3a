import type { CellPieces } from './cell-pieces';

/** Directions are gathered into this many bundles. */
const BUNDLES = 5;
/** Bundles of more lines than this are left alone: putting them in order would cost more than it saves. */
const GREATEST_BUNDLE = 128;

/**
 * A bound for boxes through which pieces of many directions pass. Pieces of nearly one direction are
 * a bundle; over a box each lies within a narrow band square to the bundle's own direction. Going
 * across the bundle, a gain counts from where its band begins and a loss only where its band ends:
 * so the greatest sum on the way is never less than what any origin of the box gains.
 */
export interface Bundles {
  /** For each family its bundle, and the slope of its lines against the bundle's. */
  readonly of: Uint8Array;
  readonly slope: Float64Array;
  /** How far one goes along the bundle's normal for each mm along the family's own. */
  readonly perMm: Float64Array;
  readonly nx: Float64Array;
  readonly ny: Float64Array;
  /** Scratch. How far the box reaches along each bundle's lines, either way from its middle. */
  readonly along: Float64Array;
  readonly gain: Float64Array;
  readonly count: Int32Array;
  readonly at: Float64Array;
  readonly change: Float64Array;
  readonly before: Float64Array;
}

export function bundlesOf({ families }: CellPieces): Bundles {
  const total = families.nx.length;
  const bundles: Bundles = {
    of: new Uint8Array(total),
    slope: new Float64Array(total),
    perMm: new Float64Array(total),
    nx: new Float64Array(BUNDLES),
    ny: new Float64Array(BUNDLES),
    along: new Float64Array(BUNDLES),
    gain: new Float64Array(BUNDLES),
    count: new Int32Array(BUNDLES),
    at: new Float64Array(BUNDLES * GREATEST_BUNDLE),
    change: new Float64Array(BUNDLES * GREATEST_BUNDLE),
    before: new Float64Array(BUNDLES),
  };
  for (let bundle = 0; bundle < BUNDLES; bundle++) {
    const angle = ((bundle + 0.5) / BUNDLES) * Math.PI;
    bundles.nx[bundle] = -Math.sin(angle);
    bundles.ny[bundle] = Math.cos(angle);
  }
  for (let f = 0; f < total; f++) {
    // A family's normal is its direction, from 0 to π, turned left.
    const angle = Math.atan2(-families.nx[f], families.ny[f]);
    const bundle = Math.min(BUNDLES - 1, Math.max(0, Math.floor((angle / Math.PI) * BUNDLES)));
    const share = families.nx[f] * bundles.nx[bundle] + families.ny[f] * bundles.ny[bundle];
    const cross = families.nx[f] * bundles.ny[bundle] - families.ny[f] * bundles.nx[bundle];
    bundles.of[f] = bundle;
    bundles.perMm[f] = 1 / share;
    bundles.slope[f] = Math.abs(cross / share);
  }
  return bundles;
}

/** Makes them ready for a box, given as half its sides. */
export function bundlesEmptied(
  { gain, count, before, along, nx, ny }: Bundles,
  halfU: number,
  halfV: number,
): void {
  for (let bundle = 0; bundle < BUNDLES; bundle++) {
    gain[bundle] = 0;
    count[bundle] = 0;
    before[bundle] = 0;
    along[bundle] = Math.abs(ny[bundle]) * halfU + Math.abs(nx[bundle]) * halfV;
  }
}

/**
 * Adds a line through the whole box, `offset` from its middle; `below` when the box's point of reference
 * has passed it. Origins keep `stand` off it, mm: what gains begins, and what loses ends, by that much later.
 */
export function bundleAdd(
  bundles: Bundles,
  f: number,
  offset: number,
  step: number,
  below: boolean,
  stand = 0,
): void {
  const bundle = bundles.of[f];
  const count = bundles.count[bundle]++;
  if (below) bundles.before[bundle] += step;
  if (count >= GREATEST_BUNDLE) return;
  const shift = bundles.slope[f] * bundles.along[bundle] - stand * bundles.perMm[f];
  const begin = offset * bundles.perMm[f] + (step > 0 ? -shift : shift);
  const { at, change } = bundles;
  const first = bundle * GREATEST_BUNDLE;
  let place = first + count;
  for (; place > first && at[place - 1] > begin; place--) {
    at[place] = at[place - 1];
    change[place] = change[place - 1];
  }
  at[place] = begin;
  change[place] = step;
}

/** What the lines of all bundles can add to the count over the box: bundle by bundle, or family by family where that is less. */
export function bundlesGain({ gain, count, change, before }: Bundles): number {
  let sum = 0;
  for (let bundle = 0; bundle < BUNDLES; bundle++) {
    let least = gain[bundle];
    if (count[bundle] > 1 && count[bundle] <= GREATEST_BUNDLE && least > 0) {
      let here = 0;
      let most = 0;
      const first = bundle * GREATEST_BUNDLE;
      for (let place = first; place < first + count[bundle]; place++) {
        here += change[place];
        if (here > most) most = here;
      }
      least = Math.min(least, most - before[bundle]);
    }
    sum += least;
  }
  return sum;
}
