import {
  envelopeClear,
  envelopePieces,
  lowerEnvelope,
  type EnvelopePieces,
} from '@/geometry/lower-envelope';
import type { Point } from '@/geometry/point';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import type { GroundEdge } from './ground';
import type { Laying } from './laying';
import { rowSearch } from './unit-rows';

/** A stretch of an edge that one unit faces: what the gap ribbon draws. */
export interface GapStretch {
  /** Index into `laying.laid`. */
  readonly unit: number;
  /** Along the edge's chords from its start, mm. */
  readonly from: number;
  readonly to: number;
  /** The true unit's side over the stretch: along the edge and square to it, mm. */
  readonly line: readonly Point[];
}

/** The gaps along one edge of the ground. Lengths in mm; null where no unit faces the edge. */
export interface EdgeProfile {
  readonly ring: number;
  readonly edge: number;
  readonly length: number;
  /** How far rays are cast: clearance, joint and the diagonal of the largest unit together. */
  readonly reach: number;
  readonly stretches: readonly GapStretch[];
  /** Units that face the edge, each with its gap, in the order in which they first face it. */
  readonly units: readonly { readonly unit: number; readonly gap: number }[];
  readonly facing: number;
  readonly least: number | null;
  readonly greatest: number | null;
  readonly mean: number | null;
}

/** How far rays are cast from an edge, mm. */
export function gapReach({ document, joint, motif }: Laying): number {
  const diagonal = Math.max(...motif.map(({ unit }) => Math.hypot(unit.length, unit.width)));
  return document.clearance + joint + diagonal;
}

/**
 * Calls `visit` with each laid unit that may touch the rectangle in front of a chord: from A
 * along the unit vector `along` for `length`, and `depth` along `inward`; `grow` widens units.
 */
function unitsBefore(
  { rows, laid, index, motif }: Laying,
  [ax, ay]: Point,
  along: Point,
  inward: Point,
  length: number,
  depth: number,
  grow: number,
  visit: (unit: number) => void,
): void {
  const [dx, dy] = rows.direction;
  const u0 = (ax - rows.from[0]) * dx + (ay - rows.from[1]) * dy;
  const v0 = (ay - rows.from[1]) * dx - (ax - rows.from[0]) * dy;
  const lu = (along[0] * dx + along[1] * dy) * length;
  const lv = (along[1] * dx - along[0] * dy) * length;
  const du = (inward[0] * dx + inward[1] * dy) * depth;
  const dv = (inward[1] * dx - inward[0] * dy) * depth;
  const us = [u0, u0 + lu, u0 + lu + du, u0 + du];
  const vs = [v0, v0 + lv, v0 + lv + dv, v0 + dv];
  const vLeast = Math.min(...vs);
  const vGreatest = Math.max(...vs);
  if (laid.count === 0) return;
  for (let k = 0; k < motif.length; k++) {
    const entry = rows.rows[k];
    const scale = 1 + (2 * grow) / Math.min(motif[k].unit.length, motif[k].unit.width);
    const reachU = (Math.abs(entry.halfLength[0]) + Math.abs(entry.halfWidth[0])) * scale;
    const reachV = (Math.abs(entry.halfLength[1]) + Math.abs(entry.halfWidth[1])) * scale;
    const row0 = entry.start[1] + entry.first * rows.step[1];
    const from = Math.max(0, Math.ceil((vLeast - reachV - row0) / rows.step[1]));
    const to = Math.min(entry.count - 1, Math.floor((vGreatest + reachV - row0) / rows.step[1]));
    for (let row = from; row <= to; row++) {
      const number = entry.base + row;
      if (index.laid.rowStart[number] === index.laid.rowStart[number + 1]) continue;
      const n = entry.first + row;
      const v = entry.start[1] + n * rows.step[1];
      let low = Infinity;
      let high = -Infinity;
      for (let m = 0; m < 4; m++) {
        const o = (m + 1) & 3;
        if (vs[m] >= v - reachV && vs[m] <= v + reachV) {
          low = Math.min(low, us[m]);
          high = Math.max(high, us[m]);
        }
        for (let side = -1; side <= 1; side += 2) {
          const line = v + side * reachV;
          if (vs[m] > line !== vs[o] > line) {
            const cut = us[m] + ((line - vs[m]) / (vs[o] - vs[m])) * (us[o] - us[m]);
            low = Math.min(low, cut);
            high = Math.max(high, cut);
          }
        }
      }
      if (low > high) continue;
      const rowU = entry.start[0] + n * rows.step[0];
      const last = Math.floor((high + reachU - rowU) / rows.pitch);
      const first = Math.ceil((low - reachU - rowU) / rows.pitch);
      const end = index.laid.rowStart[number + 1];
      for (let at = rowSearch(index.laid, number, first); at < end; at++) {
        if (index.laid.along[at] > last) break;
        visit(at);
      }
    }
  }
}

