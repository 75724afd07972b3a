import type { Point } from '@/geometry/point';
import { spotAt, spotChanged } from '@/paving/level-edits';
import type { LayoutDocument } from '@/paving/layout-document';
import { documentLevels } from '@/paving/levels';
import { screenFromGround } from '../camera';
import { placePointed, placingLeft } from '../level-actions';
import { gridPoint, gridStep } from '../snapping';
import type { TableStore } from '../table-store';
import { CLICK_SLACK_PX, reachPx, screenDistance, type TablePointer, type Tool } from './tool';

/** The place that the hand means: a corner of the ground near by, else the grid; just there while snapping is off. */
function placeMeant(table: TableStore, pointer: TablePointer): Point {
  const { document, camera, size, snap } = table.getState();
  if (!camera || !snap || pointer.free) return pointer.ground.map(Math.round) as unknown as Point;
  for (const [x, y] of document.ground.perimeter)
    if (screenDistance(screenFromGround(camera, size, [x, y]), pointer.screen) <= reachPx(pointer))
      return [x, y];
  return gridPoint(pointer.ground, gridStep(document.display, camera.scale));
}

/** The spot under a pointer; null where there is none. */
function spotUnder(table: TableStore, pointer: TablePointer): number | null {
  const { document, camera, size } = table.getState();
  if (!camera) return null;
  let [best, nearest]: [number | null, number] = [null, reachPx(pointer)];
  documentLevels(document).spots.forEach(({ at }, n) => {
    const away = screenDistance(screenFromGround(camera, size, at), pointer.screen);
    if (away <= nearest) [best, nearest] = [n, away];
  });
  return best;
}

const spotDragged = (document: LayoutDocument, index: number, at: Point): LayoutDocument | null =>
  spotAt(documentLevels(document).spots, at, index) >= 0
    ? null
    : spotChanged(document, index, { at: [at[0], at[1]] });

/** Picks spots, and drags them. */
export function createSpotLevels(): Tool {
  let held: { index: number; from: TablePointer; dragging: boolean } | null = null;
  let from: TablePointer | null = null;
  let over = false;
  return {
    down(table, pointer) {
      from = pointer;
      const index = spotUnder(table, pointer);
      if (index === null) return false;
      held = { index, from: pointer, dragging: false };
      table.getState().set({ spot: index });
      return true;
    },
    move(table, pointer) {
      if (!held) return;
      if (!held.dragging && screenDistance(held.from.screen, pointer.screen) < CLICK_SLACK_PX)
        return;
      held.dragging = true;
      const { document, show } = table.getState();
      const dragged = spotDragged(document, held.index, placeMeant(table, pointer));
      // Onto another spot it does not go: it stays where it last was.
      if (dragged) show(dragged);
    },
    up(table, pointer) {
      if (held?.dragging) table.getState().settleShown();
      else if (!held && from && screenDistance(from.screen, pointer.screen) < CLICK_SLACK_PX)
        table.getState().set({ spot: null });
      held = null;
      from = null;
    },
    hover(table, pointer) {
      over = pointer !== null && spotUnder(table, pointer) !== null;
    },
    cancel(table) {
      held = null;
      from = null;
      table.getState().show(null);
    },
    cursor: () => (held?.dragging ? 'grabbing' : over ? 'pointer' : 'grab'),
  };
}

/** Points at places for the levels; a drag pans, so that the floor can be moved about meanwhile. */
export function createPlacePoint(): Tool {
  let from: TablePointer | null = null;
  return {
    down(_table, pointer) {
      from = pointer;
      return false;
    },
    move() {},
    up(table, pointer) {
      const start = from;
      from = null;
      if (!start || screenDistance(start.screen, pointer.screen) >= CLICK_SLACK_PX) return;
      placePointed(table, placeMeant(table, pointer));
    },
    hover(table, pointer) {
      const { placing, set } = table.getState();
      if (placing)
        set({ placing: { ...placing, at: pointer ? placeMeant(table, pointer) : null } });
    },
    cancel(table) {
      from = null;
      placingLeft(table);
    },
    cursor: () => 'crosshair',
  };
}
