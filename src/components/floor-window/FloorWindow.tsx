import { useEffect, useRef, useState, type ReactNode } from 'react';
import type { Point } from '@/geometry/point';
import {
  cameraFitted,
  cameraZoomed,
  groundFromScreen,
  screenFromGround,
  type Box,
  type Camera,
  type ScreenSize,
} from '../drafting/camera';
import { drawingColours, type DrawingColours } from '../ui/drawing-colours';
import { handsBound } from './hands';

/** What a painter paints into: CSS pixels, the canvas already scaled for the screen. */
export interface Picture {
  readonly ctx: CanvasRenderingContext2D;
  readonly camera: Camera;
  readonly size: ScreenSize;
  readonly colours: DrawingColours;
  readonly pixelRatio: number;
}

/** Paints one frame; `again` asks for another, when a sharper picture is due. */
export type Painter = (picture: Picture, again: () => void) => void;

const BUTTON_STEP = 1.25;
const BORDER_PX = 22;
/** Below this width the border gives way to the floor, px. */
const NARROW_PX = 480;

export interface FloorWindowProps {
  /** What is shown when nobody has looked closer, mm. */
  readonly box: Box;
  readonly label: string;
  /** Null: fitted. Hand the same to two windows and they are locked together. */
  readonly look: Camera | null;
  readonly onLook: (look: Camera | null) => void;
  readonly paint: Painter;
  /** What stands over the picture; places ground points in the window, px. */
  readonly over?: (place: (point: Point) => Point, size: ScreenSize) => ReactNode;
  /** A spot is being picked: called with it, in ground coordinates. */
  readonly onSpot?: ((at: Point) => void) | null;
  readonly onPoint?: (at: Point | null) => void;
  /** Room kept free below the floor, px. */
  readonly foot?: number;
  readonly testId?: string;
}

/**
 * A window onto a floor: drag, wheel, pinch and keys pan and zoom it. While the whole floor is in view one
 * finger scrolls the page as anywhere else.
 */
