import type Konva from 'konva';
import { useEffect, useRef, useState } from 'react';
import { Layer, Shape, Stage } from 'react-konva';
import type { Point } from '@/geometry/point';
import { documentRing } from '@/paving/ground-edits';
import { drawingColours, type DrawingColours } from '../ui/drawing-colours';
import {
  cameraFitted,
  cameraPanned,
  cameraZoomed,
  groundFromScreen,
  screenFromGround,
} from './camera';
import { createPieceKeeper, type PieceKeeper } from './cutting/shown-pieces';
import { createFloorCache, type FloorCache } from './floor-cache';
import { floorOf } from './floor';
import { paintOverlay } from './overlay-picture';
import { ringOutline } from './ring-outline';
import { useTable, useTableStore } from './table-context';
import { shownDocument, type TableStore, type ToolName } from './table-store';
import { createAlignToEdge } from './tools/align-to-edge';
import { createDrawRing } from './tools/draw-ring';
import { createEditRing, edgeNearest } from './tools/edit-ring';
import { createHoldEdge } from './tools/hold-edge';
import { createLiftUnit } from './tools/lift-unit';
import { createChooseDatum, createShowPoint } from './tools/set-out-points';
import { createSlidePattern } from './tools/slide-pattern';
import { createPlacePoint, createSpotLevels } from './tools/spot-levels';
import { CLICK_SLACK_PX, screenDistance, type TablePointer, type Tool } from './tools/tool';

const createTools = (): Record<ToolName, Tool> => ({
  edit: createEditRing(),
  draw: createDrawRing(),
  slide: createSlidePattern(),
  lift: createLiftUnit(),
  align: createAlignToEdge(),
  hold: createHoldEdge(),
  spot: createSpotLevels(),
  place: createPlacePoint(),
  points: createShowPoint(),
  datum: createChooseDatum(),
});

/** Below this width the buttons take room from the drawing, px. */
const NARROW_PX = 600;

export function zoomToFit(table: TableStore): void {
  const { document, drawing, size, set } = table.getState();
  const points = [...ringOutline(documentRing(document, 0)), ...(drawing?.corners ?? [])];
  const xs = points.map((p) => p[0]);
  const ys = points.map((p) => p[1]);
  const box = {
    minX: Math.min(...xs),
    minY: Math.min(...ys),
    maxX: Math.max(...xs),
    maxY: Math.max(...ys),
  };
  const narrow = size.width < NARROW_PX;
  set({ camera: cameraFitted(box, size, narrow ? 44 : 76, narrow ? 34 : 0) });
}

/** Zooms to fit when a typed length has taken part of the ground out of the window. */
export function groundKeptInView(table: TableStore): void {
  const { document, camera, size } = table.getState();
  if (!camera) return;
  const out = ringOutline(documentRing(document, 0)).some((point) => {
    const [x, y] = screenFromGround(camera, size, point);
    return x < 0 || y < 0 || x > size.width || y > size.height;
  });
  if (out) zoomToFit(table);
}

/** One step of a wheel's zoom. */
const WHEEL_FACTOR = 0.0016;

/** How near to the edge a pointer lights it, px. */
const LIGHT_PX = 26;

/** Lights the spot of the edge that a pointer is near to. */
function lightEdge(table: TableStore, pointer: TablePointer | null) {
  const state = table.getState();
  if (
    !pointer ||
    !state.camera ||
    state.drawing ||
    ['ground', 'levels', 'setOut'].includes(state.step)
  ) {
    if (state.lit) state.set({ lit: null });
    return;
  }
  const near = edgeNearest(state.document, pointer.ground);
  if (near.distance * state.camera.scale > LIGHT_PX) {
    if (state.lit?.from === 'floor') state.set({ lit: null });
    return;
  }
  state.set({ lit: { ring: near.ring, edge: near.edge, s: near.s, from: 'floor' } });
}

/**
 * The drawing: one shape for the floor and one for what lies over it. Pointers go to the tool in hand;
 * what it does not take pans. Wheel, pinch and two fingers zoom and pan with any tool.
 */
