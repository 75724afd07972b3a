import { CholeskyDecomposition, EigenvalueDecomposition, Matrix } from 'ml-matrix';
import type { Point } from '@/geometry/point';
import type { ReadTape } from './survey';

/**
 * The places of points that agree best with the tapes between them, by least squares: the free
 * adjustment of a trilateration network. Textbook: Ghilani, "Adjustment Computations", chapters on
 * trilateration, on free networks and on the detection of blunders; numbers of redundancy and
 * standardised residuals after Baarda, "A testing procedure for use in geodetic networks" (1968).
 */

/** One tape's standard error: of the reading, mm, and for each metre of its length, mm. Common practice. */
const READING_MM = 2;
const PER_METRE_MM = 0.1;

/** How far a tape of that length is usually out, one standard error, mm. */
export const tapeError = (length: number): number => READING_MM + (PER_METRE_MM * length) / 1000;

export interface TapeResidual {
  /** Its place in the survey's list. */
  readonly tape: number;
  /** Between the adjusted places, mm. */
  readonly computed: number;
  /** Reading less computed, mm. */
  readonly residual: number;
  /** The share of an error of this tape that shows in its own residual, 0 to 1: nought where nothing checks it. */
  readonly share: number;
  /** The residual in its own standard errors; 0 where nothing checks the tape. */
  readonly standardised: number;
  /** What the other tapes say it should read, mm, to first order; null where nothing checks it. */
  readonly others: number | null;
}

export interface TapeAdjustment {
  readonly places: readonly Point[];
  /** True for points that the tapes do not fix against the others. */
  readonly loose: readonly boolean[];
  /** Of each point, the larger standard error, mm, among points as they lie to one another; infinite where loose. */
  readonly error: readonly number[];
  readonly tapes: readonly TapeResidual[];
  /** Tapes more than the points need. */
  readonly spare: number;
  /** The sum of the squared residuals, each in its tape's standard errors. */
  readonly squares: number;
}

/** Eigenvalues below this share of the largest are nought: the tapes say nothing of that motion. */
const NOUGHT = 1e-9;
const MOST_ROUNDS = 60;
/** Steps shorter than this end the search, mm. */
const LEAST_STEP_MM = 1e-9;
/** A point moves, in a motion that no tape resists, when it does so by more than this share. */
const MOVES = 1e-6;
/** A tape is checked when more than this share of an error would show. */
const LEAST_SHARE = 1e-6;

const offsetsOf = (places: Float64Array, { from, to }: ReadTape): [number, number, number] => {
  const dx = places[2 * to] - places[2 * from];
  const dy = places[2 * to + 1] - places[2 * from + 1];
  return [dx, dy, Math.hypot(dx, dy)];
};

function squaresOf(places: Float64Array, tapes: readonly ReadTape[]): number {
  let sum = 0;
  for (const tape of tapes) {
    const [, , computed] = offsetsOf(places, tape);
    sum += ((tape.length - computed) / tapeError(tape.length)) ** 2;
  }
  return sum;
}

/** One row a tape: how its length, in its own standard errors, changes with each coordinate. */
function designOf(places: Float64Array, tapes: readonly ReadTape[]): Matrix {
  const design = Matrix.zeros(tapes.length, places.length);
  tapes.forEach((tape, row) => {
    const [dx, dy, computed] = offsetsOf(places, tape);
    // Two points in one place: any way apart will do.
    const [nx, ny] = computed > 0 ? [dx / computed, dy / computed] : [1, 0];
    const error = tapeError(tape.length);
    design.set(row, 2 * tape.to, nx / error);
    design.set(row, 2 * tape.to + 1, ny / error);
    design.set(row, 2 * tape.from, -nx / error);
    design.set(row, 2 * tape.from + 1, -ny / error);
  });
  return design;
}

/** The inverse of a symmetric matrix on the motions that it resists, and those that it does not, column by column. */
function halfInverse(normal: Matrix): { inverse: Matrix; free: Matrix; rank: number } {
  const found = new EigenvalueDecomposition(normal, { assumeSymmetric: true });
  const values = found.realEigenvalues;
  const vectors = found.eigenvectorMatrix;
  const least = NOUGHT * Math.max(...values, 1e-300);
  const kept = values.flatMap((value, n) => (value > least ? [n] : []));
  const left = values.flatMap((value, n) => (value > least ? [] : [n]));
  const rows = Array.from({ length: normal.rows }, (_, n) => n);
  const resisted = vectors.selection(rows, kept.length > 0 ? kept : [0]);
  const scale = Matrix.diag(kept.length > 0 ? kept.map((n) => 1 / values[n]) : [0]);
  return {
    inverse: resisted.mmul(scale).mmul(resisted.transpose()),
    free: left.length > 0 ? vectors.selection(rows, left) : Matrix.zeros(normal.rows, 0),
    rank: kept.length,
  };
}

