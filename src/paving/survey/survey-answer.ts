import type { Point } from '@/geometry/point';
import { ringArea } from '@/geometry/ring';
import { segmentsCross } from '@/geometry/segment-pairs';
import { placesAligned, rmsApart } from './places-aligned';
import { readTapes, ringStarts, surveyPointCount, type ReadTape, type Survey } from './survey';
import { tapesAdjusted, type TapeAdjustment, type TapeResidual } from './tape-adjustment';
import { pointsPlaced, type Arrangement } from './tape-placing';
import { tellingTape } from './telling-tape';

/** Beyond so many of its own standard errors a residual is a mistake, not chance: Baarda's 3.29, one in a thousand. */
export const MISTAKE = 3.29;
/** Arrangements looked into. */
const LOOKED_INTO = 12;
/** Arrangements that agree so much worse than the likeliest, in squares, are not. */
const UNLIKELY = 60;
/** Other shapes that are shown. */
const MOST_OTHERS = 3;
/** Another shape agrees as well when its squares are no more than this above the best: three standard errors. */
const AS_WELL = 9;
/** What a perimeter that crosses itself, or runs clockwise, counts, in squares. */
const NO_RING = 1000;
/** A misread tape counts so much at the most while shapes are compared, in squares. */
const MISREAD = 100;
/** Shapes that differ by less are one, mm. */
const ONE_SHAPE_MM = 5;
/** A tape is checked when so great a share of an error shows: at less, some 100 mm could hide in it. */
const CHECKED = 0.01;
/** At most so many tapes are doubted, one after another. */
const MOST_DOUBTS = 4;

/** Tapes that do not agree with the rest. */
export interface TapeDoubt {
  /** Places in the survey's list: one; or several where the tapes cannot tell which of them is wrong. */
  readonly tapes: readonly number[];
  /** What all other tapes not in doubt say that each should read, mm; null where without it nothing says. */
  readonly should: readonly (number | null)[];
}

export interface SurveyAnswer {
  /** Of each point, mm, fitted to the sketch; null where the tapes do not fix it. */
  readonly places: readonly (Point | null)[];
  /** Of each point, one standard error, mm, as it lies among the others; infinite where it is not fixed. */
  readonly error: readonly number[];
  /** Of each tape of the survey; null where it is not read or left out. */
  readonly tapes: readonly (TapeResidual | null)[];
  /** Tapes read beyond those that the points need: what they are checked by. */
  readonly spare: number;
  /** Fixed points that no tape checks: a wrong reading there would not show. */
  readonly unchecked: readonly number[];
  /** No residual is beyond what reading a tape explains. */
  readonly agrees: boolean;
  /** The greatest residual, mm, without its sign. */
  readonly greatest: number;
  /** Most doubtful first. */
  readonly doubts: readonly TapeDoubt[];
  /** Once the tapes in doubt are left out, the rest agree; true where none is. */
  readonly restAgrees: boolean;
  /** Other shapes that the tapes allow as well, every point of each. */
  readonly others: readonly (readonly Point[])[];
  /** A tape, not read yet, that would tell which of several in doubt is wrong, or which shape is meant. */
  readonly telling: { readonly from: number; readonly to: number } | null;
}

/** Tapes left over, with points as they lie; where none was read. */
function nothingRead(survey: Survey): SurveyAnswer {
  const points = surveyPointCount(survey);
  return {
    places: Array.from({ length: points }, () => null),
    error: Array.from({ length: points }, () => Infinity),
    tapes: survey.tapes.map(() => null),
    spare: 0,
    unchecked: [],
    agrees: true,
    greatest: 0,
    doubts: [],
    restAgrees: true,
    others: [],
    telling: null,
  };
}

/** Places for all points: what no tape leads to is put where the sketch has it, as the rest has come to lie. */
function allPlaced(arrangement: Arrangement, sketch: readonly Point[]): Point[] {
  const known = arrangement.places.flatMap((place, n) => (place ? [n] : []));
  const moved = placesAligned(sketch, known, (n) => arrangement.places[n]!);
  return arrangement.places.map((place, n) => place ?? moved[n]);
}

interface Shape {
  readonly adjustment: TapeAdjustment;
  readonly cost: number;
  readonly squares: number;
  readonly ring: boolean;
}

