import { documentEdgeName } from '@/paving/edge-names';
import { layFloor } from '@/paving/laying';
import {
  groundMiddle,
  placementSlid,
  placementTurned,
  slideToEdge,
  turnAlongEdge,
} from '@/paving/placement-edits';
import type { LayoutDocument } from '@/paving/layout-document';
import { floorOf } from '../floor';
import type { TableStore } from '../table-store';
import { edgeNearest } from './edit-ring';
import { reachPx, type Tool } from './tool';

/** The document with the pattern turned along an edge, and a row started along it; null for an arc. */
function alignedToEdge(
  document: LayoutDocument,
  ring: number,
  edge: number,
): LayoutDocument | null {
  const turn = turnAlongEdge(document, ring, edge);
  if (turn === null) return null;
  const turned = {
    ...document,
    placement: placementTurned(document.placement, turn, groundMiddle(document)),
  };
  if (floorOf(turned).problems.length > 0) return turned;
  const by = slideToEdge(layFloor(turned), ring, edge);
  return { ...turned, placement: placementSlid(turned.placement, by) };
}

export function alignTableToEdge(table: TableStore, ring: number, edge: number): void {
  const { document, settle, set } = table.getState();
  const aligned = alignedToEdge(document, ring, edge);
  const name = documentEdgeName(document, ring, edge);
  if (!aligned) {
    set({ said: `${name} is an arc: choose a straight edge.` });
    return;
  }
  settle(aligned);
  set({ tool: 'slide', hover: null, said: `A row now starts along ${name}.` });
}

/** Points at the edge along which a row is to start. */
export function createAlignToEdge(): Tool {
  return {
    down(table, pointer) {
      const { document, camera } = table.getState();
      const near = edgeNearest(document, pointer.ground);
      return camera !== null && near.distance * camera.scale <= 2 * reachPx(pointer);
    },
    move() {},
    up(table, pointer) {
      const near = edgeNearest(table.getState().document, pointer.ground);
      alignTableToEdge(table, near.ring, near.edge);
    },
    hover(table, pointer) {
      const { document, camera, set } = table.getState();
      if (!pointer || !camera) return set({ hover: null });
      const near = edgeNearest(document, pointer.ground);
      const within = near.distance * camera.scale <= 2 * reachPx(pointer);
      set({ hover: within ? { kind: 'edge', ring: near.ring, edge: near.edge } : null });
    },
    cancel(table) {
      table.getState().set({ tool: 'slide', hover: null });
    },
    cursor: (table) => (table.getState().hover ? 'pointer' : 'grab'),
  };
}
