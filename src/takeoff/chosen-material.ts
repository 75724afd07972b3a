import type { LayoutDocument } from '@/paving/layout-document';
import type { Laying } from '@/paving/laying';
import { formatLength, type Display } from '@/paving/length';
import type { MaterialKind, MaterialPlace } from '@/paving/materials';
import { MATERIAL_DEFAULTS, kindByName, kindByStone } from './material-kinds';
import { formatDensity } from './measures';
import type { PriceItem, PriceList } from './price-list';
import type { Assumption } from './take-off-line';

/** What a place of the floor is filled or laid with: the document's choice, the catalogue's entry, the defaults. */
export interface ChosenMaterial {
  readonly name: string;
  readonly kind: MaterialKind;
  /** The order that it is part of: one for all places with the same material. */
  readonly orderId: string;
  readonly item: PriceItem | null;
  readonly stone: readonly [number, number];
  /** Loose, kg/m³. */
  readonly density: number;
  /** Loose volume for one in place. */
  readonly bulk: number;
  readonly assumptions: readonly Assumption[];
}

/** The source of a figure that a person typed. */
export const TYPED_IN = 'typed in';
const CATALOGUE = 'the catalogue';

/** What a document without an aggregate is drawn with. */
const PLAIN_AGGREGATE_NAME = 'Golden gravel';

/** The entry of the price list with this id; null without one. */
export const priceItem = (prices: PriceList | null, id: string | undefined): PriceItem | null =>
  (id !== undefined && prices?.items.find((item) => item.id === id)) || null;

/** Sizes of stone: `2.4 to 9.5 mm`, `up to 1.2 mm`. */
export function formatStone([small, large]: readonly [number, number], display: Display): string {
  const most = formatLength(large, display, { decimals: 1 });
  return small < 0.05
    ? `up to ${most}`
    : `${formatLength(small, display, { decimals: 1, unit: false })} to ${most}`;
}

/** What is taken when nobody chose: its name, its kind, and why. */
function usualMaterial(
  { document, joint }: Pick<Laying, 'document' | 'joint'>,
  place: MaterialPlace,
): { name: string; kind: MaterialKind; catalogueId?: string; source: string } {
  if (place === 'bedding') {
    return {
      kind: 'sharpSand',
      name: MATERIAL_DEFAULTS.sharpSand.name,
      source: 'ASTM C33 sand is the usual bedding',
    };
  }
  if (place === 'base') {
    return {
      kind: 'crushedStone',
      name: MATERIAL_DEFAULTS.crushedStone.name,
      source: 'common practice: crushed stone of all sizes compacts well',
    };
  }
  const name = document.aggregate?.name ?? PLAIN_AGGREGATE_NAME;
  const kind = kindByName(name) ?? 'chippings';
  if (place === 'joints' && 2 * MATERIAL_DEFAULTS[kind].stone[1] > joint) {
    const width = formatLength(joint, document.display, { decimals: 1 });
    return {
      kind: 'jointingSand',
      name: MATERIAL_DEFAULTS.jointingSand.name,
      source: `stones of “${name}” do not go into joints of ${width}`,
    };
  }
  return {
    name,
    kind,
    catalogueId: document.aggregate?.catalogueId,
    source: `by the name “${name}”`,
  };
}

/** The material of a place, each of its figures with where it comes from. */
export function chosenMaterial(
  laying: Pick<Laying, 'document' | 'joint'>,
  place: MaterialPlace,
  prices: PriceList | null,
): ChosenMaterial {
  const { document } = laying;
  const { display } = document;
  const own: NonNullable<NonNullable<LayoutDocument['materials']>['joints']> =
    document.materials?.[place] ?? {};
  const usual = usualMaterial(laying, place);
  const chose = own.kind !== undefined || own.name !== undefined || own.catalogueId !== undefined;
  const catalogueId = chose ? own.catalogueId : usual.catalogueId;
  const item = priceItem(prices, catalogueId);
  const name = own.name ?? item?.name ?? (own.kind ? MATERIAL_DEFAULTS[own.kind].name : usual.name);
  // An entry of the catalogue says what it is by its name, else by its stones; else it is the usual for the place.
  const named = chose ? kindByName(name) : null;
  const kind =
    own.kind ??
    (chose ? (named ?? (item?.stone ? kindByStone(item.stone) : null)) : null) ??
    usual.kind;
  const why = own.kind
    ? 'chosen'
    : !chose
      ? usual.source
      : named
        ? `by the name “${name}”`
        : item?.stone
          ? 'by its stones in the catalogue'
          : 'usual for the place';
  const defaults = MATERIAL_DEFAULTS[kind];
  const at = (key: string) => ['materials', place, key];
  const stone = own.stone ?? item?.stone ?? defaults.stone;
  const density = own.density ?? item?.looseDensity ?? defaults.density.value;
  const bulk = own.bulk ?? defaults.bulk.value;
  const from = (typed: boolean, listed: boolean, otherwise: string) =>
    typed ? TYPED_IN : listed ? CATALOGUE : otherwise;
  return {
    name,
    kind,
    orderId: `material:${catalogueId ?? `${kind}:${name}`}`,
    item,
    stone,
    density,
    bulk,
    assumptions: [
      {
        name: 'Taken as',
        value: defaults.name,
        source: why,
        as: 'material',
        raw: null,
        field: at('kind'),
        own: own.kind !== undefined,
      },
      {
        name: 'Stone',
        value: formatStone(stone, display),
        source: from(own.stone !== undefined, Boolean(item?.stone), defaults.stoneSource),
        as: null,
        raw: null,
        field: null,
        own: own.stone !== undefined,
      },
      {
        name: 'Loose for one in place',
        value: bulk.toFixed(2),
        source: from(own.bulk !== undefined, false, defaults.bulk.source),
        as: 'factor',
        raw: bulk,
        field: at('bulk'),
        own: own.bulk !== undefined,
      },
      {
        name: 'Weighs, loose',
        value: formatDensity(density, display),
        source: from(
          own.density !== undefined,
          item?.looseDensity != null,
          defaults.density.source,
        ),
        as: 'density',
        raw: density,
        field: at('density'),
        own: own.density !== undefined,
      },
    ],
  };
}
