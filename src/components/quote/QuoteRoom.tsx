import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { VersionOrders } from '@/api-types/purchase-orders';
import type { QuoteDetail, VersionPricing, VersionQuotes } from '@/api-types/quotes';
import type { VersionState } from '@/api-types/versions';
import { formatCount } from '@/paving/count';
import { dayText } from '@/takeoff/day-text';
import { formatMoney } from '@/takeoff/money';
import { api, type ApiError } from '../ui/api';
import { Moment } from '../ui/Moment';
import { Peg } from '../ui/Peg';
import { Queries } from '../ui/Queries';
import { Wrong } from '../ui/Wrong';
import { CostBars } from './CostBars';
import { ElsewhereList, OrderCard } from './OrderCard';
import { QuoteDraftForm } from './QuoteDraftForm';

interface Props {
  readonly versionId: string;
  readonly projectId: string;
  readonly state: VersionState;
  /** Null for a version saved before take-offs were kept with versions. */
  readonly pricing: VersionPricing | null;
  readonly quotes: VersionQuotes;
  readonly orders: VersionOrders;
}

/** What a version costs, what is asked for it and what is ordered for it: for those who see costs. */
export default function QuoteRoom(props: Props) {
  return (
    <Queries>
      <Room {...props} />
    </Queries>
  );
}

function Room({ versionId, projectId, state, pricing, quotes, orders }: Props) {
  if (!pricing)
    return (
      <p className="mt-6 max-w-xl text-lg text-slate">
        This version was saved before take-offs and prices were kept with versions, so there is
        nothing to quote from. Start a draft from it and save that as a new version.
      </p>
    );
  return (
    <>
      <Costs pricing={pricing} />
      <Quotes versionId={versionId} projectId={projectId} state={state} first={quotes} />
      <Orders versionId={versionId} state={state} first={orders} pricing={pricing} />
    </>
  );
}

