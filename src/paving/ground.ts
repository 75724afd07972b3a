import { arcLength, arcPoints } from '@/geometry/arc';
import type { Point } from '@/geometry/point';
import { ringArea } from '@/geometry/ring';
import type { LayoutDocument, Vertex } from './layout-document';

/** One edge of the document, drawn as chords that keep inside the ground. */
export interface GroundEdge {
  /** 0 for the perimeter, 1 for the first keep-out and so on. */
  readonly ring: number;
  readonly edge: number;
  readonly start: Point;
  readonly end: Point;
  readonly bulge: number;
  /** From `start` to `end`, both included. */
  readonly chords: readonly Point[];
  /** Along the edge itself, the true arc where it is one, mm. */
  readonly length: number;
}

/** One ring of the ground with its edges, anticlockwise, and the chords that stand for its arcs. */
export interface GroundRing {
  readonly ring: number;
  readonly name: string | null;
  readonly edges: readonly GroundEdge[];
  /** The chords' points once round, anticlockwise, not closed. */
  readonly outline: readonly Point[];
  /** Area inside the ring, mm². */
  readonly area: number;
}

/** Every chord of the ground as flat arrays, in the order of rings, edges and chords. */
export interface GroundChords {
  readonly count: number;
  readonly ax: Float64Array;
  readonly ay: Float64Array;
  readonly bx: Float64Array;
  readonly by: Float64Array;
  /** Index of the chord's edge among all edges of all rings. */
  readonly edge: Int32Array;
  /** 1 where the ground lies left of a → b (the perimeter), −1 where right (keep-outs). */
  readonly side: Int8Array;
}

/** The perimeter less the keep-outs, arcs flattened inward. */
export interface Ground {
  readonly rings: readonly GroundRing[];
  readonly edges: readonly GroundEdge[];
  readonly chords: GroundChords;
  /** Of the perimeter less the keep-outs, mm². */
  readonly area: number;
  readonly box: { readonly min: Point; readonly max: Point };
}

/** A ring's edges as `[start, end, bulge]`. */
export function ringEdges(ring: readonly Vertex[]): { start: Point; end: Point; bulge: number }[] {
  return ring.map((vertex, n) => {
    const next = ring[n + 1 === ring.length ? 0 : n + 1];
    return {
      start: [vertex[0], vertex[1]],
      end: [next[0], next[1]],
      bulge: vertex.length === 3 ? vertex[2] : 0,
    };
  });
}

/** The chords of one anticlockwise ring: ring 0 has its ground inside, every other outside. */
export function groundRing(vertices: readonly Vertex[], ring: number, name: string | null) {
  const edges = ringEdges(vertices).map(({ start, end, bulge }, edge): GroundEdge => {
    const bulgesIntoGround = ring === 0 ? bulge < 0 : bulge > 0;
    return {
      ring,
      edge,
      start,
      end,
      bulge,
      chords: arcPoints(start, end, bulge, bulgesIntoGround ? 'tangent' : 'inscribed'),
      length: arcLength(start, end, bulge),
    };
  });
  const outline = edges.flatMap((edge) => edge.chords.slice(0, -1));
  return { ring, name, edges, outline, area: ringArea(outline) } satisfies GroundRing;
}

/** The ground of a valid document: rings anticlockwise, ring 0 the perimeter. */
export function documentGround(document: Pick<LayoutDocument, 'ground'>): Ground {
  const { perimeter, keepOuts } = document.ground;
  const rings: GroundRing[] = [
    groundRing(perimeter, 0, null),
    ...keepOuts.map((keepOut, n) => groundRing(keepOut.ring, n + 1, keepOut.name)),
  ];
  const edges = rings.flatMap((ring) => ring.edges);
  const count = edges.reduce((sum, edge) => sum + edge.chords.length - 1, 0);
  const chords = {
    count,
    ax: new Float64Array(count),
    ay: new Float64Array(count),
    bx: new Float64Array(count),
    by: new Float64Array(count),
    edge: new Int32Array(count),
    side: new Int8Array(count),
  };
  const min: [number, number] = [Infinity, Infinity];
  const max: [number, number] = [-Infinity, -Infinity];
  let n = 0;
  edges.forEach((edge, index) => {
    for (let m = 0; m + 1 < edge.chords.length; m++, n++) {
      const [ax, ay] = edge.chords[m];
      const [bx, by] = edge.chords[m + 1];
      chords.ax[n] = ax;
      chords.ay[n] = ay;
      chords.bx[n] = bx;
      chords.by[n] = by;
      chords.edge[n] = index;
      chords.side[n] = edge.ring === 0 ? 1 : -1;
      if (edge.ring === 0) {
        min[0] = Math.min(min[0], ax);
        min[1] = Math.min(min[1], ay);
        max[0] = Math.max(max[0], ax);
        max[1] = Math.max(max[1], ay);
      }
    }
  });
  const area = rings.reduce((sum, ring) => (ring.ring === 0 ? ring.area : sum - ring.area), 0);
  return { rings, edges, chords, area, box: { min, max } };
}
