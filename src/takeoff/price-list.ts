import type { Unit } from '@/paving/layout-document';

/**
 * What the firm's catalogue asks for the things that floors take, as of one day. A saved version
 * freezes the list that it was priced with. Money is whole minor units of the currency (cents,
 * pence); no float stands for money anywhere.
 */

/** What a pack holds so much of. */
export type PackMeasure = 'each' | 'm' | 'm2' | 'm3' | 't' | 'kg';

export type PriceKind = 'unit' | 'aggregate' | 'sundry';

export interface PriceItem {
  /** The catalogue's id; `catalogueId` of a document's unit or material. */
  readonly id: string;
  readonly kind: PriceKind;
  readonly name: string;
  readonly supplier: string;
  /** What is bought at once: so many of a measure. A pack may have to be bought whole. */
  readonly pack: {
    readonly name: string;
    readonly holds: number;
    readonly measure: PackMeasure;
    readonly whole: boolean;
  };
  /** For one pack, without tax, in minor units. */
  readonly costMinor: number;
  /** The day from which the price holds, `2026-03-01`. */
  readonly from: string;
  /** One unit's, kg; null where it is not known. */
  readonly massKg: number | null;
  /** As delivered, loose, kg/m³; null where it is not known. */
  readonly looseDensity: number | null;
  /** Smallest and largest stone, mm; null for what is no aggregate. */
  readonly stone: readonly [number, number] | null;
  /** Length, width and thickness of a unit, mm; left out where the catalogue does not give all three. */
  readonly size?: readonly [number, number, number];
  /** No longer offered; in the list because a floor was drawn with it. */
  readonly retired?: true;
}

/** A price that somebody typed for an order that the catalogue has none for. */
export interface TypedPrice {
  readonly orderId: string;
  /** For one pack, without tax, in minor units. */
  readonly costMinor: number;
  /** The pack that it is for; it says nothing of another. */
  readonly pack: { readonly holds: number; readonly measure: PackMeasure };
}

export interface PriceList {
  /** ISO 4217. */
  readonly currency: string;
  /** The day that it was drawn up for, `2026-03-01`. */
  readonly on: string;
  readonly items: readonly PriceItem[];
  /** For one layout's orders; left out where there are none. */
  readonly typed?: readonly TypedPrice[];
}

/** Sides this near to each other, mm, are the same: inches and millimetres of one stone differ by rounding. */
const SAME_SIDE_MM = 2;

/** Whether an entry is the unit that a floor lays, either side of it first; an entry without a size may be. */
export function itemFits(
  { size }: Pick<PriceItem, 'size'>,
  { length, width, thickness }: Pick<Unit, 'length' | 'width' | 'thickness'>,
): boolean {
  if (!size) return true;
  const [long, short, thick] = size;
  const near = (a: number, b: number) => Math.abs(a - b) <= SAME_SIDE_MM;
  const face =
    (near(long, length) && near(short, width)) || (near(long, width) && near(short, length));
  return face && near(thick, thickness);
}
