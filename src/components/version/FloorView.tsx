import './sheet-fonts.css';
import { useEffect, useMemo, useRef, useState } from 'react';
import type { VersionDetail } from '@/api-types/versions';
import { formatCount } from '@/paving/count';
import type { Drawing } from '@/sheets/drawing';
import { boxRing } from '@/sheets/drawing';
import { PAPER } from '@/sheets/inks';
import { keepOutPlace } from '@/sheets/keep-out-place';
import { planDrawing } from '@/sheets/plan-drawing';
import { NO_STAMP } from '@/sheets/plan-input';
import { pointsBounds, viewCentred } from '@/sheets/plan-view';
import { startPoint } from '@/sheets/start-point';
import { drawingSvg } from '@/sheets/svg-sink';
import { versionPlanInput } from './version-plan';

/** Pixels of the screen for a millimetre of the drawing, so that its figures are read like the page's text. */
const PIXELS_PER_MM = 3.7;
/** Room round the floor for its dimensions, mm of the drawing. */
const MARGIN = 15;
const FOOT = 13;
const GREATEST_ZOOM = 12;
const ZOOM_STEP = 1.25;

interface Look {
  /** Centre of what is shown, mm of the drawing, and how many times larger than fitted. */
  readonly x: number;
  readonly y: number;
  readonly zoom: number;
}

/** The figured floor of a frozen version, to look at: pan by dragging, zoom by wheel, pinch or keys. */
export default function FloorView({ version }: { version: VersionDetail }) {
  const frame = useRef<HTMLDivElement>(null);
  const [size, setSize] = useState<{ width: number; height: number } | null>(null);
  useEffect(() => {
    const observer = new ResizeObserver(([entry]) => {
      const { width, height } = entry.contentRect;
      setSize({ width: Math.round(width), height: Math.round(height) });
    });
    observer.observe(frame.current!);
    return () => observer.disconnect();
  }, []);
  return (
    <div ref={frame} className="h-full w-full" aria-busy={!size}>
      {size && size.width > 0 && <Floor version={version} {...size} />}
    </div>
  );
}

function Floor({
  version,
  width,
  height,
}: {
  version: VersionDetail;
  width: number;
  height: number;
}) {
  const [across, down] = [width / PIXELS_PER_MM, height / PIXELS_PER_MM];
  const svg = useMemo(
    () => drawingSvg(floorFitted(version, across, down)),
    [version, across, down],
  );
  const [look, setLook] = useState<Look | null>(null);
  const shown = look ?? { x: across / 2, y: down / 2, zoom: 1 };
  const box = useRef<HTMLDivElement>(null);
  const pointers = useRef(new Map<number, readonly [number, number]>());

  // The drawing is put in once and only its view box moves, so that large floors pan lightly.
  useEffect(() => {
    const drawn = box.current?.querySelector('svg');
    if (!drawn) return;
    const [w, h] = [across / shown.zoom, down / shown.zoom];
    drawn.setAttribute('viewBox', `${shown.x - w / 2} ${shown.y - h / 2} ${w} ${h}`);
    drawn.setAttribute('width', '100%');
    drawn.setAttribute('height', '100%');
    drawn.setAttribute('aria-hidden', 'true');
  });

  const kept = (next: Look): Look => ({
    zoom: next.zoom,
    x: Math.min(across, Math.max(0, next.x)),
    y: Math.min(down, Math.max(0, next.y)),
  });
  const panned = (from: Look, dx: number, dy: number): Look =>
    kept({
      ...from,
      x: from.x - dx / PIXELS_PER_MM / from.zoom,
      y: from.y - dy / PIXELS_PER_MM / from.zoom,
    });
  const zoomed = (from: Look, factor: number, at?: readonly [number, number]): Look => {
    const zoom = Math.min(GREATEST_ZOOM, Math.max(1, from.zoom * factor));
    const [dx, dy] = at ? [at[0] - width / 2, at[1] - height / 2] : [0, 0];
    const moved = (1 / from.zoom - 1 / zoom) / PIXELS_PER_MM;
    return kept({ zoom, x: from.x + dx * moved, y: from.y + dy * moved });
  };
  const change = (to: (from: Look) => Look) =>
    setLook((from) => to(from ?? { x: across / 2, y: down / 2, zoom: 1 }));

  // React's wheel listeners are passive, and the page must not scroll while the floor zooms.
  useEffect(() => {
    const element = box.current!;
    const onWheel = (event: WheelEvent) => {
      event.preventDefault();
      const frame = element.getBoundingClientRect();
      change((from) =>
        zoomed(from, Math.exp(-event.deltaY * 0.0016), [
          event.clientX - frame.left,
          event.clientY - frame.top,
        ]),
      );
    };
    element.addEventListener('wheel', onWheel, { passive: false });
    return () => element.removeEventListener('wheel', onWheel);
  });

  const onMove = (event: React.PointerEvent) => {
    const before = pointers.current.get(event.pointerId);
    if (!before) return;
    const now = [event.clientX, event.clientY] as const;
    const other = [...pointers.current].find(([id]) => id !== event.pointerId)?.[1];
    pointers.current.set(event.pointerId, now);
    if (!other) {
      change((from) => panned(from, now[0] - before[0], now[1] - before[1]));
      return;
    }
    const frame = box.current!.getBoundingClientRect();
    const apart = (p: readonly [number, number]) => Math.hypot(p[0] - other[0], p[1] - other[1]);
    const middle = [
      (now[0] + other[0]) / 2 - frame.left,
      (now[1] + other[1]) / 2 - frame.top,
    ] as const;
    change((from) =>
      zoomed(
        panned(from, (now[0] - before[0]) / 2, (now[1] - before[1]) / 2),
        apart(now) / Math.max(1, apart(before)),
        middle,
      ),
    );
  };
  const release = (event: React.PointerEvent) => pointers.current.delete(event.pointerId);
  const onKey = (event: React.KeyboardEvent) => {
    const step = event.shiftKey ? 160 : 40;
    const moves: Record<string, (from: Look) => Look> = {
      ArrowLeft: (from) => panned(from, step, 0),
      ArrowRight: (from) => panned(from, -step, 0),
      ArrowUp: (from) => panned(from, 0, step),
      ArrowDown: (from) => panned(from, 0, -step),
      '+': (from) => zoomed(from, ZOOM_STEP),
      '=': (from) => zoomed(from, ZOOM_STEP),
      '-': (from) => zoomed(from, 1 / ZOOM_STEP),
    };
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    if (event.key === '0') setLook(null);
    else if (moves[event.key]) change(moves[event.key]);
    else return;
    event.preventDefault();
  };

  return (
    <div className="relative h-full w-full">
      <div
        ref={box}
        role="img"
        aria-label={`Version ${version.number}, ${version.label}: ${formatCount(version.report.wholeUnits)} whole units on the ground, figured. Arrow keys pan; plus, minus and 0 zoom.`}
        tabIndex={0}
        className="h-full w-full cursor-grab touch-none select-none active:cursor-grabbing"
        onPointerDown={(event) => {
          event.currentTarget.setPointerCapture(event.pointerId);
          pointers.current.set(event.pointerId, [event.clientX, event.clientY]);
        }}
        onPointerMove={onMove}
        onPointerUp={release}
        onPointerCancel={release}
        onDoubleClick={() => setLook(null)}
        onKeyDown={onKey}
        dangerouslySetInnerHTML={{ __html: svg }}
      />
      {version.report.lifted > 0 && <LiftedKey />}
      <div className="absolute right-2 bottom-2 flex border border-graphite bg-stone-50">
        <ZoomButton
          name="Zoom out"
          sign="−"
          act={() => change((from) => zoomed(from, 1 / ZOOM_STEP))}
        />
        <ZoomButton name="Zoom to fit" sign="Fit" act={() => setLook(null)} />
        <ZoomButton name="Zoom in" sign="+" act={() => change((from) => zoomed(from, ZOOM_STEP))} />
      </div>
    </div>
  );
}

