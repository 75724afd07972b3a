import { bondPattern } from '@/paving/bond';
import { formatCount } from '@/paving/count';
import type { Unit } from '@/paving/layout-document';
import type { Laying } from '@/paving/laying';
import { formatLength } from '@/paving/length';
import type { Report } from '@/paving/report';
import { unitTone } from '@/paving/tones';
import { TYPED_IN, priceItem } from './chosen-material';
import { UNIT_DENSITY } from './material-kinds';
import { formatDensity, formatMass } from './measures';
import type { PriceList } from './price-list';
import type { Assumption, TakeOffLine } from './take-off-line';

const MM3_PER_M3 = 1e9;

/** One unit's mass, kg, and where that comes from. */
export function unitMass(
  { document }: Pick<Laying, 'document'>,
  unit: Unit,
  prices: PriceList | null,
): { readonly kg: number; readonly formula: string; readonly assumptions: readonly Assumption[] } {
  const { display } = document;
  const listed = priceItem(prices, unit.catalogueId)?.massKg ?? null;
  const given = unit.mass ?? listed;
  if (given !== null) {
    return {
      kg: given,
      formula: `${formatMass(given, display)} each`,
      assumptions: [
        {
          name: 'One unit weighs',
          value: formatMass(given, display),
          source: unit.mass === undefined ? 'the catalogue' : 'given with the unit',
          as: null,
          raw: given,
          field: null,
          own: unit.mass !== undefined,
        },
      ],
    };
  }
  const typed = document.materials?.unitDensity;
  const density = typed ?? UNIT_DENSITY.value;
  const kg = ((unit.length * unit.width * unit.thickness) / MM3_PER_M3) * density;
  const sides = [unit.length, unit.width, unit.thickness]
    .map((side) => formatLength(side, display, { decimals: 1, unit: display === 'imperial' }))
    .join(' × ');
  return {
    kg,
    formula: `${sides}${display === 'metric' ? '\u202fmm' : ''} × ${formatDensity(density, display)} = ${formatMass(kg, display)} each`,
    assumptions: [
      {
        name: 'Units weigh',
        value: formatDensity(density, display),
        source: typed === undefined ? UNIT_DENSITY.source : TYPED_IN,
        as: 'density',
        raw: density,
        field: ['materials', 'unitDensity'],
        own: typed !== undefined,
      },
    ],
  };
}

/** Ids of the units that the bond uses, each once, in the motif's order. */
export function bondUnits({ document, motif }: Laying): readonly Unit[] {
  const ids = new Set(bondPattern(document).motif.map(({ unit }) => unit));
  return [...ids].map((id) => motif.find(({ unit }) => unit.id === id)!.unit);
}

/** Laid units by kind and tone, and those that pieces are sawn from. */
export function unitLines(
  laying: Laying,
  report: Pick<Report, 'cut'>,
  prices: PriceList | null,
): TakeOffLine[] {
  const { document, laid, motif } = laying;
  const { display } = document;
  const toned = document.tones !== undefined && document.tones.rule !== 'single';
  const units = bondUnits(laying);
  const kindOf = motif.map(({ unit }) => units.findIndex(({ id }) => id === unit.id));
  const counts = units.map(() => [0, 0]);
  for (let n = 0; n < laid.count; n++) {
    const k = laid.k[n];
    counts[kindOf[k]][toned ? unitTone(document, laid.i[n], laid.j[n], k) : 0] += 1;
  }
  return units.flatMap((unit, n) => {
    const mass = unitMass(laying, unit, prices);
    const line = (end: string, name: string, count: number, said: string, order: string) => ({
      id: `units:${unit.id}:${end}`,
      group: 'units' as const,
      name,
      amount: count,
      measure: 'each' as const,
      volume: null,
      formula: `${formatCount(count)} ${said}; ${mass.formula}, ${formatMass(count * mass.kg, display)} in all`,
      assumptions: mass.assumptions,
      massKg: count * mass.kg,
      orderId: `units:${unit.id}:${order}`,
    });
    const tones = (
      toned ? (['first-tone', 'second-tone'] as const) : (['first-tone'] as const)
    ).map((tone, which) =>
      line(
        tone,
        toned ? `${unit.name}, ${tone === 'first-tone' ? 'first' : 'second'} tone` : unit.name,
        counts[n][which],
        'laid whole',
        tone,
      ),
    );
    // A piece is sawn from a unit of its own tone, so that each tone is ordered with what is sawn from it.
    const sawn = report.cut?.byUnit[unit.id] ?? 0;
    const ofSecond = toned ? (report.cut?.bySecondTone[unit.id] ?? 0) : 0;
    const toCut = [
      ['to-cut', 'first', sawn - ofSecond] as const,
      ['to-cut-second-tone', 'second', ofSecond] as const,
    ].flatMap(([end, tone, count]) =>
      count > 0
        ? [
            line(
              end,
              `${unit.name}, ${toned ? `${tone} tone, ` : ''}to be cut`,
              count,
              'to saw pieces from',
              `${tone}-tone`,
            ),
          ]
        : [],
    );
    return [...tones, ...toCut];
  });
}
