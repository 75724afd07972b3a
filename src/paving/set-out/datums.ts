import type { Point } from '@/geometry/point';
import { ringHolds } from '@/geometry/ring';
import { keepOutName } from '../edge-names';
import type { Ground } from '../ground';
import { LEAST_BASELINE_MM } from './datum-choice';
import { cornerLabel, cornerTurns, LEAST_CORNER_DEG, type Mark } from './marks';
import type { CornerAddress, Datum } from './set-out-types';
import { crossingIsClean, crossingAngle, runningOffsets, tapeUncertainty } from './tape-cross';

/** More corners than this are not tried two by two: of an outline with more, those that lie farthest apart. */
const MOST_CORNERS = 40;
/** Pairs whose worst points differ by less than this, mm, are as good. */
const SAME_MM = 0.05;

export function datumAt(ground: Ground, [ring, vertex]: CornerAddress): Datum {
  return {
    name: cornerLabel(ring, vertex),
    ring,
    vertex,
    at: ground.rings[ring].edges[vertex].start,
  };
}

/** What two corners make of all the marks. */
export interface DatumPair {
  readonly datums: readonly [Datum, Datum];
  /** Indices of the marks whose tapes do not meet cleanly. */
  readonly failing: readonly number[];
  /** Uncertainty of the worst of the others, mm. */
  readonly worst: number;
  /** How many of the two are places where the outline has no corner to be seen. */
  readonly unseen: number;
  readonly sight: Sight;
}

/** What lies on the line between two points. */
export interface Sight {
  readonly inside: boolean;
  /** Keep-outs, `K1` …. */
  readonly crosses: readonly string[];
}

/** A line along an edge is looked at this far to either side of it, mm. */
const BESIDE_MM = 1;

export function sightBetween({ rings }: Ground, a: Point, b: Point): Sight {
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
  const dx = (b[0] - a[0]) / length;
  const dy = (b[1] - a[1]) / length;
  const crosses: string[] = [];
  let inside = true;
  for (const { ring, outline } of rings) {
    const cuts = [0, length];
    for (let n = 0; n < outline.length; n++) {
      const p = outline[n];
      const q = outline[(n + 1) % outline.length];
      const up = (p[0] - a[0]) * dx + (p[1] - a[1]) * dy;
      const vp = (p[1] - a[1]) * dx - (p[0] - a[0]) * dy;
      const uq = (q[0] - a[0]) * dx + (q[1] - a[1]) * dy;
      const vq = (q[1] - a[1]) * dx - (q[0] - a[0]) * dy;
      if (vp > 0 !== vq > 0) cuts.push(up + (vp / (vp - vq)) * (uq - up));
      else if (vp === 0) cuts.push(up);
    }
    const within = cuts.filter((u) => u >= 0 && u <= length).sort((one, other) => one - other);
    for (let n = 0; n + 1 < within.length; n++) {
      if (within[n + 1] - within[n] < BESIDE_MM) continue;
      const u = (within[n] + within[n + 1]) / 2;
      const held = [-BESIDE_MM, BESIDE_MM].map((v) =>
        ringHolds(outline, [a[0] + u * dx - v * dy, a[1] + u * dy + v * dx]),
      );
      if (ring === 0) inside &&= held[0] || held[1];
      else if (held[0] && held[1] && !crosses.includes(keepOutName(ring)))
        crosses.push(keepOutName(ring));
    }
  }
  return { inside, crosses };
}

/** The corners to try: all of a plain outline, of a fine one those farthest from each other. */
function candidates(ground: Ground): number[] {
  const { edges } = ground.rings[0];
  if (edges.length <= MOST_CORNERS) return edges.map((_, n) => n);
  const chosen: number[] = [0];
  const near = edges.map(() => Infinity);
  while (chosen.length < MOST_CORNERS) {
    const last = edges[chosen[chosen.length - 1]].start;
    let farthest = 0;
    edges.forEach(({ start }, n) => {
      near[n] = Math.min(near[n], Math.hypot(start[0] - last[0], start[1] - last[1]));
      if (near[n] > near[farthest]) farthest = n;
    });
    if (near[farthest] === 0) break;
    chosen.push(farthest);
  }
  return chosen.sort((one, other) => one - other);
}

const sameCorner = (mark: Mark, { ring, vertex }: Datum) =>
  mark.corner !== null && mark.corner[0] === ring && mark.corner[1] === vertex;

/** What the two corners make of the marks. */
export function datumPair(
  ground: Ground,
  marks: readonly Mark[],
  datums: readonly [Datum, Datum],
): DatumPair {
  const turns = ground.rings.map(cornerTurns);
  const [a, b] = datums;
  const { failing, worst } = marksFrom(marks, a, b, Infinity);
  return {
    datums,
    failing,
    worst,
    unseen: datums.filter(({ ring, vertex }) => Math.abs(turns[ring][vertex]) < LEAST_CORNER_DEG)
      .length,
    sight: sightBetween(ground, a.at, b.at),
  };
}

