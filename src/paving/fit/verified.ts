import type { Point } from '@/geometry/point';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import { laidRuns } from '../laid-runs';
import { leastGapOfRuns } from '../least-gap';
import type { Placement } from '../layout-document';
import { groundFromFrame, type FitFrame } from './fit-frame';

/** Origins are given to a ten-thousandth of a millimetre, mm, where the floor stays the same for it. */
const ORIGIN_GRID_MM = 1e-4;

/** A start, with what the laying itself finds there. */
export interface FitChoice {
  /** Whole units, lifted ones included. */
  readonly wholeUnits: number;
  /** How far the whole field may drift, in any direction, before a unit breaks the clearance, mm. */
  readonly play: number;
  readonly leastGap: number;
  readonly placement: Placement;
}

/** The origin of the same floor that is nearest to `near`, both on the ground, mm. */
function originNear({ basis }: FitFrame, [x, y]: Point, near: Point): Point {
  const { a, b } = basis;
  const cell = a[0] * b[1] - a[1] * b[0];
  const dx = near[0] - x;
  const dy = near[1] - y;
  const i = Math.round((dx * b[1] - dy * b[0]) / cell);
  const j = Math.round((dy * a[0] - dx * a[1]) / cell);
  let best: Point = [x, y];
  let least = Infinity;
  for (let m = i - 1; m <= i + 1; m++) {
    for (let n = j - 1; n <= j + 1; n++) {
      const at: Point = [x + m * a[0] + n * b[0], y + m * a[1] + n * b[1]];
      const far = Math.hypot(at[0] - near[0], at[1] - near[1]);
      if (far < least - LENGTH_TOLERANCE_MM) {
        least = far;
        best = at;
      }
    }
  }
  return best;
}

/**
 * The start that the search found at (u, v), laid and measured. The laying has the last word: a
 * count or a play other than the search's own is a fault of the program, and throws with the place.
 * `held` origins are on a line and stay on it, not on the grid.
 */
export function choiceVerified(
  frame: FitFrame,
  found: { readonly count: number; readonly slack: number; readonly u: number; readonly v: number },
  held = false,
): FitChoice {
  const { document, ground, turn } = frame;
  const exact = originNear(
    frame,
    groundFromFrame(frame, [found.u, found.v]),
    document.placement.origin,
  );
  const onGrid = (value: number) => Math.round(value / ORIGIN_GRID_MM) * ORIGIN_GRID_MM;
  const round = (value: number) => Number(onGrid(value).toFixed(4));
  const expected = found.slack - LENGTH_TOLERANCE_MM;
  const band = document.clearance + found.slack + LENGTH_TOLERANCE_MM;
  let last = '';
  const origins: Point[] = held ? [exact] : [[round(exact[0]), round(exact[1])], exact];
  for (const origin of origins) {
    const placement: Placement = { origin: [origin[0], origin[1]], turn };
    const laid = laidRuns({ ...document, placement, lifted: [] }, ground);
    const leastGap = leastGapOfRuns(laid, band);
    const play = leastGap === null ? NaN : leastGap - document.clearance;
    if (
      laid.count === found.count &&
      leastGap !== null &&
      Math.abs(play - expected) <= LENGTH_TOLERANCE_MM
    ) {
      return { wholeUnits: found.count, play, leastGap, placement };
    }
    last = `${laid.count} units with ${play} mm of play`;
  }
  throw new Error(
    `the fit found ${found.count} units with ${expected} mm of play at [${exact[0]}, ${exact[1]}], turn ${turn}, but the laying finds ${last}`,
  );
}
