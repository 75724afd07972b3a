import { unitCorners, type Laying } from '../laying';
import { wholeReport, type Report } from '../report';
import { setOutAdvice } from './advice';
import { setOutChecks } from './checks';
import { controlPoints } from './control-points';
import { coursesInOrder } from './course-numbers';
import { layingCourses } from './courses';
import { bestDatums, datumAt, datumPair } from './datums';
import { groundDiagonals } from './diagonals';
import {
  cornerChosen,
  firstUnit,
  nearestCorners,
  outermostUnits,
  workStart,
  type UnitCorner,
} from './first-unit';
import { setOutMarks, unitMarks } from './marks';
import type { Datum, SetOut } from './set-out-types';

export type * from './set-out-types';

/**
 * A laid floor set out from the two corners that its document names, or else from the best two. The same
 * floor and corners give the same names, numbers and order. `report` may be handed in when it is known.
 */
export function setOut(laying: Laying, report: Report = wholeReport(laying)): SetOut {
  const { ground, document } = laying;
  const index = layingCourses(laying);
  const starts = outermostUnits(index);
  const near = new Map<string, UnitCorner[]>();
  const startCorner = ({ name, at }: Datum, other: Datum) => {
    const corners = near.get(name) ?? nearestCorners(laying, starts, at);
    near.set(name, corners);
    return cornerChosen(corners, at, other.at);
  };
  const unitOf = (first: Datum, second: Datum) => {
    const corner = startCorner(first, second);
    if (!corner) return [];
    const { laid, motif } = laying;
    const { unit } = corner;
    return unitMarks(unitCorners(motif[laid.k[unit]], laid.x[unit], laid.y[unit]));
  };
  const best = bestDatums(ground, setOutMarks(laying, index.courses, []), unitOf);
  const chosen = document.setOut?.datums;
  const datums = chosen
    ? ([datumAt(ground, chosen[0]), datumAt(ground, chosen[1])] as const)
    : best.datums;
  const corner = startCorner(...datums);
  const courses = coursesInOrder(index.courses, workStart(index, corner));
  const first = corner && firstUnit(laying, courses, corner, datums[0].at, datums[1].at);
  const marks = setOutMarks(laying, courses, first?.corners ?? []);
  const pair = datumPair(ground, marks, datums);
  const points = controlPoints(ground, marks, pair);
  const diagonals = groundDiagonals(ground, datums);
  const [from, to] = datums.map(({ at }) => at);
  return {
    datums,
    baseline: {
      length: Math.hypot(to[0] - from[0], to[1] - from[1]),
      bearingDeg: (Math.atan2(to[1] - from[1], to[0] - from[0]) * 180) / Math.PI,
      ...pair.sight,
      chosen: chosen !== undefined,
    },
    points,
    diagonals,
    firstUnit: first,
    courses,
    checks: setOutChecks({ laying, report, courses, diagonals }),
    advice: setOutAdvice(pair, best, points, courses),
  };
}
