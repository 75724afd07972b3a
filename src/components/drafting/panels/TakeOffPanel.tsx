import { dayText } from '@/takeoff/day-text';
import { formatMass } from '@/takeoff/measures';
import { formatMoney } from '@/takeoff/money';
import type { TakeOff } from '@/takeoff/take-off';
import { FloorProblems } from '../FloorFigures';
import { useSettledFloor, useTable } from '../table-context';
import { Beyond } from '../takeoff/Beyond';
import { OrderList } from '../takeoff/OrderList';
import { QuantityList } from '../takeoff/QuantityList';
import { TakeOffBars } from '../takeoff/TakeOffBars';
import { TakeOffWarnings } from '../takeoff/TakeOffWarnings';
import { usePriceList } from '../takeoff/use-price-list';
import { useTakeOff } from '../takeoff/use-take-off';

/** Quantities, orders and cost of the floor as it stands. */
export function TakeOffPanel() {
  const floor = useSettledFloor();
  const document = useTable((state) => state.document);
  const list = usePriceList();
  const laid = floor.laying?.document ?? null;
  const { takeOff, working, failure } = useTakeOff(laid, list.data ?? null);
  if (!laid) return <FloorProblems />;
  return (
    <div className="space-y-6" aria-busy={working} data-testid="take-off">
      {failure && (
        <p role="alert" className="border-t-2 border-brick bg-brick-wash px-3 py-3">
          The take-off could not be worked out: {failure} Nothing is lost; change the floor or undo
          the last change.
        </p>
      )}
      {!takeOff && !failure && <p className="text-slate">Counting what the floor takes …</p>}
      {takeOff && (
        <>
          <Totals takeOff={takeOff} />
          <Prices list={list} takeOff={takeOff} />
          <TakeOffWarnings
            title="Before you order"
            warnings={takeOff.warnings.filter(({ weight }) => weight !== 'caution')}
          />
          <TakeOffBars takeOff={takeOff} document={document} />
          <OrderList takeOff={takeOff} prices={list.data ?? null} />
          <Beyond />
          <QuantityList takeOff={takeOff} />
          <TakeOffWarnings
            title="Take care"
            warnings={takeOff.warnings.filter(({ weight }) => weight === 'caution')}
          />
        </>
      )}
    </div>
  );
}

function Totals({ takeOff }: { takeOff: TakeOff }) {
  const display = useTable((state) => state.document.display);
  const spoil = takeOff.lines.find(({ id }) => id === 'earth:spoil')?.massKg ?? 0;
  const figures = [
    ['delivered', formatMass(takeOff.massKg, display)],
    ['carted away', formatMass(spoil, display)],
    ...(takeOff.currency && takeOff.costMinor
      ? [['without tax', formatMoney(takeOff.costMinor, takeOff.currency)]]
      : []),
  ];
  return (
    <section aria-label="In all">
      <dl className="flex flex-wrap gap-y-2 border-t border-b border-t-graphite border-b-stone-300 py-2">
        {figures.map(([name, value]) => (
          <div
            key={name}
            className="flex min-w-max flex-1 flex-col border-l border-stone-300 px-2.5 first:border-l-0 first:pl-0"
          >
            <dt className="order-2 text-sm text-slate">{name}</dt>
            <dd className="order-1 text-[1.25rem] leading-tight font-bold tracking-tight whitespace-nowrap">
              {value}
            </dd>
          </div>
        ))}
      </dl>
    </section>
  );
}

/** Where the prices are, or why there are none; quantities do without them. */
function Prices({ list, takeOff }: { list: ReturnType<typeof usePriceList>; takeOff: TakeOff }) {
  if (list.isPending) return <p className="text-sm text-slate">Reading your prices …</p>;
  if (list.error)
    return (
      <p role="alert" className="text-sm text-brick">
        Your prices could not be read, so quantities are shown without them. {list.error.message}{' '}
        <button
          type="button"
          className="link pointer-coarse:inline-flex pointer-coarse:min-h-11 pointer-coarse:items-center"
          onClick={() => void list.refetch()}
        >
          Try again
        </button>
      </p>
    );
  if (list.data.items.length === 0 && !list.data.typed?.length)
    return (
      <p className="text-sm text-slate">
        Your catalogue has no prices yet. Put in what your suppliers ask in the{' '}
        <a className="link" href="/catalogue">
          catalogue
        </a>
        , or open a thing under “To order” and type its price, and costs appear here.
      </p>
    );
  const { unpriced, orders } = takeOff;
  if (unpriced.length === 0)
    return (
      <p className="text-sm text-slate">
        Prices of {dayText(list.data.on)}. Labour, margin and tax come in with the quote of a saved
        version.
      </p>
    );
  return (
    <p className="text-sm text-slate">
      <b className="text-amber">
        {unpriced.length} of {orders.length} things have no price.
      </b>{' '}
      Open one under “To order” and choose it from your catalogue, or type its price there.
    </p>
  );
}
