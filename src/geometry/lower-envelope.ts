/** Straight pieces over a line, flat: piece n runs from (s0, t0) to (s1, t1), s0 < s1, and belongs to `owner`. */
export interface EnvelopePieces {
  readonly s0: number[];
  readonly t0: number[];
  readonly s1: number[];
  readonly t1: number[];
  readonly owner: number[];
}

export function envelopePieces(): EnvelopePieces {
  return { s0: [], t0: [], s1: [], t1: [], owner: [] };
}

/**
 * The lowest of the pieces along the line, exactly: the sweep stops wherever a piece begins,
 * ends, or crosses the one that was lowest. Calls `emit` with each stretch, in order along the
 * line; stretches where nothing stands are passed over. Where two are level, the one that goes
 * on lower has the stretch.
 */
export function lowerEnvelope(
  pieces: EnvelopePieces,
  emit: (piece: number, from: number, to: number) => void,
): void {
  const { s0, t0, s1, t1 } = pieces;
  const total = s0.length;
  if (total === 0) return;
  const byStart = Array.from({ length: total }, (_, n) => n).sort((m, n) => s0[m] - s0[n]);
  const stops = [...s0, ...s1].sort((m, n) => m - n);
  const slope = (n: number) => (t1[n] - t0[n]) / (s1[n] - s0[n]);
  const height = (n: number, s: number) =>
    s === s1[n] ? t1[n] : t0[n] + ((s - s0[n]) / (s1[n] - s0[n])) * (t1[n] - t0[n]);
  let active: number[] = [];
  let next = 0;
  for (let stop = 0; stop + 1 < stops.length; stop++) {
    const from = stops[stop];
    const to = stops[stop + 1];
    while (next < total && s0[byStart[next]] <= from) active.push(byStart[next++]);
    if (to <= from) continue;
    active = active.filter((n) => s1[n] > from);
    if (active.length === 0) continue;
    let lowest = active[0];
    let level = height(lowest, from);
    for (const n of active) {
      const at = height(n, from);
      if (at < level || (at === level && slope(n) < slope(lowest))) {
        lowest = n;
        level = at;
      }
    }
    let at = from;
    while (at < to) {
      let until = to;
      let after = -1;
      const fall = slope(lowest);
      for (const n of active) {
        const other = slope(n);
        if (!(other < fall)) continue;
        const cross = at + (height(n, at) - height(lowest, at)) / (fall - other);
        if (cross < until || (cross === until && after >= 0 && other < slope(after))) {
          until = Math.max(cross, at);
          after = n;
        }
      }
      if (until > at) emit(lowest, at, until);
      if (after < 0) break;
      lowest = after;
      at = until;
    }
  }
}
