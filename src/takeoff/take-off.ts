import type { Laying } from '@/paving/laying';
import type { Report } from '@/paving/report';
import { chosenMaterial, type ChosenMaterial } from './chosen-material';
import { earthVolumes } from './earth-volumes';
import { aggregateParts, fillLines } from './fill-lines';
import { edgingLine, geotextileLine, layerLines, spoilLine } from './layer-lines';
import { orderLines } from './order-lines';
import type { PriceList } from './price-list';
import { takeOffWarnings } from './sanity';
import type { TakeOff } from './take-off-line';
import { unitLines } from './unit-lines';

export type {
  Assumption,
  OrderLine,
  TakeOff,
  TakeOffGroup,
  TakeOffLine,
  TakeOffMeasure,
  TakeOffWarning,
} from './take-off-line';
export type { OrderWay } from '@/paving/materials';

/**
 * All that a floor takes: its quantities by line, what is bought for them, what it weighs and, with the
 * firm's price list, what it costs. A pure function of document and list.
 *
 * @param report the laying's own report
 * @param prices null where the firm has no list, or the reader may not see it: nothing then has a price,
 * and densities are those of the document and the defaults
 */
export function takeOff(laying: Laying, report: Report, prices: PriceList | null): TakeOff {
  const chosen = (place: Parameters<typeof chosenMaterial>[1]): ChosenMaterial =>
    chosenMaterial(laying, place, prices);
  const materials = {
    joints: chosen('joints'),
    voids: chosen('voids'),
    margin: chosen('margin'),
    bedding: chosen('bedding'),
    base: chosen('base'),
  };
  const parts = aggregateParts(laying, report);
  const earth = earthVolumes(laying);
  const lines = [
    ...unitLines(laying, report, prices),
    ...fillLines(laying, parts, materials),
    ...layerLines(laying, earth, materials),
    ...spoilLine(laying, earth),
    ...geotextileLine(laying, earth),
    ...edgingLine(laying),
  ];
  const orders = orderLines(laying, lines, Object.values(materials), prices);
  const priced = orders.filter(({ costMinor }) => costMinor !== null);
  const total = (parts: readonly (number | null)[]) =>
    parts.reduce<number>((sum, part) => sum + (part ?? 0), 0);
  return {
    lines,
    orders,
    warnings: takeOffWarnings({ laying, report, parts, materials, earth, lines, orders, prices }),
    massKg: total(orders.map(({ massKg }) => massKg)),
    massComplete: orders.every(({ massKg }) => massKg !== null),
    currency: prices?.currency ?? null,
    costMinor: prices ? total(priced.map(({ costMinor }) => costMinor)) : null,
    unpriced: orders.filter(({ costMinor }) => costMinor === null).map(({ id }) => id),
  };
}
