import { createContext, use, type ReactNode } from 'react';
import { useStore } from 'zustand';
import { floorOf, type Floor } from './floor';
import { shownDocument, type TableState, type TableStore } from './table-store';

const TableContext = createContext<TableStore | null>(null);
const LayoutContext = createContext<string | null>(null);

export function TableProvider({
  store,
  layoutId = null,
  children,
}: {
  store: TableStore;
  /** Left out where the floor on the table is kept nowhere. */
  layoutId?: string | null;
  children: ReactNode;
}) {
  return (
    <LayoutContext value={layoutId}>
      <TableContext value={store}>{children}</TableContext>
    </LayoutContext>
  );
}

/** The layout that is on the table; null where the floor is kept nowhere. */
export const useLayoutId = (): string | null => use(LayoutContext);

export function useTableStore(): TableStore {
  const store = use(TableContext);
  if (!store) throw new Error('useTableStore needs a TableProvider above it');
  return store;
}

export const useTable = <T,>(select: (state: TableState) => T): T =>
  useStore(useTableStore(), select);

/** The floor as shown: with the gesture in hand applied. */
export const useShownFloor = (): Floor => floorOf(useTable(shownDocument));

/** The floor as last settled: what the figures stood at before the gesture in hand. */
export const useSettledFloor = (): Floor => floorOf(useTable((state) => state.document));
