import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '@/paving/layout-document';
import { placementSlid } from '@/paving/placement-edits';
import { nudge } from '../nudge';
import { shownDocument, type TableStore } from '../table-store';

const slid =
  (by: Point) =>
  (now: LayoutDocument): LayoutDocument => ({
    ...now,
    placement: placementSlid(now.placement, by),
  });

/** What the dot of the shift map does to the floor: a drag is one undo step, and so is a run of keys. */
export const shiftHands = (table: TableStore) => ({
  onDrag: (by: Point) => table.getState().show(slid(by)(shownDocument(table.getState()))),
  onLetGo: () => table.getState().settleShown(),
  onNudge: (by: Point) => nudge(table, slid(by)),
});
