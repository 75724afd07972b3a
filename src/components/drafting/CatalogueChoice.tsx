import { useQuery } from '@tanstack/react-query';
import { useEffect, useId, useState, type ReactNode } from 'react';
import type { CatalogueItem, CataloguePage } from '@/api-types/catalogue';
import { formatMoney } from '@/takeoff/money';
import type { PriceKind } from '@/takeoff/price-list';
import { boughtAs } from '@/takeoff/bought-as';
import { api } from '../ui/api';
import { Queries } from '../ui/Queries';
import { Wrong } from '../ui/Wrong';

/** How long typing rests before the catalogue is asked, ms. */
const REST_MS = 250;
/** So many are shown; more words find fewer. */
const SHOWN = 30;

interface Props {
  readonly kind: PriceKind;
  readonly label: string;
  /** The entry that is in use now. */
  readonly chosen: string | undefined;
  readonly picture: (item: CatalogueItem) => ReactNode;
  readonly onChoose: (item: CatalogueItem) => void;
}

/** Takes something out of the firm's own catalogue. */
export function CatalogueChoice(props: Props) {
  return (
    <Queries>
      <Choice {...props} />
    </Queries>
  );
}

function Choice({ kind, label, chosen, picture, onChoose }: Props) {
  const id = useId();
  const [typed, setTyped] = useState('');
  const [search, setSearch] = useState('');
  useEffect(() => {
    const timer = setTimeout(() => setSearch(typed.trim()), REST_MS);
    return () => clearTimeout(timer);
  }, [typed]);
  const found = useQuery({
    queryKey: ['catalogue', kind, search],
    queryFn: () =>
      api<CataloguePage>(
        'GET',
        `/api/catalogue?${new URLSearchParams({ kind, size: String(SHOWN), ...(search ? { search } : {}) })}`,
      ),
    placeholderData: (before) => before,
  });
  const items = found.data?.items ?? [];
  return (
    <section aria-label={label}>
      <label htmlFor={id} className="field-label">
        {label}
      </label>
      {(items.length > 0 || typed !== '') && (
        <input
          id={id}
          type="search"
          className="field"
          placeholder="Find by name or code"
          value={typed}
          onChange={(event) => setTyped(event.target.value)}
        />
      )}
      <Wrong error={found.error} again={() => void found.refetch()} className="mt-1 text-sm" />
      {found.isPending && <p className="text-sm text-slate">Reading the catalogue …</p>}
      {found.data && items.length === 0 && !found.isPlaceholderData && (
        <p className="mt-1 text-sm text-slate">
          {search === '' ? (
            <>
              Nothing of this kind is in your{' '}
              <a className="link" href="/catalogue">
                catalogue
              </a>{' '}
              yet.
            </>
          ) : (
            'Nothing in the catalogue is like that.'
          )}
        </p>
      )}
      {items.length > 0 && (
        <ul className="mt-2 max-h-80 hairlines overflow-y-auto border-y border-stone-300">
          {items.map((item) => (
            <li key={item.id}>
              <button
                type="button"
                aria-pressed={item.id === chosen}
                className={`flex min-h-12 w-full items-center gap-3 px-2 py-1 text-left hover:bg-stone-100 ${
                  item.id === chosen ? 'bg-line-wash font-semibold text-line' : ''
                }`}
                onClick={() => onChoose(item)}
              >
                {picture(item)}
                <span className="min-w-0 flex-1">
                  <span className="block">{item.name}</span>
                  <span className="block text-sm font-normal text-slate">
                    {[
                      item.supplierName,
                      boughtAs({
                        name: item.packName,
                        holds: item.packHolds,
                        measure: item.packMeasure,
                        whole: item.packWhole,
                      }),
                    ]
                      .filter(Boolean)
                      .join(' · ')}
                  </span>
                </span>
                <span className="text-right text-sm font-normal whitespace-nowrap text-slate">
                  {item.price
                    ? formatMoney(item.price.costMinor, found.data!.currency)
                    : 'no price yet'}
                </span>
              </button>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}
