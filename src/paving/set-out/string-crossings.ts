import type { Point } from '@/geometry/point';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import type { Ground } from '../ground';

/**
 * What of a line is inside is asked this far to its left, mm, in the units that stand on it: a line along an
 * edge, or a hair over it as the tolerance allows, is then inside.
 */
const SEEN_INSIDE_MM = 2 * LENGTH_TOLERANCE_MM;

/** Where a line enters and leaves the ground, u along it, mm; `ring` is the one crossed. */
export interface Stretch {
  readonly from: number;
  readonly to: number;
  readonly fromRing: number;
  readonly toRing: number;
}

interface Crossing {
  readonly u: number;
  readonly rise: number;
  readonly ring: number;
}

/** Where the line v = `v` meets the true arc that the chord stands for, nearest to u; u itself where it does not. */
function onArc(centreU: number, centreV: number, radius: number, v: number, u: number): number {
  const square = radius * radius - (v - centreV) ** 2;
  if (!(square > 0)) return u;
  const half = Math.sqrt(square);
  return Math.abs(centreU + half - u) < Math.abs(centreU - half - u)
    ? centreU + half
    : centreU - half;
}

/** An arc and its chord part by less than this along a line that meets them steeply enough to matter, mm. */
const ARC_MOVE_MM = 50;

/**
 * The stretches of each line v = lines[n] (ascending) that lie in the ground, from left to right. u and v are
 * measured from `origin` along `direction` and square to it. Work grows with the crossings.
 */
export function stringStretches(
  ground: Ground,
  origin: Point,
  direction: Point,
  lines: ArrayLike<number>,
): Stretch[][] {
  const [dx, dy] = direction;
  const into = ([x, y]: Point): Point => {
    const px = x - origin[0];
    const py = y - origin[1];
    return [px * dx + py * dy, py * dx - px * dy];
  };
  const crossings: Crossing[][] = Array.from({ length: lines.length }, () => []);
  for (const edge of ground.edges) {
    const arc =
      edge.chords.length > 2 ? arcCircle(into(edge.start), into(edge.end), edge.bulge) : null;
    const side = edge.ring === 0 ? 1 : -1;
    for (let n = 0; n + 1 < edge.chords.length; n++) {
      const [u0, v0] = into(edge.chords[n]);
      const [u1, v1] = into(edge.chords[n + 1]);
      const low = Math.min(v0, v1);
      const high = Math.max(v0, v1);
      const rise = (v1 < v0 ? 1 : -1) * side;
      for (let line = firstFrom(lines, low - SEEN_INSIDE_MM); line < lines.length; line++) {
        const seen = lines[line] + SEEN_INSIDE_MM;
        if (seen > high) break;
        if (v0 > seen === v1 > seen) continue;
        // Where the line itself meets the chord, or the chord's end when it just passes it.
        const share = Math.max(0, Math.min(1, (lines[line] - v0) / (v1 - v0)));
        const straight = u0 + share * (u1 - u0);
        const u = arc ? onArc(arc.u, arc.v, arc.radius, lines[line], straight) : straight;
        crossings[line].push({
          u: Math.abs(u - straight) < ARC_MOVE_MM ? u : straight,
          rise,
          ring: edge.ring,
        });
      }
    }
  }
  return crossings.map((list) => {
    list.sort((one, other) => one.u - other.u || other.rise - one.rise);
    const stretches: Stretch[] = [];
    let depth = 0;
    let entered: Crossing | null = null;
    for (const crossing of list) {
      depth += crossing.rise;
      if (depth > 0 && !entered) entered = crossing;
      else if (depth <= 0 && entered) {
        if (crossing.u > entered.u) {
          const { u: from, ring: fromRing } = entered;
          stretches.push({ from, to: crossing.u, fromRing, toRing: crossing.ring });
        }
        entered = null;
      }
    }
    return stretches;
  });
}

function firstFrom(lines: ArrayLike<number>, least: number): number {
  let low = 0;
  let high = lines.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (lines[middle] < least) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** The circle of the arc from `a` to `b` with that bulge. */
function arcCircle(a: Point, b: Point, bulge: number) {
  const toCentre = (1 - bulge * bulge) / (4 * bulge);
  const du = b[0] - a[0];
  const dv = b[1] - a[1];
  return {
    u: (a[0] + b[0]) / 2 - dv * toCentre,
    v: (a[1] + b[1]) / 2 + du * toCentre,
    radius: (Math.hypot(du, dv) * (1 + bulge * bulge)) / (4 * Math.abs(bulge)),
  };
}