/** A rectangle in an edge's frame (s along it, t inward): its lower side as corners left, lowest, right. */
interface LowerSide {
  leftS: number;
  leftT: number;
  lowS: number;
  lowT: number;
  rightS: number;
  rightT: number;
  highS: number;
  highT: number;
}

/** Half axes e and f need not be in order; they are square to each other. */
function lowerSide(
  s: number,
  t: number,
  es: number,
  et: number,
  fs: number,
  ft: number,
  out: LowerSide,
): void {
  if (et < 0 || (et === 0 && es < 0)) {
    es = -es;
    et = -et;
  }
  if (ft < 0 || (ft === 0 && fs < 0)) {
    fs = -fs;
    ft = -ft;
  }
  const swap = es < fs;
  const rs = swap ? fs : es;
  const rt = swap ? ft : et;
  const ls = swap ? es : fs;
  const lt = swap ? et : ft;
  out.lowS = s - rs - ls;
  out.lowT = t - rt - lt;
  out.rightS = s + rs - ls;
  out.rightT = t + rt - lt;
  out.leftS = s - rs + ls;
  out.leftT = t - rt + lt;
  out.highS = s + rs + ls;
  out.highT = t + rt + lt;
}

/** A unit at just the reach is met, whatever rounding says, mm. */
const REACH_ROUNDING_MM = 1e-6;

/** Units level with one that screens a chord must still be weighed against it, mm. */
const SCREEN_MARGIN_MM = 1e-3;

const lineAt = (s: number, s0: number, t0: number, s1: number, t1: number) =>
  s1 === s0 ? Math.min(t0, t1) : t0 + ((s - s0) / (s1 - s0)) * (t1 - t0);

/** Height of the rectangle's lower side at s, which must lie between its left and right corners. */
function lowerHeight(side: LowerSide, s: number): number {
  return s < side.lowS
    ? lineAt(s, side.leftS, side.leftT, side.lowS, side.lowT)
    : lineAt(s, side.lowS, side.lowT, side.rightS, side.rightT);
}

/** Greatest height of the rectangle over [from, to], which must lie between its left and right corners. */
function upperGreatest(side: LowerSide, from: number, to: number): number {
  const s = Math.max(from, Math.min(to, side.highS));
  return s < side.highS
    ? lineAt(s, side.leftS, side.leftT, side.highS, side.highT)
    : s > side.highS
      ? lineAt(s, side.highS, side.highT, side.rightS, side.rightT)
      : side.highT;
}

