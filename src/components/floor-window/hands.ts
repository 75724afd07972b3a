import type { Point } from '@/geometry/point';
import {
  cameraPanned,
  cameraZoomed,
  groundFromScreen,
  type Camera,
  type ScreenSize,
} from '../drafting/camera';
import { CLICK_SLACK_PX } from '../drafting/tools/tool';

interface Hand {
  readonly camera: Camera;
  readonly size: ScreenSize;
  readonly onLook: (look: Camera) => void;
  readonly onSpot?: ((at: Point) => void) | null;
  readonly onPoint?: (at: Point | null) => void;
}

const WHEEL_FACTOR = 0.0016;

/** How long after a tap its click may come, ms. */
const CLICK_COMES_MS = 500;

/** A picked spot changes the page; the click of the same tap must not press what has come under the finger. */
function swallowClick(): void {
  const swallow = (event: Event) => {
    event.preventDefault();
    event.stopPropagation();
  };
  window.addEventListener('click', swallow, { capture: true, once: true });
  setTimeout(() => window.removeEventListener('click', swallow, { capture: true }), CLICK_COMES_MS);
}

/**
 * Binds pointers and wheel of a window: one drags, two pinch, a press that does not move picks a spot. `hand` gives what is so now:
 * several moves may come before the next drawing, so the camera in hand is kept here until then.
 */
export function handsBound(element: HTMLElement, hand: () => Hand): () => void {
  const down = new Map<number, Point>();
  let pressed: { at: Point; moved: boolean } | null = null;
  let held: { from: Camera; camera: Camera } | null = null;

  const place = (event: { clientX: number; clientY: number }): Point => {
    const frame = element.getBoundingClientRect();
    return [event.clientX - frame.left, event.clientY - frame.top];
  };
  const looked = (to: (camera: Camera) => Camera) => {
    const { camera, onLook } = hand();
    // What was handed on last may not have come back yet.
    const current = held && held.from === camera ? held.camera : camera;
    held = { from: camera, camera: to(current) };
    onLook(held.camera);
  };

  const onDown = (event: PointerEvent) => {
    if (event.button !== 0) return;
    down.set(event.pointerId, place(event));
    pressed = down.size === 1 ? { at: place(event), moved: false } : null;
    element.setPointerCapture(event.pointerId);
  };
  const onMove = (event: PointerEvent) => {
    const at = place(event);
    const { camera, size, onPoint } = hand();
    const before = down.get(event.pointerId);
    if (!before) {
      if (event.pointerType !== 'touch') onPoint?.(groundFromScreen(camera, size, at));
      return;
    }
    if (pressed && !pressed.moved) {
      if (Math.hypot(at[0] - pressed.at[0], at[1] - pressed.at[1]) <= CLICK_SLACK_PX) return;
      pressed.moved = true;
    }
    down.set(event.pointerId, at);
    const other = [...down].find(([id]) => id !== event.pointerId)?.[1];
    if (!other) {
      looked((from) => cameraPanned(from, at[0] - before[0], at[1] - before[1]));
      return;
    }
    const apart = (p: Point) => Math.hypot(p[0] - other[0], p[1] - other[1]);
    const middle: Point = [(at[0] + other[0]) / 2, (at[1] + other[1]) / 2];
    looked((from) =>
      cameraZoomed(
        cameraPanned(from, (at[0] - before[0]) / 2, (at[1] - before[1]) / 2),
        size,
        middle,
        apart(at) / Math.max(1, apart(before)),
      ),
    );
  };
  const onUp = (event: PointerEvent) => {
    if (!down.delete(event.pointerId)) return;
    const { camera, size, onSpot } = hand();
    if (event.type === 'pointerup' && pressed && !pressed.moved && onSpot) {
      swallowClick();
      onSpot(groundFromScreen(camera, size, pressed.at));
    }
    pressed = null;
  };
  const onLeave = () => hand().onPoint?.(null);
  const onWheel = (event: WheelEvent) => {
    event.preventDefault();
    const { size } = hand();
    looked((from) =>
      cameraZoomed(from, size, place(event), Math.exp(-event.deltaY * WHEEL_FACTOR)),
    );
  };

  element.addEventListener('pointerdown', onDown);
  element.addEventListener('pointermove', onMove);
  element.addEventListener('pointerup', onUp);
  element.addEventListener('pointercancel', onUp);
  element.addEventListener('pointerleave', onLeave);
  element.addEventListener('wheel', onWheel, { passive: false });
  return () => {
    element.removeEventListener('pointerdown', onDown);
    element.removeEventListener('pointermove', onMove);
    element.removeEventListener('pointerup', onUp);
    element.removeEventListener('pointercancel', onUp);
    element.removeEventListener('pointerleave', onLeave);
    element.removeEventListener('wheel', onWheel);
  };
}
