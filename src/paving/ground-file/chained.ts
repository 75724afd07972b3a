import { vertexBulge, vertexOf, vertexPoint } from '../ground-edits';
import type { Vertex } from '../layout-document';

/** Corners from one end to the other; the last has no edge of its own, so its bulge says nothing. */
export type Strand = readonly Vertex[];

/** Ends this near meet, mm: drawings are seldom drawn to the micrometre. */
const MEET_MM = 1;

const apart = (one: Vertex, other: Vertex): number =>
  Math.hypot(one[0] - other[0], one[1] - other[1]);

/** True when two ends are near enough to be one. */
export const endsMeet = (one: Vertex, other: Vertex): boolean => apart(one, other) <= MEET_MM;

/** The strand run from its other end: each arc goes with its edge and bulges the other way. */
export function strandTurned(strand: Strand): Vertex[] {
  const last = strand.length - 1;
  return strand.map((_, n) =>
    vertexOf(vertexPoint(strand[last - n]), n < last ? -vertexBulge(strand[last - n - 1]) : 0),
  );
}

interface End {
  readonly strand: Strand;
  readonly at: Vertex;
  /** It is the strand's last corner: the strand is turned to go on from here. */
  readonly turn: boolean;
}

const squareOf = (mm: number): number => Math.floor(mm / MEET_MM);

/** Every end of the strands by the square of the plane that it lies in, one as wide as ends may lie apart. */
function endsBySquare(strands: readonly Strand[]): ReadonlyMap<string, End[]> {
  const squares = new Map<string, End[]>();
  for (const strand of strands)
    for (const turn of [false, true]) {
      const at = turn ? strand[strand.length - 1] : strand[0];
      const key = `${squareOf(at[0])} ${squareOf(at[1])}`;
      const own = squares.get(key);
      if (own) own.push({ strand, at, turn });
      else squares.set(key, [{ strand, at, turn }]);
    }
  return squares;
}

/** The nearest end of a waiting strand that meets a place; ends of strands that wait no longer are dropped. */
function nearestEnd(
  squares: ReadonlyMap<string, End[]>,
  waiting: ReadonlySet<Strand>,
  place: Vertex,
): End | null {
  let nearest: End | null = null;
  let least = MEET_MM;
  for (let x = squareOf(place[0]) - 1; x <= squareOf(place[0]) + 1; x++)
    for (let y = squareOf(place[1]) - 1; y <= squareOf(place[1]) + 1; y++) {
      const ends = squares.get(`${x} ${y}`) ?? [];
      for (let n = ends.length - 1; n >= 0; n--) {
        if (!waiting.has(ends[n].strand)) {
          ends.splice(n, 1);
          continue;
        }
        const gap = apart(place, ends[n].at);
        if (gap > least) continue;
        least = gap;
        nearest = ends[n];
      }
    }
  return nearest;
}

/**
 * Strands joined end to end into rings, each to the nearest end that meets it. `left` counts the strands that
 * belong to none.
 */
export function chained(strands: readonly Strand[]): { rings: Vertex[][]; left: number } {
  const waiting = new Set(strands);
  const squares = endsBySquare(strands);
  const rings: Vertex[][] = [];
  let left = 0;
  for (const first of strands) {
    if (!waiting.delete(first)) continue;
    const chain: Vertex[] = [...first];
    let used = 1;
    const closed = () => chain.length > 2 && endsMeet(chain[0], chain[chain.length - 1]);
    while (!closed()) {
      const end = chain[chain.length - 1];
      const next = nearestEnd(squares, waiting, end);
      if (!next) break;
      waiting.delete(next.strand);
      used++;
      chain.pop();
      chain.push(...joined(end, next.turn ? strandTurned(next.strand) : next.strand));
    }
    if (closed()) rings.push(chain.slice(0, -1));
    else left += used;
  }
  return { rings, left };
}

/** The next strand begun where the last one ended. */
const joined = (end: Vertex, next: Strand): Vertex[] => [
  vertexOf(vertexPoint(end), vertexBulge(next[0])),
  ...next.slice(1),
];
