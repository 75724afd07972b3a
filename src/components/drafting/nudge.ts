import type { LayoutDocument } from '@/paving/layout-document';
import { shownDocument, type TableStore } from './table-store';

/** Keys pressed one after another within this time are one gesture, and so one undo step, ms. */
const GESTURE_REST_MS = 500;

const timers = new WeakMap<TableStore, ReturnType<typeof setTimeout>>();

/** Shows a small change at once; a run of them settles as one undo step when the keys rest. */
export function nudge(
  table: TableStore,
  change: (document: LayoutDocument) => LayoutDocument,
): void {
  clearTimeout(timers.get(table));
  table.getState().show(change(shownDocument(table.getState())));
  timers.set(
    table,
    setTimeout(() => table.getState().settleShown(), GESTURE_REST_MS),
  );
}
