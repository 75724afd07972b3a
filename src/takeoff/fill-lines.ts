import { formatArea } from '@/paving/area';
import { bondPattern } from '@/paving/bond';
import { formatCount } from '@/paving/count';
import { fillParts, type FillParts } from '@/paving/fill-parts';
import type { Laying } from '@/paving/laying';
import { formatLength, type Display } from '@/paving/length';
import { aggregateArea, type Report } from '@/paving/report';
import { TYPED_IN, type ChosenMaterial } from './chosen-material';
import { formatMass, formatWorkedVolume } from './measures';
import type { Assumption, TakeOffLine } from './take-off-line';
import { bondUnits } from './unit-lines';

const MM_PER_M = 1000;

export type FillPlace = 'joints' | 'voids' | 'margin';
export type FillMaterials = Readonly<Record<FillPlace, ChosenMaterial>>;

/** Parts of the fill as aggregate takes them: pieces cut at the edge take from the margin. */
export function aggregateParts(laying: Laying, report: Report): FillParts {
  const parts = fillParts(laying);
  const margin = Math.max(0, aggregateArea(report) - parts.joints - parts.voids);
  return { ...parts, margin };
}

/** `0.605 m³ × 1.10 = 0.666 m³ loose × 1 602 kg/m³ = 1.07 t`: from a volume in place to what is carted. */
export function looseWords(
  inPlace: number,
  bulk: number,
  density: number,
  densityWords: string,
  display: Display,
): string {
  const loose = inPlace * bulk;
  return `${formatWorkedVolume(inPlace, display)} × ${bulk.toFixed(2)} = ${formatWorkedVolume(loose, display)} loose; × ${densityWords} = ${formatMass(loose * density, display)}`;
}

/** An area with a depth as a volume: metric by the thousand, US by the foot. */
export function depthWords(areaM2: number, depthMm: number, display: Display): string {
  const [area, depth] = [
    formatArea(areaM2, display),
    formatLength(depthMm, display, { decimals: 1 }),
  ];
  const volume = formatWorkedVolume((areaM2 * depthMm) / MM_PER_M, display);
  return `${area} × ${depth}${display === 'metric' ? ' ÷ 1\u202f000' : ' ÷ 12'} = ${volume}`;
}

const PLACES: readonly (readonly [FillPlace, string])[] = [
  ['joints', 'Joints'],
  ['voids', 'Voids of the pattern'],
  ['margin', 'Margin along the edges'],
];

/** What is counted in each part, for its formula. */
function partWords(place: FillPlace, parts: FillParts, laying: Laying): string {
  const { display } = laying.document;
  if (place === 'joints') {
    const { joint } = bondPattern(laying.document);
    return `all gaps of ${formatLength(joint, display, { decimals: 1 })} between laid units`;
  }
  if (place === 'voids') {
    const counted = [
      parts.openPlaces > 0 ? `${formatCount(parts.openPlaces)} open places of the pattern` : '',
      parts.liftedPlaces > 0
        ? `${formatCount(parts.liftedPlaces)} ${parts.liftedPlaces === 1 ? 'unit' : 'units'} lifted out`
        : '',
    ].filter(Boolean);
    return counted.length > 0 ? counted.join(' and ') : 'open ground between units';
  }
  return 'the fill less joints and voids';
}

/** Lines of what fills the floor; a part without area has no line. */
export function fillLines(
  laying: Laying,
  parts: FillParts,
  materials: FillMaterials,
): TakeOffLine[] {
  const { document } = laying;
  const { display } = document;
  const thickness = Math.max(...bondUnits(laying).map((unit) => unit.thickness));
  return PLACES.flatMap(([place, name]) => {
    const area = parts[place];
    if (area <= 0) return [];
    const material = materials[place];
    const typed = document.materials?.[place]?.depth;
    const depth = typed ?? thickness;
    const inPlace = (area * depth) / MM_PER_M;
    const loose = inPlace * material.bulk;
    const deep: Assumption = {
      name: 'Depth',
      value: formatLength(depth, display, { decimals: 1 }),
      source: typed === undefined ? 'the unit’s thickness' : TYPED_IN,
      as: 'length',
      raw: depth,
      field: ['materials', place, 'depth'],
      own: typed !== undefined,
    };
    const density = material.assumptions.find(({ as }) => as === 'density')!;
    return [
      {
        id: `fill:${place}`,
        group: 'fill' as const,
        name: `${name}: ${material.name}`,
        amount: inPlace,
        measure: 'm3' as const,
        volume: { inPlace, loose },
        formula: `${partWords(place, parts, laying)}: ${depthWords(area, depth, display)}; ${looseWords(inPlace, material.bulk, material.density, density.value, display)}`,
        assumptions: [deep, ...material.assumptions],
        massKg: loose * material.density,
        orderId: material.orderId,
      },
    ];
  });
}
