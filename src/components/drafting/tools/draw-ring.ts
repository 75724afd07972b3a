import type { Point } from '@/geometry/point';
import { ringArea } from '@/geometry/ring';
import type { LayoutDocument, Vertex } from '@/paving/layout-document';
import { documentRing, documentRingCount, vertexPoint } from '@/paving/ground-edits';
import { screenFromGround } from '../camera';
import { gridStep, snapPoint, squareDirections, type SnapLine } from '../snapping';
import type { Drawing, TableState, TableStore } from '../table-store';
import { reachPx, screenDistance, type TablePointer, type Tool } from './tool';

const DEGREE = Math.PI / 180;

export const drawingStarted = (target: Drawing['target']): Drawing => ({
  target,
  corners: [],
  next: null,
  lengthMm: null,
  directionDeg: null,
});

const existingVertices = (document: LayoutDocument, target: Drawing['target']): Point[] =>
  target === 'perimeter'
    ? []
    : Array.from({ length: documentRingCount(document) }, (_, ring) =>
        documentRing(document, ring).map(vertexPoint),
      ).flat();

/** Where the next corner would go for a pointer, by what is typed, snapped and free. */
function nextCorner(state: TableState, pointer: TablePointer) {
  const { drawing, document, camera, snap } = state;
  if (!drawing || !camera) return { next: null, guides: [] };
  const last = drawing.corners.at(-1);
  const typed = typedCorner(drawing, pointer.ground);
  if (typed) return { next: typed, guides: [] };
  if (!snap || pointer.free) return { next: pointer.ground, guides: [] };

  const before = drawing.corners.at(-2);
  const others = [...existingVertices(document, drawing.target), ...drawing.corners.slice(0, -1)];
  const lines: SnapLine[] = [];
  if (last)
    for (const along of squareDirections(
      before ? [last[0] - before[0], last[1] - before[1]] : [1, 0],
    ))
      lines.push({ anchor: last, along });
  for (const anchor of others) lines.push({ anchor, along: [1, 0] }, { anchor, along: [0, 1] });
  const snapped = snapPoint(pointer.ground, {
    vertices: others,
    lines,
    grid: gridStep(document.display, camera.scale),
    reachMm: reachPx(pointer) / camera.scale,
  });
  return { next: snapped.point, guides: snapped.guides };
}

/** The corner that the typed length and direction give; what is not typed follows `towards`. */
export function typedCorner(drawing: Drawing, towards: Point | null): Point | null {
  const last = drawing.corners.at(-1);
  const { lengthMm, directionDeg } = drawing;
  if (!last || (lengthMm === null && directionDeg === null)) return null;
  const away: Point = towards ? [towards[0] - last[0], towards[1] - last[1]] : [1, 0];
  const angle = directionDeg === null ? squaredAngle(away) : directionDeg * DEGREE;
  const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
  const length = lengthMm ?? Math.max(0, away[0] * cos + away[1] * sin);
  const micron = (value: number) => Math.round(value * 1000) / 1000;
  return [micron(last[0] + length * cos), micron(last[1] + length * sin)];
}

/** A typed length without a direction runs square when the pointer is nearly square, else at the pointer. */
function squaredAngle([x, y]: Point): number {
  const angle = Math.atan2(y, x);
  const square = Math.round(angle / (Math.PI / 2)) * (Math.PI / 2);
  return Math.abs(angle - square) < 20 * DEGREE ? square : angle;
}

/** Puts a corner down; on the first corner again, closes the ring. */
export function cornerPlaced(table: TableStore, corner: Point): void {
  const { drawing, camera, size, set } = table.getState();
  if (!drawing) return;
  const first = drawing.corners[0];
  const last = drawing.corners.at(-1);
  if (last && Math.hypot(corner[0] - last[0], corner[1] - last[1]) < 0.5) return;
  if (first && drawing.corners.length >= 3) {
    const mm = Math.hypot(corner[0] - first[0], corner[1] - first[1]);
    const px = camera
      ? screenDistance(
          screenFromGround(camera, size, corner),
          screenFromGround(camera, size, first),
        )
      : Infinity;
    if (mm < 0.5 || px < 1) return ringClosed(table);
  }
  set({
    drawing: {
      ...drawing,
      corners: [...drawing.corners, corner],
      next: null,
      lengthMm: null,
      directionDeg: null,
    },
    guides: [],
  });
}

export function cornerTakenBack(table: TableStore): void {
  const { drawing, set } = table.getState();
  if (drawing) set({ drawing: { ...drawing, corners: drawing.corners.slice(0, -1), next: null } });
}

const anticlockwise = (corners: readonly Point[]): Vertex[] => {
  const ordered = ringArea(corners) < 0 ? [corners[0], ...corners.slice(1).reverse()] : corners;
  return ordered.map(([x, y]) => [x, y]);
};

/** Closes the ring being drawn: it becomes the perimeter, or one more keep-out, as one undo step. */
export function ringClosed(table: TableStore): void {
  const { drawing, document, settle, set } = table.getState();
  if (!drawing || drawing.corners.length < 3) return;
  const ring = anticlockwise(drawing.corners);
  const { ground } = document;
  if (drawing.target === 'perimeter') {
    settle({ ...document, ground: { ...ground, perimeter: ring }, lifted: [] });
    set({ said: `Ground drawn with ${ring.length} corners.` });
  } else {
    const name = `Keep-out ${ground.keepOuts.length + 1}`;
    settle({ ...document, ground: { ...ground, keepOuts: [...ground.keepOuts, { name, ring }] } });
    set({ said: `${name} drawn with ${ring.length} corners.` });
  }
  set({ drawing: null, tool: 'edit', guides: [], pick: null });
}

export function createDrawRing(): Tool {
  let held: TablePointer | null = null;

  const follow = (table: TableStore, pointer: TablePointer) => {
    const state = table.getState();
    if (!state.drawing) return;
    const { next, guides } = nextCorner(state, pointer);
    const first = state.drawing.corners[0];
    const closing =
      first &&
      next &&
      state.drawing.corners.length >= 3 &&
      state.camera &&
      screenDistance(screenFromGround(state.camera, state.size, first), pointer.screen) <=
        reachPx(pointer);
    state.set({
      drawing: { ...state.drawing, next: closing ? first : next },
      guides: closing ? [] : guides,
    });
  };

  return {
    down(table, pointer) {
      held = pointer;
      follow(table, pointer);
      return true;
    },
    move: follow,
    up(table, pointer) {
      if (!held) return;
      held = null;
      follow(table, pointer);
      const next = table.getState().drawing?.next;
      if (next) cornerPlaced(table, next);
    },
    hover(table, pointer) {
      if (pointer) follow(table, pointer);
    },
    cancel() {
      held = null;
    },
    cursor: () => 'crosshair',
  };
}
