import { M2_PER_SQUARE_FOOT, formatArea } from '@/paving/area';
import { formatCount } from '@/paving/count';
import type { LayoutDocument } from '@/paving/layout-document';
import type { Display } from '@/paving/length';
import type { OrderWay } from '@/paving/materials';
import {
  KG_PER_POUND,
  KG_PER_SHORT_TON,
  KG_PER_TONNE,
  M3_PER_CUBIC_YARD,
  M_PER_FOOT,
  formatFigure,
  formatMass,
  formatRun,
  formatWorkedVolume,
} from './measures';
import type { PackMeasure, PriceItem } from './price-list';

/** What things are bought by: the catalogue's pack, bags, lorries, or plain measures. */
export interface Pack {
  /** Of one; its plural has an s. */
  readonly name: string;
  readonly holds: number;
  readonly measure: PackMeasure;
  readonly whole: boolean;
}

/** What bags and lorries hold unless somebody says otherwise, kg: common practice. */
const USUAL_KG: Readonly<Record<Display, Readonly<Record<'bag' | 'bulkBag' | 'load', number>>>> = {
  metric: { bag: 20, bulkBag: 800, load: 10 * KG_PER_TONNE },
  imperial: { bag: 50 * KG_PER_POUND, bulkBag: 2000 * KG_PER_POUND, load: 10 * KG_PER_SHORT_TON },
};

type Holder = 'bag' | 'bulkBag' | 'load';

/** What a bag, bulk bag or lorry holds, and whether somebody typed it. */
export function holderKg(
  document: Pick<LayoutDocument, 'display' | 'order'>,
  holder: Holder,
): { readonly kg: number; readonly own: boolean } {
  const typed = document.order?.[holder];
  return { kg: typed ?? USUAL_KG[document.display][holder], own: typed !== undefined };
}

/** What one lorry load holds: kg, and in words. */
export function loadHolds(document: Pick<LayoutDocument, 'display' | 'order'>) {
  const { kg } = holderKg(document, 'load');
  const pack = wayPack(document, 'load', null);
  return { kg, words: holdsWords(pack, document.display) };
}

/** Parts of a measure that are sold are not finer than this share of it. */
const MEASURE_STEP = 0.1;

const HOLDER_NAMES: Readonly<Record<Holder, string>> = {
  bag: 'bag',
  bulkBag: 'bulk bag',
  load: 'lorry load',
};

/** The pack of a way of ordering. */
export function wayPack(
  document: Pick<LayoutDocument, 'display' | 'order'>,
  way: OrderWay,
  item: PriceItem | null,
): Pack {
  const metric = document.display === 'metric';
  const plain = (name: string, holds: number, measure: PackMeasure): Pack => ({
    name,
    holds,
    measure,
    whole: false,
  });
  switch (way) {
    case 'pack':
      return item ? item.pack : { name: 'unit', holds: 1, measure: 'each', whole: true };
    case 'each':
      return { name: 'unit', holds: 1, measure: 'each', whole: true };
    case 'volume':
      return metric ? plain('m³', 1, 'm3') : plain('cubic yard', M3_PER_CUBIC_YARD, 'm3');
    case 'mass':
      return metric ? plain('t', 1, 't') : plain('short ton', KG_PER_SHORT_TON, 'kg');
    case 'length':
      return metric ? plain('m', 1, 'm') : plain('foot', M_PER_FOOT, 'm');
    case 'area':
      return metric ? plain('m²', 1, 'm2') : plain('square foot', M2_PER_SQUARE_FOOT, 'm2');
    case 'bag':
    case 'bulkBag':
    case 'load':
      return {
        name: HOLDER_NAMES[way],
        holds: holderKg(document, way).kg,
        measure: 'kg',
        whole: true,
      };
  }
}

/** A measure as a round figure: `800 kg`, `10 t`, `1 short ton`, `0.85 t`. */
const rounded = (text: string): string =>
  text
    .replace(/(\.\d*?)0+(?=\D|$)/, '$1')
    .replace(/\.(?=\D|$)/, '')
    .replace(/^1\u202fshort tons$/, '1\u202fshort ton');

/** What a pack holds, as text. */
export function holdsWords({ holds, measure }: Pack, display: Display): string {
  switch (measure) {
    case 'each':
      return formatCount(holds);
    case 'm':
      return rounded(formatRun(holds, display));
    case 'm2':
      return rounded(formatArea(holds, display));
    case 'm3':
      return rounded(formatWorkedVolume(holds, display));
    case 't':
      return rounded(formatMass(holds * KG_PER_TONNE, display));
    case 'kg':
      return rounded(formatMass(holds, display));
  }
}

const SYMBOLS = new Set(['t', 'm', 'm²', 'm³']);
/** Packs whose name says what they hold. */
const MEASURES = new Set([...SYMBOLS, 'cubic yard', 'short ton', 'foot', 'square foot']);

/** A pack's name for so many: `pallets`, `t`, `square feet`. */
export function packPlural(name: string, amount: number): string {
  if (amount === 1 || SYMBOLS.has(name)) return name;
  if (name === 'foot') return 'feet';
  if (name === 'square foot') return 'square feet';
  return name.endsWith('s') ? name : `${name}s`;
}

/** `3 bulk bags of 800 kg`, `12.4 t`, `91 units`, `4 pallets of 24`. */
export function packWords(amount: number, pack: Pack, display: Display): string {
  const figure = pack.whole ? formatCount(amount) : formatFigure(amount, 1);
  const gap = SYMBOLS.has(pack.name) ? '\u202f' : ' ';
  const bare =
    MEASURES.has(pack.name) || (pack.holds === 1 && (pack.measure === 'each' || !pack.whole));
  return `${figure}${gap}${packPlural(pack.name, amount)}${bare ? '' : ` of ${holdsWords(pack, display)}`}`;
}

/** So many packs for what is needed, both in the pack's measure: whole packs, or to a tenth, never less. */
export function packsFor(needed: number, { holds, whole }: Pack): number {
  // What rounding adds to a number of packs that comes out even is no reason for one more.
  const packs = needed / holds - 1e-9;
  return whole
    ? Math.max(0, Math.ceil(packs))
    : Math.max(0, Math.round(Math.ceil(packs / MEASURE_STEP)) / (1 / MEASURE_STEP));
}
