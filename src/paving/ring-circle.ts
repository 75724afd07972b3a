import type { Point } from '@/geometry/point';
import type { GroundRing } from './ground';

/** Centre and radius, mm. */
export interface Circle {
  readonly centre: Point;
  readonly radius: number;
}

/** Arcs whose centres and radii differ by less than this, mm, are of one circle. */
const SAME_CIRCLE_MM = 0.5;

/** The circle that an anticlockwise ring of arcs about one centre is; null for any other ring. */
export function ringCircle(ring: GroundRing): Circle | null {
  if (ring.edges.some(({ bulge }) => bulge <= 0)) return null;
  const arcs = ring.edges.map(({ start, end, bulge }) => {
    const [dx, dy] = [end[0] - start[0], end[1] - start[1]];
    const toCentre = (1 - bulge * bulge) / (4 * bulge);
    return {
      centre: [
        (start[0] + end[0]) / 2 - dy * toCentre,
        (start[1] + end[1]) / 2 + dx * toCentre,
      ] as const,
      radius: (Math.hypot(dx, dy) * (1 + bulge * bulge)) / (4 * bulge),
    };
  });
  const [first] = arcs;
  const same = arcs.every(
    ({ centre, radius }) =>
      Math.abs(radius - first.radius) < SAME_CIRCLE_MM &&
      Math.hypot(centre[0] - first.centre[0], centre[1] - first.centre[1]) < SAME_CIRCLE_MM,
  );
  return same ? first : null;
}
