import type { Point } from '@/geometry/point';
import { tapeError } from './tape-adjustment';
import type { ReadTape } from './survey';

/**
 * First places for the points of a survey, from nothing but tapes and a rough sketch. One point after
 * another is put where two tapes from points placed before it meet; each time on both sides, and all
 * arrangements are carried on that agree best with the further tapes. The sketch decides only where tapes do not.
 */

/** Arrangements carried on from one point to the next. */
const CARRIED = 64;
/** Pairs of tapes that a point is placed by, the squarest ones: one of them may be misread. */
const PAIRS = 3;
/** A tape that is out by more standard errors than this counts no worse: it is misread. */
const MISREAD = 10;
/** What a point on the other side than in the sketch counts, in squared standard errors. */
const OTHER_SIDE = 0.5;
/** Arrangements nearer than this everywhere are one, mm. */
const SAME_MM = 1;

/** Places of points, null where the tapes do not lead to one; the less `cost`, the better it agrees. */
export interface Arrangement {
  readonly places: readonly (Point | null)[];
  readonly cost: number;
}

export interface Placing {
  /** Best first; one at least. */
  readonly arrangements: readonly Arrangement[];
  /** The two points that all others are placed from. */
  readonly base: readonly [number, number];
}

const cross = ([ax, ay]: Point, [bx, by]: Point, [cx, cy]: Point): number =>
  (bx - ax) * (cy - ay) - (by - ay) * (cx - ax);

/** The two points at distances p from a and q from b; where the tapes do not reach each other, the one between. */
export function tapesMeet(a: Point, p: number, b: Point, q: number): [Point, Point] {
  const dx = b[0] - a[0];
  const dy = b[1] - a[1];
  const apart = Math.hypot(dx, dy) || 1;
  const along = (apart * apart + p * p - q * q) / (2 * apart);
  const square = p * p - along * along;
  const ux = dx / apart;
  const uy = dy / apart;
  if (square <= 0) {
    // Half of what is lacking at each: between the two, beyond b, or behind a.
    const on =
      p + q < apart ? (p + apart - q) / 2 : p > q ? (p + apart + q) / 2 : (apart - q - p) / 2;
    const point: Point = [a[0] + on * ux, a[1] + on * uy];
    return [point, point];
  }
  const off = Math.sqrt(square);
  return [
    [a[0] + along * ux - off * uy, a[1] + along * uy + off * ux],
    [a[0] + along * ux + off * uy, a[1] + along * uy - off * ux],
  ];
}

interface Near {
  readonly point: number;
  readonly length: number;
}

/** Of each point, the points that tapes run to from it; of two tapes between the same points, each. */
function neighbours(points: number, tapes: readonly ReadTape[]): Near[][] {
  const near: Near[][] = Array.from({ length: points }, () => []);
  for (const { from, to, length } of tapes) {
    near[from].push({ point: to, length });
    near[to].push({ point: from, length });
  }
  return near;
}

/** How many points can be placed one after another from the two ends of a tape, and in which order. */
function orderFrom(near: readonly Near[][], base: readonly [number, number]): number[] {
  const placed = new Set<number>(base);
  const ways = near.map((others) => new Set(others.map(({ point }) => point)));
  for (;;) {
    let next = -1;
    let most = 1;
    ways.forEach((others, point) => {
      if (placed.has(point)) return;
      let count = 0;
      for (const other of others) if (placed.has(other)) count++;
      if (count > most) {
        most = count;
        next = point;
      }
    });
    if (next < 0) return [...placed];
    placed.add(next);
  }
}

/** The tape from which most points can be placed, the longest of those. */
function baseTape(near: readonly Near[][], tapes: readonly ReadTape[]): ReadTape | null {
  let best: ReadTape | null = null;
  let most = 0;
  for (const tape of tapes) {
    const count = orderFrom(near, [tape.from, tape.to]).length;
    if (count > most || (count === most && best && tape.length > best.length)) {
      most = count;
      best = tape;
    }
    // No other tape can lead to more.
    if (count === near.length && near.length > 24) break;
  }
  return best;
}

interface State {
  readonly places: (Point | null)[];
  readonly cost: number;
}

const misfit = (off: number, length: number): number =>
  Math.min((off / tapeError(length)) ** 2, MISREAD ** 2);

/** Every place for a point that its squarest pairs of tapes give. */
function candidates(state: State, near: readonly Near[], sketch: readonly Point[], point: number) {
  const known = near.filter((other) => state.places[other.point]);
  const pairs: { a: Near; b: Near; square: number }[] = [];
  for (let n = 0; n < known.length; n++)
    for (let m = n + 1; m < known.length; m++) {
      const [a, b] = [known[n], known[m]];
      if (a.point === b.point) continue;
      const [left] = tapesMeet(state.places[a.point]!, a.length, state.places[b.point]!, b.length);
      const area = Math.abs(cross(state.places[a.point]!, state.places[b.point]!, left));
      pairs.push({ a, b, square: area / (a.length * b.length) });
    }
  pairs.sort((one, other) => other.square - one.square);
  return pairs.slice(0, PAIRS).flatMap(({ a, b }) => {
    const from = state.places[a.point]!;
    const to = state.places[b.point]!;
    const side = Math.sign(cross(sketch[a.point], sketch[b.point], sketch[point]));
    return tapesMeet(from, a.length, to, b.length).map((place, n) => {
      let cost = side !== 0 && side !== (n === 0 ? 1 : -1) ? OTHER_SIDE : 0;
      for (const { point: other, length } of known) {
        const [x, y] = state.places[other]!;
        cost += misfit(Math.hypot(place[0] - x, place[1] - y) - length, length);
      }
      return { place, cost };
    });
  });
}

const same = (one: State, other: State): boolean =>
  one.places.every((place, n) => {
    const there = other.places[n];
    return !place || !there
      ? place === there
      : Math.hypot(place[0] - there[0], place[1] - there[1]) < SAME_MM;
  });

/** Arrangements of `sketch.length` points by tapes; null when there are no tapes. The base lies along x, its first end at the origin. */
export function pointsPlaced(sketch: readonly Point[], tapes: readonly ReadTape[]): Placing | null {
  const near = neighbours(sketch.length, tapes);
  const first = baseTape(near, tapes);
  if (!first) return null;
  const base: readonly [number, number] = [first.from, first.to];
  const start: State = { places: sketch.map(() => null), cost: 0 };
  start.places[base[0]] = [0, 0];
  start.places[base[1]] = [first.length, 0];
  let states: State[] = [start];
  for (const point of orderFrom(near, base).slice(2)) {
    const next: State[] = [];
    for (const state of states)
      for (const { place, cost } of candidates(state, near[point], sketch, point)) {
        const places = [...state.places];
        places[point] = place;
        next.push({ places, cost: state.cost + cost });
      }
    next.sort((one, other) => one.cost - other.cost);
    states = [];
    for (const state of next) {
      if (states.length === CARRIED) break;
      if (!states.some((other) => same(state, other))) states.push(state);
    }
  }
  return { arrangements: states, base };
}
