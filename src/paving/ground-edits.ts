import type { Point } from '@/geometry/point';
import type { LayoutDocument, Vertex } from './layout-document';

/**
 * Edits of the ground's rings, as the drafting table makes them: each takes a document and gives
 * another. Ring 0 is the perimeter, ring n the n-th keep-out; edge e runs from vertex e to the next.
 * A ring may cross itself after an edit: it is kept as drawn, and `parseLayoutDocument` says where.
 */

export type Ring = readonly Vertex[];

/** Where a corner lies, mm. */
export const vertexPoint = (vertex: Vertex): Point => [vertex[0], vertex[1]];
/** Bulge of the edge that leaves a corner: tan(sweep / 4), positive anticlockwise; 0 on a straight one. */
export const vertexBulge = (vertex: Vertex): number => vertex[2] ?? 0;

/** A corner, with its bulge where it has one. */
export const vertexOf = ([x, y]: Point, bulge: number): Vertex =>
  bulge === 0 ? [x, y] : [x, y, bulge];

/** Ring 0 is the perimeter, rings 1, 2 … the keep-outs. */
export function documentRing(document: LayoutDocument, ring: number): Ring {
  return ring === 0 ? document.ground.perimeter : document.ground.keepOuts[ring - 1].ring;
}

/** The perimeter and the keep-outs. */
export function documentRingCount(document: LayoutDocument): number {
  return 1 + document.ground.keepOuts.length;
}

/** The document with ring `ring` replaced. */
export function ringReplaced(
  document: LayoutDocument,
  ring: number,
  vertices: Ring,
): LayoutDocument {
  const { ground } = document;
  return {
    ...document,
    ground:
      ring === 0
        ? { ...ground, perimeter: [...vertices] }
        : {
            ...ground,
            keepOuts: ground.keepOuts.map((keepOut, index) =>
              index === ring - 1 ? { ...keepOut, ring: [...vertices] } : keepOut,
            ),
          },
  };
}

/** The ring with one corner elsewhere; bulges stay. */
export const vertexMoved = (ring: Ring, vertex: number, to: Point): Ring =>
  ring.map((v, index) => (index === vertex ? vertexOf(to, vertexBulge(v)) : v));

/** Ring with the two ends of edge `edge` shifted by `by`; its neighbours stretch. */
export function edgeMoved(ring: Ring, edge: number, by: Point): Ring {
  const end = (edge + 1) % ring.length;
  return ring.map((v, index) =>
    index === edge || index === end ? vertexOf([v[0] + by[0], v[1] + by[1]], vertexBulge(v)) : v,
  );
}

/** The ring shifted as a whole, mm. */
export const ringMoved = (ring: Ring, by: Point): Ring =>
  ring.map((v) => vertexOf([v[0] + by[0], v[1] + by[1]], vertexBulge(v)));

/** Ring with a vertex put into edge `edge` at `at`; an arc becomes two arcs of the same circle when `at` is on it. */
export function vertexInserted(ring: Ring, edge: number, at: Point): Ring {
  const start = ring[edge];
  const bulge = vertexBulge(start);
  const half = bulge === 0 ? 0 : Math.tan(Math.atan(bulge) / 2);
  return [
    ...ring.slice(0, edge),
    vertexOf(vertexPoint(start), half),
    vertexOf(at, half),
    ...ring.slice(edge + 1),
  ];
}

/** Ring without vertex `vertex`, or null when fewer than 3 would be left. */
export function vertexRemoved(ring: Ring, vertex: number): Ring | null {
  return ring.length <= 3 ? null : ring.filter((_, index) => index !== vertex);
}

const edgeBulged = (ring: Ring, edge: number, bulge: number): Ring =>
  ring.map((v, index) => (index === edge ? vertexOf(vertexPoint(v), bulge) : v));

/** The chord's length from one end of an edge to the other, mm. */
export function chordLength(ring: Ring, edge: number): number {
  const start = ring[edge];
  const end = ring[(edge + 1) % ring.length];
  return Math.hypot(end[0] - start[0], end[1] - start[1]);
}

/** Direction from an edge's start to its end, degrees anticlockwise from the x axis, in (−180, 180]. */
export function edgeDirectionDeg(ring: Ring, edge: number): number {
  const start = ring[edge];
  const end = ring[(edge + 1) % ring.length];
  return (Math.atan2(end[1] - start[1], end[0] - start[0]) * 180) / Math.PI;
}

/**
 * Ring in which the chord of edge `edge` has the length `lengthMm`: the far end moves along the edge,
 * and takes the next edge with it, which keeps its direction, so that square corners stay square.
 */
export function edgeLengthSet(ring: Ring, edge: number, lengthMm: number): Ring {
  const now = chordLength(ring, edge);
  if (now === 0) return ring;
  const start = ring[edge];
  const end = ring[(edge + 1) % ring.length];
  const factor = lengthMm / now - 1;
  const by: Point = [(end[0] - start[0]) * factor, (end[1] - start[1]) * factor];
  return ring.length === 3
    ? vertexMoved(ring, (edge + 1) % 3, [end[0] + by[0], end[1] + by[1]])
    : edgeMoved(ring, (edge + 1) % ring.length, by);
}

/** Ring in which edge `edge` points `directionDeg` from its start, its length kept; only its far end moves. */
export function edgeDirectionSet(ring: Ring, edge: number, directionDeg: number): Ring {
  const length = chordLength(ring, edge);
  const start = ring[edge];
  const radians = (directionDeg * Math.PI) / 180;
  return vertexMoved(ring, (edge + 1) % ring.length, [
    start[0] + length * Math.cos(radians),
    start[1] + length * Math.sin(radians),
  ]);
}

/** Rise of an arc over its chord, mm; positive to the right of the direction of travel (outward on an anticlockwise ring). */
export const arcRise = (ring: Ring, edge: number): number =>
  (vertexBulge(ring[edge]) * chordLength(ring, edge)) / 2;

/** Ring with edge `edge` an arc of the given rise, or straight for a rise of 0. */
export function edgeRiseSet(ring: Ring, edge: number, riseMm: number): Ring {
  const chord = chordLength(ring, edge);
  return chord === 0 ? ring : edgeBulged(ring, edge, (2 * riseMm) / chord);
}

/** Radius of an arc, mm; Infinity for a straight edge. */
export function arcRadius(ring: Ring, edge: number): number {
  const bulge = Math.abs(vertexBulge(ring[edge]));
  return bulge === 0 ? Infinity : (chordLength(ring, edge) * (1 + bulge * bulge)) / (4 * bulge);
}

/** Length along an edge, an arc's along the arc, mm. */
export function edgeLength(ring: Ring, edge: number): number {
  const bulge = Math.abs(vertexBulge(ring[edge]));
  return bulge === 0 ? chordLength(ring, edge) : arcRadius(ring, edge) * 4 * Math.atan(bulge);
}

/** The point half-way along an edge, on the arc if it is one. */
export function edgeMiddle(ring: Ring, edge: number): Point {
  const start = ring[edge];
  const end = ring[(edge + 1) % ring.length];
  const half = vertexBulge(start) / 2;
  return [
    (start[0] + end[0]) / 2 + (end[1] - start[1]) * half,
    (start[1] + end[1]) / 2 - (end[0] - start[0]) * half,
  ];
}