function LiftedKey() {
  return (
    <p className="pointer-events-none absolute top-2 left-2 flex items-center gap-2 bg-stone-50 px-2 py-1 text-sm">
      <svg viewBox="0 0 18 18" className="size-4.5 shrink-0" aria-hidden="true">
        <path d="M1 1L17 17M17 1L1 17" className="fill-none stroke-graphite" strokeWidth="0.8" />
        <path
          d="M1 1H17V17H1Z"
          className="fill-none stroke-graphite"
          strokeWidth="1.2"
          strokeDasharray="4 2.4"
        />
      </svg>
      Lifted out by hand: leave open
    </p>
  );
}

function ZoomButton({ name, sign, act }: { name: string; sign: string; act: () => void }) {
  return (
    <button
      type="button"
      aria-label={name}
      onClick={act}
      className="min-h-[44px] min-w-[44px] px-2 font-semibold not-first:border-l not-first:border-stone-300 hover:bg-stone-100"
    >
      {sign}
    </button>
  );
}

/** The plan's own drawing, at whatever scale fills the box. */
function floorFitted(version: VersionDetail, width: number, height: number): Drawing {
  const input = versionPlanInput({ version, stamp: NO_STAMP }, 'auto');
  const { ground } = input.laying;
  // The foot keeps clear of the zoom buttons.
  const frame = { left: 0, top: 0, right: width, bottom: height - FOOT };
  const bounds = pointsBounds(ground.rings[0].edges.flatMap((edge) => edge.chords));
  const scale = Math.max(
    (bounds.greatest[0] - bounds.least[0]) / Math.max(10, width - 2 * MARGIN),
    (bounds.greatest[1] - bounds.least[1]) / Math.max(10, height - FOOT - 2 * MARGIN),
  );
  const facts = {
    input,
    start: startPoint(input.laying),
    keepOuts: ground.rings.slice(1).map((ring) => keepOutPlace(ground, ring)),
    asCourses: false,
    parts: [],
  };
  const { layers } = planDrawing(facts, viewCentred(bounds, scale, frame), frame);
  // Paper far beyond the frame, so that panning never comes to its end.
  const paper = boxRing({ left: -width, top: -height, right: 2 * width, bottom: 2 * height });
  const sheet = {
    name: 'paper',
    commands: [{ kind: 'path' as const, rings: [paper], fill: PAPER }],
  };
  return { width, height, layers: [sheet, ...layers] };
}
