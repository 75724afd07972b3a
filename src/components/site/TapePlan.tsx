import { useState } from 'react';
import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '@/paving/layout-document';
import type { ControlPoint, Datum } from '@/paving/set-out/set-out';
import { cameraFitted, type Camera } from '../drafting/camera';
import { useFloorPainter } from '../floor-window/floor-painter';
import { FloorWindow, ZoomButtons } from '../floor-window/FloorWindow';
import { groundBox } from '../floor-window/ground-box';

interface Props {
  readonly document: LayoutDocument;
  readonly datums: readonly [Datum, Datum];
  /** The points that can be pressed. */
  readonly points: readonly ControlPoint[];
  /** The one in hand. */
  readonly point: ControlPoint | null;
  readonly onPick: (name: string) => void;
}

/** The floor with its points; the tapes to the one in hand are drawn live, with the angle at which they meet. */
export function TapePlan({ document, datums, points, point, onPick }: Props) {
  const [look, setLook] = useState<Camera | null>(null);
  const paint = useFloorPainter(document);
  const box = groundBox([document]);
  const zoom = (factor: number) =>
    setLook((from) => {
      const frame = window.document.querySelector('[data-tape-plan]')!.getBoundingClientRect();
      const start = from ?? cameraFitted(box, frame, 28);
      return { ...start, scale: start.scale * factor };
    });
  const own = point?.by === 'second-pair' && point.secondPair ? point.secondPair.datums : datums;
  return (
    <div className="relative h-full w-full" data-tape-plan>
      <FloorWindow
        box={box}
        look={look}
        onLook={setLook}
        paint={paint}
        testId="tape-plan"
        label={
          point
            ? `The plan, with the tapes to ${point.name} drawn over it.`
            : 'The plan, with its points.'
        }
        over={(place, size) => (
          <svg aria-hidden="true" className="pointer-events-none absolute inset-0 h-full w-full">
            {point && point.by !== 'datum' && point.by !== 'offsets' && (
              <TapeLines from={own.map(({ at }) => place(at))} to={place(point.at)} />
            )}
            {points.map((each) => {
              const [x, y] = place(each.at);
              return (
                <g key={each.name} onClick={() => onPick(each.name)}>
                  <circle cx={x} cy={y} r={20} className="pointer-events-auto fill-transparent" />
                  <circle cx={x} cy={y} r={3.5} className="fill-stone-50 stroke-graphite" />
                </g>
              );
            })}
            {own.map(({ name, at }) => (
              <Hook key={name} name={name} at={place(at)} />
            ))}
            {point && <Named name={point.name} at={place(point.at)} width={size.width} />}
          </svg>
        )}
      />
      <div className="absolute right-2 bottom-2">
        <ZoomButtons onZoom={zoom} onFit={() => setLook(null)} />
      </div>
    </div>
  );
}

/** Radius of the arc that shows the angle between the tapes, px. */
const ARC_PX = 26;

function TapeLines({ from, to }: { from: readonly Point[]; to: Point }) {
  const away = (end: Point, px: number): Point => {
    const length = Math.hypot(end[0] - to[0], end[1] - to[1]) || 1;
    return [to[0] + ((end[0] - to[0]) / length) * px, to[1] + ((end[1] - to[1]) / length) * px];
  };
  const [p, q] = from.map((end) => away(end, ARC_PX));
  const turn = (p[0] - to[0]) * (q[1] - to[1]) - (p[1] - to[1]) * (q[0] - to[0]);
  return (
    <>
      {from.map((end, n) => (
        <path
          key={n}
          d={`M${end.join(' ')}L${to.join(' ')}`}
          className="fill-none stroke-line"
          strokeWidth="3"
        />
      ))}
      <path
        d={`M${p.join(' ')}A${ARC_PX} ${ARC_PX} 0 0 ${turn > 0 ? 1 : 0} ${q.join(' ')}`}
        className="fill-none stroke-line"
        strokeWidth="1.5"
      />
    </>
  );
}

function Hook({ name, at: [x, y] }: { name: string; at: Point }) {
  return (
    <g transform={`translate(${x} ${y})`}>
      <path d="M-8 -9H8L5 11H-5Z" className="fill-graphite" />
      <text y="5" textAnchor="middle" className="fill-stone-50 font-sans font-bold" fontSize="13">
        {name}
      </text>
    </g>
  );
}

/** Nearer to the right edge than this, a name stands left of its point, px. */
const NAME_PX = 90;

function Named({ name, at: [x, y], width }: { name: string; at: Point; width: number }) {
  const left = x > width - NAME_PX;
  return (
    <g transform={`translate(${x} ${y})`}>
      <circle r="7" className="fill-line" />
      <text
        x={left ? -12 : 12}
        y={y < 30 ? 22 : -10}
        textAnchor={left ? 'end' : 'start'}
        className="fill-line stroke-stone-50 font-sans font-bold"
        fontSize="17"
        strokeWidth="4"
        paintOrder="stroke"
      >
        {name}
      </text>
    </g>
  );
}
