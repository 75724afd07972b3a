import { regionClip, type ClipResult, type Region } from '@/geometry/clipping';
import type { Laying } from './laying';
import { unitCorners } from './laying';

/** Units united at a time: the clipping library slows and recurses deeply on many at once. */
const BATCH = 64;

/**
 * What the aggregate takes: the ground less the laid units, as polygons with holes, mm. Its area
 * is checked against the ground's less the units'; a failure of the clipping library comes back
 * as a value with a place.
 */
export function fillRegion({ ground, laid, motif }: Laying): ClipResult {
  const [perimeter, ...keepOuts] = ground.rings;
  const units: Region[] = [];
  for (let n = 0; n < laid.count; n++) {
    units.push([[unitCorners(motif[laid.k[n]], laid.x[n], laid.y[n])]]);
  }
  const whole: Region = [[perimeter.outline]];
  let left: ClipResult = { ok: true, region: whole, area: perimeter.area };
  const cuts = [...keepOuts.map(({ outline }): Region => [[outline]]), ...units];
  for (let n = 0; n < cuts.length && left.ok; n += BATCH) {
    left = regionClip('difference', left.region, cuts.slice(n, n + BATCH));
  }
  return left;
}