/**
 * What the tapes of a survey come to: places for its points, how far each tape is off, which do not
 * agree with the rest, and which other shapes they allow. Deterministic.
 */
export function surveyAnswer(survey: Survey): SurveyAnswer {
  const tapes = readTapes(survey);
  const placing = pointsPlaced(survey.sketch, tapes);
  if (!placing) return nothingRead(survey);
  const corners = ringStarts(survey)[1];
  const [likeliest] = placing.arrangements;
  const shapes = placing.arrangements
    .filter(({ cost }, n) => n < LOOKED_INTO && cost <= likeliest.cost + UNLIKELY)
    .map((arrangement): Shape => {
      const start = allPlaced(arrangement, survey.sketch);
      const adjustment = tapesAdjusted(start, tapes, placing.base);
      const squares = robustSquares(adjustment, tapes);
      const fixed = adjustment.loose.slice(0, corners).every((is) => !is);
      const ring = !fixed || isRing(adjustment.places.slice(0, corners));
      const sides = sidesOff(adjustment.places, survey.sketch);
      return { adjustment, squares, ring, cost: squares + (ring ? 0 : NO_RING) + sides };
    })
    .sort((one, other) => one.cost - other.cost);
  const [best] = shapes;
  const { adjustment } = best;
  const residuals: (TapeResidual | null)[] = survey.tapes.map(() => null);
  for (const residual of adjustment.tapes) residuals[residual.tape] = residual;
  const { doubts, restAgrees, shapes: doubtful } = tapeDoubts(adjustment, tapes, placing.base);
  const known = adjustment.loose.flatMap((is, n) => (is ? [] : [n]));
  const fitted = (places: readonly Point[]) =>
    placesAligned(places, known, (n) => survey.sketch[n]);
  const others = otherShapes(shapes, known);
  const open = doubts.length > 0 ? doubtful : [adjustment.places, ...others];
  return {
    places: fitted(adjustment.places).map((place, n) => (adjustment.loose[n] ? null : place)),
    error: adjustment.error,
    tapes: residuals,
    spare: adjustment.spare,
    unchecked: pointsUnchecked(adjustment, tapes),
    agrees: agree(adjustment),
    greatest: Math.max(0, ...adjustment.tapes.map(({ residual }) => Math.abs(residual))),
    doubts,
    restAgrees,
    others: others.map(fitted),
    telling: open.length > 1 ? tellingTape(survey, open) : null,
  };
}

function robustSquares({ tapes }: TapeAdjustment, read: readonly ReadTape[]): number {
  return tapes.reduce((sum, { standardised, residual }, n) => {
    if (standardised === 0) return sum + (residual / read[n].length) ** 2;
    return sum + Math.min(standardised ** 2, MISREAD);
  }, 0);
}

/** How little the shape is like the sketch, as a share of its size: less than 1, so that it only breaks ties. */
function sidesOff(places: readonly Point[], sketch: readonly Point[]): number {
  const all = places.map((_, n) => n);
  const moved = placesAligned(sketch, all, (n) => places[n]);
  const apart = rmsApart(moved, places);
  const size = rmsApart(
    places,
    places.map(() => centre(places)),
  );
  return size > 0 ? Math.min(1, apart / size) : 0;
}

/** True when the corners run anticlockwise round a ring whose sides do not cross. */
function isRing(corners: readonly Point[]): boolean {
  const count = corners.length;
  for (let n = 0; n < count; n++)
    for (let m = n + 2; m < count; m++)
      if (segmentsCross(corners[n], corners[n + 1], corners[m], corners[(m + 1) % count]))
        return false;
  return ringArea(corners) > 0;
}

function centre(places: readonly Point[]): Point {
  const sum = places.reduce(([x, y], [px, py]) => [x + px, y + py], [0, 0]);
  return [sum[0] / places.length, sum[1] / places.length];
}

function otherShapes(shapes: readonly Shape[], known: readonly number[]): (readonly Point[])[] {
  const [best] = shapes;
  const found: (readonly Point[])[] = [];
  for (const { adjustment, squares, ring } of shapes.slice(1)) {
    if (found.length === MOST_OTHERS) break;
    if (!ring || squares > best.squares + AS_WELL) continue;
    const { places } = adjustment;
    const alike = [best.adjustment.places, ...found].some((other) => {
      const moved = placesAligned(places, known, (n) => other[n]);
      return known.every(
        (n) => Math.hypot(moved[n][0] - other[n][0], moved[n][1] - other[n][1]) < ONE_SHAPE_MM,
      );
    });
    if (!alike) found.push(places);
  }
  return found;
}

