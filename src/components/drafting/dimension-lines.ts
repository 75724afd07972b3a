import type { Point } from '@/geometry/point';
import { edgeMiddle, vertexBulge, vertexPoint, type Ring } from '@/paving/ground-edits';
import { screenFromGround, type Camera, type ScreenSize } from './camera';

/** A dimension on the screen: where its line runs and its figure stands, in CSS pixels. */
export interface DimensionLine {
  readonly edge: number;
  /** The line's two ends, off the edge; the same point twice for an arc, which has a figure only. */
  readonly from: Point;
  readonly to: Point;
  /** Where the edge itself begins and ends. */
  readonly edgeFrom: Point;
  readonly edgeTo: Point;
  readonly middle: Point;
  /** The middle of the edge itself, on the arc if it is one, and the unit vector out from there. */
  readonly edgeMiddle: Point;
  readonly out: Point;
  /** Turn of the figure so that it reads along the line and never upside down, radians. */
  readonly angle: number;
  readonly lengthPx: number;
}

const OFFSET_PX = 26;

/** Dimension lines of a ring, outside it for the perimeter (`side` 1) and within for a keep-out (−1). */
export function dimensionLines(
  ring: Ring,
  camera: Camera,
  size: ScreenSize,
  side: 1 | -1,
): DimensionLine[] {
  const offset = side === 1 ? OFFSET_PX : -10;
  return ring.map((vertex, edge) => {
    const a = screenFromGround(camera, size, vertexPoint(vertex));
    const b = screenFromGround(camera, size, vertexPoint(ring[(edge + 1) % ring.length]));
    const lengthPx = Math.hypot(b[0] - a[0], b[1] - a[1]);
    const along: Point =
      lengthPx === 0 ? [1, 0] : [(b[0] - a[0]) / lengthPx, (b[1] - a[1]) / lengthPx];
    // On the screen y grows down, so outward of an anticlockwise ring is to the right of travel as drawn.
    const out: Point = [-along[1], along[0]];
    const shift = (p: Point): Point => [p[0] + out[0] * offset, p[1] + out[1] * offset];
    let angle = Math.atan2(along[1], along[0]);
    if (angle > Math.PI / 2 + 1e-6) angle -= Math.PI;
    if (angle <= -Math.PI / 2 + 1e-6) angle += Math.PI;
    const arc = vertexBulge(vertex) !== 0;
    const onEdge = screenFromGround(camera, size, edgeMiddle(ring, edge));
    const middle = shift(arc ? onEdge : [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2]);
    return {
      edge,
      from: arc ? middle : shift(a),
      to: arc ? middle : shift(b),
      edgeFrom: a,
      edgeTo: b,
      middle,
      edgeMiddle: onEdge,
      out,
      angle,
      lengthPx,
    };
  });
}
