import { formatMoney, parseMoney } from '@/takeoff/money';
import type { OrderLine } from '@/takeoff/take-off';
import { TypedField } from '../../ui/TypedField';
import { usePriceSetting } from './use-price-list';

/** The price of an order that the catalogue has none for: to be typed here, and kept with the layout for the firm alone. */
export function TypedPrice({ order, currency }: { order: OrderLine; currency: string }) {
  const setting = usePriceSetting();
  const { id: orderId, pack, packCostMinor, priceTyped } = order;
  return (
    <div className="mt-2">
      <TypedField
        label={`Price of a ${pack.name}, without tax`}
        shown={priceTyped && packCostMinor !== null ? formatMoney(packCostMinor, currency) : ''}
        inputMode="decimal"
        read={(text) => {
          const parsed = parseMoney(text, currency);
          return parsed.ok ? { ok: true, value: parsed.minor } : parsed;
        }}
        refuse={(minor) => (minor < 0 ? 'A price cannot be less than 0.' : null)}
        onValue={(costMinor) =>
          setting.mutate({
            orderId,
            price: { costMinor, pack: { holds: pack.holds, measure: pack.measure } },
          })
        }
      />
      <p className="mt-1 text-[0.82rem] text-slate" role="status">
        {setting.isPending
          ? 'Keeping it …'
          : priceTyped
            ? 'Typed here, for this layout. Versions and quotes from now on have it; clients and crews do not see it.'
            : 'The catalogue has no price for this. Type one, and versions and quotes of this layout have it.'}{' '}
        {priceTyped && !setting.isPending && (
          <button
            type="button"
            className="link pointer-coarse:inline-flex pointer-coarse:min-h-11 pointer-coarse:items-center"
            onClick={() => setting.mutate({ orderId, price: null })}
          >
            Take the price away
          </button>
        )}
      </p>
      {setting.error && (
        <p role="alert" className="mt-1 text-[0.82rem] text-brick">
          The price was not kept. {setting.error.message}
        </p>
      )}
    </div>
  );
}
