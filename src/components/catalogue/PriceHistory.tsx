import { useQuery } from '@tanstack/react-query';
import type { CatalogueItem, PriceEntry } from '@/api-types/catalogue';
import { dayText } from '@/takeoff/day-text';
import { formatMoney } from '@/takeoff/money';
import { api } from '../ui/api';
import { Dialog } from '../ui/Dialog';
import { Moment } from '../ui/Moment';
import { Wrong } from '../ui/Wrong';
import { todayHere } from './catalogue-words';

/** Every price that an item had and is known to get, the newest day first. */
export function PriceHistory({
  item,
  currency,
  onClose,
}: {
  item: CatalogueItem;
  currency: string;
  onClose: () => void;
}) {
  const history = useQuery({
    queryKey: ['catalogue', 'prices', item.id, item.revision],
    queryFn: () => api<{ prices: PriceEntry[] }>('GET', `/api/catalogue/${item.id}/prices`),
  });
  const prices = history.data?.prices ?? [];
  const greatest = Math.max(1, ...prices.map(({ costMinor }) => costMinor));
  const holds = prices.find(({ from, corrected }) => !corrected && from <= todayHere());
  return (
    <Dialog open onClose={onClose} title={`Prices of ${item.name}`}>
      <Wrong error={history.error} again={() => void history.refetch()} />
      {history.isPending && <p className="text-slate">Reading …</p>}
      {history.data && prices.length === 0 && (
        <p>No price yet. Open the item and type one, with the day from which it holds.</p>
      )}
      {prices.length > 0 && (
        <ol className="hairlines border-b border-stone-300">
          {prices.map((price, n) => (
            <li key={n} className="py-2">
              <div className="flex items-baseline justify-between gap-4">
                <span>
                  from <strong>{dayText(price.from)}</strong>
                  {price === holds && ' · holds now'}
                  {price.corrected && ' · put right by the one above'}
                </span>
                <span
                  className={`font-semibold whitespace-nowrap ${price.corrected ? 'line-through' : ''}`}
                >
                  {formatMoney(price.costMinor, currency)}
                </span>
              </div>
              <div
                aria-hidden
                className={`mt-1 h-1.5 ${price === holds ? 'bg-graphite' : 'bg-stone-300'}`}
                style={{ width: `${Math.max(1, (price.costMinor / greatest) * 100)}%` }}
              />
              <p className="mt-1 text-sm text-slate">
                entered by {price.by.name}, <Moment iso={price.at} />
              </p>
            </li>
          ))}
        </ol>
      )}
      <p className="mt-3 text-sm text-slate">
        A price is never written over. Versions that were saved keep the prices of their day.
      </p>
    </Dialog>
  );
}
