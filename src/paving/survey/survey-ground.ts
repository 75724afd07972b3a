import type { Point } from '@/geometry/point';
import { edgeRiseSet, vertexBulge, vertexOf, type Ring } from '../ground-edits';
import type { KeepOut, LayoutDocument } from '../layout-document';
import { ringStarts, type Survey } from './survey';
import type { SurveyAnswer } from './survey-answer';

/** Corners are put on a grid finer than tapes read, mm. */
const GRID_MM = 0.1;
const onGrid = (mm: number) => Number((Math.round(mm / GRID_MM) * GRID_MM).toFixed(1));

/** The rings of a survey with its points at `places`, each side bent by its rise. */
export function surveyRings(survey: Survey, places: readonly Point[]): Ring[] {
  const starts = ringStarts(survey);
  return survey.rings.map((_, ring) =>
    survey.arcs
      .filter((arc) => arc.ring === ring)
      .reduce<Ring>(
        (bent, { edge, rise }) => edgeRiseSet(bent, edge, rise),
        places.slice(starts[ring], starts[ring + 1]).map(([x, y]) => [x, y]),
      ),
  );
}

/**
 * The ground as surveyed; null while a corner of it is not fixed. It lies where the sketch lay, and the
 * longest side that the sketch had level or upright is exactly so. Keep-outs that were not taped stay as they were.
 */
export function surveyedGround(
  survey: Survey,
  { places }: Pick<SurveyAnswer, 'places'>,
  before: LayoutDocument['ground'],
): LayoutDocument['ground'] | null {
  const corners = places.slice(0, ringStarts(survey)[survey.rings.length]);
  if (corners.some((place) => place === null)) return null;
  const rings = surveyRings(survey, placesLevelled(corners as Point[], survey)).map((ring) =>
    ring.map((vertex) => vertexOf([onGrid(vertex[0]), onGrid(vertex[1])], vertexBulge(vertex))),
  );
  const taped = survey.rings
    .slice(1)
    .map(({ name = 'Keep-out' }, n): KeepOut => ({ name, ring: rings[n + 1] }));
  const names = new Set(taped.map(({ name }) => name));
  return {
    perimeter: rings[0],
    keepOuts: [...taped, ...before.keepOuts.filter(({ name }) => !names.has(name))],
  };
}

/** The places turned so that the longest side that is level or upright in the sketch is so. */
function placesLevelled(places: readonly Point[], { sketch, rings }: Survey): readonly Point[] {
  const { corners } = rings[0];
  let longest = 0;
  let turn = 0;
  for (let n = 0; n < corners; n++) {
    const next = (n + 1) % corners;
    const [sx, sy] = [sketch[next][0] - sketch[n][0], sketch[next][1] - sketch[n][1]];
    if (sx !== 0 && sy !== 0) continue;
    const [dx, dy] = [places[next][0] - places[n][0], places[next][1] - places[n][1]];
    if (Math.hypot(dx, dy) <= longest) continue;
    longest = Math.hypot(dx, dy);
    turn = Math.atan2(sy, sx) - Math.atan2(dy, dx);
  }
  if (longest === 0) return places;
  const [cos, sin] = [Math.cos(turn), Math.sin(turn)];
  const [ox, oy] = places[0];
  return places.map(([x, y]) => [
    ox + cos * (x - ox) - sin * (y - oy),
    oy + sin * (x - ox) + cos * (y - oy),
  ]);
}
