import { formatCount } from '@/paving/count';
import type { LayoutDocument, Unit } from '@/paving/layout-document';
import type { Laying } from '@/paving/laying';
import type { Order, OrderWay } from '@/paving/materials';
import { TYPED_IN, priceItem, type ChosenMaterial } from './chosen-material';
import { geotextileRoll } from './layer-lines';
import { KG_PER_TONNE, formatAmount, formatFigure, formatMass } from './measures';
import { moneyTimes } from './money';
import { holderKg, holdsWords, packWords, packsFor, wayPack, type Pack } from './order-packs';
import type { PackMeasure, PriceItem, PriceKind, PriceList } from './price-list';
import type { Assumption, OrderLine, TakeOffLine, TakeOffMeasure } from './take-off-line';
import { bondUnits, unitMass } from './unit-lines';

/** Units beyond those laid and stone beyond what is worked out, per cent: common practice. */
const USUAL_SPARES: NonNullable<Order['spares']> = { rule: 'percent', value: 5 };
const USUAL_EXTRA = 5;
/** Up to so many kg a thing comes in bags, up to so many in bulk bags: both common practice. */
const GREATEST_IN_BAGS_KG = 300;
const GREATEST_IN_BULK_BAGS_KG = 4000;
/** Packs that hold the same to this share are one: a pound and a kilogram come back rounded. */
const SAME_HOLDS = 1e-6;
/** Joints wider than this, mm, are no part of what a pack of so many square metres is reckoned to cover. */
const GREATEST_COVERING_JOINT_MM = 10;

/** One thing to order: how much is needed, in every measure in which it can be bought. */
interface Need {
  readonly id: string;
  readonly kind: PriceKind;
  readonly name: string;
  readonly lines: readonly string[];
  readonly needed: number;
  readonly measure: TakeOffMeasure;
  readonly item: PriceItem | null;
  readonly ways: readonly OrderWay[];
  readonly usualWay: OrderWay;
  /** How much of a measure one of `measure` is; null where it cannot be said. */
  readonly each: (measure: PackMeasure) => number | null;
  readonly formula: string;
  readonly assumptions: readonly Assumption[];
}

const sparesOf = (document: LayoutDocument) => document.order?.spares ?? USUAL_SPARES;

/** Units with their spares, whole. */
function withSpares(count: number, { rule, value }: NonNullable<Order['spares']>): number {
  if (count === 0) return 0;
  return rule === 'count' ? count + value : Math.ceil(count * (1 + value / 100) - 1e-9);
}

function unitNeeds(
  laying: Laying,
  lines: readonly TakeOffLine[],
  prices: PriceList | null,
): Need[] {
  const { document, joint } = laying;
  const spares = sparesOf(document);
  const percent = spares.rule === 'percent';
  return bondUnits(laying).flatMap((unit: Unit) => {
    const own = lines.filter(({ id }) => id.startsWith(`units:${unit.id}:`));
    const orders = [...new Set(own.map(({ orderId }) => orderId!))];
    return orders.flatMap((id) => {
      const served = own.filter(({ orderId }) => orderId === id);
      const count = served.reduce((sum, { amount }) => sum + amount, 0);
      if (count === 0) return [];
      const needed = withSpares(count, spares);
      const item = priceItem(prices, unit.catalogueId);
      const { kg } = unitMass(laying, unit, prices);
      const gap =
        document.bond.kind === 'stepping' ? 0 : Math.min(joint, GREATEST_COVERING_JOINT_MM);
      const face = ((unit.length + gap) * (unit.width + gap)) / 1e6;
      const sum = served.map(({ amount }) => formatCount(amount)).join(' + ');
      return [
        {
          id,
          kind: 'unit' as const,
          name: served[0].name,
          lines: served.map((line) => line.id),
          needed,
          measure: 'each' as const,
          item,
          ways: item ? (['pack', 'each'] as const) : (['each'] as const),
          usualWay: item ? ('pack' as const) : ('each' as const),
          each: (measure: PackMeasure) => {
            if (measure === 'each') return 1;
            if (measure === 'm2') return face;
            if (measure === 'kg') return kg;
            return measure === 't' ? kg / KG_PER_TONNE : null;
          },
          formula: `${sum} + ${percent ? `${spares.value}\u202f%` : formatCount(spares.value)} spare = ${formatCount(needed)}`,
          assumptions: [
            {
              name: 'Spares',
              value: percent
                ? `${spares.value}\u202f%`
                : `${formatCount(spares.value)} of each kind`,
              source: document.order?.spares ? TYPED_IN : 'common practice',
              as: percent ? ('percent' as const) : ('count' as const),
              raw: spares.value,
              field: ['order', 'spares', 'value'],
              own: document.order?.spares !== undefined,
            },
          ],
        },
      ];
    });
  });
}

