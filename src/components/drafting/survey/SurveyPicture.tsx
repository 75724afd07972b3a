import type { Point } from '@/geometry/point';
import { ringStarts, surveyPointName, tapeName, type Survey } from '@/paving/survey/survey';
import type { SurveyAnswer } from '@/paving/survey/survey-answer';
import { ringOutline } from '../ring-outline';

interface Props {
  readonly survey: Survey;
  readonly answer: SurveyAnswer;
  /** Every point: as the tapes have it, or as sketched where they do not fix it. */
  readonly places: readonly Point[];
  /** The tape that is picked, by its place in the list. */
  readonly picked: number | null;
}

/** Width of the picture in its own units; letters and lines are sized in these. */
const WIDE = 440;
const MARGIN = 34;
const HEIGHT = { least: 150, most: 330 };

/** Ground to picture: y down, the whole survey in view. */
function viewOf(places: readonly Point[]) {
  const xs = places.map(([x]) => x);
  const ys = places.map(([, y]) => y);
  const [left, right, low, high] = [
    Math.min(...xs),
    Math.max(...xs),
    Math.min(...ys),
    Math.max(...ys),
  ];
  const scale = Math.min(
    (WIDE - 2 * MARGIN) / Math.max(right - left, 1),
    (HEIGHT.most - 2 * MARGIN) / Math.max(high - low, 1),
  );
  const height = Math.max(HEIGHT.least, (high - low) * scale + 2 * MARGIN);
  const offX = (WIDE - (right - left) * scale) / 2 - left * scale;
  const offY = (height - (high - low) * scale) / 2 + high * scale;
  return { height, at: ([x, y]: Point): Point => [offX + x * scale, offY - y * scale] };
}

const pathOf = (points: readonly Point[], closed: boolean): string =>
  points.map(([x, y], n) => `${n === 0 ? 'M' : 'L'}${x.toFixed(1)} ${y.toFixed(1)}`).join(' ') +
  (closed ? ' Z' : '');

/** The points of a survey as the tapes have them, with the tapes between. */
export function SurveyPicture({ survey, answer, places, picked }: Props) {
  const { height, at } = viewOf(places);
  const starts = ringStarts(survey);
  const doubted = new Set(answer.doubts.flatMap(({ tapes }) => tapes));
  const middle = at([
    places.reduce((sum, [x]) => sum + x, 0) / places.length,
    places.reduce((sum, [, y]) => sum + y, 0) / places.length,
  ]);
  const rings = survey.rings.map(({ corners }, ring) => {
    const own = places.slice(starts[ring], starts[ring] + corners);
    const fixed = answer.places.slice(starts[ring], starts[ring] + corners).every(Boolean);
    const outline = ringOutline(
      own.map(([x, y], edge) => {
        const [toX, toY] = own[(edge + 1) % corners];
        const rise = survey.arcs.find((arc) => arc.ring === ring && arc.edge === edge)?.rise ?? 0;
        const chord = Math.hypot(toX - x, toY - y);
        return rise === 0 || chord === 0 ? [x, y] : [x, y, (2 * rise) / chord];
      }),
    );
    return { fixed, path: pathOf(outline.map(at), true) };
  });
  return (
    <svg
      viewBox={`0 0 ${WIDE} ${height.toFixed(0)}`}
      className="block w-full border border-stone-300 bg-stone-50"
      role="img"
      aria-label={`The ground by its tapes: ${rings.every(({ fixed }) => fixed) ? 'every corner is fixed' : 'some corners are not fixed yet and stand as sketched'}`}
      data-testid="survey-picture"
    >
      {rings.map(({ path, fixed }, ring) => (
        <path
          key={ring}
          d={path}
          className={`${ring === 0 ? 'fill-stone-100' : 'fill-stone-50'} stroke-graphite`}
          strokeWidth={fixed ? 2 : 1}
          strokeDasharray={fixed ? undefined : '5 4'}
        />
      ))}
      {survey.tapes.map((tape, n) => {
        const live = n === picked;
        const doubt = doubted.has(n);
        const read = tape.length !== undefined && !tape.left;
        const [x1, y1] = at(places[tape.from]);
        const [x2, y2] = at(places[tape.to]);
        return (
          <g key={n}>
            <line
              {...{ x1, y1, x2, y2 }}
              className={live ? 'stroke-line' : doubt ? 'stroke-amber' : 'stroke-slate'}
              strokeWidth={live ? 2.5 : doubt ? 2 : read ? 0.9 : 0.6}
              strokeDasharray={doubt ? '9 4' : read || live ? undefined : '1.5 4'}
            >
              <title>{tapeName(survey, tape)}</title>
            </line>
            {doubt && (
              <text
                x={(x1 + x2) / 2}
                y={(y1 + y2) / 2 + 5}
                textAnchor="middle"
                className="fill-amber stroke-stone-50 text-[17px] font-bold"
                strokeWidth={4}
                paintOrder="stroke"
              >
                ?
              </text>
            )}
          </g>
        );
      })}
      {places.map((place, n) => {
        const [x, y] = at(place);
        const away = Math.hypot(x - middle[0], y - middle[1]) || 1;
        const fixed = answer.places[n] !== null;
        const keepOut = n >= starts[1] && n < starts[survey.rings.length];
        return (
          <g key={n}>
            <circle
              cx={x}
              cy={y}
              r={keepOut ? 2.5 : 4}
              className={`stroke-graphite ${fixed ? 'fill-graphite' : 'fill-stone-50'}`}
              strokeWidth={1.3}
            />
            {!keepOut && (
              <text
                x={x + (15 * (x - middle[0])) / away}
                y={y + (15 * (y - middle[1])) / away + 5}
                textAnchor="middle"
                className="fill-graphite stroke-stone-50 text-[15px] font-bold"
                strokeWidth={4}
                paintOrder="stroke"
              >
                {surveyPointName(survey, n)}
              </text>
            )}
          </g>
        );
      })}
    </svg>
  );
}

/** Another shape, small, to be pressed. */
export function ShapeSketch({ places, corners }: { places: readonly Point[]; corners: number }) {
  const ring = places.slice(0, corners);
  const { height, at } = viewOf(ring);
  return (
    <svg viewBox={`0 0 ${WIDE} ${height.toFixed(0)}`} className="h-16 w-full" aria-hidden>
      <path
        d={pathOf(ring.map(at), true)}
        className="fill-stone-100 stroke-graphite"
        strokeWidth={6}
      />
    </svg>
  );
}
