/**
 * The best values of a few joints and a shift, by branch and bound. Each unit still to lay moves in a straight line with
 * each value, so its distance to one chord of the edge is convex in them, and over a box of values it is greatest at a
 * corner of the box. That of any one chord is no less than the unit's own: no box is given up that could hold more units, or
 * a wider least gap, than the best known.
 */

/** One value that may be chosen, mm. */
export interface Freedom {
  readonly from: number;
  readonly to: number;
}

/** One unit still to lay, as the search asks about it; `values` are joints and shifts, mm. */
export interface SearchUnit {
  /** Its distance to the edge at these values, mm; 0 where it is not in the ground. */
  readonly gap: (values: readonly number[]) => number;
  /** No less than that anywhere in the box with this middle and these corners. */
  readonly most: (middle: readonly number[], corners: readonly (readonly number[])[]) => number;
}

/** The values that keep most units, and of those the most gap, mm. */
export interface SearchResult {
  readonly values: readonly number[];
  readonly kept: number;
  /** Least gap of the units kept; Infinity when none is near an edge. */
  readonly gap: number;
  /** False when the search was left off before all boxes were weighed. */
  readonly proven: boolean;
}

/** Gaps this near to the best are as good, mm. */
const GAP_FINENESS_MM = 0.05;
/** Values are given in these where the least gap loses no more than that by it, mm. */
const FIGURE_MM = 0.1;
const GAP_GIVEN_UP_MM = 0.2;
/** A box of values no wider than this is not halved any more, mm. */
const BOX_FINENESS_MM = 1e-4;
/** Boxes looked into before the best known is taken. */
const MOST_BOXES = 20_000;

interface Box {
  readonly middle: readonly number[];
  readonly half: readonly number[];
  readonly kept: number;
  readonly gap: number;
}

/** The values that keep most units, and of those the widest least gap: branch and bound over boxes of joints and shifts, up to MOST_BOXES. */
export function bestValues(
  units: readonly SearchUnit[],
  freedoms: readonly Freedom[],
  clearance: number,
  start: readonly number[],
): SearchResult {
  const at = (values: readonly number[]) => {
    let kept = 0;
    let gap = Infinity;
    for (const unit of units) {
      const own = unit.gap(values);
      if (own < clearance) continue;
      kept++;
      if (own < gap) gap = own;
    }
    return { kept, gap };
  };
  let best = { values: start, ...at(start) };
  // Of values as good, those that were first stay: the crew's own joints before others.
  const better = (kept: number, gap: number) =>
    kept > best.kept || (kept === best.kept && gap > best.gap + GAP_FINENESS_MM);

  const boxAt = (middle: readonly number[], half: readonly number[]): Box => {
    const corners = half.reduce<readonly (readonly number[])[]>(
      (some, by, m) =>
        some.flatMap((corner) =>
          (by > 0 ? [-by, by] : [0]).map((d) => corner.with(m, middle[m] + d)),
        ),
      [middle],
    );
    const reaches: number[] = [];
    for (const unit of units) {
      const most = unit.most(middle, corners);
      if (most >= clearance) reaches.push(most);
    }
    const kept = reaches.length;
    if (kept < best.kept) return { middle, half, kept, gap: 0 };
    // With as many kept as the best keeps, the worst of these may be left out.
    reaches.sort((one, other) => one - other);
    const box = { middle, half, kept, gap: reaches[kept - best.kept] ?? Infinity };
    if (better(kept, box.gap)) {
      const found = at(middle);
      if (better(found.kept, found.gap)) best = { values: middle, ...found };
    }
    return box;
  };

  /** The best in tenths of a millimetre, where that is next to as good: nobody lays finer. */
  const rounded = () => {
    const values = best.values.map((value, m) => {
      const { from, to } = freedoms[m];
      const tenth = from + Math.round((value - from) / FIGURE_MM) * FIGURE_MM;
      return Math.max(from, Math.min(to, tenth));
    });
    const found = at(values);
    return found.kept === best.kept && found.gap >= best.gap - GAP_GIVEN_UP_MM
      ? { values, ...found }
      : best;
  };

  const heap: Box[] = [];
  const before = (one: Box, other: Box) =>
    one.kept > other.kept || (one.kept === other.kept && one.gap > other.gap);
  const push = (box: Box) => {
    let n = heap.push(box) - 1;
    while (n > 0) {
      const parent = (n - 1) >> 1;
      if (!before(heap[n], heap[parent])) break;
      [heap[n], heap[parent]] = [heap[parent], heap[n]];
      n = parent;
    }
  };
  const pop = (): Box | undefined => {
    const top = heap[0];
    const last = heap.pop();
    if (!top || !last || heap.length === 0) return top;
    heap[0] = last;
    for (let n = 0; ;) {
      const left = 2 * n + 1;
      let next = n;
      if (left < heap.length && before(heap[left], heap[next])) next = left;
      if (left + 1 < heap.length && before(heap[left + 1], heap[next])) next = left + 1;
      if (next === n) return top;
      [heap[n], heap[next]] = [heap[next], heap[n]];
      n = next;
    }
  };

  const whole = boxAt(
    freedoms.map(({ from, to }) => (from + to) / 2),
    freedoms.map(({ from, to }) => (to - from) / 2),
  );
  if (better(whole.kept, whole.gap)) push(whole);
  for (let boxes = 0; heap.length > 0; boxes++) {
    if (boxes > MOST_BOXES) return { ...rounded(), proven: false };
    const box = pop()!;
    if (!better(box.kept, box.gap)) break;
    const across = box.half.indexOf(Math.max(...box.half));
    if (!(box.half[across] > BOX_FINENESS_MM)) continue;
    const half = box.half.map((value, m) => (m === across ? value / 2 : value));
    for (const side of [-1, 1]) {
      const middle = box.middle.map((value, m) => (m === across ? value + side * half[m] : value));
      const part = boxAt(middle, half);
      if (better(part.kept, part.gap)) push(part);
    }
  }
  return { ...rounded(), proven: true };
}
