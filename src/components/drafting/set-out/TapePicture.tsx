import type { Point } from '@/geometry/point';
import type { ControlPoint, SetOut } from '@/paving/set-out/set-out';
import { TAPE_READING_MM } from '@/paving/set-out/tape-cross';
import { tapedFrom } from './set-out-picture';

const SIZE = 132;
/** What the picture is across at least, mm; a worse point is drawn smaller. */
const LEAST_ACROSS_MM = 14;

/** Where two circles cross on the point's own side, as a shift from the point; null where they do not. */
function crossed(a: Point, b: Point, at: Point, p: number, q: number): Point | null {
  const d = Math.hypot(b[0] - a[0], b[1] - a[1]);
  const x = (p * p - q * q + d * d) / (2 * d);
  const square = p * p - x * x;
  if (square < 0) return null;
  const [ux, uy] = [(b[0] - a[0]) / d, (b[1] - a[1]) / d];
  const side = ux * (at[1] - a[1]) - uy * (at[0] - a[0]) < 0 ? -1 : 1;
  const y = side * Math.sqrt(square);
  return [a[0] + x * ux - y * uy - at[0], a[1] + x * uy + y * ux - at[1]];
}

/**
 * What two tapes leave open at a point, much enlarged: the figure that all readings within ±2 mm fill, and the circle
 * of the farthest of them. Plan the right way up.
 */
export function TapePicture({ setOut, point }: { setOut: SetOut; point: ControlPoint }) {
  const doubt = (point.secondPair ?? point).uncertainty;
  if (doubt === null || point.by === 'offsets' || point.by === 'datum') return null;
  const [a, b] = tapedFrom(setOut, point).map(({ at }) => at);
  const [p, q] = (point.secondPair ?? point).tapes;
  const e = TAPE_READING_MM;
  const corners = [
    [e, e],
    [e, -e],
    [-e, -e],
    [-e, e],
  ].map(([dp, dq]) => crossed(a, b, point.at, p + dp, q + dq));
  if (corners.some((corner) => corner === null)) return null;
  const scale = SIZE / Math.max(LEAST_ACROSS_MM, 2.5 * doubt);
  const drawn = (shift: Point): string =>
    `${(shift[0] * scale).toFixed(1)},${(-shift[1] * scale).toFixed(1)}`;
  const ray = (from: Point) => {
    const away: Point = [from[0] - point.at[0], from[1] - point.at[1]];
    const length = Math.hypot(...away) || 1;
    const [x, y] = [(away[0] / length) * SIZE, (-away[1] / length) * SIZE];
    return <line x1={0} y1={0} x2={x} y2={y} stroke="var(--line)" strokeWidth={1.4} />;
  };
  const words = `Where ${point.name} can come to lie: within ${doubt.toFixed(1)} mm`;
  return (
    <svg
      viewBox={`${-SIZE / 2} ${-SIZE / 2} ${SIZE} ${SIZE}`}
      width={SIZE}
      height={SIZE}
      role="img"
      aria-label={words}
      className="shrink-0 border border-stone-300 bg-stone-50"
    >
      <polygon
        points={(corners as Point[]).map(drawn).join(' ')}
        fill="var(--stone-300)"
        stroke="var(--graphite)"
        strokeWidth={1.2}
      />
      {ray(a)}
      {ray(b)}
      <circle
        r={doubt * scale}
        fill="none"
        stroke="var(--graphite)"
        strokeWidth={1}
        strokeDasharray="4 3"
      />
      <circle r={2.6} fill="var(--line)" />
      <g stroke="var(--slate)" strokeWidth={1}>
        <line
          x1={-SIZE / 2 + 6}
          y1={SIZE / 2 - 8}
          x2={-SIZE / 2 + 6 + 5 * scale}
          y2={SIZE / 2 - 8}
        />
        <line x1={-SIZE / 2 + 6} y1={SIZE / 2 - 11} x2={-SIZE / 2 + 6} y2={SIZE / 2 - 5} />
        <line
          x1={-SIZE / 2 + 6 + 5 * scale}
          y1={SIZE / 2 - 11}
          x2={-SIZE / 2 + 6 + 5 * scale}
          y2={SIZE / 2 - 5}
        />
      </g>
      <text x={-SIZE / 2 + 6} y={SIZE / 2 - 14} fontSize={10} fill="var(--slate)">
        5 mm
      </text>
    </svg>
  );
}
