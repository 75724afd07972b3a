import { createContext, use, type ReactNode } from 'react';
import { useStore } from 'zustand';
import { floorOf, type Floor } from './floor';
import { shownDocument, type TableState, type TableStore } from './table-store';

const TableContext = createContext<TableStore | null>(null);

export function TableProvider({ store, children }: { store: TableStore; children: ReactNode }) {
  return <TableContext value={store}>{children}</TableContext>;
}

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
