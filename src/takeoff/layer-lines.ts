import { formatArea } from '@/paving/area';
import { buildUpSaid, documentBuildUp } from '@/paving/build-up';
import { formatCount } from '@/paving/count';
import type { Laying } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { formatLength, MM_PER_FOOT, type Display } from '@/paving/length';
import type { MaterialPlace } from '@/paving/materials';
import { TYPED_IN, type ChosenMaterial } from './chosen-material';
import { dugRegion } from './dug-region';
import type { EarthVolumes } from './earth-volumes';
import { depthWords, looseWords } from './fill-lines';
import { GROUND_DEFAULTS } from './material-kinds';
import { formatDensity, formatRun, formatWorkedVolume } from './measures';
import { loadHolds } from './order-packs';
import type { Assumption, TakeOffLine } from './take-off-line';

const MM_PER_M = 1000;
/** Strips of a geotextile overlap by this, mm, 12 in, and it goes up the sides of the dig. */
const GEOTEXTILE_LAP_MM: Readonly<Record<Display, number>> = {
  metric: 300,
  imperial: MM_PER_FOOT,
};
const GEOTEXTILE_SOURCE =
  'Masonry Magazine, April 2007, p. 52: strips overlap by at least 300\u202fmm (12 in), up the sides of the dig';
/** A usual roll, mm: 4.5 m, or 15 ft. */
const ROLL_WIDTH_MM: Readonly<Record<Display, number>> = {
  metric: 4500,
  imperial: 15 * MM_PER_FOOT,
};

/** Lap and roll of the geotextile that a document has or takes, mm. */
export const geotextileRoll = ({
  display,
  materials,
}: Pick<LayoutDocument, 'display' | 'materials'>): {
  readonly lap: number;
  readonly rollWidth: number;
} => ({
  lap: materials?.geotextile?.lap ?? GEOTEXTILE_LAP_MM[display],
  rollWidth: materials?.geotextile?.rollWidth ?? ROLL_WIDTH_MM[display],
});

const given = (name: string, value: string, source: string): Assumption => ({
  name,
  value,
  source,
  as: null,
  raw: null,
  field: null,
  own: false,
});

/** Bedding and base, in place and as they are carted. */
export function layerLines(
  { document }: Laying,
  earth: EarthVolumes,
  materials: Readonly<Record<'bedding' | 'base', ChosenMaterial>>,
): TakeOffLine[] {
  const { display, buildUp } = document;
  const { bedding, base } = documentBuildUp(document);
  const from = buildUpSaid(document)
    ? 'typed in under Levels'
    : buildUp
      ? 'not looked at yet: common practice'
      : 'not looked at yet: the least that is usual';
  const thick = (mm: number) =>
    given('Thickness', formatLength(mm, display, { decimals: 1 }), from);
  const more = (m3: number, why: string) =>
    m3 > 0 ? ` + ${formatWorkedVolume(m3, display)} ${why}` : '';
  const line = (
    place: MaterialPlace & ('bedding' | 'base'),
    name: string,
    inPlace: number,
    layer: number,
    said: string,
    thickness: number,
  ): TakeOffLine[] => {
    if (inPlace <= 0) return [];
    const { bulk, density, orderId, assumptions, name: material } = materials[place];
    const densityWords = assumptions.find(({ as }) => as === 'density')!.value;
    const sum = said ? `${said} = ${formatWorkedVolume(inPlace, display)}` : '';
    return [
      {
        id: `layer:${place}`,
        group: 'layers',
        name: `${name}: ${material}`,
        amount: inPlace,
        measure: 'm3',
        volume: { inPlace, loose: inPlace * bulk },
        formula: `${depthWords(layer, thickness, display)}${sum}; ${looseWords(inPlace, bulk, density, densityWords, display)}`,
        assumptions: [thick(thickness), ...assumptions],
        massKg: inPlace * bulk * density,
        orderId,
      },
    ];
  };
  return [
    ...line(
      'bedding',
      'Bedding',
      earth.bedding,
      earth.area,
      more(earth.beddingUnderThin, 'under thinner units'),
      bedding,
    ),
    ...line(
      'base',
      'Base',
      earth.base,
      earth.dugArea,
      more(earth.fill, 'where the ground is low'),
      base,
    ),
  ];
}

