import { describe, expect, test } from 'vitest';
import { layFloor } from '@/paving/laying';
import { wholeReport } from '@/paving/report';
import type { PriceItem, PriceList, TypedPrice } from '@/takeoff/price-list';
import { takeOff } from '@/takeoff/take-off';
import { takeOffWithoutCosts } from '@/takeoff/without-costs';
import { documentOf, parsed } from '../../oracle/documents';

/** Ten slabs in a row; two spare, so that twelve are ordered. */
const laying = layFloor(
  parsed(
    documentOf({
      ground: { perimeter: [[0, 0], [4000, 0], [4000, 400], [0, 400]], keepOuts: [] }, // prettier-ignore
      units: [{ id: 'a', name: 'Slab', length: 400, width: 400, thickness: 50, catalogueId: 'slab' }], // prettier-ignore
      bond: { kind: 'stack', unit: 'a', joint: 0 },
      placement: { origin: [200, 200], turn: 0 },
      clearance: 0,
      order: { spares: { rule: 'count', value: 2 } },
    }),
  ),
);
const ORDER = 'units:a:first-tone';
const typed: TypedPrice = {
  orderId: ORDER,
  costMinor: 98_765,
  pack: { holds: 1, measure: 'each' },
};
const slab: PriceItem = {
  id: 'slab',
  kind: 'unit',
  name: 'Slab',
  supplier: 'Quarry',
  pack: { name: 'slab', holds: 1, measure: 'each', whole: true },
  costMinor: 700,
  from: '2026-01-01',
  massKg: null,
  looseDensity: null,
  stone: null,
};
const list = (part: Partial<PriceList>): PriceList => ({
  currency: 'EUR',
  on: '2026-03-01',
  items: [],
  ...part,
});
const ordered = (prices: PriceList) =>
  takeOff(laying, wholeReport(laying), prices).orders.find(({ id }) => id === ORDER)!;

describe('a price that was typed for an order', () => {
  test('counts where the catalogue has none', () => {
    // 12 × 987.65.
    expect(ordered(list({ typed: [typed] }))).toMatchObject({
      costMinor: 1_185_180,
      priceTyped: true,
    });
  });

  test('gives way to the catalogue’s', () => {
    const order = ordered(list({ items: [slab], typed: [typed] }));
    expect(order.costMinor).toBe(12 * 700);
    expect(order.priceTyped).toBeUndefined();
  });

  test('says nothing of another pack', () => {
    const pallet = { ...typed, pack: { holds: 20, measure: 'each' as const } };
    expect(ordered(list({ typed: [pallet] })).costMinor).toBeNull();
  });

  test('is nothing that a crew gets', () => {
    const taken = takeOff(laying, wholeReport(laying), list({ typed: [typed] }));
    expect(JSON.stringify(takeOffWithoutCosts(taken))).not.toMatch(/98765|1185180|priceTyped/);
  });
});

test('an item that is offered no longer keeps its price, and says so', () => {
  const order = ordered(list({ items: [{ ...slab, retired: true }] }));
  expect(order).toMatchObject({ costMinor: 12 * 700, item: { id: 'slab', retired: true } });
});
