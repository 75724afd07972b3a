import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '@/paving/layout-document';
import {
  documentRing,
  documentRingCount,
  edgeMiddle,
  edgeMoved,
  edgeRiseSet,
  ringMoved,
  ringReplaced,
  vertexInserted,
  vertexMoved,
  vertexPoint,
  type Ring,
} from '@/paving/ground-edits';
import { screenFromGround } from '../camera';
import { edgeOutline, ringOutline } from '../ring-outline';
import { gridLength, gridStep, snapPoint, squareDirections, type SnapLine } from '../snapping';
import type { Pick, TableState } from '../table-store';
import { CLICK_SLACK_PX, reachPx, screenDistance, type TablePointer, type Tool } from './tool';

type Held =
  | Pick
  | { readonly kind: 'arc'; readonly ring: number; readonly edge: number }
  | { readonly kind: 'ring'; readonly ring: number };

type State =
  | { readonly kind: 'idle' }
  | { readonly kind: 'pointing'; readonly held: Held; readonly from: TablePointer }
  | { readonly kind: 'dragging'; readonly held: Held; readonly from: TablePointer };

const rings = (document: LayoutDocument) =>
  Array.from({ length: documentRingCount(document) }, (_, ring) => documentRing(document, ring));

function segmentNearest(p: Point, a: Point, b: Point): { distance: number; at: Point } {
  const [dx, dy] = [b[0] - a[0], b[1] - a[1]];
  const length2 = dx * dx + dy * dy;
  const t =
    length2 === 0
      ? 0
      : Math.min(1, Math.max(0, ((p[0] - a[0]) * dx + (p[1] - a[1]) * dy) / length2));
  const at: Point = [a[0] + t * dx, a[1] + t * dy];
  return { distance: Math.hypot(p[0] - at[0], p[1] - at[1]), at };
}

/** The edge nearest to a ground point, and where on it. */
export function edgeNearest(document: LayoutDocument, point: Point) {
  let best = { ring: 0, edge: 0, distance: Infinity, at: point, s: 0 };
  rings(document).forEach((ring, ringIndex) =>
    ring.forEach((_, edge) => {
      const outline = edgeOutline(ring, edge);
      let s = 0;
      for (let n = 1; n < outline.length; n++) {
        const near = segmentNearest(point, outline[n - 1], outline[n]);
        const from = Math.hypot(near.at[0] - outline[n - 1][0], near.at[1] - outline[n - 1][1]);
        if (near.distance < best.distance)
          best = { ring: ringIndex, edge, distance: near.distance, at: near.at, s: s + from };
        s += Math.hypot(outline[n][0] - outline[n - 1][0], outline[n][1] - outline[n - 1][1]);
      }
    }),
  );
  return best;
}

function insideRing(point: Point, outline: readonly Point[]): boolean {
  let inside = false;
  for (let n = 0, m = outline.length - 1; n < outline.length; m = n++) {
    const [a, b] = [outline[n], outline[m]];
    if (a[1] > point[1] !== b[1] > point[1])
      if (point[0] < ((b[0] - a[0]) * (point[1] - a[1])) / (b[1] - a[1]) + a[0]) inside = !inside;
  }
  return inside;
}

/** What a pointer would take hold of: a vertex before an arc's handle, an edge, a whole keep-out. */
function heldAt(state: TableState, pointer: TablePointer): Held | null {
  const { document, camera, size, pick } = state;
  if (!camera) return null;
  const reach = reachPx(pointer);
  const away = (p: Point) => screenDistance(screenFromGround(camera, size, p), pointer.screen);
  let nearest: { held: Held; px: number } | null = null;
  rings(document).forEach((ring, index) =>
    ring.forEach((vertex, n) => {
      const px = away(vertexPoint(vertex));
      if (px <= reach && (!nearest || px < nearest.px))
        nearest = { held: { kind: 'vertex', ring: index, vertex: n }, px };
    }),
  );
  if (nearest) return (nearest as { held: Held }).held;
  if (pick?.kind === 'edge') {
    const middle = edgeMiddle(documentRing(document, pick.ring), pick.edge);
    if (away(middle) <= reach) return { kind: 'arc', ring: pick.ring, edge: pick.edge };
  }
  const edge = edgeNearest(document, pointer.ground);
  if (edge.distance * camera.scale <= reach)
    return { kind: 'edge', ring: edge.ring, edge: edge.edge };
  const keepOut = document.ground.keepOuts.findIndex((k) =>
    insideRing(pointer.ground, ringOutline(k.ring)),
  );
  return keepOut < 0 ? null : { kind: 'ring', ring: keepOut + 1 };
}

/** Lines through a vertex's neighbours, along and square to their own edges, and through all others along the axes. */
function linesFor(document: LayoutDocument, ringIndex: number, vertex: number): SnapLine[] {
  const ring = documentRing(document, ringIndex);
  const at = (n: number) => vertexPoint(ring[(n + ring.length) % ring.length]);
  const lines: SnapLine[] = [];
  for (const [anchor, beyond] of [
    [at(vertex - 1), at(vertex - 2)],
    [at(vertex + 1), at(vertex + 2)],
  ] as const)
    for (const along of squareDirections([anchor[0] - beyond[0], anchor[1] - beyond[1]]))
      lines.push({ anchor, along });
  rings(document).forEach((other, index) =>
    other.forEach((v, n) => {
      if (index === ringIndex && n === vertex) return;
      lines.push(
        { anchor: vertexPoint(v), along: [1, 0] },
        { anchor: vertexPoint(v), along: [0, 1] },
      );
    }),
  );
  return lines;
}

