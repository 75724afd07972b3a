import type { Address } from '@/paving/layout-document';
import { unitAt } from '@/paving/laying';
import { floorOf } from '../floor';
import type { TableStore } from '../table-store';
import { CLICK_SLACK_PX, screenDistance, type TablePointer, type Tool } from './tool';

const same = (a: Address, b: Address) => a.every((part, n) => part === b[n]);

/** Takes a laid unit out, or lays a lifted one back, by a click. */
export function createLiftUnit(): Tool {
  let from: TablePointer | null = null;
  let over: 'laid' | 'lifted' | 'leftOut' | null = null;

  const unitUnder = (table: TableStore, pointer: TablePointer) => {
    const { laying } = floorOf(table.getState().document);
    return laying ? unitAt(laying, pointer.ground) : null;
  };

  return {
    // A drag pans, so that the floor can be moved about while lifting; a click is told on the way up.
    down(_table, pointer) {
      from = pointer;
      return false;
    },
    move() {},
    up(table, pointer) {
      const start = from;
      from = null;
      if (!start || screenDistance(start.screen, pointer.screen) >= CLICK_SLACK_PX) return;
      const unit = unitUnder(table, pointer);
      const { document, settle, set } = table.getState();
      if (!unit) return;
      if (unit.status === 'laid') {
        settle({ ...document, lifted: [...document.lifted, unit.address] });
        set({ said: 'Unit lifted: its place is filled with aggregate.' });
      } else if (unit.status === 'lifted') {
        settle({ ...document, lifted: document.lifted.filter((a) => !same(a, unit.address)) });
        set({ said: 'Unit laid back.' });
      } else set({ said: 'That unit is left out: it would not lie whole inside the edge.' });
    },
    hover(table, pointer) {
      over = pointer ? (unitUnder(table, pointer)?.status ?? null) : null;
    },
    cancel() {
      from = null;
    },
    cursor: () => (over === 'laid' || over === 'lifted' ? 'pointer' : 'grab'),
  };
}
