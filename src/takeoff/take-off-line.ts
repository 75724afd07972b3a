import type { OrderWay } from '@/paving/materials';
import type { PackMeasure, PriceKind } from './price-list';

/** The lines, orders and warnings that a take-off is made of. */

/** What a line counts in; volumes and areas of the floor are metric inside, whatever is shown. */
export type TakeOffMeasure = 'each' | 'm' | 'm2' | 'm3' | 'kg';

export type TakeOffGroup = 'units' | 'fill' | 'layers' | 'earth' | 'sundries';

/** A value that the take-off reckoned with, and where it comes from. */
export interface Assumption {
  /** What it is, `Loose for one in place`. */
  readonly name: string;
  /** As people read it, `1.17`. */
  readonly value: string;
  /** A published source, `common practice`, `typed in`, `the catalogue` or what it was taken from. */
  readonly source: string;
  /** What kind of value, so that it can be typed anew; null for what cannot be. */
  readonly as: 'length' | 'factor' | 'density' | 'percent' | 'count' | 'mass' | 'material' | 'ground' | null; // prettier-ignore
  /** The value itself, in mm, kg/m³, kg, or plain; null for names. */
  readonly raw: number | null;
  /** Where the document keeps it once it is changed, `['materials', 'base', 'bulk']`; null where it does not. */
  readonly field: readonly string[] | null;
  /** Whether somebody chose or typed it. */
  readonly own: boolean;
}

/** One quantity of the floor. */
export interface TakeOffLine {
  /**
   * The same for the same thing of every version: `units:<unit id>:first-tone`,
   * `units:<unit id>:second-tone`, `units:<unit id>:to-cut`, `units:<unit id>:to-cut-second-tone`, `fill:joints`, `fill:voids`, `fill:margin`, `layer:bedding`,
   * `layer:base`, `earth:spoil`, `geotextile`, `edging`.
   */
  readonly id: string;
  readonly group: TakeOffGroup;
  readonly name: string;
  /** What the floor takes, in `measure`: units without spares, volumes as they lie in the floor. */
  readonly amount: number;
  readonly measure: TakeOffMeasure;
  /** m³ as it lies in the floor and as it is carted; null for what is not counted by volume. */
  readonly volume: { readonly inPlace: number; readonly loose: number } | null;
  /** With its numbers, so that a person can check it by hand. */
  readonly formula: string;
  readonly assumptions: readonly Assumption[];
  /** Of what is ordered for the line or carted away, kg; null where it is not known. */
  readonly massKg: number | null;
  /** The order that it is part of; null for what is not bought. */
  readonly orderId: string | null;
}

/** What is bought of one thing: voids and margin of one aggregate are one order. */
export interface OrderLine {
  readonly id: string;
  readonly kind: PriceKind;
  readonly name: string;
  /** Ids of the take-off lines that it serves. */
  readonly lines: readonly string[];
  /** What is needed with spares and laps, loose, in `measure`, not rounded. */
  readonly needed: number;
  readonly measure: TakeOffMeasure;
  readonly way: OrderWay;
  /** Other ways in which it could be ordered. */
  readonly ways: readonly OrderWay[];
  /** What is bought at once. */
  readonly pack: {
    readonly name: string;
    readonly holds: number;
    readonly measure: PackMeasure;
    readonly whole: boolean;
  };
  /** So many packs: a whole number where packs are bought whole, else to a thousandth. */
  readonly amount: number;
  /** `3 bulk bags of 800 kg`, in the document's own measures. */
  readonly words: string;
  /** From the lines to the packs, with its numbers. */
  readonly formula: string;
  readonly assumptions: readonly Assumption[];
  readonly massKg: number | null;
  /** The entry of the price list that it is bought by; null where none was chosen or found. */
  readonly item: {
    readonly id: string;
    readonly supplier: string;
    readonly from: string;
    /** No longer offered. */
    readonly retired?: true;
  } | null;
  /** For one pack and for all, without tax, minor units; null without a price. */
  readonly packCostMinor: number | null;
  readonly costMinor: number | null;
  /** True where somebody typed the price, for the catalogue has none. */
  readonly priceTyped?: true;
}

/** Something that a careful person would look at before ordering. */
export interface TakeOffWarning {
  /** Stable, `stone-too-large:joints`. */
  readonly id: string;
  /** `wrong` will not work; `look` needs a decision; `caution` is for people's safety. */
  readonly weight: 'wrong' | 'look' | 'caution';
  readonly words: string;
  /** Who says so; `common practice` where nobody published it, null where the layout itself does. */
  readonly source: string | null;
  /** The line that it is about. */
  readonly line: string | null;
}

/** All that a floor takes. */
export interface TakeOff {
  readonly lines: readonly TakeOffLine[];
  readonly orders: readonly OrderLine[];
  readonly warnings: readonly TakeOffWarning[];
  /** Of all that is delivered, kg; what is not known is left out and `massComplete` is false. */
  readonly massKg: number;
  readonly massComplete: boolean;
  /** ISO 4217; null without a price list. */
  readonly currency: string | null;
  /** Of the orders that have a price, minor units; null without a price list. */
  readonly costMinor: number | null;
  /** Ids of orders without a price. */
  readonly unpriced: readonly string[];
}