/** The step that solves the normal equations, and moves nothing that no tape resists. */
function resistedStep(normal: Matrix, pull: Matrix): number[] {
  // The pull has no part in motions that nothing resists: a trifle of resistance to all leaves those at nought.
  const trifle = NOUGHT * Math.max(...normal.diagonal());
  const resisted = Matrix.add(normal, Matrix.diag(normal.diagonal().map(() => trifle)));
  return new CholeskyDecomposition(resisted).solve(pull).to1DArray();
}

/**
 * Which points move against the base, two points that a tape joins: those for which a motion is left
 * when the base stands still. Which points are fixed hangs on the base, so it should be well inside the net.
 */
function looseOf(places: Float64Array, design: Matrix, base: readonly [number, number]): boolean[] {
  const [a, b] = base;
  const size = places.length;
  const dx = places[2 * b] - places[2 * a];
  const dy = places[2 * b + 1] - places[2 * a + 1];
  const apart = Math.hypot(dx, dy) || 1;
  const still = Matrix.zeros(3, size);
  still.set(0, 2 * a, 1);
  still.set(1, 2 * a + 1, 1);
  still.set(2, 2 * b, -dy / apart);
  still.set(2, 2 * b + 1, dx / apart);
  // All rows of one size, so that small eigenvalues mean the same everywhere.
  const scaled = design.to2DArray().map((row) => {
    const length = Math.hypot(...row) || 1;
    return row.map((value) => value / length);
  });
  const rows = new Matrix([...scaled, ...still.to2DArray()]);
  const { free } = halfInverse(rows.transpose().mmul(rows));
  return Array.from({ length: size / 2 }, (_, point) => {
    for (let n = 0; n < free.columns; n++)
      if (Math.hypot(free.get(2 * point, n), free.get(2 * point + 1, n)) > MOVES) return true;
    return false;
  });
}

/**
 * Adjusts `start` (a place for each point, mm, near enough that no point is on the wrong side of
 * others) to the tapes. Only what the tapes say is changed: the whole keeps its place and turn as well as can be.
 */
export function tapesAdjusted(
  start: readonly Point[],
  tapes: readonly ReadTape[],
  base: readonly [number, number],
): TapeAdjustment {
  const places = Float64Array.from(start.flat());
  let squares = squaresOf(places, tapes);
  for (let round = 0; round < MOST_ROUNDS && tapes.length > 0; round++) {
    const design = designOf(places, tapes);
    const off = Matrix.columnVector(
      tapes.map((tape) => (tape.length - offsetsOf(places, tape)[2]) / tapeError(tape.length)),
    );
    const across = design.transpose();
    const step = resistedStep(across.mmul(design), across.mmul(off));
    let share = 1;
    let next = places;
    let found = Infinity;
    for (; share > 1e-4; share /= 2) {
      next = places.map((value, n) => value + share * step[n]);
      found = squaresOf(next, tapes);
      if (found <= squares) break;
    }
    if (!(found <= squares)) break;
    places.set(next);
    const done = Math.max(...step.map(Math.abs)) * share < LEAST_STEP_MM;
    squares = found;
    if (done) break;
  }

  const design = designOf(places, tapes);
  const { inverse, rank } = tapes.length
    ? halfInverse(design.transpose().mmul(design))
    : { inverse: Matrix.zeros(places.length, places.length), rank: 0 };
  const loose = looseOf(places, design, base);
  return {
    places: Array.from({ length: start.length }, (_, n): Point => [
      places[2 * n],
      places[2 * n + 1],
    ]),
    loose,
    error: loose.map((is, n) => (is ? Infinity : greaterError(inverse, n))),
    tapes: tapes.map((tape, row) => residualOf(places, design, inverse, tape, row)),
    spare: tapes.length - rank,
    squares,
  };
}

/** The larger half-axis of the ellipse of standard errors of a point. */
function greaterError(inverse: Matrix, point: number): number {
  const xx = inverse.get(2 * point, 2 * point);
  const yy = inverse.get(2 * point + 1, 2 * point + 1);
  const xy = inverse.get(2 * point, 2 * point + 1);
  return Math.sqrt(Math.max(0, (xx + yy) / 2 + Math.hypot((xx - yy) / 2, xy)));
}

function residualOf(
  places: Float64Array,
  design: Matrix,
  inverse: Matrix,
  tape: ReadTape,
  row: number,
): TapeResidual {
  const [, , computed] = offsetsOf(places, tape);
  const residual = tape.length - computed;
  // A row has four entries: the tape's two ends.
  const at = [2 * tape.from, 2 * tape.from + 1, 2 * tape.to, 2 * tape.to + 1];
  let taken = 0;
  for (const one of at)
    for (const other of at)
      taken += design.get(row, one) * inverse.get(one, other) * design.get(row, other);
  const share = Math.min(1, Math.max(0, 1 - taken));
  const checked = share > LEAST_SHARE;
  return {
    tape: tape.tape,
    computed,
    residual,
    share: checked ? share : 0,
    standardised: checked ? residual / (tapeError(tape.length) * Math.sqrt(share)) : 0,
    others: checked ? tape.length - residual / share : null,
  };
}
