import {
  documentRing,
  documentRingCount,
  edgeMiddle,
  edgeMoved,
  ringReplaced,
  vertexInserted,
  vertexMoved,
  vertexPoint,
  vertexRemoved,
} from '@/paving/ground-edits';
import type { Point } from '@/geometry/point';
import { nudge } from './nudge';
import type { Pick, TableStore } from './table-store';
import { drawingStarted } from './tools/draw-ring';

/** What keys and buttons do to the ground. */

export function drawGround(table: TableStore): void {
  const { settleShown, set } = table.getState();
  settleShown();
  set({ tool: 'draw', drawing: drawingStarted('perimeter'), pick: null, hover: null });
}

export function drawKeepOut(table: TableStore): void {
  const { settleShown, set } = table.getState();
  settleShown();
  set({ tool: 'draw', drawing: drawingStarted('keepOut'), pick: null, hover: null });
}

export function drawingLeft(table: TableStore): void {
  table.getState().set({ tool: 'edit', drawing: null, guides: [] });
}

/** Picks the next vertex or edge round the rings, in either direction. */
export function pickStepped(table: TableStore, by: 1 | -1): void {
  const { document, pick, set } = table.getState();
  const all: Pick[] = [];
  for (let ring = 0; ring < documentRingCount(document); ring++)
    documentRing(document, ring).forEach((_, n) => {
      all.push({ kind: 'vertex', ring, vertex: n }, { kind: 'edge', ring, edge: n });
    });
  const at = pick
    ? all.findIndex((other) => JSON.stringify(other) === JSON.stringify(pick))
    : by === 1
      ? -1
      : 0;
  set({ pick: all[(at + by + all.length) % all.length] });
}

export function pickNudged(table: TableStore, by: Point): void {
  const { pick } = table.getState();
  if (!pick) return;
  nudge(table, (document) => {
    const ring = documentRing(document, pick.ring);
    if (pick.kind === 'edge')
      return ringReplaced(document, pick.ring, edgeMoved(ring, pick.edge, by));
    const [x, y] = vertexPoint(ring[pick.vertex]);
    return ringReplaced(
      document,
      pick.ring,
      vertexMoved(ring, pick.vertex, [x + by[0], y + by[1]]),
    );
  });
}

/** Puts a corner half-way along the picked edge. */
export function cornerAdded(table: TableStore): void {
  const { pick, edit, set } = table.getState();
  if (pick?.kind !== 'edge') return;
  edit((document) => {
    const ring = documentRing(document, pick.ring);
    return ringReplaced(
      document,
      pick.ring,
      vertexInserted(ring, pick.edge, edgeMiddle(ring, pick.edge)),
    );
  });
  set({ pick: { kind: 'vertex', ring: pick.ring, vertex: pick.edge + 1 } });
}

/** Takes the picked corner away, or says why it cannot be. */
export function cornerRemoved(table: TableStore): void {
  const { pick, edit, set, document } = table.getState();
  if (pick?.kind !== 'vertex') return;
  const left = vertexRemoved(documentRing(document, pick.ring), pick.vertex);
  if (!left) {
    set({ said: 'A ring needs at least 3 corners.' });
    return;
  }
  edit((now) => ringReplaced(now, pick.ring, left));
  set({ pick: null, hover: null });
}

export function keepOutRemoved(table: TableStore, index: number): void {
  const { edit, set } = table.getState();
  edit((document) => ({
    ...document,
    ground: {
      ...document.ground,
      keepOuts: document.ground.keepOuts.filter((_, n) => n !== index),
    },
  }));
  set({ pick: null, hover: null });
}
