import type { Address, LayoutDocument } from '@/paving/layout-document';
import type { Point } from '@/geometry/point';
import { unitAt, type Laying, type UnitSet } from '@/paving/laying';
import { floorOf } from '../floor';
import type { TableStore } from '../table-store';
import { CLICK_SLACK_PX, screenDistance, type TablePointer, type Tool } from './tool';

const same = (a: Address, b: Address) => a.every((part, n) => part === b[n]);

interface Standing {
  readonly address: Address;
  readonly at: Point;
}

/** The units that can be lifted or laid back, with their places. */
function standing({ document, laid, lifted, leftOut }: Laying): Standing[] {
  const of = (set: UnitSet): Standing[] =>
    Array.from({ length: set.count }, (_, n) => ({
      address: [set.i[n], set.j[n], set.k[n]],
      at: [set.x[n], set.y[n]],
    }));
  const cut = document.cutting === 'edge' ? of(leftOut) : [];
  return [...of(laid), ...of(lifted), ...cut];
}

/** Chooses the nearest unit in a direction from the one chosen; the first time, the one nearest the floor's middle. */
export function unitChosen(table: TableStore, towards: Point): void {
  const { document, unit, camera, set } = table.getState();
  const { laying } = floorOf(document);
  if (!laying || !camera) return;
  const units = standing(laying);
  const now = unit && units.find((other) => same(other.address, unit));
  const from = now?.at ?? camera.centre;
  let best: { unit: Standing; cost: number } | null = null;
  for (const other of units) {
    const [dx, dy] = [other.at[0] - from[0], other.at[1] - from[1]];
    const along = dx * towards[0] + dy * towards[1];
    const across = Math.abs(dx * towards[1]) + Math.abs(dy * towards[0]);
    if (now && along <= 1e-6) continue;
    // Straight on before aside: a unit off the line counts as twice as far off it.
    const cost = now ? along + 2 * across : Math.hypot(dx, dy);
    if (!best || cost < best.cost) best = { unit: other, cost };
  }
  if (best) set({ unit: best.unit.address });
}

/** Lifts the unit chosen with the keys, or lays it back. */
export function chosenUnitToggled(table: TableStore): void {
  const { unit, document } = table.getState();
  if (!unit) return unitChosen(table, [0, 0]);
  toggled(table, unit, document.lifted.some((a) => same(a, unit)) ? 'lifted' : 'laid');
}

/** True for a unit at the edge of a floor that is cut there: it is a piece, or was left to aggregate by hand. */
function unitIsCut(table: TableStore, address: Address): boolean {
  const { document } = table.getState();
  const { laying } = floorOf(document);
  if (document.cutting !== 'edge' || !laying) return false;
  const { leftOut } = laying;
  for (let n = 0; n < leftOut.count; n++) {
    if (same([leftOut.i[n], leftOut.j[n], leftOut.k[n]], address)) return true;
  }
  return false;
}

function toggled(table: TableStore, address: Address, status: 'laid' | 'lifted'): void {
  const { edit, set } = table.getState();
  const change = (now: LayoutDocument): LayoutDocument => ({
    ...now,
    lifted:
      status === 'laid'
        ? [...now.lifted, address]
        : now.lifted.filter((other) => !same(other, address)),
  });
  edit(change);
  const lifted = status === 'laid';
  const piece = unitIsCut(table, address);
  set({
    said: piece
      ? lifted
        ? 'Not cut: aggregate takes its place.'
        : 'Cut to the edge again.'
      : lifted
        ? 'Unit lifted: its place is filled with aggregate.'
        : 'Unit laid back.',
  });
}

/** Takes a laid unit out, or lays a lifted one back, by a click. */
export function createLiftUnit(): Tool {
  let from: TablePointer | null = null;
  let over: 'laid' | 'lifted' | 'leftOut' | 'piece' | null = null;

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
      if (!unit) return;
      const { document } = table.getState();
      if (unit.status === 'leftOut' && document.cutting === 'edge') {
        const lifted = document.lifted.some((address) => same(address, unit.address));
        toggled(table, unit.address, lifted ? 'lifted' : 'laid');
      } else if (unit.status === 'leftOut')
        table
          .getState()
          .set({ said: 'That unit is left out: it would not lie whole inside the edge.' });
      else toggled(table, unit.address, unit.status);
    },
    hover(table, pointer) {
      over = pointer ? (unitUnder(table, pointer)?.status ?? null) : null;
      if (over === 'leftOut' && table.getState().document.cutting === 'edge') over = 'piece';
    },
    cancel() {
      from = null;
    },
    cursor: () => (over === 'laid' || over === 'lifted' || over === 'piece' ? 'pointer' : 'grab'),
  };
}