export function FloorWindow(props: FloorWindowProps) {
  const { box, label, look, onLook, paint, over, onSpot, onPoint, foot = 0, testId } = props;
  const frame = useRef<HTMLDivElement>(null);
  const canvas = useRef<HTMLCanvasElement>(null);
  const [size, setSize] = useState<ScreenSize>({ width: 0, height: 0 });
  const [colours, setColours] = useState<DrawingColours | null>(null);
  const fitted = cameraFitted(box, size, size.width < NARROW_PX ? 12 : BORDER_PX, foot);
  const camera = look ?? fitted;

  useEffect(() => {
    const read = () => setColours(drawingColours());
    read();
    window.addEventListener('evenlay:theme', read);
    const observer = new ResizeObserver(([entry]) => {
      const { width, height } = entry.contentRect;
      setSize({ width: Math.round(width), height: Math.round(height) });
    });
    observer.observe(frame.current!);
    return () => {
      window.removeEventListener('evenlay:theme', read);
      observer.disconnect();
    };
  }, []);

  const now = useRef({ camera, size, onLook, onSpot, onPoint });
  useEffect(() => {
    now.current = { camera, size, onLook, onSpot, onPoint };
  });
  useEffect(() => handsBound(frame.current!, () => now.current), []);

  useEffect(() => {
    if (!colours || size.width === 0) return;
    let asked = requestAnimationFrame(draw);
    function draw() {
      const element = canvas.current!;
      const pixelRatio = window.devicePixelRatio || 1;
      const [width, height] = [size.width * pixelRatio, size.height * pixelRatio].map(Math.round);
      if (element.width !== width || element.height !== height) {
        element.width = width;
        element.height = height;
      }
      const ctx = element.getContext('2d')!;
      ctx.setTransform(pixelRatio, 0, 0, pixelRatio, 0, 0);
      ctx.clearRect(0, 0, size.width, size.height);
      paint({ ctx, camera, size, colours: colours!, pixelRatio }, () => {
        cancelAnimationFrame(asked);
        asked = requestAnimationFrame(draw);
      });
      element.dataset.painted = 'true';
    }
    return () => cancelAnimationFrame(asked);
    // The camera's numbers, not its identity: a fitted camera is made anew each time.
  }, [paint, colours, size, camera.centre[0], camera.centre[1], camera.scale]);

  const zoomed = (factor: number) =>
    onLook(cameraZoomed(camera, size, [size.width / 2, size.height / 2], factor));
  const onKeyDown = (event: React.KeyboardEvent) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    if (event.target !== event.currentTarget) return;
    const step = (event.shiftKey ? 160 : 40) / camera.scale;
    const [x, y] = camera.centre;
    const moves: Record<string, () => void> = {
      ArrowLeft: () => onLook({ ...camera, centre: [x - step, y] }),
      ArrowRight: () => onLook({ ...camera, centre: [x + step, y] }),
      ArrowUp: () => onLook({ ...camera, centre: [x, y + step] }),
      ArrowDown: () => onLook({ ...camera, centre: [x, y - step] }),
      '+': () => zoomed(BUTTON_STEP),
      '=': () => zoomed(BUTTON_STEP),
      '-': () => zoomed(1 / BUTTON_STEP),
      '0': () => onLook(null),
      ...(onSpot
        ? {
            Enter: () => onSpot(groundFromScreen(camera, size, [size.width / 2, size.height / 2])),
          }
        : {}),
    };
    if (!moves[event.key]) return;
    event.preventDefault();
    moves[event.key]();
  };

  return (
    <div className="relative h-full w-full overflow-hidden">
      <div
        ref={frame}
        role="img"
        tabIndex={0}
        aria-label={`${label} Arrow keys pan; plus, minus and 0 zoom.${onSpot ? ' Enter marks the spot in the middle.' : ''}`}
        data-testid={testId}
        className={`absolute inset-0 select-none focus-visible:-outline-offset-2 ${onSpot ? 'cursor-crosshair' : 'cursor-grab active:cursor-grabbing'}`}
        style={{ touchAction: look || onSpot ? 'none' : 'pan-y' }}
        onKeyDown={onKeyDown}
      >
        <canvas ref={canvas} className="absolute inset-0 h-full w-full" aria-hidden="true" />
      </div>
      {size.width > 0 && over?.((point) => screenFromGround(camera, size, point), size)}
      {onSpot && (
        <div
          aria-hidden="true"
          className="pointer-events-none absolute top-1/2 left-1/2 size-5 -translate-x-1/2 -translate-y-1/2 opacity-70 pointer-coarse:hidden"
          style={{
            background:
              'linear-gradient(var(--line),var(--line)) center/1px 100% no-repeat, linear-gradient(var(--line),var(--line)) center/100% 1px no-repeat',
          }}
        />
      )}
    </div>
  );
}

/** Zoom buttons, for one window or for those locked together. */
export function ZoomButtons({
  onZoom,
  onFit,
}: {
  onZoom: (factor: number) => void;
  onFit: () => void;
}) {
  const buttons = [
    ['Zoom out', '−', () => onZoom(1 / BUTTON_STEP)],
    ['Zoom to fit', 'Fit', onFit],
    ['Zoom in', '+', () => onZoom(BUTTON_STEP)],
  ] as const;
  return (
    <div className="flex border border-graphite bg-stone-50">
      {buttons.map(([name, sign, act]) => (
        <button
          key={name}
          type="button"
          aria-label={name}
          onClick={act}
          className="min-h-9 min-w-9 px-2 font-semibold not-first:border-l not-first:border-stone-300 hover:bg-stone-100 pointer-coarse:min-h-11 pointer-coarse:min-w-11"
        >
          {sign}
        </button>
      ))}
    </div>
  );
}
