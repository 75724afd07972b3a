import { createColumnHelper, tableFeatures, useTable } from '@tanstack/react-table';
import { Fragment, type ReactNode } from 'react';
import type { CatalogueItem, ItemSort } from '@/api-types/catalogue';
import { formatMoney } from '@/takeoff/money';
import { boughtAs } from '@/takeoff/bought-as';
import type { Display } from '@/paving/length';
import { dayText } from '@/takeoff/day-text';
import { Moment } from '../ui/Moment';
import { SortedHead } from '../ui/SortedHead';
import { itemMeasure, KIND_WORDS } from './catalogue-words';

// The server searches, sorts and pages: the table holds columns and rows alone.
const features = tableFeatures({});
const helper = createColumnHelper<typeof features, CatalogueItem>();

interface Props {
  readonly items: readonly CatalogueItem[];
  readonly currency: string;
  readonly display: Display;
  readonly sort: ItemSort;
  readonly onSort: (sort: ItemSort) => void;
  /** The item that is being changed, and its form. */
  readonly editing: string | null;
  readonly form: ReactNode;
  readonly onEdit: (item: CatalogueItem) => void;
  readonly onHistory: (item: CatalogueItem) => void;
}

const SORTED: Readonly<Record<string, { by: ItemSort; order: 'ascending' | 'descending' }>> = {
  name: { by: 'name', order: 'ascending' },
  updated: { by: 'updated', order: 'descending' },
};

/** Shown only where there is room; the name's cell says the most needed of them on a phone. */
const WIDE_ONLY: Readonly<Record<string, string>> = {
  supplier: 'max-md:hidden',
  pack: 'max-sm:hidden',
  updated: 'max-lg:hidden',
};

const columns = (props: Props) =>
  helper.columns([
    helper.accessor('name', {
      header: 'Item',
      cell: ({ row: { original: item } }) => (
        <>
          <button
            type="button"
            data-item={item.id}
            className="flex items-center gap-2 text-left font-semibold hover:text-line pointer-coarse:min-h-11"
            aria-label={`Change ${item.name}`}
            onClick={() => props.onEdit(item)}
          >
            {item.colour && (
              <span
                aria-hidden
                className="inline-block size-4 shrink-0 border border-slate"
                style={{ background: item.colour }}
              />
            )}
            {item.name}
          </button>
          <p className="text-sm text-slate">
            {[KIND_WORDS[item.kind], itemMeasure(item, props.display), item.code]
              .filter(Boolean)
              .join(' · ')}
          </p>
          <p className="text-sm text-slate sm:hidden">
            {boughtAs({
              name: item.packName,
              holds: item.packHolds,
              measure: item.packMeasure,
              whole: item.packWhole,
            })}
          </p>
          <p className="text-sm text-slate md:hidden">{item.supplierName ?? ''}</p>
        </>
      ),
    }),
    helper.accessor('supplierName', {
      id: 'supplier',
      header: 'Supplier',
      cell: ({ getValue }) => getValue() ?? <span className="text-slate">–</span>,
    }),
    helper.accessor('packName', {
      id: 'pack',
      header: 'Bought as',
      cell: ({ row: { original: item } }) =>
        boughtAs({
          name: item.packName,
          holds: item.packHolds,
          measure: item.packMeasure,
          whole: item.packWhole,
        }),
    }),
    helper.accessor('price', {
      header: () => `Price, ${props.currency}`,
      cell: ({ row: { original: item } }) => <Price item={item} props={props} />,
    }),
    helper.accessor('updatedAt', {
      id: 'updated',
      header: 'Changed',
      cell: ({ getValue }) => <Moment iso={getValue()} day />,
    }),
  ]);

function Price({ item, props }: { item: CatalogueItem; props: Props }) {
  const { price, nextPrice } = item;
  const money = (minor: number) => formatMoney(minor, props.currency);
  return (
    <button
      type="button"
      className="text-right hover:text-line pointer-coarse:min-h-11"
      aria-label={`Prices of ${item.name}`}
      onClick={() => props.onHistory(item)}
    >
      {price ? (
        <>
          <span className="block font-semibold whitespace-nowrap">{money(price.costMinor)}</span>
          <span className="block text-sm whitespace-nowrap text-slate">
            from {dayText(price.from)}
          </span>
        </>
      ) : (
        <span className="block text-slate">no price yet</span>
      )}
      {nextPrice && (
        <span className="block text-sm text-slate">
          {money(nextPrice.costMinor)} from {dayText(nextPrice.from)}
        </span>
      )}
    </button>
  );
}

/** The catalogue's items; the one that is being changed opens in its own row. */
export function ItemTable(props: Props) {
  const { items, sort, onSort, editing, form } = props;
  const table = useTable({
    features,
    columns: columns(props),
    data: items as CatalogueItem[],
    getRowId: (item) => item.id,
  });
  const right = (id: string) => (id === 'price' || id === 'updated' ? 'text-right' : 'text-left');
  const count = table.getAllColumns().length;
  return (
    <table className="mt-4 w-full">
      <caption className="sr-only">Items of the catalogue</caption>
      <thead>
        {table.getHeaderGroups().map((group) => (
          <tr key={group.id} className="border-b border-graphite text-sm text-slate">
            {group.headers.map((header) => {
              const { id } = header.column;
              const sorted = SORTED[id];
              return (
                <SortedHead
                  key={header.id}
                  order={sorted?.by === sort ? sorted.order : null}
                  onSort={sorted && (() => onSort(sorted.by))}
                  className={`${right(id)} ${WIDE_ONLY[id] ?? ''}`}
                >
                  <table.FlexRender header={header} />
                </SortedHead>
              );
            })}
          </tr>
        ))}
      </thead>
      <tbody className="hairlines border-b border-stone-300">
        {table.getRowModel().rows.map((row) => (
          <Fragment key={row.id}>
            {row.id === editing ? (
              <tr>
                <td colSpan={count} className="py-2">
                  {form}
                </td>
              </tr>
            ) : (
              <tr>
                {row.getAllCells().map((cell) => (
                  <td
                    key={cell.id}
                    className={`py-2 pr-4 align-top last:pr-0 ${right(cell.column.id)} ${WIDE_ONLY[cell.column.id] ?? ''}`}
                  >
                    <table.FlexRender cell={cell} />
                  </td>
                ))}
              </tr>
            )}
          </Fragment>
        ))}
      </tbody>
    </table>
  );
}