/** Adds the piece from (s0, t0) to (s1, t1), cut to [from, to], raised to t ≥ 0 and ended at t = reach. */
function addPiece(
  pieces: EnvelopePieces,
  owner: number,
  s0: number,
  t0: number,
  s1: number,
  t1: number,
  from: number,
  to: number,
  reach: number,
): void {
  const push = (a: number, ta: number, b: number, tb: number) => {
    if (!(b > a)) return;
    pieces.s0.push(a);
    pieces.t0.push(ta);
    pieces.s1.push(b);
    pieces.t1.push(tb);
    pieces.owner.push(owner);
  };
  let a = Math.max(s0, from);
  let b = Math.min(s1, to);
  if (!(b > a)) return;
  let ta = a === s0 ? t0 : lineAt(a, s0, t0, s1, t1);
  let tb = b === s1 ? t1 : lineAt(b, s0, t0, s1, t1);
  if (ta > reach && tb > reach) return;
  if (ta > reach || tb > reach) {
    const s = a + ((reach - ta) / (tb - ta)) * (b - a);
    if (ta > reach) {
      a = s;
      ta = reach;
    } else {
      b = s;
      tb = reach;
    }
  }
  if (ta >= 0 && tb >= 0) push(a, ta, b, tb);
  else if (ta <= 0 && tb <= 0) push(a, 0, b, 0);
  else {
    const s = a + (ta / (ta - tb)) * (b - a);
    push(a, Math.max(0, ta), s, 0);
    push(s, 0, b, Math.max(0, tb));
  }
}

/** Adds what rays from the chord meet of a grown unit: its lower side where it stands in front of the chord. */
function addUnit(
  pieces: EnvelopePieces,
  owner: number,
  side: LowerSide,
  length: number,
  reach: number,
): void {
  if (side.highT < 0 || side.lowT > reach) return;
  let from = Math.max(0, side.leftS);
  let to = Math.min(length, side.rightS);
  if (side.leftT < 0) {
    from = Math.max(
      from,
      side.leftS + (side.leftT / (side.leftT - side.highT)) * (side.highS - side.leftS),
    );
  }
  if (side.rightT < 0) {
    to = Math.min(
      to,
      side.rightS + (side.rightT / (side.rightT - side.highT)) * (side.highS - side.rightS),
    );
  }
  addPiece(pieces, owner, side.leftS, side.leftT, side.lowS, side.lowT, from, to, reach);
  addPiece(pieces, owner, side.lowS, side.lowT, side.rightS, side.rightT, from, to, reach);
}

/** The true unit's lower side over [from, to] of the chord, moved along by `shift`. */
function sideLine(side: LowerSide, from: number, to: number, shift: number): Point[] {
  const a = Math.max(from, Math.min(to, side.leftS));
  const b = Math.min(to, Math.max(from, side.rightS));
  const inside = (s: number) => Math.max(side.leftS, Math.min(side.rightS, s));
  const at = (s: number): Point => [s + shift, Math.max(0, lowerHeight(side, inside(s)))];
  const middle: Point[] =
    side.lowS > a && side.lowS < b ? [[side.lowS + shift, Math.max(0, side.lowT)]] : [];
  return a < b ? [at(a), ...middle, at(b)] : [at(from), at(to)];
}

