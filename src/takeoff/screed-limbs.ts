import { regionClip, type Region } from '@/geometry/clipping';
import { pointsBox } from '@/geometry/convex-part';
import type { Point } from '@/geometry/point';
import { ringArea } from '@/geometry/ring';

/**
 * A floor's limbs for screeding: parts between which the edge steps in or out by more than one board makes up for. An L has two,
 * each with a width of its own.
 */
export interface ScreedLimb {
  /** On the ground, anticlockwise, mm. */
  readonly outline: readonly Point[];
  /** Its borders on other limbs, where no edge carries a board. */
  readonly open: readonly (readonly [Point, Point])[];
}

/** An inner corner flatter than this is part of a curve. */
const CURVE_TURN_RAD = (20 * Math.PI) / 180;
/** Of so many directions of the floor's sides, the longest first, each is tried for the cuts between limbs. */
const MOST_DIRECTIONS = 8;
/** Places this near to one another, mm, are one. */
const SAME_PLACE_MM = 0.05;

const turned = (ring: readonly Point[], [ux, uy]: Point): Point[] =>
  ring.map(([x, y]): Point => [x * ux + y * uy, y * ux - x * uy]);
const turnedBack = (ring: readonly Point[], [ux, uy]: Point): Point[] =>
  ring.map(([s, t]): Point => [s * ux - t * uy, s * uy + t * ux]);

/** Directions of the sides, each once whichever way along it, the longest first. */
function sideDirections(outline: readonly Point[]): Point[] {
  const sides = outline
    .map(([x, y], n) => {
      const [nx, ny] = outline[(n + 1) % outline.length];
      return { dx: nx - x, dy: ny - y, length: Math.hypot(nx - x, ny - y) };
    })
    .filter(({ length }) => length > 0)
    .sort((one, other) => other.length - one.length);
  const found: Point[] = [];
  for (const { dx, dy, length } of sides) {
    const along: Point = [dx / length, dy / length];
    const known = found.some(([x, y]) => Math.abs(x * along[1] - y * along[0]) < 1e-4);
    if (!known) found.push(along);
    if (found.length === MOST_DIRECTIONS) break;
  }
  return found;
}

/** Corners at which the outline turns into the floor, flat ones of curves left out. */
function innerCorners(outline: readonly Point[]): Point[] {
  return outline.filter(([x, y], n) => {
    const [px, py] = outline[(n + outline.length - 1) % outline.length];
    const [qx, qy] = outline[(n + 1) % outline.length];
    const turn = Math.atan2(
      (x - px) * (qy - y) - (y - py) * (qx - x),
      (x - px) * (qx - x) + (y - py) * (qy - y),
    );
    return turn < -CURVE_TURN_RAD;
  });
}

interface Slab {
  readonly ring: readonly Point[];
  /** Which slab along the direction. */
  readonly place: number;
}

/** What of a ring lies on a line across, from its least to its greatest place; null where it does not meet it. */
function across(ring: readonly Point[], at: number): readonly [number, number] | null {
  const on = ring.filter(([s]) => Math.abs(s - at) < SAME_PLACE_MM).map(([, t]) => t);
  return on.length < 2 ? null : [Math.min(...on), Math.max(...on)];
}

/** The limbs by cuts square to one direction, through every inner corner; null where the clipping library fails. */
function limbsAlong(
  outline: readonly Point[],
  along: Point,
  greatestStep: number,
): ScreedLimb[] | null {
  const ring = turned(outline, along);
  const cuts = [...new Set(turned(innerCorners(outline), along).map(([s]) => s))]
    .sort((p, q) => p - q)
    .filter((s, n, all) => n === 0 || s - all[n - 1] > SAME_PLACE_MM);
  const { min, max } = pointsBox(ring);
  const ends = [min[0] - 1, ...cuts, max[0] + 1];
  const slabs: Slab[] = [];
  for (let place = 0; place + 1 < ends.length; place++) {
    const [from, to] = [ends[place], ends[place + 1]];
    const strip: Region = [[[[from, min[1] - 1], [to, min[1] - 1], [to, max[1] + 1], [from, max[1] + 1]]]]; // prettier-ignore
    const met = regionClip('intersection', [[ring]], [strip]);
    if (!met.ok) return null;
    for (const [outer] of met.region) slabs.push({ ring: outer, place });
  }
  // Slabs that go on in one another, with no step that a board does not pass, are one limb.
  const limb = slabs.map((_, n) => n);
  const head = (n: number): number => (limb[n] === n ? n : (limb[n] = head(limb[n])));
  const borders: { readonly one: number; readonly other: number; readonly border: readonly [Point, Point] }[] = []; // prettier-ignore
  slabs.forEach((one, n) => {
    const at = ends[one.place + 1];
    const own = across(one.ring, at);
    if (!own) return;
    const meeting = (range: readonly [number, number] | null) =>
      range && Math.min(own[1], range[1]) - Math.max(own[0], range[0]) > SAME_PLACE_MM;
    const next = slabs.flatMap((other, m) =>
      other.place === one.place + 1 && meeting(across(other.ring, at)) ? [m] : [],
    );
    for (const m of next) {
      const theirs = across(slabs[m].ring, at)!;
      const back = slabs.filter(
        (other) => other.place === one.place && meetsBoth(across(other.ring, at), theirs),
      );
      const steps = [0, 1].map((end) => Math.abs(own[end] - theirs[end]));
      const goesOn = next.length === 1 && back.length === 1 && Math.max(...steps) <= greatestStep;
      if (goesOn) limb[head(m)] = head(n);
      else {
        const border: readonly [Point, Point] = [
          [at, Math.max(own[0], theirs[0])],
          [at, Math.min(own[1], theirs[1])],
        ];
        borders.push({ one: n, other: m, border });
      }
    }
  });
  const heads = [...new Set(slabs.map((_, n) => head(n)))];
  const limbs: ScreedLimb[] = [];
  for (const which of heads) {
    const own = slabs.filter((_, n) => head(n) === which).map((slab): Region => [[slab.ring]]);
    const joined = own.length === 1 ? null : regionClip('union', own[0], own.slice(1));
    if (joined && (!joined.ok || joined.region.length !== 1)) return null;
    const outer = joined?.ok ? joined.region[0][0] : own[0][0][0];
    const right = ringArea(outer) > 0 ? outer : [...outer].reverse();
    limbs.push({
      outline: turnedBack(right, along),
      open: borders
        .filter(({ one, other }) => head(one) === which || head(other) === which)
        .map(({ border }) => turnedBack(border, along) as [Point, Point]),
    });
  }
  return limbs;
}

const meetsBoth = (
  one: readonly [number, number] | null,
  other: readonly [number, number],
): boolean =>
  one !== null && Math.min(one[1], other[1]) - Math.max(one[0], other[0]) > SAME_PLACE_MM;

/**
 * The ways to part a floor into limbs: square to each direction of its sides, at its inner corners. A floor without inner
 * corners is one limb.
 *
 * @param greatestStep a step of the edge up to this, mm, is passed by one board
 */
export function screedLimbs(
  outline: readonly Point[],
  greatestStep: number,
): readonly (readonly ScreedLimb[])[] {
  const whole: ScreedLimb[] = [{ outline, open: [] }];
  if (innerCorners(outline).length === 0) return [whole];
  const ways = sideDirections(outline).flatMap((along) => {
    const limbs = limbsAlong(outline, along, greatestStep);
    return limbs ? [limbs] : [];
  });
  return ways.length > 0 ? ways : [whole];
}