function materialNeeds(
  { document }: Laying,
  lines: readonly TakeOffLine[],
  materials: readonly ChosenMaterial[],
): Need[] {
  const { display } = document;
  const extra = document.order?.extra ?? USUAL_EXTRA;
  const orders = new Map(materials.map((material) => [material.orderId, material]));
  return [...orders.values()].flatMap((material): Need[] => {
    const served = lines.filter(({ orderId }) => orderId === material.orderId);
    const loose = served.reduce((sum, { volume }) => sum + (volume?.loose ?? 0), 0);
    if (loose <= 0) return [];
    const needed = loose * (1 + extra / 100);
    const kg = needed * material.density;
    const usualWay = material.item
      ? 'pack'
      : kg <= GREATEST_IN_BAGS_KG
        ? 'bag'
        : kg <= GREATEST_IN_BULK_BAGS_KG
          ? 'bulkBag'
          : 'mass';
    const sum = served.map(({ volume }) => formatAmount(volume!.loose, 'm3', display)).join(' + ');
    return [
      {
        id: material.orderId,
        kind: 'aggregate',
        name: material.name,
        lines: served.map(({ id }) => id),
        needed,
        measure: 'm3',
        item: material.item,
        ways: [
          ...(material.item ? (['pack'] as const) : []),
          'bag',
          'bulkBag',
          'load',
          'mass',
          'volume',
        ],
        usualWay,
        each: (measure) => {
          if (measure === 'm3') return 1;
          if (measure === 'kg') return material.density;
          return measure === 't' ? material.density / KG_PER_TONNE : null;
        },
        formula: `${sum} loose + ${extra}\u202f% = ${formatAmount(needed, 'm3', display)}, ${formatMass(kg, display)}`,
        assumptions: [
          {
            name: 'Beyond what is worked out',
            value: `${extra}\u202f%`,
            source:
              document.order?.extra === undefined
                ? 'common practice, for what is spilled and trodden in'
                : TYPED_IN,
            as: 'percent',
            raw: extra,
            field: ['order', 'extra'],
            own: document.order?.extra !== undefined,
          },
        ],
      },
    ];
  });
}

function sundryNeeds(
  { document }: Laying,
  lines: readonly TakeOffLine[],
  prices: PriceList | null,
): Need[] {
  const { display, materials } = document;
  return (['geotextile', 'edging'] as const).flatMap((id): Need[] => {
    const line = lines.find((candidate) => candidate.id === id);
    if (!line?.orderId || line.amount <= 0) return [];
    const item = priceItem(prices, materials?.[id]?.catalogueId);
    const width = geotextileRoll(document).rollWidth / 1000;
    const own = id === 'geotextile' ? 'area' : 'length';
    return [
      {
        id,
        kind: 'sundry',
        name: line.name,
        lines: [id],
        needed: line.amount,
        measure: line.measure,
        item,
        ways: item ? ['pack', own] : [own],
        usualWay: item ? 'pack' : own,
        each: (measure) => {
          if (measure === line.measure) return 1;
          return id === 'geotextile' && measure === 'm' ? 1 / width : null;
        },
        formula: formatAmount(line.amount, line.measure, display),
        assumptions: [],
      },
    ];
  });
}

/** What of a need a pack takes, and how many packs; null where the pack's measure says nothing of it. */
function packed(need: Need, pack: Pack): number | null {
  const each = need.each(pack.measure);
  return each === null ? null : packsFor(need.needed * each, pack);
}

