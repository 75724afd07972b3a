import type { OrderWay } from '@/paving/materials';
import { orderItemSet, orderWaySet } from '@/takeoff/assumption-edits';
import { dayText } from '@/takeoff/day-text';
import { formatMass } from '@/takeoff/measures';
import { formatMoney } from '@/takeoff/money';
import { itemFits, type PriceItem, type PriceList } from '@/takeoff/price-list';
import type { OrderLine, TakeOff } from '@/takeoff/take-off';
import { useTable, useTableStore } from '../table-context';
import { AssumptionRow } from './AssumptionRow';
import { Opening } from './Opening';
import { TypedPrice } from './TypedPrice';

const WAY_WORDS: Readonly<Record<OrderWay, string>> = {
  pack: 'By the catalogue’s pack',
  each: 'One by one',
  bag: 'In bags',
  bulkBag: 'In bulk bags',
  load: 'In lorry loads',
  mass: 'Loose, by weight',
  volume: 'Loose, by volume',
  length: 'By length',
  area: 'By area',
};

function Order({
  order,
  currency,
  prices,
}: {
  order: OrderLine;
  currency: string | null;
  prices: PriceList | null;
}) {
  const table = useTableStore();
  const display = useTable((state) => state.document.display);
  const units = useTable((state) => state.document.units);
  const unitId = /^units:(.*):[^:]*$/.exec(order.id)?.[1];
  const unit = units.find(({ id }) => id === unitId);
  // What is another size is no choice; what was chosen stays in the list, to be seen and left.
  const fits = (item: PriceItem) => !unit || item.id === order.item?.id || itemFits(item, unit);
  const offered =
    prices?.items.filter(
      (item) =>
        item.kind === order.kind && fits(item) && (!item.retired || item.id === order.item?.id),
    ) ?? [];
  const cost =
    currency === null || (prices?.items.length === 0 && order.costMinor === null)
      ? null
      : order.costMinor === null
        ? 'no price'
        : formatMoney(order.costMinor, currency);
  return (
    <Opening
      name={order.name}
      figure={order.words}
      under={
        <>
          {order.massKg !== null && <span>{formatMass(order.massKg, display)}</span>}
          {order.item?.retired && <span className="text-amber">retired</span>}
          {cost && (
            <span className={order.costMinor === null ? 'text-amber' : 'font-semibold'}>
              {cost}
            </span>
          )}
        </>
      }
    >
      <p className="text-[0.9rem]">{order.formula}</p>
      {order.ways.length > 1 && (
        <label className="mt-2 block">
          <span className="field-label">How it comes</span>
          <select
            className="field"
            value={order.way}
            onChange={(event) =>
              table
                .getState()
                .edit((now) => orderWaySet(now, order.id, event.target.value as OrderWay))
            }
          >
            {order.ways.map((way) => (
              <option key={way} value={way}>
                {WAY_WORDS[way]}
              </option>
            ))}
          </select>
        </label>
      )}
      {offered.length > 0 && (
        <label className="mt-2 block">
          <span className="field-label">From your catalogue</span>
          <select
            className="field"
            value={order.item?.id ?? ''}
            onChange={(event) =>
              table
                .getState()
                .edit((now) => orderItemSet(now, order, event.target.value || undefined))
            }
          >
            <option value="">Nothing chosen</option>
            {offered.map(({ id, name, supplier, retired }) => (
              <option key={id} value={id}>
                {supplier ? `${name}, ${supplier}` : name}
                {retired ? ' (retired)' : ''}
              </option>
            ))}
          </select>
        </label>
      )}
      {order.item?.retired && (
        <p className="mt-1 text-[0.82rem] text-amber">
          Your catalogue no longer offers this; its last price still counts. Choose another, or ask
          whether it can still be had.
        </p>
      )}
      {order.item && order.packCostMinor !== null && !order.priceTyped && currency && (
        <p className="mt-1 text-[0.82rem] text-slate">
          {formatMoney(order.packCostMinor, currency)} a {order.pack.name} without tax, price of{' '}
          {dayText(order.item.from)}.
        </p>
      )}
      {order.item && (order.packCostMinor === null || order.priceTyped) && (
        <p className="mt-1 text-[0.82rem] text-amber">
          The catalogue’s price is for whole packs, so it says nothing of this way of ordering.
        </p>
      )}
      {currency !== null && (order.packCostMinor === null || order.priceTyped) && (
        <TypedPrice order={order} currency={currency} />
      )}
      <ul className="mt-1 hairlines">
        {order.assumptions.map((assumption) => (
          <AssumptionRow key={assumption.name} assumption={assumption} />
        ))}
      </ul>
    </Opening>
  );
}

/** What is bought, each thing opening to how its amount came about. */
export function OrderList({ takeOff, prices }: { takeOff: TakeOff; prices: PriceList | null }) {
  if (takeOff.orders.length === 0) return null;
  return (
    <section aria-label="To order">
      <h3 className="border-b border-graphite pb-1">To order</h3>
      <ul className="hairlines">
        {takeOff.orders.map((order) => (
          <Order key={order.lines[0]} order={order} currency={takeOff.currency} prices={prices} />
        ))}
      </ul>
    </section>
  );
}