export default function FloorStage({ label }: { label: string }) {
  const table = useTableStore();
  const frame = useRef<HTMLDivElement>(null);
  const floorLayer = useRef<Konva.Layer>(null);
  const overlayLayer = useRef<Konva.Layer>(null);
  const cache = useRef<FloorCache | null>(null);
  const pieces = useRef<PieceKeeper | null>(null);
  const [colours, setColours] = useState<DrawingColours | null>(null);
  const size = useTable((state) => state.size);

  useEffect(() => {
    const read = () => setColours(drawingColours());
    read();
    // Text measured before the typeface has come is measured in another.
    void document.fonts.ready.then(read);
    window.addEventListener('evenlay:theme', read);
    return () => window.removeEventListener('evenlay:theme', read);
  }, []);

  useEffect(() => {
    const element = frame.current!;
    const observer = new ResizeObserver(([entry]) => {
      const { width, height } = entry.contentRect;
      table.getState().set({ size: { width: Math.round(width), height: Math.round(height) } });
      if (!table.getState().camera && width > 0) zoomToFit(table);
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, [table]);

  useEffect(() => {
    cache.current = createFloorCache(() => floorLayer.current?.batchDraw());
    pieces.current = createPieceKeeper(() => floorLayer.current?.batchDraw());
    const drawn = table.subscribe((now, before) => {
      if (
        now.camera !== before.camera ||
        shownDocument(now) !== shownDocument(before) ||
        now.size !== before.size
      )
        floorLayer.current?.batchDraw();
      overlayLayer.current?.batchDraw();
    });
    return () => {
      drawn();
      cache.current?.dispose();
      pieces.current?.dispose();
    };
  }, [table]);

  useEffect(() => pointersBound(table, frame.current!), [table]);

  useEffect(() => {
    floorLayer.current?.batchDraw();
    overlayLayer.current?.batchDraw();
  }, [colours]);

  return (
    <div
      ref={frame}
      className="absolute inset-0 touch-none select-none focus-visible:-outline-offset-2"
      role="application"
      aria-label={label}
      aria-describedby="table-said"
      tabIndex={0}
      data-testid="floor"
    >
      {size.width > 0 && colours && (
        <Stage width={size.width} height={size.height} listening={false}>
          <Layer ref={floorLayer} listening={false}>
            <Shape
              listening={false}
              perfectDrawEnabled={false}
              sceneFunc={(context) => {
                const state = table.getState();
                if (!state.camera) return;
                const document = shownDocument(state);
                const ctx = context._context as CanvasRenderingContext2D;
                if (state.drawing?.target === 'perimeter') ctx.globalAlpha = 0.25;
                const { laying } = floorOf(document);
                cache.current?.paint(
                  ctx,
                  document,
                  laying,
                  state.camera,
                  state.size,
                  colours,
                  window.devicePixelRatio || 1,
                  pieces.current?.of(laying),
                );
                ctx.globalAlpha = 1;
              }}
            />
          </Layer>
          <Layer ref={overlayLayer} listening={false}>
            <Shape
              listening={false}
              perfectDrawEnabled={false}
              sceneFunc={(context) => {
                const state = table.getState();
                paintOverlay(
                  context._context as CanvasRenderingContext2D,
                  state,
                  floorOf(shownDocument(state)),
                  colours,
                );
              }}
            />
          </Layer>
        </Stage>
      )}
    </div>
  );
}

/** Binds pointers and wheel of `element` to the tool in hand and the camera; returns how to unbind. */
function pointersBound(table: TableStore, element: HTMLElement): () => void {
  const tools = createTools();
  const tool = () => tools[table.getState().tool];
  const down = new Map<number, Point>();
  let gesture: { kind: 'tool' | 'pan' | 'pinch'; id: number; last: Point; from: Point } | null =
    null;
  let waiting: TablePointer | null = null;
  let frame = 0;

  const screenOf = (event: { clientX: number; clientY: number }): Point => {
    const box = element.getBoundingClientRect();
    return [event.clientX - box.left, event.clientY - box.top];
  };
  const pointerOf = (event: PointerEvent | MouseEvent, at = screenOf(event)): TablePointer => {
    const { camera, size } = table.getState();
    return {
      screen: at,
      ground: camera ? groundFromScreen(camera, size, at) : [0, 0],
      shift: event.shiftKey,
      free: event.altKey || event.ctrlKey,
      touch: 'pointerType' in event && event.pointerType !== 'mouse',
    };
  };
  const paintCursor = () => {
    element.style.cursor = gesture?.kind === 'pan' ? 'grabbing' : tool().cursor(table);
  };
  // Many moves may come between two frames; the tool sees the last of them, once a frame.
  const moveSoon = (pointer: TablePointer) => {
    waiting = pointer;
    frame ||= requestAnimationFrame(moveNow);
  };
  const moveNow = () => {
    cancelAnimationFrame(frame);
    frame = 0;
    if (waiting && gesture?.kind === 'tool') tool().move(table, waiting);
    waiting = null;
  };

  const onDown = (event: PointerEvent) => {
    element.focus({ preventScroll: true });
    table.getState().settleShown();
    const pointer = pointerOf(event);
    down.set(event.pointerId, pointer.screen);
    element.setPointerCapture(event.pointerId);
    if (down.size === 2) {
      tool().cancel(table);
      gesture = { kind: 'pinch', id: event.pointerId, last: pointer.screen, from: pointer.screen };
      return;
    }
    if (down.size > 2) return;
    const base = { id: event.pointerId, last: pointer.screen, from: pointer.screen };
    const middle = event.button === 1 || event.button === 2;
    const taken = !middle && tool().down(table, pointer);
    gesture = { kind: taken ? 'tool' : 'pan', ...base };
    paintCursor();
  };

  const pinch = (id: number, at: Point) => {
    const other = [...down].find(([key]) => key !== id)?.[1];
    const before = down.get(id);
    const { camera, size, set } = table.getState();
    if (!other || !before || !camera) return;
    const middleOf = (p: Point): Point => [(p[0] + other[0]) / 2, (p[1] + other[1]) / 2];
    const [m0, m1] = [middleOf(before), middleOf(at)];
    const factor = screenDistance(at, other) / Math.max(screenDistance(before, other), 1);
    const panned = cameraPanned(camera, m1[0] - m0[0], m1[1] - m0[1]);
    set({ camera: cameraZoomed(panned, size, m1, factor) });
  };

  const onMove = (event: PointerEvent) => {
    const pointer = pointerOf(event);
    if (!down.has(event.pointerId) || !gesture) {
      if (event.pointerType === 'mouse') {
        tool().hover(table, pointer);
        lightEdge(table, pointer);
        paintCursor();
      }
      return;
    }
    if (gesture.kind === 'pinch') pinch(event.pointerId, pointer.screen);
    else if (gesture.kind === 'tool') moveSoon(pointer);
    else if (
      screenDistance(gesture.from, pointer.screen) >= CLICK_SLACK_PX ||
      gesture.last !== gesture.from
    ) {
      const { camera, set } = table.getState();
      if (camera)
        set({
          camera: cameraPanned(
            camera,
            pointer.screen[0] - gesture.last[0],
            pointer.screen[1] - gesture.last[1],
          ),
        });
      gesture = { ...gesture, last: pointer.screen };
    }
    down.set(event.pointerId, pointer.screen);
  };

  const onUp = (event: PointerEvent) => {
    down.delete(event.pointerId);
    if (gesture && gesture.kind !== 'pinch' && gesture.id === event.pointerId) {
      if (waiting) moveNow();
      tool().up(table, pointerOf(event));
      if (event.pointerType !== 'mouse') {
        tool().hover(table, null);
        lightEdge(table, pointerOf(event));
      }
    }
    if (down.size === 0) gesture = null;
    paintCursor();
  };

  const onCancel = (event: PointerEvent) => {
    down.delete(event.pointerId);
    tool().cancel(table);
    if (down.size === 0) gesture = null;
  };

  const onLeave = () => {
    if (gesture) return;
    tool().hover(table, null);
    lightEdge(table, null);
  };

  const onWheel = (event: WheelEvent) => {
    event.preventDefault();
    const { camera, size, set } = table.getState();
    if (!camera) return;
    // A pinch on a trackpad comes as a wheel with Control held.
    const factor = Math.exp(-event.deltaY * (event.ctrlKey ? 6 : 1) * WHEEL_FACTOR);
    set({
      camera: event.shiftKey
        ? cameraPanned(camera, -event.deltaY, 0)
        : cameraZoomed(camera, size, screenOf(event), factor),
    });
  };

  const onDouble = (event: MouseEvent) => tool().doubleClick?.(table, pointerOf(event));
  const noMenu = (event: Event) => event.preventDefault();
  // After a tap browsers play a mouse press as well, which would take the focus back from the field that the tap opened.
  const noPress = (event: Event) => event.preventDefault();
  const unsubscribe = table.subscribe((now, before) => {
    if (now.tool !== before.tool) paintCursor();
  });

  element.addEventListener('pointerdown', onDown);
  element.addEventListener('pointermove', onMove);
  element.addEventListener('pointerup', onUp);
  element.addEventListener('pointercancel', onCancel);
  element.addEventListener('pointerleave', onLeave);
  element.addEventListener('wheel', onWheel, { passive: false });
  element.addEventListener('dblclick', onDouble);
  element.addEventListener('contextmenu', noMenu);
  element.addEventListener('mousedown', noPress);
  return () => {
    unsubscribe();
    cancelAnimationFrame(frame);
    element.removeEventListener('pointerdown', onDown);
    element.removeEventListener('pointermove', onMove);
    element.removeEventListener('pointerup', onUp);
    element.removeEventListener('pointercancel', onCancel);
    element.removeEventListener('pointerleave', onLeave);
    element.removeEventListener('wheel', onWheel);
    element.removeEventListener('dblclick', onDouble);
    element.removeEventListener('contextmenu', noMenu);
    element.removeEventListener('mousedown', noPress);
  };
}
