import type { RowMarks } from './row-marks';

/** Runs of whole numbers [from, to], flat, in order and apart. */
export type Runs = number[];

/** Places of the row whose centre lies in the ground. */
export function insideRuns({ crossing }: RowMarks, row: number, runs: Runs): void {
  runs.length = 0;
  let depth = 0;
  let from = 0;
  for (let n = crossing.start[row]; n < crossing.start[row + 1]; n++) {
    const before = depth;
    depth += crossing.rise[n];
    if (before <= 0 && depth > 0) {
      from = Math.floor(crossing.at[n]) + 1;
    } else if (before > 0 && depth <= 0) {
      const to = Math.ceil(crossing.at[n]) - 1;
      if (from <= to) runs.push(from, to);
    }
  }
}

/** Places of the row whose unit would be too near to the boundary. */
export function blockedRuns({ blocked }: RowMarks, row: number, runs: Runs): void {
  runs.length = 0;
  for (let n = blocked.start[row]; n < blocked.start[row + 1]; n++) {
    if (runs.length > 0 && blocked.from[n] <= runs[runs.length - 1] + 1) {
      if (blocked.to[n] > runs[runs.length - 1]) runs[runs.length - 1] = blocked.to[n];
    } else {
      runs.push(blocked.from[n], blocked.to[n]);
    }
  }
}

/** Parts of `runs` outside (`free`) and inside (`held`) `others`. */
export function runsParted(runs: Runs, others: Runs, free: Runs, held: Runs): void {
  free.length = 0;
  held.length = 0;
  let m = 0;
  for (let n = 0; n < runs.length; n += 2) {
    let from = runs[n];
    const to = runs[n + 1];
    while (m < others.length && others[m + 1] < from) m += 2;
    for (let o = m; o < others.length && others[o] <= to; o += 2) {
      if (others[o] > from) free.push(from, others[o] - 1);
      held.push(Math.max(from, others[o]), Math.min(to, others[o + 1]));
      from = others[o + 1] + 1;
    }
    if (from <= to) free.push(from, to);
  }
}
