import type { OrderLine, TakeOff } from './take-off-line';

/** A take-off as a crew may have it: amounts, packs and warnings, but no price and nobody it is bought from. */
export interface TakeOffWithoutCosts extends Pick<TakeOff, 'lines' | 'warnings'> {
  readonly orders: readonly Omit<
    OrderLine,
    'item' | 'packCostMinor' | 'costMinor' | 'priceTyped'
  >[];
}

export const takeOffWithoutCosts = ({ lines, orders, warnings }: TakeOff): TakeOffWithoutCosts => ({
  lines,
  orders: orders.map(
    ({ item: _item, packCostMinor: _pack, costMinor: _cost, priceTyped: _typed, ...order }) =>
      order,
  ),
  warnings,
});
