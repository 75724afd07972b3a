import type { ReactNode } from 'react';

/** The head of a column that a list may be sorted by: bold with an arrow while it is. */
export function SortedHead({
  children,
  order,
  onSort,
  className,
}: {
  children: ReactNode;
  /** How the list is sorted by this column now; null when it is by another. */
  order: 'ascending' | 'descending' | null;
  /** Left out where the list cannot be sorted by this column. */
  onSort?: () => void;
  className: string;
}) {
  return (
    <th
      scope="col"
      aria-sort={order ?? undefined}
      className={`py-1 pr-4 font-normal last:pr-0 ${className}`}
    >
      {onSort ? (
        <button
          type="button"
          className={`min-h-8 pointer-coarse:min-h-11 ${order ? 'font-bold text-graphite' : 'hover:text-line'}`}
          onClick={onSort}
        >
          {children}
          <span aria-hidden="true">{order && (order === 'ascending' ? ' ↑' : ' ↓')}</span>
        </button>
      ) : (
        children
      )}
    </th>
  );
}
