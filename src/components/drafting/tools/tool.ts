import type { Point } from '@/geometry/point';
import type { TableStore } from '../table-store';

/** Where a pointer is, on the ground and on the screen, and what is held down with it. */
export interface TablePointer {
  readonly ground: Point;
  readonly screen: Point;
  readonly shift: boolean;
  /** Snapping is suspended while this is held (Alt or Control). */
  readonly free: boolean;
  readonly touch: boolean;
}

/**
 * A tool of the table: a small state machine fed with pointers. A gesture runs from `down` to `up`;
 * when `down` answers false the hand pans the drawing instead.
 */
export interface Tool {
  down(table: TableStore, pointer: TablePointer): boolean;
  move(table: TableStore, pointer: TablePointer): void;
  up(table: TableStore, pointer: TablePointer): void;
  /** The pointer passes over with nothing held; null: it has left. */
  hover(table: TableStore, pointer: TablePointer | null): void;
  doubleClick?(table: TableStore, pointer: TablePointer): void;
  /** Escape, or a second finger: the gesture is abandoned. */
  cancel(table: TableStore): void;
  cursor(table: TableStore): string;
}

/** How far a pointer moves before it drags rather than clicks, px. */
export const CLICK_SLACK_PX = 4;

/** How near a pointer must be to take hold of something, px. */
export const reachPx = (pointer: TablePointer): number => (pointer.touch ? 24 : 10);

export const screenDistance = (a: Point, b: Point): number => Math.hypot(a[0] - b[0], a[1] - b[1]);
