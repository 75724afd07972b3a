import { buildUpSaid } from '@/paving/build-up';
import { bondPattern } from '@/paving/bond';
import type { FillParts } from '@/paving/fill-parts';
import type { Laying } from '@/paving/laying';
import { formatLength } from '@/paving/length';
import type { Report } from '@/paving/report';
import { formatStone, priceItem, type ChosenMaterial } from './chosen-material';
import type { EarthVolumes } from './earth-volumes';
import type { FillPlace } from './fill-lines';
import { MATERIAL_DEFAULTS } from './material-kinds';
import { formatMass } from './measures';
import { itemFits, type PriceList } from './price-list';
import type { OrderLine, TakeOffLine, TakeOffWarning } from './take-off-line';
import { bondUnits, unitMass } from './unit-lines';

/** Heavier than this is a two-person or machine lift, kg: the load constant of NIOSH, 51 lb. */
const LIFT_KG = 23;
const NIOSH =
  'NIOSH publication 94-110: 23\u202fkg (51\u202flb) is the most in the best of circumstances';
/** A stone goes into a gap that is at least twice as wide. */
const STONE_SHARE = 1 / 2;
const HALF = 'common practice: a stone goes where the gap is twice as wide';
const CMHA = 'CMHA, “Proper concrete paver base and depth”';
/** Openings wider than this, mm, are none on an accessible route. */
const ADA_OPENING_MM = 13;

interface Looked {
  readonly laying: Laying;
  readonly report: Pick<Report, 'leastGap' | 'wholeUnits'>;
  readonly parts: FillParts;
  readonly materials: Readonly<Record<FillPlace | 'bedding' | 'base', ChosenMaterial>>;
  readonly earth: EarthVolumes;
  readonly lines: readonly TakeOffLine[];
  readonly orders: readonly OrderLine[];
  readonly prices: PriceList | null;
}

/** Stones against the gaps that they are to fill. */
function stoneWarnings({ laying, report, parts, materials }: Looked): TakeOffWarning[] {
  const { document } = laying;
  const { display } = document;
  const shown = (mm: number) => formatLength(mm, display, { decimals: 1 });
  const tooLarge = (
    place: FillPlace,
    gap: number,
    where: string,
    then: string,
  ): TakeOffWarning[] => {
    const { name, stone } = materials[place];
    if (gap <= 0 || stone[1] <= gap * STONE_SHARE) return [];
    return [
      {
        id: `stone-too-large:${place}`,
        weight: place === 'joints' ? 'wrong' : 'look',
        words: `${name} (${formatStone(stone, display)}) will not go ${where} of ${shown(gap)}: the largest stone may be ${shown(gap * STONE_SHARE)} there. ${then}`,
        source: HALF,
        line: `fill:${place}`,
      },
    ];
  };
  const { joint } = bondPattern(document);
  return [
    ...(parts.joints > 0
      ? tooLarge('joints', joint, 'into joints', 'Take a finer one, or wider joints.')
      : []),
    ...(parts.margin > 0 && report.leastGap !== null
      ? tooLarge(
          'margin',
          report.leastGap,
          'into the least gap at the edge,',
          'Take a finer one for the narrow places, or look in Fit for a start with a wider least gap.',
        )
      : []),
  ];
}

/** Materials that do not go together, or not where they are put. */
function materialWarnings({ materials, parts, lines }: Looked): TakeOffWarning[] {
  const { bedding, base } = materials;
  const warnings: TakeOffWarning[] = [];
  const has = (line: string) => lines.some(({ id }) => id === line);
  const kindOf = (material: ChosenMaterial) => MATERIAL_DEFAULTS[material.kind];
  const sandPlaces = (['joints', 'voids', 'margin'] as const).filter(
    (place) => parts[place] > 0 && kindOf(materials[place]).sand,
  );
  if (has('layer:bedding') && kindOf(bedding).open && sandPlaces.length > 0) {
    warnings.push({
      id: 'sand-over-open-bedding',
      weight: 'wrong',
      words: `${materials[sandPlaces[0]].name} trickles down into a bedding of ${bedding.name.toLowerCase()} and leaves the joints empty. Fill with fine chippings, or lay on sharp sand.`,
      source: 'Interlock Design 2019, issue 3, p. 13: sand works down into No. 8 and No. 89 stone',
      line: 'layer:bedding',
    });
  }
  if (has('layer:base') && kindOf(base).rounded) {
    warnings.push({
      id: 'rounded-base',
      weight: 'wrong',
      words: `${base.name} is rounded and does not lock together: no base of river stone or pea gravel. Take crushed stone.`,
      source: CMHA,
      line: 'layer:base',
    });
  }
  for (const [line, material] of [
    ['layer:base', base],
    ['layer:bedding', bedding],
  ] as const) {
    if (has(line) && material.kind === 'stoneDust') {
      warnings.push({
        id: `dust:${line}`,
        weight: 'wrong',
        words: `${material.name} holds water and moves: never under paving. ${line === 'layer:base' ? 'Take crushed stone of all sizes.' : 'Take sharp sand or fine clean stone.'}`,
        source: `${CMHA}: never use stone dust or screenings`,
        line,
      });
    }
  }
  if (has('layer:base') && kindOf(base).sand) {
    warnings.push({
      id: 'sand-base',
      weight: 'look',
      words: `${base.name} alone is no base for a floor that is walked on in the wet: crushed stone is usual.`,
      source: 'common practice',
      line: 'layer:base',
    });
  }
  if (has('layer:base') && has('layer:bedding') && kindOf(base).open && kindOf(bedding).sand) {
    warnings.push({
      id: 'sand-over-open-base',
      weight: 'look',
      words: `${bedding.name} runs down into the pores of ${base.name.toLowerCase()}. Lay a bedding of fine clean stone, or a geotextile between them.`,
      source: 'common practice',
      line: 'layer:bedding',
    });
  }
  return warnings;
}

