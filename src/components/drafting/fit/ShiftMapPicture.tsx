import { useEffect, useRef, type KeyboardEvent, type PointerEvent } from 'react';
import type { Point } from '@/geometry/point';
import { formatCount } from '@/paving/count';
import type { BestFace } from '@/paving/fit/best-face';
import type { ShiftMap } from '@/paving/fit/shift-map';
import { shiftMapPlace, shiftMapShift } from '@/paving/fit/shift-map';

interface Props {
  readonly map: ShiftMap;
  readonly face: BestFace | null;
  readonly origin: Point;
  /** The placement with the most play, and its play: drawn as a circle of that radius. */
  readonly best: { readonly origin: Point; readonly play: number } | null;
  readonly countHere: number | null;
  /** The most that any start gives, proven; a face too thin for the map's grain is not lost. */
  readonly most: number;
  /** The dot is dragged: the origin moves by this much on the ground, mm. */
  readonly onDrag: (by: Point) => void;
  /** The dot is let go. */
  readonly onLetGo: () => void;
  /** A key moves the origin by this much on the ground, mm. */
  readonly onNudge: (by: Point) => void;
}

/** The page's ink for the fewest and the most units, as grey levels: light is few, dark is many. */
const LIGHT = 240;
const DARK = 60;

function greyImage(map: ShiftMap): ImageData {
  const image = new ImageData(map.width, map.height);
  const span = Math.max(1, map.most - map.least);
  for (let row = 0; row < map.height; row++)
    for (let column = 0; column < map.width; column++) {
      // Rows of the map run upward, those of a picture downward.
      const count = map.counts[(map.height - 1 - row) * map.width + column];
      const grey = LIGHT - ((count - map.least) / span) * (LIGHT - DARK);
      const at = (row * map.width + column) * 4;
      image.data[at] = image.data[at + 1] = grey;
      image.data[at + 2] = grey - 3;
      image.data[at + 3] = 255;
    }
  return image;
}

/**
 * Every start in one lattice cell as a picture: drag the dot, and the floor follows. Lines on it are drawn in both
 * of the theme's inks, one over the other, so that they show on any grey.
 */
export function ShiftMapPicture({
  map,
  face,
  origin,
  best,
  countHere,
  onDrag,
  onLetGo,
  onNudge,
  most,
}: Props) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const frame = useRef<HTMLDivElement>(null);
  const last = useRef<Point | null>(null);

  useEffect(() => {
    const ctx = canvas.current!.getContext('2d')!;
    ctx.putImageData(greyImage(map), 0, 0);
  }, [map]);

  const share = (point: Point): Point => {
    const [u, v] = shiftMapPlace(map, point);
    return [u / map.pitch, 1 - v / map.rise];
  };
  const [x, y] = share(origin);
  const bestAt = best ? share(best.origin) : null;

  const drag = (event: PointerEvent, first: boolean) => {
    const box = frame.current!.getBoundingClientRect();
    const now: Point = [
      ((event.clientX - box.left) / box.width) * map.pitch,
      (1 - (event.clientY - box.top) / box.height) * map.rise,
    ];
    const from = first ? shiftMapPlace(map, origin) : last.current;
    last.current = now;
    if (from) onDrag(shiftMapShift(map, [now[0] - from[0], now[1] - from[1]]));
  };
  const key = (event: KeyboardEvent) => {
    const step = event.shiftKey ? 10 : 1;
    const by: Record<string, Point> = {
      ArrowRight: [step, 0],
      ArrowLeft: [-step, 0],
      ArrowUp: [0, step],
      ArrowDown: [0, -step],
    };
    const shift = by[event.key];
    if (!shift) return;
    event.preventDefault();
    event.stopPropagation();
    onNudge(shiftMapShift(map, shift));
  };

  return (
    <div
      ref={frame}
      role="slider"
      tabIndex={0}
      aria-label="Shift map: where the pattern starts"
      aria-valuemin={map.least}
      aria-valuemax={most}
      aria-valuenow={countHere ?? 0}
      aria-valuetext={`${formatCount(countHere ?? 0)} whole units from this start; the most is ${formatCount(most)}. Arrows move the start.`}
      data-testid="shift-map"
      className="relative cursor-crosshair touch-none overflow-hidden border border-graphite"
      style={{ aspectRatio: `${map.pitch} / ${map.rise}` }}
      onPointerDown={(event) => {
        if (event.button !== 0) return;
        event.currentTarget.setPointerCapture(event.pointerId);
        drag(event, true);
      }}
      onPointerMove={(event) => event.buttons > 0 && last.current && drag(event, false)}
      onPointerUp={() => {
        last.current = null;
        onLetGo();
      }}
      onPointerCancel={() => {
        last.current = null;
        onLetGo();
      }}
      onKeyDown={key}
    >
      <canvas
        ref={canvas}
        width={map.width}
        height={map.height}
        className="absolute inset-0 size-full [image-rendering:pixelated]"
      />
      <svg
        viewBox={`0 0 ${map.pitch} ${map.rise}`}
        preserveAspectRatio="none"
        className="absolute inset-0 size-full overflow-visible"
        aria-hidden="true"
      >
        {(['stone-50', 'graphite'] as const).map((ink, over) => (
          <g key={ink} fill="none" stroke={`var(--${ink})`} strokeWidth={over ? 1.5 : 3.5}>
            <path d={facePath(map, face)} vectorEffect="non-scaling-stroke" />
            {best &&
              bestAt &&
              best.play > 0 &&
              cellCopies(map).map(([du, dv]) => (
                <circle
                  key={`${du} ${dv}`}
                  cx={bestAt[0] * map.pitch + du}
                  cy={bestAt[1] * map.rise - dv}
                  r={best.play}
                  strokeDasharray={over ? '4 3' : undefined}
                  vectorEffect="non-scaling-stroke"
                />
              ))}
          </g>
        ))}
      </svg>
      {bestAt && (
        <span
          aria-hidden="true"
          className="absolute size-5 -translate-1/2 border border-graphite outline-1 outline-on-line"
          style={{ left: `${bestAt[0] * 100}%`, top: `${bestAt[1] * 100}%`, borderRadius: '50%' }}
        />
      )}
      <span
        aria-hidden="true"
        className="absolute size-3.5 -translate-1/2 rounded-full border-2 border-on-line bg-line outline-1 outline-line"
        style={{ left: `${x * 100}%`, top: `${y * 100}%`, borderRadius: '50%' }}
      />
    </div>
  );
}

/** The best face to its true edge, drawn again a lattice step over where it runs out of the map; else at the map’s grain. */
function facePath({ outline, pitch, rise, shift }: ShiftMap, face: BestFace | null): string {
  if (!face?.outline)
    return outline.map(([a, b]) => `M${a[0]} ${rise - a[1]}L${b[0]} ${rise - b[1]}`).join('');
  const ring = face.outline;
  return cellCopies({ pitch, rise, shift })
    .map(([du, dv]) => `M${ring.map(([u, v]) => `${u + du} ${rise - v - dv}`).join('L')}Z`)
    .join('');
}

/** How far the map's own picture and those about it lie off, mm: what runs out on one side comes in on the other. */
const cellCopies = ({ pitch, rise, shift }: Pick<ShiftMap, 'pitch' | 'rise' | 'shift'>): Point[] =>
  [-1, 0, 1].flatMap((row) =>
    [-1, 0, 1].map((step): Point => [step * pitch + row * shift, row * rise]),
  );
