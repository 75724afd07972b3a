import type { Ground } from './ground';
import { patternRows, type LaidMotif } from './laying';
import type { LayoutDocument } from './layout-document';
import type { Point } from '@/geometry/point';
import { chordFrame, rowMarks } from './row-marks';
import { blockedRuns, insideRuns, runsParted, type Runs } from './row-runs';
import type { UnitRows } from './unit-rows';

/**
 * The whole units of a floor as runs of places along its rows, without a place in memory for each:
 * what is laid when nothing is lifted, found as `layFloor` finds it.
 */
export interface LaidRuns {
  readonly ground: Ground;
  readonly origin: Point;
  readonly motif: readonly LaidMotif[];
  /** Centre of each motif entry's unit from the origin, on the ground, mm. */
  readonly centres: readonly Point[];
  readonly rows: UnitRows;
  readonly count: number;
  /** Row r of all has the runs `start[r]` up to `start[r + 1]`, in order: places `from` to `to` of the row, both whole. */
  readonly start: Int32Array;
  readonly from: readonly number[];
  readonly to: readonly number[];
}

/** The runs of whole units of a valid document. Work grows with the rows that each chord of the boundary touches. */
export function laidRuns(document: LayoutDocument, ground: Ground): LaidRuns {
  const { motif, centres, rows } = patternRows(document, ground);
  const frame = chordFrame(ground, rows);
  const start = new Int32Array(rows.total + 1);
  const from: number[] = [];
  const to: number[] = [];
  const inside: Runs = [];
  const blocked: Runs = [];
  const free: Runs = [];
  const held: Runs = [];
  let count = 0;
  motif.forEach((_, k) => {
    const marks = rowMarks(ground, rows, frame, k, document.clearance, false);
    for (let row = 0; row < rows.rows[k].count; row++) {
      start[rows.rows[k].base + row] = from.length;
      insideRuns(marks, row, inside);
      if (inside.length === 0) continue;
      blockedRuns(marks, row, blocked);
      runsParted(inside, blocked, free, held);
      for (let r = 0; r < free.length; r += 2) {
        from.push(free[r]);
        to.push(free[r + 1]);
        count += free[r + 1] - free[r] + 1;
      }
    }
  });
  start[rows.total] = from.length;
  const { origin } = document.placement;
  return { ground, origin, motif, centres, rows, count, start, from, to };
}