function Costs({ pricing: { takeOff, priceList, at } }: { pricing: VersionPricing }) {
  const { orders, costMinor } = takeOff;
  const currency = takeOff.currency ?? priceList.currency;
  const unpriced = orders.filter((order) => order.costMinor === null && order.amount > 0);
  return (
    <section className="mt-6">
      <div className="flex flex-wrap items-end justify-between gap-3 border-b border-graphite pb-1">
        <h2>What it takes</h2>
        <p>
          Materials cost <strong>{formatMoney(costMinor ?? 0, currency)}</strong>
          {unpriced.length > 0 && <span className="text-amber">, as far as there are prices</span>}
        </p>
      </div>
      <div className="mt-4 grid gap-x-12 gap-y-6 md:grid-cols-2">
        <CostBars
          label="What materials cost"
          currency={currency}
          bars={orders.map(({ id, name, costMinor: own }) => ({ id, name, minor: own ?? 0 }))}
        />
        <table className="w-full self-start">
          <caption className="sr-only">What is to be ordered</caption>
          <thead>
            <tr className="border-b border-graphite text-left text-sm text-slate">
              <th scope="col" className="py-1 font-normal">
                What
              </th>
              <th scope="col" className="py-1 text-right font-normal">
                To order
              </th>
              <th scope="col" className="py-1 pl-3 text-right font-normal">
                Price of one
              </th>
            </tr>
          </thead>
          <tbody className="hairlines border-b border-stone-300">
            {orders.map((order) => (
              <tr key={order.id}>
                <th scope="row" className="py-1.5 pr-2 text-left font-normal">
                  {order.name}
                  {order.item?.supplier && (
                    <span className="block text-sm text-slate">{order.item.supplier}</span>
                  )}
                  {order.item?.retired && (
                    <span className="block text-sm text-amber">no longer in the catalogue</span>
                  )}
                  {order.priceTyped && (
                    <span className="block text-sm text-slate">price typed on the table</span>
                  )}
                </th>
                <td className="py-1.5 text-right">{order.words}</td>
                <td className="py-1.5 pl-3 text-right whitespace-nowrap">
                  {order.packCostMinor === null ? (
                    <span className="text-amber">no price</span>
                  ) : (
                    formatMoney(order.packCostMinor, currency)
                  )}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <p className="mt-3 text-sm text-slate">
        Frozen with the version on <Moment iso={at} day />, at the prices of {dayText(priceList.on)}
        . What the catalogue asks later changes nothing here.
        {unpriced.length > 0 &&
          ' To price what has none, take it from the catalogue or type its price on the drafting table, at Take-off, and save another version; or type its cost into the quote.'}
      </p>
    </section>
  );
}

function Quotes({
  versionId,
  projectId,
  state,
  first,
}: {
  versionId: string;
  projectId: string;
  state: VersionState;
  first: VersionQuotes;
}) {
  const queries = useQueryClient();
  const [said, setSaid] = useState('');
  const path = `/api/versions/${versionId}/quotes`;
  const list = useQuery({
    queryKey: ['quotes', versionId],
    queryFn: () => api<VersionQuotes>('GET', path),
    initialData: first,
  });
  const anew = () => queries.invalidateQueries({ queryKey: ['quotes', versionId] });
  const begin = useMutation<QuoteDetail, ApiError>({
    networkMode: 'always',
    mutationFn: () => api('POST', path, {}),
    onSuccess: () => {
      setSaid('');
      return anew();
    },
  });
  const draft = list.data.quotes.find((quote) => quote.state === 'draft');
  const sent = list.data.quotes.filter((quote) => quote.state === 'sent');
  return (
    <section className="mt-10">
      <h2 className="border-b border-graphite pb-1">Quote</h2>
      <p role="status" className={said ? 'mt-3 font-semibold' : 'sr-only'}>
        {said}
      </p>
      <Wrong error={list.error} again={() => void list.refetch()} className="mt-3" />
      {sent.length > 0 && (
        <ul className="mt-2 hairlines border-b border-stone-300">
          {sent.map((quote, n) => (
            <li
              key={quote.id}
              className="flex flex-wrap items-center justify-between gap-x-6 gap-y-2 py-3"
            >
              <p className="flex items-center gap-3">
                <Peg look={n === 0 ? 'holds' : 'empty'} />
                <span>
                  <strong>{quote.number}</strong>
                  <span className="text-slate">
                    , sent by {quote.sentBy?.name}{' '}
                    {quote.sentAt && <Moment iso={quote.sentAt} day />}, holds until{' '}
                    {dayText(quote.quote.validUntil)}
                    {n > 0 && ', replaced by the one above'}
                  </span>
                </span>
              </p>
              <p className="flex items-center gap-4">
                <span className="text-right">
                  <strong>{formatMoney(quote.quote.totalMinor, quote.quote.currency)}</strong>
                  <span className="block text-sm text-slate">
                    margin {formatMoney(quote.quote.marginMinor, quote.quote.currency)}
                  </span>
                </span>
                <a className="button" href={`/api/quotes/${quote.id}/pdf`} target="_blank">
                  PDF
                </a>
              </p>
            </li>
          ))}
        </ul>
      )}
      {draft ? (
        <QuoteDraftForm
          key={draft.id}
          quote={draft}
          shared={state !== 'saved'}
          clients={list.data.clients}
          projectId={projectId}
          onSent={(words) => {
            setSaid(words);
            void anew();
          }}
          onDropped={() => {
            setSaid('The draft is thrown away.');
            void anew();
          }}
        />
      ) : (
        <div className="mt-3">
          {sent.length === 0 && (
            <p className="mb-3 max-w-xl text-slate">
              No quote yet. It begins with what the floor takes, the work at your rates, your margin
              and tax; every line can be changed before it is sent.
            </p>
          )}
          <button
            type="button"
            className={`button ${sent.length === 0 ? 'button-primary' : ''}`}
            disabled={begin.isPending}
            onClick={() => begin.mutate()}
          >
            {sent.length === 0 ? 'Make a quote' : 'Make another quote'}
          </button>
          <Wrong error={begin.error} className="mt-2" />
        </div>
      )}
    </section>
  );
}

function Orders({
  versionId,
  state,
  first,
  pricing,
}: {
  versionId: string;
  state: VersionState;
  first: VersionOrders;
  pricing: VersionPricing;
}) {
  const queries = useQueryClient();
  const [said, setSaid] = useState('');
  const path = `/api/versions/${versionId}/orders`;
  const list = useQuery({
    queryKey: ['orders', versionId],
    queryFn: () => api<VersionOrders>('GET', path),
    initialData: first,
    // A letter on its way is looked after until it is sent.
    refetchInterval: ({ state: { data } }) =>
      data?.orders.some(({ letter }) => letter === 'waiting') ? 3000 : false,
  });
  const { orders, unsupplied, elsewhere } = list.data;
  const begin = useMutation<VersionOrders, ApiError, { supplierId?: string }>({
    networkMode: 'always',
    mutationFn: (what) => api('POST', path, what),
    onSuccess: (answer) => {
      setSaid('');
      queries.setQueryData(['orders', versionId], answer);
    },
  });
  const changed = (words: string) => {
    setSaid(words);
    void queries.invalidateQueries({ queryKey: ['orders', versionId] });
  };
  const drafted = new Set(
    orders.filter((order) => order.state === 'draft').map(({ supplier }) => supplier.id),
  );
  const again = [...new Map(orders.map(({ supplier }) => [supplier.id, supplier])).values()].filter(
    ({ id }) => !drafted.has(id),
  );
  const accepted = state === 'accepted' || state === 'issued';
  const some = pricing.takeOff.orders.some(({ item }) => item?.supplier);
  return (
    <section className="mt-10">
      <h2 className="border-b border-graphite pb-1">Orders</h2>
      <p role="status" className={said ? 'mt-3 font-semibold' : 'sr-only'}>
        {said}
      </p>
      <Wrong error={list.error} again={() => void list.refetch()} className="mt-3" />
      {!accepted && (
        <p className="mt-3 bg-amber-wash p-3">
          The client has not accepted this version
          {state === 'superseded' && ', or another was issued in its place'}. Orders can be made
          ready; look twice before you send them.
        </p>
      )}
      {elsewhere.length > 0 && (
        <div className="mt-3 bg-amber-wash p-3">
          <p className="font-bold text-amber">
            {elsewhere.length === 1 ? 'An order' : `${formatCount(elsewhere.length)} orders`} went
            for another version of this project
          </p>
          <ElsewhereList orders={elsewhere} />
          <p className="mt-1">What is sent from here comes on top of that.</p>
        </div>
      )}
      {unsupplied.length > 0 && (
        <p className="mt-3 text-slate">
          Without a supplier in your catalogue: {unsupplied.join(', ')}. Choose an item of the
          catalogue on the drafting table and save another version, or buy it separately.
        </p>
      )}
      {orders.length > 0 && (
        <ul className="mt-1 hairlines border-b border-stone-300">
          {orders.map((order) => (
            <OrderCard
              key={`${order.id} ${order.state}`}
              order={order}
              elsewhere={elsewhere}
              onChanged={changed}
              onElsewhere={() => void list.refetch()}
            />
          ))}
        </ul>
      )}
      <div className="mt-3 flex flex-wrap gap-2">
        {orders.length === 0 ? (
          <button
            type="button"
            className="button button-primary"
            disabled={begin.isPending || !some}
            onClick={() => begin.mutate({})}
          >
            Make the orders ready, one a supplier
          </button>
        ) : (
          again.map(({ id, name }) => (
            <button
              key={id}
              type="button"
              className="button"
              disabled={begin.isPending}
              onClick={() => begin.mutate({ supplierId: id })}
            >
              Order more of {name}
            </button>
          ))
        )}
      </div>
      {orders.length === 0 && !some && (
        <p className="mt-2 text-slate">
          Nothing of this floor was taken from the catalogue, so there is nobody to order from.
        </p>
      )}
      <Wrong error={begin.error} className="mt-2" />
    </section>
  );
}
