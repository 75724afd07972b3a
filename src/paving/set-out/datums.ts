import type { Point } from '@/geometry/point';
import { ringHolds } from '@/geometry/ring';
import { keepOutName } from '../edge-names';
import type { Ground } from '../ground';
import { LEAST_BASELINE_MM } from './datum-choice';
import { cornerLabel, cornerTurns, LEAST_CORNER_DEG, type Mark } from './marks';
import type { CornerAddress, Datum } from './set-out-types';
import { runningOffsets, tapesMeetCleanly, tapeUncertainty } from './tape-cross';
import { tapedMarks } from './taped-marks';

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
  const { failing, worst } = marksFrom(marks, a, b);
  return {
    datums,
    failing,
    worst,
    unseen: datums.filter(({ ring, vertex }) => Math.abs(turns[ring][vertex]) < LEAST_CORNER_DEG)
      .length,
    sight: sightBetween(ground, a.at, b.at),
  };
}

/** Marks that fail from a and b, and the uncertainty of the worst of the others. */
function marksFrom(marks: readonly Mark[], a: Datum, b: Datum) {
  const failing: number[] = [];
  const baseline = Math.hypot(b.at[0] - a.at[0], b.at[1] - a.at[1]);
  let worst = 0;
  marks.forEach((mark, n) => {
    if (sameCorner(mark, a) || sameCorner(mark, b)) return;
    const uncertainty = tapesMeetCleanly(a.at, b.at, mark.at)
      ? tapeUncertainty(baseline, ...runningOffsets(a.at, b.at, mark.at))
      : null;
    if (uncertainty === null) failing.push(n);
    else worst = Math.max(worst, uncertainty);
  });
  return { failing, worst };
}

const perimeterCorners = (ground: Ground): readonly Datum[] =>
  ground.rings[0].edges.map((_, n) => datumAt(ground, [0, n]));

const isBaseline = (a: Datum, b: Datum) =>
  Math.hypot(b.at[0] - a.at[0], b.at[1] - a.at[1]) >= LEAST_BASELINE_MM;

/**
 * Of all pairs of the perimeter's corners the one from which the fewest marks fail to be taped cleanly; of
 * those, corners that can be seen, then a baseline over the ground and clear of keep-outs, then the smallest worst uncertainty. `more` gives marks that
 * hang on the pair themselves. Every pair is tried, but no further than it takes to know that another one is better.
 */
export function bestDatums(
  ground: Ground,
  marks: readonly Mark[],
  more: (a: Datum, b: Datum) => readonly Mark[],
): DatumPair {
  const corners = perimeterCorners(ground);
  const turns = cornerTurns(ground.rings[0]);
  const view = tapedMarks(marks);
  let fewest = Infinity;
  let found: (readonly [Datum, Datum])[] = [];
  corners.forEach((a, n) => {
    for (const b of corners.slice(n + 1)) {
      if (!isBaseline(a, b)) continue;
      const fixed = view.failures(a, b, fewest);
      if (fixed > fewest) continue;
      const failing = fixed + marksFrom(more(a, b), a, b).failing.length;
      if (failing > fewest) continue;
      if (failing < fewest) found = [];
      fewest = failing;
      found.push([a, b]);
    }
  });
  if (found.length === 0) {
    // A ground smaller than a baseline: its two farthest corners.
    found = [farthestCorners(corners)];
  }
  const [first, ...others] = found;
  let best = judged(first);
  for (const pair of others) {
    const unseen = unseenOf(pair);
    if (unseen > best.unseen) continue;
    if (unseen === best.unseen) {
      const limit = best.worst - SAME_MM;
      const finer =
        marksFrom(more(...pair), ...pair).worst < limit && view.worstUnder(...pair, limit);
      if (!finer && !best.blocked) continue;
      const blocked = isBlocked(pair);
      if (blocked ? !best.blocked || !finer : best.blocked ? false : !finer) continue;
    }
    best = judged(pair);
  }
  return datumPair(ground, [...marks, ...more(...best.pair)], best.pair);

  function unseenOf(pair: readonly [Datum, Datum]): number {
    return pair.filter(({ vertex }) => Math.abs(turns[vertex]) < LEAST_CORNER_DEG).length;
  }
  function isBlocked([a, b]: readonly [Datum, Datum]): boolean {
    const sight = sightBetween(ground, a.at, b.at);
    return !sight.inside || sight.crosses.length > 0;
  }
  function judged(pair: readonly [Datum, Datum]) {
    const { worst } = marksFrom([...marks, ...more(...pair)], ...pair);
    return { pair, unseen: unseenOf(pair), blocked: isBlocked(pair), worst };
  }
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
  const corners = perimeterCorners(ground);
  const taken = new Map<number, readonly [Datum, Datum]>();
  let left = [...failing];
  for (let round = 0; round < most && left.length > 0; round++) {
    const subset = left.map((at) => marks[at]);
    const view = tapedMarks(subset);
    let best: { pair: readonly [Datum, Datum]; does: number; worst: number } | null = null;
    corners.forEach((a, n) => {
      for (const b of corners.slice(n + 1)) {
        if (!isBaseline(a, b)) continue;
        const own = view.cornersAmong(a, b);
        const needed = Math.max(1, best?.does ?? 1);
        const failed = view.failures(a, b, left.length - own - needed);
        const does = left.length - own - failed;
        if (does < needed) continue;
        const more = best === null || does > best.does;
        if (!more && !view.worstUnder(a, b, best!.worst - SAME_MM)) continue;
        best = { pair: [a, b], does, worst: marksFrom(subset, a, b).worst };
      }
    });
    const found = best as { pair: readonly [Datum, Datum] } | null;
    if (!found) break;
    const [a, b] = found.pair;
    const still = new Set(marksFrom(subset, a, b).failing);
    const does = left.filter(
      (_, m) => !still.has(m) && !sameCorner(subset[m], a) && !sameCorner(subset[m], b),
    );
    for (const at of does) taken.set(at, found.pair);
    const done = new Set(does);
    left = left.filter((at) => !done.has(at));
  }
  return taken;
}
