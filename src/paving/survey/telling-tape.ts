import type { Point } from '@/geometry/point';
import { ringHolds } from '@/geometry/ring';
import { segmentsCross } from '@/geometry/segment-pairs';
import { readTapes, ringStarts, surveyPointCount, type Survey } from './survey';
import { tapeError } from './tape-adjustment';

/** A tape tells two shapes apart when they differ along it by more than so many of its standard errors. */
const TELLS = 6;
/** A tape that would run outside the ground may meet a wall: it must tell so many times as much to be asked for. */
const OUTSIDE_COSTS = 3;

/**
 * The tape, not read yet, that would best tell which of several shapes of a survey is the true one: the least
 * difference of its length between any two of them is the greatest. Null when none would tell.
 */
export function tellingTape(
  survey: Survey,
  shapes: readonly (readonly Point[])[],
): { readonly from: number; readonly to: number } | null {
  const corners = ringStarts(survey)[1];
  const points = Array.from({ length: surveyPointCount(survey) }, (_, n) => n).filter(
    (n) => n < corners || n >= ringStarts(survey)[survey.rings.length],
  );
  const read = new Set(
    readTapes(survey).flatMap(({ from, to }) => [`${from} ${to}`, `${to} ${from}`]),
  );
  let best: { from: number; to: number } | null = null;
  let most = 0;
  for (const from of points)
    for (const to of points) {
      if (to <= from || read.has(`${from} ${to}`)) continue;
      const lengths = shapes.map((places) =>
        Math.hypot(places[to][0] - places[from][0], places[to][1] - places[from][1]),
      );
      lengths.sort((one, other) => one - other);
      const apart = Math.min(...lengths.slice(1).map((length, n) => length - lengths[n]));
      if (!(apart > TELLS * tapeError(lengths[lengths.length - 1]))) continue;
      const clear = shapes.every((places) =>
        runsClear(places.slice(0, corners), places[from], places[to]),
      );
      const worth = clear ? apart : apart / OUTSIDE_COSTS;
      if (worth > most) {
        most = worth;
        best = { from, to };
      }
    }
  return best;
}

/** True when a line between two corners crosses no side of the ring, and its middle is not outside. */
function runsClear(ring: readonly Point[], from: Point, to: Point): boolean {
  const middle: Point = [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2];
  return (
    ringHolds(ring, middle) &&
    ring.every((corner, n) => !segmentsCross(corner, ring[(n + 1) % ring.length], from, to))
  );
}