/** What one pack costs by a catalogue's entry, minor units; null where the entry cannot say. */
function packCost(need: Need, pack: Pack): number | null {
  const { item } = need;
  if (!item) return null;
  if (pack === item.pack) return item.costMinor;
  // By another measure than the catalogue's own a price holds only where parts of its pack are sold.
  if (item.pack.whole && item.pack.holds !== 1) return null;
  const [ours, theirs] = [need.each(pack.measure), need.each(item.pack.measure)];
  if (ours === null || theirs === null) return null;
  const packs = ((pack.holds / ours) * theirs) / item.pack.holds;
  return moneyTimes(packs, item.costMinor, 'halfUp');
}

/** What somebody typed for one such pack, minor units. */
function typedCost(prices: PriceList | null, orderId: string, pack: Pack): number | null {
  const typed = prices?.typed?.find((price) => price.orderId === orderId);
  const same =
    typed &&
    typed.pack.measure === pack.measure &&
    Math.abs(typed.pack.holds - pack.holds) <= SAME_HOLDS * pack.holds;
  return same ? typed.costMinor : null;
}

/** What is bought, in the ways that the document chose. The catalogue's price goes before one that was typed. */
export function orderLines(
  laying: Laying,
  lines: readonly TakeOffLine[],
  materials: readonly ChosenMaterial[],
  prices: PriceList | null,
): OrderLine[] {
  const { document } = laying;
  const { display } = document;
  const needs = [
    ...unitNeeds(laying, lines, prices),
    ...materialNeeds(laying, lines, materials),
    ...sundryNeeds(laying, lines, prices),
  ];
  return needs.map((need) => {
    const chosen = document.order?.ways?.[need.id];
    let way = chosen && need.ways.includes(chosen) ? chosen : need.usualWay;
    let pack = wayPack(document, way, need.item);
    let amount = packed(need, pack);
    if (amount === null) {
      // The catalogue sells it by a measure that the take-off cannot turn it into.
      way = need.kind === 'unit' ? 'each' : need.kind === 'aggregate' ? 'mass' : need.ways[need.ways.length - 1]; // prettier-ignore
      pack = wayPack(document, way, need.item);
      amount = packed(need, pack) ?? 0;
    }
    const holder: Assumption[] =
      way === 'bag' || way === 'bulkBag' || way === 'load'
        ? [
            {
              name: { bag: 'A bag holds', bulkBag: 'A bulk bag holds', load: 'A lorry takes' }[way],
              value: holdsWords(pack, display),
              source: holderKg(document, way).own
                ? TYPED_IN
                : 'common practice; ask whoever delivers',
              as: 'mass',
              raw: pack.holds,
              field: ['order', way],
              own: holderKg(document, way).own,
            },
          ]
        : [];
    const listed = packCost(need, pack);
    const typed = listed === null ? typedCost(prices, need.id, pack) : null;
    const packCostMinor = listed ?? typed;
    const kgEach = need.each('kg');
    const inPack = need.each(pack.measure);
    const words = packWords(amount, pack, display);
    const byPack =
      pack.holds === 1 && pack.measure === 'each'
        ? ''
        : pack.whole
          ? `; by ${holdsWords(pack, display)} = ${formatFigure((need.needed * inPack!) / pack.holds, 2)}, so ${words}`
          : `; up to the next tenth, ${words}`;
    return {
      id: need.id,
      kind: need.kind,
      name: need.name,
      lines: need.lines,
      needed: need.needed,
      measure: need.measure,
      way,
      ways: need.ways,
      pack,
      amount,
      words,
      formula: `${need.formula}${byPack}`,
      assumptions: [...need.assumptions, ...holder],
      massKg: kgEach === null || inPack === null ? null : ((amount * pack.holds) / inPack) * kgEach,
      item: need.item && {
        id: need.item.id,
        supplier: need.item.supplier,
        from: need.item.from,
        ...(need.item.retired ? { retired: true as const } : {}),
      },
      packCostMinor,
      costMinor: packCostMinor === null ? null : moneyTimes(amount, packCostMinor, 'halfUp'),
      ...(typed === null ? {} : { priceTyped: true as const }),
    };
  });
}
