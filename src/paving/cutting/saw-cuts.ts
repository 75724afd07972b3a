import type { Point } from '@/geometry/point';
import { factorySide } from './piece-shape';

/** A cut goes on round a corner that turns by less than this: a curve is one cut. */
const CURVE_TURN_RAD = (20 * Math.PI) / 180;
/** An edge shorter than this, mm, is no cut of its own; it counts in the length. */
const LEAST_CUT_MM = 0.1;
/** Corners nearer to a line than this, mm, lie on it: shapes are rounded to a hundredth. */
const ON_LINE_MM = 0.02;

/** What the saw does: in how many cuts, straight or curved, and how far it goes along them, mm. */
export interface SawCuts {
  readonly cuts: number;
  readonly length: number;
}

/** A piece's sawn edges by how they can be sawn. */
export interface SawnEdges {
  /** For each side of the hull whether it is sawn in one straight cut right through. */
  readonly sides: readonly boolean[];
  /** Curves and notches, which are sawn along their own outline. */
  readonly bent: SawCuts;
}

interface Edge {
  readonly from: Point;
  readonly to: Point;
  readonly long: number;
  readonly heading: number;
  readonly sawn: boolean;
  /** Which side of the hull it lies along; -1 for none. */
  readonly side: number;
}

const between = (from: Edge, to: Edge): number =>
  Math.abs(((to.heading - from.heading + 3 * Math.PI) % (2 * Math.PI)) - Math.PI);

/** The hull's side that an edge lies along, or -1. */
function hullSide(hull: readonly Point[], from: Point, to: Point): number {
  return hull.findIndex(([ax, ay], n) => {
    const [bx, by] = hull[(n + 1) % hull.length];
    const long = Math.hypot(bx - ax, by - ay);
    return [from, to].every(
      ([x, y]) => Math.abs((bx - ax) * (y - ay) - (by - ay) * (x - ax)) <= ON_LINE_MM * long,
    );
  });
}

function edgesOf(ring: readonly Point[], half: Point, hull: readonly Point[]): Edge[] {
  return ring.flatMap((from, n): Edge[] => {
    const to = ring[(n + 1) % ring.length];
    const long = Math.hypot(to[0] - from[0], to[1] - from[1]);
    if (long === 0) return [];
    const heading = Math.atan2(to[1] - from[1], to[0] - from[0]);
    const sawn = factorySide(from, to, half) === null;
    return [{ from, to, long, heading, sawn, side: sawn ? hullSide(hull, from, to) : -1 }];
  });
}

/**
 * Sorts the sawn edges of a piece, its rings in its unit's own frame with corners on the unit's sides put exactly
 * there: a side of the hull that meets no other at a flat corner is one straight cut, all else is bent.
 *
 * @param rings the piece's outline and what is cut out of its middle
 * @param hull of the outline
 */
export function sawnEdges(
  rings: readonly (readonly Point[])[],
  half: Point,
  hull: readonly Point[],
): SawnEdges {
  const outline = edgesOf(rings[0], half, hull);
  const long = outline.filter((edge) => edge.long >= LEAST_CUT_MM);
  const inCurve = (edge: Edge, other: Edge, turn: number) =>
    other.sawn && other.side !== edge.side && turn < CURVE_TURN_RAD;
  const sides = hull.map((_, side) => {
    const own = long.map((edge, n) => ({ edge, n })).filter(({ edge }) => edge.side === side);
    return (
      own.length > 0 &&
      own.every(({ edge, n }) => {
        const before = long[(n + long.length - 1) % long.length];
        const after = long[(n + 1) % long.length];
        return (
          !inCurve(edge, before, between(before, edge)) &&
          !inCurve(edge, after, between(edge, after))
        );
      })
    );
  });
  const ringsOfEdges = [outline, ...rings.slice(1).map((ring) => edgesOf(ring, half, []))];
  let cuts = 0;
  let length = 0;
  for (const edges of ringsOfEdges) {
    const bent = (edge: Edge) => edge.sawn && (edge.side < 0 || !sides[edge.side]);
    for (const edge of edges) if (bent(edge)) length += edge.long;
    const counted = edges.filter((edge) => edge.long >= LEAST_CUT_MM);
    const begun = counted.filter((edge, n) => {
      if (!bent(edge)) return false;
      const before = counted[(n + counted.length - 1) % counted.length];
      return !bent(before) || between(before, edge) >= CURVE_TURN_RAD;
    }).length;
    // A round hole has no corner to begin at.
    cuts += begun === 0 && counted.some(bent) ? 1 : begun;
  }
  return { sides, bent: { cuts, length } };
}
