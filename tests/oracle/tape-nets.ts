import type { Point } from '@/geometry/point';
import type { Survey, Tape } from '@/paving/survey/survey';

/** A survey of points that are known, each tape read with the given error, mm. */
export function surveyOfPoints(
  corners: readonly Point[],
  pairs: readonly (readonly [number, number])[],
  {
    pegs = [],
    errors = [],
    sketch = [...corners, ...pegs],
  }: {
    readonly pegs?: readonly Point[];
    readonly errors?: readonly number[];
    readonly sketch?: readonly Point[];
  } = {},
): Survey {
  const all = [...corners, ...pegs];
  return {
    rings: [{ corners: corners.length }],
    pegs: pegs.length,
    sketch: sketch.map(([x, y]) => [x, y]),
    tapes: pairs.map(([from, to], n): Tape => {
      const apart = Math.hypot(all[to][0] - all[from][0], all[to][1] - all[from][1]);
      return { from, to, length: apart + (errors[n] ?? 0) };
    }),
    arcs: [],
  };
}

/** Every pair of so many points. */
export const everyPair = (points: number): [number, number][] =>
  Array.from({ length: points }, (_, from) =>
    Array.from({ length: points - from - 1 }, (__, n): [number, number] => [from, from + n + 1]),
  ).flat();
