import type { Point } from '@/geometry/point';
import { factorySide } from './piece-shape';

/** A cut goes on round a corner that turns by less than this: a curve is one cut. */
const CURVE_TURN_RAD = (20 * Math.PI) / 180;
/** An edge shorter than this, mm, is no cut of its own; it counts in the length. */
const LEAST_CUT_MM = 0.1;

/** What the saw does along the rings of one piece. */
export interface SawCuts {
  /** Straight or curved cuts. */
  readonly cuts: number;
  /** Along all edges that are not factory edges, mm. */
  readonly length: number;
}

/** The saw's work on one piece, its rings in its unit's own frame with corners on the unit's sides put exactly there. */
export function sawCuts(rings: readonly (readonly Point[])[], half: Point): SawCuts {
  let cuts = 0;
  let length = 0;
  for (const ring of rings) {
    const edges = ring.flatMap((a, n) => {
      const b = ring[(n + 1) % ring.length];
      const long = Math.hypot(b[0] - a[0], b[1] - a[1]);
      const sawn = factorySide(a, b, half) === null;
      if (sawn) length += long;
      const heading = Math.atan2(b[1] - a[1], b[0] - a[0]);
      return long < LEAST_CUT_MM ? [] : [{ sawn, heading }];
    });
    const begun = edges.filter(({ sawn, heading }, n) => {
      if (!sawn) return false;
      const before = edges[(n + edges.length - 1) % edges.length];
      const turn = Math.abs(((heading - before.heading + 3 * Math.PI) % (2 * Math.PI)) - Math.PI);
      return !before.sawn || turn >= CURVE_TURN_RAD;
    }).length;
    // A round hole has no corner to begin at.
    cuts += begun === 0 && edges.some(({ sawn }) => sawn) ? 1 : begun;
  }
  return { cuts, length };
}
