import { pointsBox, type PieceBox, type SignedRings } from './convex-part';
import type { Point } from './point';

/**
 * A region's chords sorted into square bins. Answers are the same as those found by going through every
 * chord; the work is that of the chords near by.
 */
export interface RegionBins {
  /** Whether the box about any chord of a ring meets the box. */
  readonly meets: (ring: number, box: PieceBox) => boolean;
  /** As `ringHolds`. */
  readonly holds: (ring: number, point: Point) => boolean;
  /** The region's corners in the box; one may come several times. */
  readonly cornersIn: (box: PieceBox) => Point[];
}

/** Bins to a side for so many chords: some chords to a bin of the border, and few bins to go through. */
const binsToSide = (chords: number): number => Math.max(1, Math.min(64, Math.ceil(Math.sqrt(chords) * 2))); // prettier-ignore

/** Sorts the chords of a region, each ring for itself. */
export function regionBins(region: SignedRings): RegionBins {
  const { min, max } = pointsBox(region.flat());
  const side = binsToSide(region.reduce((sum, ring) => sum + ring.length, 0));
  const per = [0, 1].map((axis) => side / (max[axis] - min[axis] || 1));
  const bin = (value: number, axis: 0 | 1): number =>
    Math.max(0, Math.min(side - 1, Math.floor((value - min[axis]) * per[axis])));
  const sorted = region.map((ring) => {
    const bins: number[][] = Array.from({ length: side * side }, () => []);
    const rows: number[][] = Array.from({ length: side }, () => []);
    ring.forEach(([bx, by], n) => {
      const [ax, ay] = ring[(n + ring.length - 1) % ring.length];
      const [x0, x1] = [bin(Math.min(ax, bx), 0), bin(Math.max(ax, bx), 0)];
      const [y0, y1] = [bin(Math.min(ay, by), 1), bin(Math.max(ay, by), 1)];
      for (let y = y0; y <= y1; y++) {
        rows[y].push(n);
        for (let x = x0; x <= x1; x++) bins[y * side + x].push(n);
      }
    });
    return { ring, bins, rows };
  });
  const before = (ring: readonly Point[], n: number): Point =>
    ring[n === 0 ? ring.length - 1 : n - 1];
  return {
    meets(which, box) {
      const { ring, bins } = sorted[which];
      const [x0, x1] = [bin(box.min[0], 0), bin(box.max[0], 0)];
      const [y0, y1] = [bin(box.min[1], 1), bin(box.max[1], 1)];
      for (let y = y0; y <= y1; y++)
        for (let x = x0; x <= x1; x++)
          for (const n of bins[y * side + x]) {
            const [ax, ay] = before(ring, n);
            const [bx, by] = ring[n];
            if (
              Math.max(ax, bx) >= box.min[0] &&
              Math.min(ax, bx) <= box.max[0] &&
              Math.max(ay, by) >= box.min[1] &&
              Math.min(ay, by) <= box.max[1]
            )
              return true;
          }
      return false;
    },
    holds(which, [x, y]) {
      if (y < min[1] || y > max[1]) return false;
      const { ring, rows } = sorted[which];
      let inside = false;
      for (const n of rows[bin(y, 1)]) {
        const [ax, ay] = before(ring, n);
        const [bx, by] = ring[n];
        if (ay < y !== by < y && x < ax + ((y - ay) / (by - ay)) * (bx - ax)) inside = !inside;
      }
      return inside;
    },
    cornersIn(box) {
      const found: Point[] = [];
      for (const { ring, bins } of sorted)
        for (let y = bin(box.min[1], 1); y <= bin(box.max[1], 1); y++)
          for (let x = bin(box.min[0], 0); x <= bin(box.max[0], 0); x++)
            for (const n of bins[y * side + x]) {
              const [px, py] = ring[n];
              const within =
                px >= box.min[0] && px <= box.max[0] && py >= box.min[1] && py <= box.max[1];
              if (within) found.push(ring[n]);
            }
      return found;
    },
  };
}
