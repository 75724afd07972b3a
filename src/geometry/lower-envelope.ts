/** Straight pieces over a line, flat: piece n runs from (s0, t0) to (s1, t1), s0 < s1, and belongs to `owner`. */
export interface EnvelopePieces {
  readonly s0: number[];
  readonly t0: number[];
  readonly s1: number[];
  readonly t1: number[];
  readonly owner: number[];
}

/** No pieces yet, to be filled. */
export function envelopePieces(): EnvelopePieces {
  return { s0: [], t0: [], s1: [], t1: [], owner: [] };
}

/** Forgets the pieces, to gather others in the same room. */
export function envelopeClear({ s0, t0, s1, t1, owner }: EnvelopePieces): void {
  s0.length = t0.length = s1.length = t1.length = owner.length = 0;
}

/** Pieces that part by no more than this over a stretch, mm, are level there: rounding does not choose. */
const LEVEL_MM = 1e-6;

/** Fewer numbers than this are put in order one by one, which is quicker than a general sort. */
const FEW = 24;

function ordered(count: number, before: (m: number, n: number) => number): number[] {
  const order = Array.from({ length: count }, (_, n) => n);
  if (count > FEW) return order.sort(before);
  for (let n = 1; n < count; n++) {
    const each = order[n];
    let m = n - 1;
    for (; m >= 0 && before(order[m], each) > 0; m--) order[m + 1] = order[m];
    order[m + 1] = each;
  }
  return order;
}

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
  if (total === 1) {
    emit(0, s0[0], s1[0]);
    return;
  }
  const byStart = ordered(total, (m, n) => s0[m] - s0[n]);
  const end = (n: number) => (n < total ? s0[n] : s1[n - total]);
  const stops = ordered(2 * total, (m, n) => end(m) - end(n));
  const slope = (n: number) => (t1[n] - t0[n]) / (s1[n] - s0[n]);
  const height = (n: number, s: number) =>
    s === s1[n] ? t1[n] : t0[n] + ((s - s0[n]) / (s1[n] - s0[n])) * (t1[n] - t0[n]);
  const levelOver = (m: number, n: number, from: number, to: number) =>
    Math.abs(height(m, from) - height(n, from)) <= LEVEL_MM &&
    Math.abs(height(m, to) - height(n, to)) <= LEVEL_MM;
  const active: number[] = [];
  let next = 0;
  for (let stop = 0; stop + 1 < stops.length; stop++) {
    const from = end(stops[stop]);
    const to = end(stops[stop + 1]);
    while (next < total && s0[byStart[next]] <= from) active.push(byStart[next++]);
    if (to <= from) continue;
    let kept = 0;
    for (const n of active) if (s1[n] > from) active[kept++] = n;
    active.length = kept;
    if (kept === 0) continue;
    let lowest = active[0];
    let level = height(lowest, from);
    for (let m = 1; m < kept; m++) {
      const n = active[m];
      const at = height(n, from);
      if (at > level + LEVEL_MM) continue;
      const before = levelOver(n, lowest, from, to)
        ? precedes(owner[n], owner[lowest])
        : at < level - LEVEL_MM || slope(n) < slope(lowest);
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
        if (!(other < fall)) continue;
        const cross = at + (height(n, at) - height(lowest, at)) / (fall - other);
        if (cross > until || levelOver(n, lowest, at, to)) continue;
        if (cross < until || (after >= 0 && other < slope(after))) {
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
