import type { Vertex } from '../layout-document';

/** Corners from one end to the other; the last has no edge of its own, so its bulge says nothing. */
export type Strand = readonly Vertex[];

/** Ends this near meet, mm: drawings are seldom drawn to the micrometre. */
const MEET_MM = 1;

const apart = (one: Vertex, other: Vertex): number =>
  Math.hypot(one[0] - other[0], one[1] - other[1]);

/** The strand run from its other end: each arc goes with its edge and bulges the other way. */
export function strandTurned(strand: Strand): Vertex[] {
  const last = strand.length - 1;
  return strand.map((_, n): Vertex => {
    const [x, y] = strand[last - n];
    const bulge = n < last ? -(strand[last - n - 1][2] ?? 0) : 0;
    return bulge === 0 ? [x, y] : [x, y, bulge];
  });
}

/**
 * Strands joined end to end into rings, each to the nearest end that meets it. `left` counts the strands that
 * belong to none.
 */
export function chained(strands: readonly Strand[]): { rings: Vertex[][]; left: number } {
  const waiting = new Set(strands);
  const rings: Vertex[][] = [];
  let left = 0;
  for (const first of strands) {
    if (!waiting.delete(first)) continue;
    let chain: Vertex[] = [...first];
    let used = 1;
    for (;;) {
      const end = chain[chain.length - 1];
      if (chain.length > 2 && apart(chain[0], end) <= MEET_MM) break;
      let next: Strand | null = null;
      let least = MEET_MM;
      let turn = false;
      for (const other of waiting) {
        for (const turned of [false, true]) {
          const gap = apart(end, turned ? other[other.length - 1] : other[0]);
          if (gap > least) continue;
          least = gap;
          next = other;
          turn = turned;
        }
      }
      if (!next) break;
      waiting.delete(next);
      used++;
      chain = [...chain.slice(0, -1), ...joined(end, turn ? strandTurned(next) : next)];
    }
    const closed = chain.length > 2 && apart(chain[0], chain[chain.length - 1]) <= MEET_MM;
    if (closed) rings.push(chain.slice(0, -1));
    else left += used;
  }
  return { rings, left };
}

/** The next strand begun where the last one ended. */
function joined([x, y]: Vertex, next: Strand): Vertex[] {
  const bulge = next[0][2] ?? 0;
  return [bulge === 0 ? [x, y] : [x, y, bulge], ...next.slice(1)];
}
