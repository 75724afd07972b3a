import type { Mark } from './marks';
import type { Datum } from './set-out-types';
import { CLEAN_SLOPE, tapeUncertainty } from './tape-cross';

/**
 * Tapes no shorter than this that meet cleanly still cross when both are read wrong by 2 mm: with γ from 30° to 150° the two
 * together are longer than the baseline, and the baseline longer than their difference, by at least 0.067 times the shorter.
 * Only shorter ones need their uncertainty to be known.
 */
const SURELY_CROSS_MM = 100;

/** Marks as the search for corners asks of them, pair after pair. */
export interface TapedMarks {
  /** How many cannot be taped cleanly from a and b; some number over `most` as soon as there are more than that. */
  readonly failures: (a: Datum, b: Datum, most: number) => number;
  /** No mark that can be taped has an uncertainty of `limit` mm or more. */
  readonly worstUnder: (a: Datum, b: Datum, limit: number) => boolean;
  /** How many of the marks are a or b themselves. */
  readonly cornersAmong: (a: Datum, b: Datum) => number;
}

/** Moves what is at `at` to the front. */
function toFront(order: Int32Array, at: number): void {
  const n = order[at];
  order.copyWithin(1, 0, at);
  order[0] = n;
}

/**
 * Marks as flat arrays, in an order that changes: one that decides against a pair is asked first of the next pair, since
 * neighbouring corners fail by the same marks. Answers do not hang on the order. The reckoning is that of `tapesMeetCleanly`.
 */
export function tapedMarks(marks: readonly Mark[]): TapedMarks {
  const xs = Float64Array.from(marks, ({ at }) => at[0]);
  const ys = Float64Array.from(marks, ({ at }) => at[1]);
  const placesOf = new Map<number, Map<number, number>>();
  marks.forEach(({ corner }, n) => {
    if (!corner) return;
    const [ring, vertex] = corner;
    if (!placesOf.has(ring)) placesOf.set(ring, new Map());
    placesOf.get(ring)!.set(vertex, n);
  });
  const placeOf = ({ ring, vertex }: Datum) => placesOf.get(ring)?.get(vertex) ?? -1;
  const failOrder = Int32Array.from(marks, (_, n) => n);
  const worstOrder = Int32Array.from(marks, (_, n) => n);

  /** What the tapes leave open at mark n; null where it cannot be taped. */
  function uncertainty({ at: a }: Datum, { at: b }: Datum, n: number): number | null {
    const dx = b[0] - a[0];
    const dy = b[1] - a[1];
    const px = xs[n] - a[0];
    const py = ys[n] - a[1];
    const baseline = Math.hypot(dx, dy);
    return tapeUncertainty(
      baseline,
      (px * dx + py * dy) / baseline,
      (py * dx - px * dy) / baseline,
    );
  }

  function failures(a: Datum, b: Datum, most: number): number {
    const one = placeOf(a);
    const other = placeOf(b);
    const [ax, ay] = a.at;
    const [bx, by] = b.at;
    let count = 0;
    for (let m = 0; m < failOrder.length; m++) {
      const n = failOrder[m];
      if (n === one || n === other) continue;
      const px = ax - xs[n];
      const py = ay - ys[n];
      const qx = bx - xs[n];
      const qy = by - ys[n];
      const across = Math.abs(px * qy - py * qx);
      if (across > 0 && across >= CLEAN_SLOPE * Math.abs(px * qx + py * qy)) {
        const short =
          (Math.abs(px) < SURELY_CROSS_MM && Math.abs(py) < SURELY_CROSS_MM) ||
          (Math.abs(qx) < SURELY_CROSS_MM && Math.abs(qy) < SURELY_CROSS_MM);
        if (!short || uncertainty(a, b, n) !== null) continue;
      }
      if (++count > most) {
        toFront(failOrder, m);
        return count;
      }
    }
    return count;
  }

  function worstUnder(a: Datum, b: Datum, limit: number): boolean {
    const one = placeOf(a);
    const other = placeOf(b);
    const [ax, ay] = a.at;
    const [bx, by] = b.at;
    for (let m = 0; m < worstOrder.length; m++) {
      const n = worstOrder[m];
      if (n === one || n === other) continue;
      const px = ax - xs[n];
      const py = ay - ys[n];
      const qx = bx - xs[n];
      const qy = by - ys[n];
      const across = Math.abs(px * qy - py * qx);
      const meets = across > 0 && across >= CLEAN_SLOPE * Math.abs(px * qx + py * qy);
      if (!meets || (uncertainty(a, b, n) ?? 0) < limit) continue;
      toFront(worstOrder, m);
      return false;
    }
    return true;
  }

  return {
    failures,
    worstUnder,
    cornersAmong: (a, b) => Number(placeOf(a) >= 0) + Number(placeOf(b) >= 0),
  };
}