/**
 * The tapes in doubt. A tape without which all others agree is a culprit; where there are several, the tapes cannot
 * tell which of them is wrong. Where there is none, more than one is wrong: the one whose residual is the most of
 * its own standard errors is left out, and the rest looked at anew.
 */
function tapeDoubts(
  whole: TapeAdjustment,
  tapes: readonly ReadTape[],
  base: readonly [number, number],
): Pick<SurveyAnswer, 'doubts' | 'restAgrees'> & {
  /** Where several tapes may be the wrong one, the shape without each. */
  readonly shapes: readonly (readonly Point[])[];
} {
  const doubts: TapeDoubt[] = [];
  let now = whole;
  let used = tapes;
  while (!agree(now)) {
    if (doubts.length === MOST_DOUBTS) return { doubts, restAgrees: false, shapes: [] };
    const without = now.tapes
      .filter(({ standardised }) => Math.abs(standardised) > MISTAKE)
      .sort((one, other) => Math.abs(other.standardised) - Math.abs(one.standardised))
      .map(({ tape }) => {
        const rest = used.filter((other) => other.tape !== tape);
        return { tape, rest, adjustment: tapesAdjusted(now.places, rest, base) };
      });
    const culprits = without.filter(({ adjustment }) => agree(adjustment));
    const named = culprits.length > 0 ? culprits : without.slice(0, 1);
    doubts.push({
      tapes: named.map(({ tape }) => tape),
      should: named.map(({ tape, adjustment: { places, loose } }) => {
        const { from, to } = used.find((other) => other.tape === tape)!;
        if (loose[from] || loose[to]) return null;
        return Math.hypot(places[to][0] - places[from][0], places[to][1] - places[from][1]);
      }),
    });
    if (culprits.length > 1) {
      const shapes = culprits.map(({ adjustment }) => adjustment.places);
      return { doubts, restAgrees: false, shapes };
    }
    [{ rest: used, adjustment: now }] = named;
  }
  return { doubts: doubtsSettled(doubts, now, used, tapes, base), restAgrees: true, shapes: [] };
}

/**
 * Doubts of which each names one tape, looked at once more when all wrong tapes are out: a tape that agrees with
 * what is left was blamed for another's fault, and what each should read is what the sound tapes say.
 */
function doubtsSettled(
  doubts: readonly TapeDoubt[],
  sound: TapeAdjustment,
  used: readonly ReadTape[],
  tapes: readonly ReadTape[],
  base: readonly [number, number],
): TapeDoubt[] {
  let now = sound;
  let kept = used;
  const wrong: ReadTape[] = [];
  for (const {
    tapes: [doubted],
  } of doubts) {
    const tape = tapes.find((other) => other.tape === doubted)!;
    const rest = [...kept, tape];
    const adjustment = doubts.length > 1 ? tapesAdjusted(now.places, rest, base) : now;
    const own = adjustment.tapes.find((other) => other.tape === doubted);
    if (own && own.share > 0 && agree(adjustment)) {
      kept = rest;
      now = adjustment;
    } else wrong.push(tape);
  }
  return wrong.map(({ tape, from, to }) => {
    const [[ax, ay], [bx, by]] = [now.places[from], now.places[to]];
    const loose = now.loose[from] || now.loose[to];
    return { tapes: [tape], should: [loose ? null : Math.hypot(bx - ax, by - ay)] };
  });
}

/** Fixed points all of whose tapes are read without a check. */
function pointsUnchecked(
  { tapes, loose }: TapeAdjustment,
  read: readonly ReadTape[],
): readonly number[] {
  const checked = new Set(
    read.flatMap(({ from, to }, n) => (tapes[n].share >= CHECKED ? [from, to] : [])),
  );
  return loose.flatMap((is, point) => (is || checked.has(point) ? [] : [point]));
}

/** True when no residual is more than chance explains. */
const agree = ({ tapes }: TapeAdjustment): boolean =>
  tapes.every(({ standardised }) => Math.abs(standardised) <= MISTAKE);
