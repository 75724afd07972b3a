import type { Point } from '@/geometry/point';
import { documentRing, vertexPoint } from '@/paving/ground-edits';
import type { CornerAddress } from '@/paving/set-out/set-out-types';
import { screenFromGround } from '../camera';
import { floorOf } from '../floor';
import { datumCorners, datumPointed, datumsLeft } from '../set-out/set-out-actions';
import { shownDocument, type TableStore } from '../table-store';
import { reachPx, screenDistance, type TablePointer, type Tool } from './tool';

/** The nearest of some places that the pointer reaches; the first of equals. */
function nearest<T>(
  table: TableStore,
  pointer: TablePointer,
  all: readonly T[],
  place: (one: T) => Point,
): T | null {
  const { camera, size } = table.getState();
  if (!camera) return null;
  let best: T | null = null;
  let least = 1.4 * reachPx(pointer);
  for (const one of all) {
    const away = screenDistance(screenFromGround(camera, size, place(one)), pointer.screen);
    if (away < least) {
      least = away;
      best = one;
    }
  }
  return best;
}

const pointUnder = (table: TableStore, pointer: TablePointer): string | null => {
  const points = floorOf(shownDocument(table.getState())).setOut?.points ?? [];
  return nearest(table, pointer, points, ({ at }) => at)?.name ?? null;
};

/** Shows how a control point is taped while the pointer is over it, and keeps it shown once pressed. */
export function createShowPoint(): Tool {
  return {
    down: (table, pointer) => pointUnder(table, pointer) !== null,
    move() {},
    up(table, pointer) {
      const name = pointUnder(table, pointer);
      if (name) table.getState().set({ point: name, pointed: null });
    },
    hover(table, pointer) {
      const pointed = pointer && pointUnder(table, pointer);
      if (table.getState().pointed !== pointed) table.getState().set({ pointed });
    },
    cancel(table) {
      table.getState().set({ point: null, pointed: null });
    },
    cursor: (table) => (table.getState().pointed ? 'pointer' : 'grab'),
  };
}

const cornerUnder = (table: TableStore, pointer: TablePointer): CornerAddress | null => {
  const { document } = table.getState();
  return nearest(table, pointer, datumCorners(document), ([ring, vertex]) =>
    vertexPoint(documentRing(document, ring)[vertex]),
  );
};

/** Points at the two corners that tapes are hooked on. */
export function createChooseDatum(): Tool {
  return {
    down: (table, pointer) => cornerUnder(table, pointer) !== null,
    move() {},
    up(table, pointer) {
      const corner = cornerUnder(table, pointer);
      if (corner) datumPointed(table, corner);
    },
    hover(table, pointer) {
      const corner = pointer && cornerUnder(table, pointer);
      table.getState().set({
        hover: corner ? { kind: 'vertex', ring: corner[0], vertex: corner[1] } : null,
      });
    },
    cancel: datumsLeft,
    cursor: (table) => (table.getState().hover ? 'pointer' : 'grab'),
  };
}