function edgeProfile(laying: Laying, edge: GroundEdge, reach: number): EdgeProfile {
  const { laid, motif, joint } = laying;
  const stretches: GapStretch[] = [];
  const faced = new Map<number, { stretch: number; gap: number }>();
  const side: LowerSide = {
    leftS: 0,
    leftT: 0,
    lowS: 0,
    lowT: 0,
    rightS: 0,
    rightT: 0,
    highS: 0,
    highT: 0,
  };
  const precedes = (one: number, other: number) =>
    (laid.k[one] - laid.k[other] || laid.j[one] - laid.j[other] || laid.i[one] - laid.i[other]) < 0;
  const pieces = envelopePieces();
  let shift = 0;
  for (let m = 0; m + 1 < edge.chords.length; m++) {
    const start = edge.chords[m];
    const end = edge.chords[m + 1];
    const length = Math.hypot(end[0] - start[0], end[1] - start[1]);
    if (!(length > 0)) continue;
    const along: Point = [(end[0] - start[0]) / length, (end[1] - start[1]) / length];
    const inward: Point = edge.ring === 0 ? [-along[1], along[0]] : [along[1], -along[0]];
    const place = (unit: number, grow: number) => {
      const entry = motif[laid.k[unit]];
      const x = laid.x[unit] - start[0];
      const y = laid.y[unit] - start[1];
      const longer = 1 + (2 * grow) / entry.unit.length;
      const wider = 1 + (2 * grow) / entry.unit.width;
      const [lx, ly] = entry.halfLength;
      const [wx, wy] = entry.halfWidth;
      lowerSide(
        x * along[0] + y * along[1],
        x * inward[0] + y * inward[1],
        (lx * along[0] + ly * along[1]) * longer,
        (lx * inward[0] + ly * inward[1]) * longer,
        (wx * along[0] + wy * along[1]) * wider,
        (wx * inward[0] + wy * inward[1]) * wider,
        side,
      );
    };
    envelopeClear(pieces);
    // A unit that screens the whole chord hides all that begin behind it.
    let screen = reach + REACH_ROUNDING_MM;
    unitsBefore(
      laying,
      start,
      along,
      inward,
      length,
      reach + REACH_ROUNDING_MM,
      joint / 2,
      (unit) => {
        place(unit, joint / 2);
        addUnit(pieces, unit, side, length, screen);
        if (side.leftS <= 0 && side.rightS >= length && side.leftT >= 0 && side.rightT >= 0) {
          const high = Math.max(lowerHeight(side, 0), lowerHeight(side, length));
          screen = Math.min(screen, high + SCREEN_MARGIN_MM);
        }
        // The gap is that of the true unit, wherever along the edge it stands before it.
        place(unit, 0);
        const from = Math.max(0, side.leftS);
        const to = Math.min(length, side.rightS);
        if (!(to - from > LENGTH_TOLERANCE_MM) || upperGreatest(side, from, to) <= 0) return;
        const gap = Math.max(0, lowerHeight(side, Math.max(from, Math.min(to, side.lowS))));
        const known = faced.get(unit);
        if (known) known.gap = Math.min(known.gap, gap);
        else faced.set(unit, { stretch: 0, gap });
      },
    );
    let open = -1;
    let openFrom = 0;
    let openTo = 0;
    const close = () => {
      if (open < 0) return;
      place(open, 0);
      stretches.push({
        unit: open,
        from: openFrom + shift,
        to: openTo + shift,
        line: sideLine(side, openFrom, openTo, shift),
      });
    };
    lowerEnvelope(pieces, precedes, (piece, from, to) => {
      const unit = pieces.owner[piece];
      const known = faced.get(unit);
      if (known) known.stretch += to - from;
      if (unit !== open || from > openTo) {
        close();
        open = unit;
        openFrom = from;
      }
      openTo = to;
    });
    close();
    shift += length;
  }
  const units: { unit: number; gap: number }[] = [];
  const seen = new Set<number>();
  const shown = stretches.filter(({ unit }) => {
    const known = faced.get(unit);
    if (!known || !(known.stretch > LENGTH_TOLERANCE_MM)) return false;
    if (!seen.has(unit)) {
      seen.add(unit);
      units.push({ unit, gap: known.gap });
    }
    return true;
  });
  const gaps = units.map(({ gap }) => gap);
  const facing = gaps.length;
  return {
    ring: edge.ring,
    edge: edge.edge,
    length: edge.length,
    reach,
    stretches: shown,
    units,
    facing,
    least: facing ? gaps.reduce((least, gap) => Math.min(least, gap)) : null,
    greatest: facing ? gaps.reduce((greatest, gap) => Math.max(greatest, gap)) : null,
    mean: facing ? gaps.reduce((sum, gap) => sum + gap, 0) / facing : null,
  };
}

/**
 * The gaps along every edge of the ground, in the order of rings and edges, as a person would
 * measure them with a tape square to the edge. A unit faces an edge when rays from more than
 * 0.01 mm of it meet that unit first, units being grown by half the joint for this test alone;
 * its gap is the least distance to the part of the true unit in front of the edge. A unit that
 * only its joint puts in front of the edge (no more than 0.01 mm of the unit itself) has no gap
 * and does not face it. Rays are not stopped
 * by other edges of the ground.
 */
export function gapProfile(laying: Laying): EdgeProfile[] {
  const reach = gapReach(laying);
  return laying.ground.edges.map((edge) => edgeProfile(laying, edge, reach));
}