/** Marks that fail from a and b, left off when they are more than `most`; and the worst of the others. */
function marksFrom(marks: readonly Mark[], a: Datum, b: Datum, most: number) {
  const failing: number[] = [];
  const baseline = Math.hypot(b.at[0] - a.at[0], b.at[1] - a.at[1]);
  let worst = 0;
  for (let n = 0; n < marks.length && failing.length <= most; n++) {
    const mark = marks[n];
    if (sameCorner(mark, a) || sameCorner(mark, b)) continue;
    if (!crossingIsClean(crossingAngle(a.at, b.at, mark.at))) {
      failing.push(n);
      continue;
    }
    const [along, square] = runningOffsets(a.at, b.at, mark.at);
    const uncertainty = tapeUncertainty(baseline, along, square);
    if (uncertainty === null) failing.push(n);
    else worst = Math.max(worst, uncertainty);
  }
  return { failing, worst };
}

/**
 * Of all pairs of the perimeter's corners the one from which the fewest marks fail to be taped cleanly; of
 * those, corners that can be seen, then a baseline over the ground and clear of keep-outs, then the smallest worst uncertainty. `more` gives marks that
 * hang on the pair themselves.
 */
export function bestDatums(
  ground: Ground,
  marks: readonly Mark[],
  more: (a: Datum, b: Datum) => readonly Mark[],
): DatumPair {
  const corners = candidates(ground).map((vertex) => datumAt(ground, [0, vertex]));
  let fewest = Infinity;
  let found: (readonly [Datum, Datum])[] = [];
  corners.forEach((a, n) => {
    for (const b of corners.slice(n + 1)) {
      if (Math.hypot(b.at[0] - a.at[0], b.at[1] - a.at[1]) < LEAST_BASELINE_MM) continue;
      const { failing } = marksFrom([...more(a, b), ...marks], a, b, fewest);
      if (failing.length > fewest) continue;
      if (failing.length < fewest) found = [];
      fewest = failing.length;
      found.push([a, b]);
    }
  });
  if (found.length === 0) {
    // A ground smaller than a baseline: its two farthest corners.
    found = [farthestCorners(corners)];
  }
  const blocked = ({ sight }: DatumPair) => (sight.inside && sight.crosses.length === 0 ? 0 : 1);
  return found
    .map((pair) => datumPair(ground, [...marks, ...more(...pair)], pair))
    .reduce((best, pair) => {
      const order =
        best.unseen - pair.unseen || blocked(best) - blocked(pair) || best.worst - pair.worst;
      const better =
        best.unseen !== pair.unseen || blocked(best) !== blocked(pair)
          ? order > 0
          : order > SAME_MM;
      return better ? pair : best;
    });
}

function farthestCorners(corners: readonly Datum[]): readonly [Datum, Datum] {
  let best: readonly [Datum, Datum] = [corners[0], corners[1]];
  const apart = ([a, b]: readonly [Datum, Datum]) =>
    Math.hypot(b.at[0] - a.at[0], b.at[1] - a.at[1]);
  corners.forEach((a, n) => {
    for (const b of corners.slice(n + 1)) if (apart([a, b]) > apart(best)) best = [a, b];
  });
  return best;
}

/** Pairs for the marks that fail, each the one that takes most of those left; at most `most` pairs. */
export function secondPairs(
  ground: Ground,
  marks: readonly Mark[],
  failing: readonly number[],
  most: number,
): ReadonlyMap<number, readonly [Datum, Datum]> {
  const corners = candidates(ground).map((vertex) => datumAt(ground, [0, vertex]));
  const taken = new Map<number, readonly [Datum, Datum]>();
  let left = [...failing];
  for (let round = 0; round < most && left.length > 0; round++) {
    let best: { pair: readonly [Datum, Datum]; does: number[]; worst: number } | null = null;
    corners.forEach((a, n) => {
      for (const b of corners.slice(n + 1)) {
        if (Math.hypot(b.at[0] - a.at[0], b.at[1] - a.at[1]) < LEAST_BASELINE_MM) continue;
        const subset = left.map((at) => marks[at]);
        const { failing: still, worst } = marksFrom(subset, a, b, Infinity);
        const out = new Set(still);
        const does = left.filter(
          (at, m) => !out.has(m) && !sameCorner(marks[at], a) && !sameCorner(marks[at], b),
        );
        const more = does.length - (best?.does.length ?? 0);
        if (more > 0 || (more === 0 && best && worst < best.worst - SAME_MM))
          best = { pair: [a, b], does, worst };
      }
    });
    const found = best as { pair: readonly [Datum, Datum]; does: number[] } | null;
    if (!found) break;
    for (const at of found.does) taken.set(at, found.pair);
    const done = new Set(found.does);
    left = left.filter((at) => !done.has(at));
  }
  return taken;
}
