import { regionClip, type ClipResult, type Region } from '@/geometry/clipping';
import { unitCorners, type Laying } from '@/paving/laying';

/** Units taken away at a time when the clipping library fails on all of them at once. */
const BATCH = 64;

/**
 * What the aggregate takes: the ground less the laid units, as polygons with holes, mm. Its area
 * is checked against the ground's less the units'; a failure of the clipping library comes back
 * as a value with a place.
 */
export function fillRegion({ ground, laid, motif }: Laying): ClipResult {
  const [perimeter, ...keepOuts] = ground.rings;
  const cuts = keepOuts.map(({ outline }): Region => [[outline]]);
  let covered = 0;
  for (let n = 0; n < laid.count; n++) {
    const entry = motif[laid.k[n]];
    cuts.push([[unitCorners(entry, laid.x[n], laid.y[n])]]);
    covered += entry.unit.length * entry.unit.width;
  }
  const whole: Region = [[perimeter.outline]];
  // Keep-outs along an arc part from it by a sagitta, so their areas do not add up to the micrometre.
  const curved = keepOuts.some(({ edges }) => edges.some(({ bulge }) => bulge !== 0));
  const expected = curved ? undefined : ground.area - covered;
  const atOnce = regionClip('difference', whole, cuts, expected);
  if (atOnce.ok) return atOnce;
  let left: ClipResult = { ok: true, region: whole, area: perimeter.area };
  for (let n = 0; n < cuts.length && left.ok; n += BATCH) {
    const last = n + BATCH >= cuts.length;
    left = regionClip(
      'difference',
      left.region,
      cuts.slice(n, n + BATCH),
      last ? expected : undefined,
    );
  }
  return left;
}
