/** One line of a benchmark: a ratio measured within one run, and the least (or greatest) that is asked of it. */
export interface Ratio {
  readonly name: string;
  readonly value: number;
  readonly least?: number;
  readonly greatest?: number;
  /** What the ratio was worked out from. */
  readonly detail: string;
}

export interface Bench {
  readonly name: string;
  readonly run: () => Ratio[] | Promise<Ratio[]>;
}

/** Median wall time of `runs` calls after `warm` calls that are not counted, ms. */
export function medianMs(work: () => unknown, runs: number, warm = 2): number {
  for (let n = 0; n < warm; n++) work();
  return medianOf(
    Array.from({ length: runs }, () => {
      const from = performance.now();
      work();
      return performance.now() - from;
    }),
  );
}

export function medianOf(times: readonly number[]): number {
  return [...times].sort((one, other) => one - other)[times.length >> 1];
}
