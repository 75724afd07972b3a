import { useInfiniteQuery, useMutation, useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type {
  CatalogueItem,
  CataloguePage,
  CatalogueQuery,
  ItemSort,
  NewItem,
} from '@/api-types/catalogue';
import type { Supplier } from '@/api-types/suppliers';
import type { Display } from '@/paving/length';
import type { PriceKind } from '@/takeoff/price-list';
import { api, ApiError } from '../ui/api';
import { Queries } from '../ui/Queries';
import { SearchField } from '../ui/SearchField';
import { SelectField } from '../ui/SelectField';
import { Wrong } from '../ui/Wrong';
import { ImportFile } from './ImportFile';
import { ItemEditing } from './ItemEditing';
import { ItemForm, type ItemSent } from './ItemForm';
import { ItemTable } from './ItemTable';
import { PriceHistory } from './PriceHistory';

interface Props {
  readonly first: CataloguePage;
  readonly suppliers: readonly Supplier[];
  readonly display: Display;
}

export default function CatalogueList(props: Props) {
  return (
    <Queries>
      <List {...props} />
    </Queries>
  );
}

/** How long typing rests before the list is asked for, ms. */
const REST_MS = 250;
const PAGE_SIZE = 50;

interface Look {
  readonly search: string;
  readonly kind: PriceKind | '';
  readonly supplier: string;
  readonly retired: boolean;
  readonly sort: ItemSort;
}

const PLAIN: Look = { search: '', kind: '', supplier: '', retired: false, sort: 'name' };

const asked = (look: Look, after: string): CatalogueQuery => ({
  ...(look.search.trim() ? { search: look.search.trim() } : {}),
  ...(look.kind ? { kind: look.kind } : {}),
  ...(look.supplier ? { supplier: look.supplier } : {}),
  retired: look.retired ? 'only' : 'no',
  sort: look.sort,
  size: PAGE_SIZE,
  ...(after ? { after } : {}),
});

const isPlain = (look: Look) => JSON.stringify(look) === JSON.stringify(PLAIN);

function List({ first, suppliers, display }: Props) {
  const queries = useQueryClient();
  const [look, setLook] = useState(PLAIN);
  const [typed, setTyped] = useState('');
  const [editing, setEditing] = useState<string | null>(null);
  const [adding, setAdding] = useState(false);
  const [importing, setImporting] = useState(false);
  const [history, setHistory] = useState<CatalogueItem | null>(null);
  const [said, setSaid] = useState('');
  useEffect(() => {
    if (typed === look.search) return;
    const timer = setTimeout(() => setLook((now) => ({ ...now, search: typed })), REST_MS);
    return () => clearTimeout(timer);
  }, [typed, look.search]);

  const list = useInfiniteQuery({
    queryKey: ['catalogue', look],
    queryFn: ({ pageParam }) =>
      api<CataloguePage>(
        'GET',
        `/api/catalogue?${new URLSearchParams(Object.entries(asked(look, pageParam)).map(([name, value]) => [name, String(value)]))}`,
      ),
    initialPageParam: '',
    getNextPageParam: (page) => page.next,
    initialData: isPlain(look) ? { pages: [first], pageParams: [''] } : undefined,
    placeholderData: (before) => before,
  });
  const pages = list.data?.pages ?? [];
  const items = pages.flatMap((page) => page.items);
  const currency = pages[0]?.currency ?? first.currency;
  const anew = () => queries.invalidateQueries({ queryKey: ['catalogue'] });
  const change = (part: Partial<Look>) => {
    setSaid('');
    setLook((now) => ({ ...now, ...part }));
  };

  const add = useMutation<CatalogueItem, ApiError, ItemSent>({
    networkMode: 'always',
    mutationFn: ({ fields, price }) =>
      api('POST', '/api/catalogue', { ...fields, price } as NewItem),
    onSuccess: (item) => {
      setAdding(false);
      setSaid(`${item.name} is in the catalogue.`);
      void anew();
    },
  });

  const nothingAtAll =
    isPlain(look) && items.length === 0 && !list.isFetching && !adding && list.data !== undefined;

  return (
    <>
      <div className="mt-4 flex flex-wrap gap-2">
        <button
          type="button"
          className="button button-primary"
          onClick={() => {
            add.reset();
            setAdding(true);
          }}
        >
          Add an item
        </button>
        <button type="button" className="button" onClick={() => setImporting(true)}>
          Read in a file
        </button>
        <a className="button" href="/api/catalogue/export" download="catalogue.csv">
          Save as a file
        </a>
      </div>
      {adding && (
        <div className="mt-4">
          <ItemForm
            item={null}
            suppliers={suppliers}
            display={display}
            currency={currency}
            busy={add.isPending}
            error={add.error}
            onSend={(sent) => add.mutate(sent)}
            onLeave={() => setAdding(false)}
          />
        </div>
      )}
      {nothingAtAll ? (
        <p className="mt-8 max-w-xl text-lg text-slate">
          Nothing here yet. Add what you buy: units, aggregates and sundries such as geotextile,
          each with its supplier, its pack and its price. Or read in a file: “Save as a file” gives
          you an empty one with the headings.
        </p>
      ) : (
        <Controls
          look={look}
          typed={typed}
          suppliers={suppliers}
          onTyped={(text) => {
            setSaid('');
            setTyped(text);
          }}
          onChange={change}
        />
      )}
      <p role="status" className={said ? 'mt-4 font-semibold' : 'sr-only'}>
        {said || (list.isFetching ? 'Reading the catalogue' : `${items.length} items shown`)}
      </p>
      <Wrong error={list.error} again={() => void list.refetch()} className="mt-4" />
      <div className={list.isPlaceholderData ? 'opacity-60' : ''}>
        {items.length > 0 && (
          <ItemTable
            items={items}
            currency={currency}
            display={display}
            sort={look.sort}
            onSort={(sort) => change({ sort })}
            editing={editing}
            onEdit={({ id }) => {
              setSaid('');
              setEditing(id);
            }}
            onHistory={setHistory}
            form={
              <ItemEditing
                key={editing}
                item={items.find(({ id }) => id === editing)}
                suppliers={suppliers}
                display={display}
                currency={currency}
                onLeave={(words) => {
                  const id = editing;
                  setEditing(null);
                  if (words) setSaid(words);
                  requestAnimationFrame(() =>
                    document.querySelector<HTMLElement>(`[data-item="${id}"]`)?.focus(),
                  );
                  void anew();
                }}
              />
            }
          />
        )}
      </div>
      {items.length === 0 && !nothingAtAll && !list.isFetching && list.data && (
        <p className="mt-6 max-w-xl text-lg text-slate">
          {look.retired && look.search.trim() === ''
            ? 'Nothing is retired.'
            : 'Nothing in the catalogue is like that.'}{' '}
          <button
            type="button"
            className="link"
            onClick={() => {
              setTyped('');
              setLook(PLAIN);
            }}
          >
            Show all
          </button>
        </p>
      )}
      {list.hasNextPage && (
        <button
          type="button"
          className="button mt-8"
          disabled={list.isFetchingNextPage}
          onClick={() => void list.fetchNextPage()}
        >
          {list.isFetchingNextPage ? 'Reading …' : 'Show more'}
        </button>
      )}
      {history && (
        <PriceHistory item={history} currency={currency} onClose={() => setHistory(null)} />
      )}
      <ImportFile
        open={importing}
        onClose={() => setImporting(false)}
        onTaken={(words) => {
          setSaid(words);
          void anew();
        }}
      />
    </>
  );
}

function Controls({
  look,
  typed,
  suppliers,
  onTyped,
  onChange,
}: {
  look: Look;
  typed: string;
  suppliers: readonly Supplier[];
  onTyped: (text: string) => void;
  onChange: (part: Partial<Look>) => void;
}) {
  return (
    <div
      role="search"
      className="mt-5 grid grid-cols-2 items-end gap-3 sm:flex sm:flex-wrap sm:items-end"
    >
      <SearchField
        label="Find by name or code"
        value={typed}
        onValue={onTyped}
        className="col-span-2 sm:w-72"
      />
      <SelectField
        label="Kind"
        value={look.kind}
        onValue={(kind) => onChange({ kind })}
        options={[
          ['', 'All'],
          ['unit', 'Units'],
          ['aggregate', 'Aggregates'],
          ['sundry', 'Sundries'],
        ]}
      />
      <SelectField
        label="Supplier"
        value={look.supplier}
        onValue={(supplier) => onChange({ supplier })}
        options={[['', 'All'], ...suppliers.map(({ id, name }) => [id, name] as const)]}
      />
      <label className="col-span-2 flex min-h-[2.4rem] items-center gap-2">
        <input
          type="checkbox"
          className="size-5 accent-line"
          checked={look.retired}
          onChange={(event) => onChange({ retired: event.target.checked })}
        />
        Retired ones
      </label>
    </div>
  );
}
