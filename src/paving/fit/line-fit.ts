import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import { gapProfile } from '../gap-profile';
import { layFloor } from '../laying';
import { CHOICES_SHARE } from './cell-fit';
import type { CellPieces } from './cell-pieces';
import { unitCount } from './count';
import { cellPoint, groundFromFrame, type FitFrame } from './fit-frame';
import { holdLines, type EdgeAddress, type FitHold, type HoldLine } from './hold';
import { nearPieces } from './near-pieces';
import { pieceGap, pieceGapsRoom, pointSlack, unitsApart } from './slack';
import type { CellChoice } from './known-choices';

/** A stretch of a line, or a point, whose origins all have the same units. */
interface Stretch {
  readonly line: HoldLine;
  readonly from: number;
  readonly to: number;
  readonly count: number;
}

/** Stretches shorter than this, mm, are rounding. */
const LEAST_STRETCH_MM = 1e-6;
/** Along a stretch the most slack is found to within this, mm. */
const LINE_TOLERANCE_MM = 2e-4;
/** Margins that part by no more than this, mm, are the same: the layout document's own measure. */
const SAME_MARGIN_MM = 0.1;
/** Origins in the cell nearer than this, mm, are one. */
const SAME_ORIGIN_MM = 1e-6;

const pointOn = ({ nx, ny, height }: HoldLine, s: number): [number, number] => [
  nx * height - ny * s,
  ny * height + nx * s,
];

/** Calls `visit` with every i·a + j·b such that (across, along) of it lie in the ranges given. */
function latticeWithin(
  { pitch, rise, shift }: FitFrame,
  nx: number,
  ny: number,
  across: readonly [number, number],
  along: readonly [number, number],
  visit: (u: number, v: number) => void,
): void {
  let low = Infinity;
  let high = -Infinity;
  for (const t of across) {
    for (const s of along) {
      const v = ny * t + nx * s;
      low = Math.min(low, v);
      high = Math.max(high, v);
    }
  }
  for (let j = Math.ceil(low / rise - 1e-9); j <= Math.floor(high / rise + 1e-9); j++) {
    // Both ranges bound u on this row.
    let from = -Infinity;
    let to = Infinity;
    const v = j * rise;
    for (const [k, rest, [least, most]] of [
      [nx, ny * v, across],
      [-ny, nx * v, along],
    ] as const) {
      if (Math.abs(k) < 1e-12) {
        if (rest < least - 1e-9 || rest > most + 1e-9) to = -Infinity;
        continue;
      }
      const one = (least - rest) / k;
      const other = (most - rest) / k;
      from = Math.max(from, Math.min(one, other));
      to = Math.min(to, Math.max(one, other));
    }
    const first = Math.ceil((from - j * shift) / pitch - 1e-9);
    const last = Math.floor((to - j * shift) / pitch + 1e-9);
    for (let i = first; i <= last; i++) visit(i * pitch + j * shift, v);
  }
}

/** The line cut where the count changes: each of its stretches with its count. */
function lineStretches(frame: FitFrame, line: HoldLine): Stretch[] {
  const { nx, ny, height, from, to } = line;
  const changes: { s: number; by: number }[] = [];
  for (const b of frame.clear) {
    for (let n = 0; n < b.count; n++) {
      const t0 = nx * b.x0[n] + ny * b.y0[n];
      const t1 = nx * b.x1[n] + ny * b.y1[n];
      const s0 = -ny * b.x0[n] + nx * b.y0[n];
      const s1 = -ny * b.x1[n] + nx * b.y1[n];
      const r = b.radius[n];
      const tc = nx * b.cx[n] + ny * b.cy[n];
      const sc = -ny * b.cx[n] + nx * b.cy[n];
      const bow = r === 0 ? 0 : r;
      const across = [Math.min(t0, t1) - height - bow, Math.max(t0, t1) - height + bow] as const;
      const along = [Math.min(s0, s1) - to - bow, Math.max(s0, s1) - from + bow] as const;
      latticeWithin(frame, nx, ny, across, along, (u, v) => {
        const dt = height + nx * u + ny * v;
        const ds = -ny * u + nx * v;
        const put = (s: number, by: number) => {
          if (s - ds > from && s - ds < to) changes.push({ s: s - ds, by });
        };
        if (r === 0) {
          if (t0 > dt === t1 > dt) return;
          // The clear region lies left of the piece: that is ahead where the piece heads down across.
          put(s0 + ((dt - t0) / (t1 - t0)) * (s1 - s0), t1 > t0 ? 1 : -1);
          return;
        }
        const away = dt - tc;
        if (Math.abs(away) >= r) return;
        const reach = Math.sqrt(r * r - away * away);
        for (const side of [-1, 1]) {
          // On the quarter that the arc covers, which runs clockwise.
          const px = away;
          const py = side * reach;
          const first = (t0 - tc) * py - (s0 - sc) * px;
          const last = (t1 - tc) * py - (s1 - sc) * px;
          const facing = px * (t0 + t1 - 2 * tc) + py * (s0 + s1 - 2 * sc);
          if (first <= 0 && last >= 0 && facing > 0) put(sc + side * reach, side);
        }
      });
    }
  }
  changes.sort((one, other) => one.s - other.s);
  // Counted in the middle of the widest stretch, as far as can be from where rounding could tell.
  let widest = 0;
  let start = (from + to) / 2;
  for (let n = 0; n <= changes.length; n++) {
    const low = n === 0 ? from : changes[n - 1].s;
    const high = n === changes.length ? to : changes[n].s;
    if (high - low > widest) {
      widest = high - low;
      start = (low + high) / 2;
    }
  }
  let count = unitCount(frame, ...pointOn(line, start));
  for (const { s, by } of changes) if (s < start) count -= by;
  const stretches: Stretch[] = [];
  let low = from;
  for (let n = 0; n <= changes.length; n++) {
    const high = n === changes.length ? to : changes[n].s;
    if (high - low > LEAST_STRETCH_MM) stretches.push({ line, from: low, to: high, count });
    if (n < changes.length) count += changes[n].by;
    low = high;
  }
  return stretches;
}

