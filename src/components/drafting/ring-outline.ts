import type { Point } from '@/geometry/point';
import { edgeMiddle, vertexBulge, vertexPoint, type Ring } from '@/paving/ground-edits';

/** Halvings of an arc for drawing it: 2⁶ chords, smooth at any zoom that shows the whole arc. */
const HALVINGS = 6;

/** The points of an edge in order, both ends included: what is drawn, also where the ring cannot be laid. */
export function edgeOutline(ring: Ring, edge: number): readonly Point[] {
  const start = ring[edge];
  const end = ring[(edge + 1) % ring.length];
  const halve = (from: Point, to: Point, bulge: number, depth: number): Point[] => {
    if (bulge === 0 || depth === 0) return [from];
    const arc: Ring = [
      [from[0], from[1], bulge],
      [to[0], to[1]],
    ];
    const middle = edgeMiddle(arc, 0);
    const half = Math.tan(Math.atan(bulge) / 2);
    return [...halve(from, middle, half, depth - 1), ...halve(middle, to, half, depth - 1)];
  };
  const to = vertexPoint(end);
  return [...halve(vertexPoint(start), to, vertexBulge(start), HALVINGS), to];
}

export const ringOutline = (ring: Ring): readonly Point[] =>
  ring.flatMap((_, edge) => edgeOutline(ring, edge).slice(0, -1));
