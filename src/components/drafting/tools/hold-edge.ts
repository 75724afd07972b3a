import { fitRefusal, type FitHold } from '@/paving/fit/fit';
import { documentEdgeName } from '@/paving/edge-names';
import type { TableStore } from '../table-store';
import { edgeNearest } from './edit-ring';
import { reachPx, type Tool } from './tool';

const sameEdge = (a: readonly [number, number], b: readonly [number, number]) =>
  a[0] === b[0] && a[1] === b[1];

/** Begins pointing at the edge (or the two edges) that a hold is for. */
export function holdStarted(table: TableStore, kind: 'edge' | 'between'): void {
  table.getState().set({ tool: 'hold', holding: { kind, first: null }, hover: null });
}

export function holdLeft(table: TableStore): void {
  table.getState().set({ tool: 'slide', holding: null, hover: null });
}

/** Points at an edge for the hold in hand; the second edge of `between` completes it. */
export function holdPointed(table: TableStore, ring: number, edge: number): void {
  const { holding, hold, document, set } = table.getState();
  if (!holding) return;
  if (holding.kind === 'between' && !holding.first) {
    set({
      holding: { kind: 'between', first: [ring, edge] },
      said: `Between ${documentEdgeName(document, ring, edge)} and …: point at the other edge.`,
    });
    return;
  }
  if (holding.first && sameEdge(holding.first, [ring, edge])) return;
  const made: FitHold = holding.first
    ? { between: [[...holding.first], [ring, edge]] }
    : { edge: [ring, edge] };
  const name = (r: number, e: number) => documentEdgeName(document, r, e);
  const alone = (one: FitHold) => !fitRefusal(document, { hold: [one] });
  const clashes = (one: FitHold) =>
    alone(one) && alone(made) && fitRefusal(document, { hold: [one, made] }) !== null;
  // Two freedoms at most: to a third hold the one that runs the same way gives way, else the older.
  const [older, newer] = hold;
  const stay = newer ? [clashes(newer) ? older : newer] : hold;
  const clash = stay.find(clashes);
  if (clash) {
    const refused = `${holdWords(made, name)} and ${holdWords(clash, name)} run the same way, so both cannot be kept. Point at an edge that runs another way, or leave it free and let go of the first.`;
    set({ holding: { kind: holding.kind, first: null, refused } });
    return;
  }
  const left = hold.filter((one) => !stay.includes(one));
  set({ hold: [...stay, made], tool: 'slide', holding: null, hover: null });
  if (left.length > 0)
    set({
      said: `Two holds are all that a floor can keep: ${holdWords(left[0], name)} is let go.`,
    });
}

/** The hold in words: `a row along AB`, `the pattern centred between BC and FA`. */
export function holdWords(hold: FitHold, name: (ring: number, edge: number) => string): string {
  return 'edge' in hold
    ? `a row along ${name(...hold.edge)}`
    : `the pattern centred between ${name(...hold.between[0])} and ${name(...hold.between[1])}`;
}

/** Points at the edges that the pattern is held to. */
export function createHoldEdge(): Tool {
  const near = (table: TableStore, pointer: Parameters<Tool['down']>[1]) => {
    const { document, camera } = table.getState();
    const found = edgeNearest(document, pointer.ground);
    return camera && found.distance * camera.scale <= 2 * reachPx(pointer) ? found : null;
  };
  return {
    down: (table, pointer) => near(table, pointer) !== null,
    move() {},
    up(table, pointer) {
      const found = near(table, pointer);
      if (found) holdPointed(table, found.ring, found.edge);
    },
    hover(table, pointer) {
      const found = pointer && near(table, pointer);
      table
        .getState()
        .set({ hover: found ? { kind: 'edge', ring: found.ring, edge: found.edge } : null });
    },
    cancel: holdLeft,
    cursor: (table) => (table.getState().hover ? 'pointer' : 'grab'),
  };
}