/** Where two lines of origins cross, in all ways that the lattice repeats the second. */
function crossings(frame: FitFrame, one: HoldLine, other: HoldLine): Stretch[] {
  const cross = one.nx * other.ny - one.ny * other.nx;
  const found: Stretch[] = [];
  const seen = new Set<string>();
  // o on the first line, o + λ on the second: λ lies in the first line's stretch turned round and set on the second's.
  const ends = [one.from, one.to].map((s) => pointOn(one, s));
  const t = ends.map(([u, v]) => other.height - (other.nx * u + other.ny * v));
  const s = ends.map(([u, v]) => -other.ny * u + other.nx * v);
  const across = [Math.min(...t), Math.max(...t)] as const;
  const along = [other.from - Math.max(...s), other.to - Math.min(...s)] as const;
  latticeWithin(frame, other.nx, other.ny, across, along, (u, v) => {
    const height = other.height - (other.nx * u + other.ny * v);
    // n1 · o = t1 and n2 · o = height.
    const ou = (one.height * other.ny - height * one.ny) / cross;
    const ov = (height * one.nx - one.height * other.nx) / cross;
    const at = -one.ny * ou + one.nx * ov;
    if (at < one.from - LEAST_STRETCH_MM || at > one.to + LEAST_STRETCH_MM) return;
    const [cu, cv] = cellPoint(frame, [ou, ov]);
    const key = `${Math.round(cu / SAME_ORIGIN_MM / 10)},${Math.round(cv / SAME_ORIGIN_MM / 10)}`;
    if (seen.has(key)) return;
    seen.add(key);
    found.push({ line: one, from: at, to: at, count: unitCount(frame, ou, ov) });
  });
  return found;
}

/** So many of the nearest pieces of units that are whole are followed along a stretch. */
const FOLLOWED = 8;

/**
 * Finds, for a stretch, the place on it with the most slack, or one within the tolerance of it: the
 * middle, where nothing is better. The units whole at the middle are whole all along, and the
 * distance to each of their pieces is convex along the line, so over a part of the stretch it is
 * nowhere more than at the part's ends; parts in which no such bound beats the best are let go.
 */
