import { floorComparison, UNIT_FATE, type UnitMatching } from '@/paving/comparison';
import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor, unitCorners, type Laying } from '@/paving/laying';
import { PLAIN_AGGREGATE, PLAIN_UNIT } from '../ui/drawing-colours';
import { pointsBounds } from '@/sheets/plan-view';

/** Hatching of each fate, as on the compare page: never by colour alone. */
const HATCHES = `<defs>
<pattern id="gone" width="90" height="90" patternUnits="userSpaceOnUse" patternTransform="rotate(-45)"><path d="M0 45H90" stroke="var(--brick)" stroke-width="14"/></pattern>
<pattern id="moved" width="90" height="90" patternUnits="userSpaceOnUse"><path d="M0 45H90" stroke="var(--amber)" stroke-width="14"/></pattern>
<pattern id="new" width="110" height="110" patternUnits="userSpaceOnUse"><path d="M25 55H85M55 25V85" stroke="var(--vial)" stroke-width="14"/></pattern>
</defs>`;

const STROKES = {
  gone: 'var(--brick)',
  moved: 'var(--amber)',
  new: 'var(--vial)',
  kept: 'var(--graphite)',
};
type Fate = keyof typeof STROKES;

/** Two floors laid over each other as SVG, y turned up by a transform, and how many units share each fate. */
export function overlayPicture(
  a: LayoutDocument,
  b: LayoutDocument,
): { readonly svg: string; readonly units: UnitMatching } {
  const [layingA, layingB] = [layFloor(a), layFloor(b)];
  const units = floorComparison(layingA, layingB);
  const path = (laying: Laying, fates: Uint8Array, fate: number) => {
    const { laid, motif } = laying;
    let d = '';
    for (let n = 0; n < laid.count; n++) {
      if (fates[n] !== fate) continue;
      const corners = unitCorners(motif[laid.k[n]], laid.x[n], laid.y[n]);
      d += `M${corners.map(([x, y]) => `${x.toFixed(1)} ${y.toFixed(1)}`).join('L')}Z`;
    }
    return d;
  };
  const drawn = (name: Fate, d: string) =>
    `<path d="${d}" fill="${PLAIN_UNIT}"/><path d="${d}" fill="${name === 'kept' ? 'none' : `url(#${name})`}" stroke="${STROKES[name]}" stroke-width="12"/>`;
  const rings = layingB.ground.rings.map(
    (ring) =>
      `M${ring.edges
        .flatMap((edge) => edge.chords.slice(0, -1))
        .map(([x, y]) => `${x} ${y}`)
        .join('L')}Z`,
  );
  const { least, greatest } = pointsBounds(layingB.ground.rings[0].edges.flatMap((e) => e.chords));
  const [width, height] = [greatest[0] - least[0] + 60, greatest[1] - least[1] + 60];
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${width} ${height}">${HATCHES}<g transform="translate(${30 - least[0]} ${30 + greatest[1]}) scale(1 -1)"><path d="${rings.join('')}" fill="${PLAIN_AGGREGATE}" fill-rule="evenodd"/>${drawn('kept', path(layingA, units.fateOfA, UNIT_FATE.kept))}${drawn('gone', path(layingA, units.fateOfA, UNIT_FATE.single))}${drawn('new', path(layingB, units.fateOfB, UNIT_FATE.single))}${drawn('moved', path(layingB, units.fateOfB, UNIT_FATE.moved))}<path d="${rings.join('')}" fill="none" stroke="var(--graphite)" stroke-width="22"/></g></svg>`;
  return { svg, units };
}