/** Units priced by an entry of the catalogue that is another size. */
function sizeWarnings({ laying, prices }: Looked): TakeOffWarning[] {
  const { display } = laying.document;
  const sides = (lengths: readonly number[]) =>
    lengths.map((mm) => formatLength(mm, display, { decimals: 1 })).join(' × ');
  return bondUnits(laying).flatMap((unit): TakeOffWarning[] => {
    const item = priceItem(prices, unit.catalogueId);
    if (!item?.size || itemFits(item, unit)) return [];
    return [
      {
        id: `other-size:${unit.id}`,
        weight: 'wrong',
        words: `${unit.name} is priced as ${item.name}, which the catalogue has as ${sides(item.size)}. The floor lays ${sides([unit.length, unit.width, unit.thickness])}: choose an entry of that size.`,
        source: null,
        line: `units:${unit.id}:first-tone`,
      },
    ];
  });
}

/** What hurts people. */
function peopleWarnings({ laying, parts, orders, prices }: Looked): TakeOffWarning[] {
  const { document } = laying;
  const { display } = document;
  const warnings: TakeOffWarning[] = [];
  for (const unit of bondUnits(laying)) {
    const { kg } = unitMass(laying, unit, prices);
    if (kg <= LIFT_KG) continue;
    warnings.push({
      id: `lift:${unit.id}`,
      weight: 'caution',
      words: `One ${unit.name} weighs ${formatMass(kg, display)}: lift it with two people or a machine, and follow the rules for lifting where you work.`,
      source: NIOSH,
      line: `units:${unit.id}:first-tone`,
    });
  }
  const heavy = orders.find(
    ({ kind, way, pack, massKg, amount }) =>
      kind === 'aggregate' &&
      massKg !== null &&
      amount > 0 &&
      pack.whole &&
      (way === 'bag' || (way === 'pack' && massKg / amount <= 60)) &&
      massKg / amount > LIFT_KG,
  );
  if (heavy) {
    warnings.push({
      id: 'lift:bags',
      weight: 'caution',
      words: `A ${heavy.pack.name.toLowerCase()} of ${heavy.name.toLowerCase()} weighs ${formatMass(heavy.massKg! / heavy.amount, display)}: too heavy for one person to lift again and again.`,
      source: NIOSH,
      line: heavy.lines[0] ?? null,
    });
  }
  const { joint } = bondPattern(document);
  if (parts.voids > 0 || (parts.joints > 0 && joint > ADA_OPENING_MM)) {
    warnings.push({
      id: 'not-accessible',
      weight: 'caution',
      words:
        'A floor with open places or loose stone is not an accessible route: wheels, sticks and heels go in. Where one is asked for, ask whoever is licensed to say so.',
      source: 'ADA Standards 302.3: no opening lets a 13\u202fmm (1/2 in) ball pass',
      line: parts.voids > 0 ? 'fill:voids' : 'fill:joints',
    });
  }
  return warnings;
}

/** Things that nobody has said yet, on which figures hang. */
function openWarnings({ laying, parts, earth, report }: Looked): TakeOffWarning[] {
  const { document } = laying;
  const warnings: TakeOffWarning[] = [];
  if (report.wholeUnits === 0) {
    warnings.push({
      id: 'nothing-laid',
      weight: 'look',
      words:
        'No unit is laid, so only the fill and the layers are counted. Look at Unit, Bond and Fit first.',
      source: null,
      line: null,
    });
  }
  if (!buildUpSaid(document)) {
    warnings.push({
      id: 'no-build-up',
      weight: 'look',
      words:
        'Bedding and base have not been looked at yet: the least that is usual for a floor to walk on is taken. Say what they are under Levels.',
      source: null,
      line: 'layer:base',
    });
  }
  if (!parts.toldApart) {
    warnings.push({
      id: 'not-told-apart',
      weight: 'look',
      words:
        'In this pattern joints and voids cannot all be told from the margin; the fill as a whole is right.',
      source: null,
      line: 'fill:margin',
    });
  }
  for (const { kind, text } of earth.warnings) {
    warnings.push({
      id: `levels:${kind}`,
      weight: 'look',
      words: text,
      source: null,
      line: 'earth:spoil',
    });
  }
  return warnings;
}

/** Everything worth a second look, what will not work first. */
export function takeOffWarnings(looked: Looked): TakeOffWarning[] {
  const order = { wrong: 0, look: 1, caution: 2 };
  return [
    ...sizeWarnings(looked),
    ...stoneWarnings(looked),
    ...materialWarnings(looked),
    ...openWarnings(looked),
    ...peopleWarnings(looked),
  ].sort((one, other) => order[one.weight] - order[other.weight]);
}
