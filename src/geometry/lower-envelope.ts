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

/** Pieces that part by no more than this over a stretch, mm, are level there: rounding does not choose. */
const LEVEL_MM = 1e-6;

/**
 * The lowest of the pieces along the line, exactly: the sweep stops wherever a piece begins,
 * ends, or crosses the one that was lowest. Calls `emit` with each stretch, in order along the
 * line; stretches where nothing stands are passed over. Of pieces that are level over a stretch
 * the one whose owner comes first, by `precedes`, has it, however the line is turned.
 */
export function lowerEnvelope(
  pieces: EnvelopePieces,
  precedes: (owner: number, other: number) => boolean,
  emit: (piece: number, from: number, to: number) => void,
): void {
  const { s0, t0, s1, t1, owner } = pieces;
  const total = s0.length;
  if (total === 0) return;
  const byStart = Array.from({ length: total }, (_, n) => n).sort((m, n) => s0[m] - s0[n]);
  const stops = [...s0, ...s1].sort((m, n) => m - n);
  const slope = (n: number) => (t1[n] - t0[n]) / (s1[n] - s0[n]);
  const height = (n: number, s: number) =>
    s === s1[n] ? t1[n] : t0[n] + ((s - s0[n]) / (s1[n] - s0[n])) * (t1[n] - t0[n]);
  const levelOver = (m: number, n: number, from: number, to: number) =>
    Math.abs(height(m, from) - height(n, from)) <= LEVEL_MM &&
    Math.abs(height(m, to) - height(n, to)) <= LEVEL_MM;
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
      const before = levelOver(n, lowest, from, to)
        ? precedes(owner[n], owner[lowest])
        : at < level - LEVEL_MM || (at < level + LEVEL_MM && slope(n) < slope(lowest));
      if (before) {
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
        if (!(other < fall) || levelOver(n, lowest, at, to)) continue;
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
