import type { Point } from '@/geometry/point';
import { ringStarts, surveyPointName, tapeName, type Survey } from '@/paving/survey/survey';
import type { SurveyAnswer } from '@/paving/survey/survey-answer';
import { surveyRings } from '@/paving/survey/survey-ground';
import { planPath, planView, PLAN_WIDE } from '../plan-view';
import { ringOutline } from '../ring-outline';

interface Props {
  readonly survey: Survey;
  readonly answer: SurveyAnswer;
  /** Every point: as the tapes have it, or as sketched where they do not fix it. */
  readonly places: readonly Point[];
  /** The tape that is picked, by its place in the list. */
  readonly picked: number | null;
}

/** The points of a survey as the tapes have them, with the tapes between. */
export function SurveyPicture({ survey, answer, places, picked }: Props) {
  const { height, at } = planView(places);
  const starts = ringStarts(survey);
  const doubted = new Set(answer.doubts.flatMap(({ tapes }) => tapes));
  const middle = at([
    places.reduce((sum, [x]) => sum + x, 0) / places.length,
    places.reduce((sum, [, y]) => sum + y, 0) / places.length,
  ]);
  const rings = surveyRings(survey, places).map((vertices, ring) => ({
    fixed: answer.places.slice(starts[ring], starts[ring + 1]).every(Boolean),
    path: planPath(ringOutline(vertices).map(at)),
  }));
  return (
    <svg
      viewBox={`0 0 ${PLAN_WIDE} ${height.toFixed(0)}`}
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
  const { height, at } = planView(ring);
  return (
    <svg viewBox={`0 0 ${PLAN_WIDE} ${height.toFixed(0)}`} className="h-16 w-full" aria-hidden>
      <path d={planPath(ring.map(at))} className="fill-stone-100 stroke-graphite" strokeWidth={6} />
    </svg>
  );
}