/** What is dug and carted away. */
export function spoilLine({ document }: Laying, earth: EarthVolumes): TakeOffLine[] {
  if (earth.spoil <= 0) return [];
  const { display, materials } = document;
  const own = materials?.spoil ?? {};
  const ground = GROUND_DEFAULTS[own.ground ?? 'earth'];
  const bulk = own.bulk ?? ground.bulk.value;
  const density = own.density ?? ground.density.value;
  const loose = earth.spoil * bulk;
  const massKg = loose * density;
  const { kg, words } = loadHolds(document);
  const loads = Math.ceil(massKg / kg - 1e-9);
  return [
    {
      id: 'earth:spoil',
      group: 'earth',
      name: 'Spoil to cart away',
      amount: earth.spoil,
      measure: 'm3',
      volume: { inPlace: earth.spoil, loose },
      formula: `${formatWorkedVolume(earth.spoil, display)} as it lies; ${looseWords(earth.spoil, bulk, density, formatDensity(density, display), display)}: ${formatCount(loads)} ${loads === 1 ? 'load' : 'loads'} of ${words}`,
      assumptions: [
        {
          ...given('Ground', ground.name, own.ground ? 'chosen' : 'not known yet: taken as earth'),
          as: 'ground',
          field: ['materials', 'spoil', 'ground'],
          own: own.ground !== undefined,
        },
        {
          ...given(
            'Loose for one as it lies',
            bulk.toFixed(2),
            own.bulk ? TYPED_IN : ground.bulk.source,
          ),
          as: 'factor',
          raw: bulk,
          field: ['materials', 'spoil', 'bulk'],
          own: own.bulk !== undefined,
        },
        {
          ...given(
            'Weighs, loose',
            formatDensity(density, display),
            own.density ? TYPED_IN : ground.density.source,
          ),
          as: 'density',
          raw: density,
          field: ['materials', 'spoil', 'density'],
          own: own.density !== undefined,
        },
      ],
      massKg,
      orderId: null,
    },
  ];
}

/** Geotextile with its laps and up the sides, where the build-up has one. */
export function geotextileLine(laying: Laying, earth: EarthVolumes): TakeOffLine[] {
  const { document, ground } = laying;
  const { display, materials } = document;
  const { geotextile, bedding, base, overdig } = documentBuildUp(document);
  if (!geotextile) return [];
  const { lap, rollWidth } = geotextileRoll(document);
  const rings = dugRegion(ground, overdig) ?? dugRegion(ground, 0)!;
  const round = rings.reduce(
    (sum, ring) =>
      sum +
      ring.reduce((length, [x, y], n) => {
        const [nx, ny] = ring[(n + 1) % ring.length];
        return length + Math.hypot(nx - x, ny - y);
      }, 0),
    0,
  );
  const up = bedding + base;
  const sides = (round * up) / 1e6;
  const laps = rollWidth / (rollWidth - lap);
  const amount = (earth.dugArea + sides) * laps;
  const length = (mm: number) => formatLength(mm, display, { decimals: 1 });
  return [
    {
      id: 'geotextile',
      group: 'sundries',
      name: 'Geotextile under the base',
      amount,
      measure: 'm2',
      volume: null,
      formula: `(${formatArea(earth.dugArea, display)} of ground + ${formatRun(round / MM_PER_M, display)} of side × ${length(up)} = ${formatArea(sides, display)}) × ${length(rollWidth)} ÷ (${length(rollWidth)} − ${length(lap)}) for laps = ${formatArea(amount, display)}`,
      assumptions: [
        {
          ...given('Lap', length(lap), materials?.geotextile?.lap ? TYPED_IN : GEOTEXTILE_SOURCE),
          as: 'length',
          raw: lap,
          field: ['materials', 'geotextile', 'lap'],
          own: materials?.geotextile?.lap !== undefined,
        },
        {
          ...given('Roll’s width', length(rollWidth), materials?.geotextile?.rollWidth ? TYPED_IN : 'common practice'), // prettier-ignore
          as: 'length',
          raw: rollWidth,
          field: ['materials', 'geotextile', 'rollWidth'],
          own: materials?.geotextile?.rollWidth !== undefined,
        },
      ],
      massKg: null,
      orderId: 'geotextile',
    },
  ];
}

/** The perimeter's own length; it is ordered where somebody wants an edging. */
export function edgingLine({ document, ground }: Laying): TakeOffLine[] {
  const [perimeter] = ground.rings;
  const metres = perimeter.edges.reduce((sum, { length }) => sum + length, 0) / MM_PER_M;
  const wanted = document.materials?.edging?.wanted ?? false;
  return [
    {
      id: 'edging',
      group: 'sundries',
      name: wanted ? 'Edging' : 'Edge (it stands already)',
      amount: metres,
      measure: 'm',
      volume: null,
      formula: `once round the perimeter: ${formatRun(metres, document.display)}${wanted ? '' : '; nothing to order'}`,
      assumptions: [],
      massKg: null,
      orderId: wanted ? 'edging' : null,
    },
  ];
}