function stretchSearch(frame: FitFrame, pieces: CellPieces, stop?: () => boolean) {
  const { pitch, rise, shift } = frame;
  const reach = pitch * 1.001;
  const near = nearPieces(pieces, pitch, rise, shift, reach);
  const every = Int32Array.from({ length: near.count }, (_, n) => n);
  const room = pieceGapsRoom(near.count);
  const order = new Int32Array(near.count);
  const ends = pieceGapsRoom(2);
  return ({ line, from, to }: Stretch): { s: number; slack: number } => {
    const middle = (from + to) / 2;
    const [u, v] = cellPoint(frame, pointOn(line, middle));
    const at = (s: number): [number, number] => [
      u - line.ny * (s - middle),
      v + line.nx * (s - middle),
    ];
    const first = pointSlack(near, every, 0, near.count, u, v, reach, room, order);
    let best = { s: middle, slack: Math.max(0, first) };
    // Nothing farther off can be the nearest anywhere on the stretch.
    const half = (to - from) / 2;
    const within = Math.min(reach, best.slack + half);
    const local = every.filter((_, n) => room.distance[n] <= within + half);
    let parts = [{ low: from, high: to }];
    while (parts.length > 0 && !stop?.()) {
      const next: typeof parts = [];
      for (const { low, high } of parts) {
        const centre = (low + high) / 2;
        const slack = pointSlack(near, local, 0, local.length, ...at(centre), within, room, order);
        if (slack > best.slack + LINE_TOLERANCE_MM) best = { s: centre, slack };
        let bound = within;
        let followed = 0;
        for (let m = 0; m < local.length && followed < FOLLOWED; m++) {
          const n = local[order[m]];
          if (room.distance[order[m]] >= within) break;
          if (room.side[order[m]] < 0 || unitsApart(near, n, local, order, m, 1) === 0) continue;
          followed++;
          pieceGap(near, n, ...at(low), ends, 0);
          pieceGap(near, n, ...at(high), ends, 1);
          bound = Math.min(bound, Math.max(ends.distance[0], ends.distance[1]));
        }
        if (bound <= best.slack + LINE_TOLERANCE_MM || high - low < LINE_TOLERANCE_MM) continue;
        next.push({ low, high: centre }, { low: centre, high });
      }
      parts = next;
    }
    return best;
  };
}

/** True when the margins at both edges of each such hold are the same where the floor starts at the point. */
function marginsAgree(frame: FitFrame, holds: readonly FitHold[], u: number, v: number): boolean {
  const between = holds.filter((hold) => 'between' in hold);
  if (between.length === 0) return true;
  const { document, ground, turn } = frame;
  const [x, y] = groundFromFrame(frame, [u, v]);
  const placement = { origin: [x, y] as [number, number], turn };
  const profiles = gapProfile(layFloor({ ...document, placement, lifted: [] }, ground));
  const least = ([ring, edge]: EdgeAddress) =>
    profiles.find((profile) => profile.ring === ring && profile.edge === edge)?.least ?? null;
  return between.every(({ between: [one, other] }) => {
    const first = least(one);
    const second = least(other);
    return first !== null && second !== null && Math.abs(first - second) <= SAME_MARGIN_MM;
  });
}

/**
 * The trade-off among origins that keep one or two holds, most units first; empty when none lays a
 * unit. Along a line the count changes only where it crosses a boundary of the regions, so between
 * those crossings every origin is the same and the best of each stretch is the best there is. Without
 * `all`, the best start alone. When `stop` answers true what was found so far is given, and is not to be used.
 */
export function heldChoices(
  frame: FitFrame,
  pieces: CellPieces,
  holds: readonly FitHold[],
  all: boolean,
  stop?: () => boolean,
): CellChoice[] {
  const first = holdLines(frame, holds[0]);
  const stretches =
    holds.length === 1
      ? first.flatMap((line) => lineStretches(frame, line))
      : first.flatMap((line) =>
          holdLines(frame, holds[1]).flatMap((other) => crossings(frame, line, other)),
        );
  stretches.sort(
    (one, other) => other.count - one.count || other.to - other.from - (one.to - one.from),
  );
  const bestOn = stretchSearch(frame, pieces, stop);
  const choices: CellChoice[] = [];
  let above = -Infinity;
  for (let n = 0; n < stretches.length && !stop?.();) {
    const { count } = stretches[n];
    const top = choices.length > 0 ? choices[0].count : count;
    if (count <= 0 || (choices.length > 0 && (!all || count < CHOICES_SHARE * top))) break;
    let end = n;
    while (end < stretches.length && stretches[end].count === count) end++;
    const places = stretches
      .slice(n, end)
      .map((stretch) => ({ line: stretch.line, ...bestOn(stretch) }));
    // Those with the most slack first; within the tolerance the widest stretch, which came first, stays first.
    places.sort((one, other) =>
      Math.abs(one.slack - other.slack) <= LINE_TOLERANCE_MM ? 0 : other.slack - one.slack,
    );
    for (const { line, s, slack } of places) {
      if (stop?.()) break;
      if (slack <= above + LENGTH_TOLERANCE_MM) break;
      const [u, v] = pointOn(line, s);
      if (!marginsAgree(frame, holds, u, v)) continue;
      choices.push({ count, slack, u, v });
      above = slack;
      break;
    }
    n = end;
  }
  return choices;
}