function dragged(state: TableState, held: Held, from: TablePointer, pointer: TablePointer) {
  const { document, camera, snap } = state;
  const ring = documentRing(document, held.ring);
  const by: Point = [pointer.ground[0] - from.ground[0], pointer.ground[1] - from.ground[1]];
  const grid = gridStep(document.display, camera!.scale);
  const snapping = snap && !pointer.free;
  const replaced = (vertices: Ring) => ringReplaced(document, held.ring, vertices);

  if (held.kind === 'vertex') {
    const start = vertexPoint(ring[held.vertex]);
    const raw: Point = [start[0] + by[0], start[1] + by[1]];
    if (!snapping) return { document: replaced(vertexMoved(ring, held.vertex, raw)), guides: [] };
    const others = rings(document).flatMap((r, index) =>
      index === held.ring ? [] : r.map(vertexPoint),
    );
    const snapped = snapPoint(raw, {
      vertices: others,
      lines: linesFor(document, held.ring, held.vertex),
      grid,
      reachMm: reachPx(pointer) / camera!.scale,
    });
    return {
      document: replaced(vertexMoved(ring, held.vertex, snapped.point)),
      guides: snapped.guides,
    };
  }

  if (held.kind === 'ring') {
    const shift: Point = snapping ? [gridLength(by[0], grid), gridLength(by[1], grid)] : by;
    return { document: replaced(ringMoved(ring, shift)), guides: [] };
  }

  const [a, b] = [ring[held.edge], ring[(held.edge + 1) % ring.length]];
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]) || 1;
  // To the right of travel: outward on an anticlockwise ring.
  const out: Point = [(b[1] - a[1]) / length, -(b[0] - a[0]) / length];

  if (held.kind === 'arc') {
    const middle: Point = [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2];
    const raw = (pointer.ground[0] - middle[0]) * out[0] + (pointer.ground[1] - middle[1]) * out[1];
    const limit = length * 2;
    const rise = Math.max(-limit, Math.min(limit, snapping ? gridLength(raw, grid) : raw));
    const straight = Math.abs(raw) * camera!.scale < 6;
    return { document: replaced(edgeRiseSet(ring, held.edge, straight ? 0 : rise)), guides: [] };
  }

  let off = by[0] * out[0] + by[1] * out[1];
  if (snapping) {
    const line = a[0] * out[0] + a[1] * out[1];
    const level = rings(document)
      .flatMap((r) => r.map((v) => v[0] * out[0] + v[1] * out[1] - line))
      .filter(
        (other) =>
          Math.abs(other) > 1e-6 && Math.abs(other - off) * camera!.scale <= reachPx(pointer),
      )
      .sort((p, q) => Math.abs(p - off) - Math.abs(q - off))[0];
    off = level ?? gridLength(off, grid);
  }
  return {
    document: replaced(edgeMoved(ring, held.edge, [out[0] * off, out[1] * off])),
    guides: [],
  };
}

const asPick = (held: Held | null): Pick | null =>
  held === null || held.kind === 'ring'
    ? null
    : held.kind === 'arc'
      ? { kind: 'edge', ring: held.ring, edge: held.edge }
      : held;

/** Takes hold of vertices, whole edges, arcs and keep-outs, and drags them. */
export function createEditRing(): Tool {
  let state: State = { kind: 'idle' };
  let over: Held | null = null;

  return {
    down(table, pointer) {
      const held = heldAt(table.getState(), pointer);
      if (!held) {
        state = { kind: 'idle' };
        table.getState().set({ pick: null });
        return false;
      }
      state = { kind: 'pointing', held, from: pointer };
      table.getState().set({ pick: asPick(held) });
      return true;
    },
    move(table, pointer) {
      if (state.kind === 'idle') return;
      if (state.kind === 'pointing') {
        if (screenDistance(state.from.screen, pointer.screen) < CLICK_SLACK_PX) return;
        state = { ...state, kind: 'dragging' };
      }
      const table_ = table.getState();
      const { document, guides } = dragged(table_, state.held, state.from, pointer);
      table_.show(document);
      table_.set({ guides });
    },
    up(table) {
      if (state.kind === 'dragging') table.getState().settleShown();
      state = { kind: 'idle' };
    },
    hover(table, pointer) {
      over = pointer ? heldAt(table.getState(), pointer) : null;
      const hover = asPick(over);
      const before = table.getState().hover;
      if (JSON.stringify(hover) !== JSON.stringify(before)) table.getState().set({ hover });
    },
    doubleClick(table, pointer) {
      const { document, camera, settle, set } = table.getState();
      const edge = edgeNearest(document, pointer.ground);
      if (!camera || edge.distance * camera.scale > reachPx(pointer)) return;
      const held = heldAt(table.getState(), pointer);
      if (held?.kind === 'vertex') return;
      const ring = documentRing(document, edge.ring);
      settle(ringReplaced(document, edge.ring, vertexInserted(ring, edge.edge, edge.at)));
      set({ pick: { kind: 'vertex', ring: edge.ring, vertex: edge.edge + 1 } });
    },
    cancel(table) {
      state = { kind: 'idle' };
      table.getState().show(null);
      table.getState().set({ guides: [] });
    },
    cursor() {
      if (state.kind === 'dragging') return 'grabbing';
      if (!over) return 'grab';
      return over.kind === 'vertex' || over.kind === 'ring' ? 'move' : 'pointer';
    },
  };
}
