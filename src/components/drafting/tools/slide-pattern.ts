import type { Point } from '@/geometry/point';
import { groundMiddle, placementSlid, placementTurned, turnNormal } from '@/paving/placement-edits';
import {
  documentRing,
  documentRingCount,
  edgeDirectionDeg,
  vertexBulge,
} from '@/paving/ground-edits';
import type { LayoutDocument } from '@/paving/layout-document';
import { screenFromGround } from '../camera';
import type { TableState, TableStore } from '../table-store';
import { CLICK_SLACK_PX, reachPx, screenDistance, type TablePointer, type Tool } from './tool';

/** How far from its pivot the turn handle stands, px. */
const TURN_HANDLE_PX = 84;
/** A turn snaps to whole fifteens and to the edges within this, degrees. */
const TURN_SNAP_DEG = 1.5;

type State =
  | { readonly kind: 'idle' }
  | { readonly kind: 'pointing'; readonly what: 'slide' | 'turn'; readonly from: TablePointer }
  | { readonly kind: 'dragging'; readonly what: 'slide' | 'turn'; readonly from: TablePointer };

/** Where the turn handle stands on the screen. */
export function turnHandle(
  state: TableState,
  document: LayoutDocument,
): { pivot: Point; handle: Point } | null {
  if (!state.camera) return null;
  const pivot = screenFromGround(state.camera, state.size, groundMiddle(document));
  const angle = (document.placement.turn * Math.PI) / 180;
  return {
    pivot,
    handle: [
      pivot[0] + TURN_HANDLE_PX * Math.cos(angle),
      pivot[1] - TURN_HANDLE_PX * Math.sin(angle),
    ],
  };
}

/** The turn that the hand means: near a whole fifteen degrees or an edge's direction, that. */
function snappedTurn(document: LayoutDocument, turnDeg: number): number {
  const candidates = [Math.round(turnDeg / 15) * 15];
  for (let ring = 0; ring < documentRingCount(document); ring++) {
    const vertices = documentRing(document, ring);
    vertices.forEach((vertex, edge) => {
      if (vertexBulge(vertex) !== 0) return;
      const off = turnDeg - edgeDirectionDeg(vertices, edge);
      candidates.push(turnDeg - (off - Math.round(off / 90) * 90));
    });
  }
  const nearest = candidates.sort((a, b) => Math.abs(a - turnDeg) - Math.abs(b - turnDeg))[0];
  return Math.abs(nearest - turnDeg) <= TURN_SNAP_DEG ? nearest : Math.round(turnDeg * 10) / 10;
}

/** Slides the whole pattern under the hand, or turns it by its handle. */
export function createSlidePattern(): Tool {
  let state: State = { kind: 'idle' };
  let overHandle = false;

  const onHandle = (table: TableStore, pointer: TablePointer) => {
    const handle = turnHandle(table.getState(), table.getState().document);
    return handle !== null && screenDistance(handle.handle, pointer.screen) <= reachPx(pointer) + 4;
  };

  return {
    down(table, pointer) {
      state = {
        kind: 'pointing',
        what: onHandle(table, pointer) ? 'turn' : 'slide',
        from: pointer,
      };
      return true;
    },
    move(table, pointer) {
      if (state.kind === 'idle') return;
      if (state.kind === 'pointing') {
        if (screenDistance(state.from.screen, pointer.screen) < CLICK_SLACK_PX) return;
        state = { ...state, kind: 'dragging' };
      }
      const { document, show, snap } = table.getState();
      const { placement } = document;
      if (state.what === 'slide') {
        const raw: Point = [
          pointer.ground[0] - state.from.ground[0],
          pointer.ground[1] - state.from.ground[1],
        ];
        const by: Point = pointer.shift
          ? Math.abs(raw[0]) > Math.abs(raw[1])
            ? [raw[0], 0]
            : [0, raw[1]]
          : raw;
        show({ ...document, placement: placementSlid(placement, by) });
        return;
      }
      const pivot = groundMiddle(document);
      const angle =
        (Math.atan2(pointer.ground[1] - pivot[1], pointer.ground[0] - pivot[0]) * 180) / Math.PI;
      const turn =
        snap && !pointer.free
          ? snappedTurn(document, turnNormal(angle))
          : Math.round(angle * 10) / 10;
      show({ ...document, placement: placementTurned(placement, turn, pivot) });
    },
    up(table) {
      if (state.kind === 'dragging') table.getState().settleShown();
      state = { kind: 'idle' };
    },
    hover(table, pointer) {
      overHandle = pointer !== null && onHandle(table, pointer);
    },
    cancel(table) {
      state = { kind: 'idle' };
      table.getState().show(null);
    },
    cursor: () => (state.kind === 'dragging' ? 'grabbing' : overHandle ? 'pointer' : 'grab'),
  };
}
