import { sweepSegment, sweptSection, sweptSegmentRoom } from '@/geometry/row-section';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import type { Ground } from './ground';
import type { UnitRows } from './unit-rows';

/** Chords nearer to a unit than this, mm, take part in its exact cover; it absorbs rounding only. */
const TOUCH_MARGIN_MM = 1e-6;

/** Marks of every row of one motif entry: row r has those from `start[r]` up to `start[r + 1]`. */
export interface RowMarks {
  /** Runs of places too near to the boundary, ordered by where they begin; they may overlap. */
  readonly blocked: { start: Int32Array; from: Float64Array; to: Float64Array };
  /** Where the row's centre line crosses the boundary, in places, ordered; `rise` is 1 on the way into the ground. */
  readonly crossing: { start: Int32Array; at: Float64Array; rise: Float64Array };
  /** Places whose unit meets or touches a chord, ordered by place. */
  readonly touch: { start: Int32Array; at: Float64Array; chord: Float64Array };
}

/** The ground's chords in the rows' frame. */
export interface ChordFrame {
  readonly u0: Float64Array;
  readonly v0: Float64Array;
  readonly u1: Float64Array;
  readonly v1: Float64Array;
}

/** The chords of the ground in the frame of the rows: u along a row, v square to it, mm. */
export function chordFrame({ chords }: Ground, rows: UnitRows): ChordFrame {
  const { count } = chords;
  const frame = {
    u0: new Float64Array(count),
    v0: new Float64Array(count),
    u1: new Float64Array(count),
    v1: new Float64Array(count),
  };
  const [dx, dy] = rows.direction;
  const [fx, fy] = rows.from;
  for (let n = 0; n < count; n++) {
    const ax = chords.ax[n] - fx;
    const ay = chords.ay[n] - fy;
    const bx = chords.bx[n] - fx;
    const by = chords.by[n] - fy;
    frame.u0[n] = ax * dx + ay * dy;
    frame.v0[n] = ay * dx - ax * dy;
    frame.u1[n] = bx * dx + by * dy;
    frame.v1[n] = by * dx - bx * dy;
  }
  return frame;
}

/** Keys with two values each, gathered by row and put in order of the first value. */
function gathered(rows: number, key: number[], one: number[], two: number[]) {
  const start = new Int32Array(rows + 1);
  for (const row of key) start[row + 1]++;
  for (let row = 0; row < rows; row++) start[row + 1] += start[row];
  const next = start.slice();
  const first = new Float64Array(key.length);
  const second = new Float64Array(key.length);
  for (let n = 0; n < key.length; n++) {
    const at = next[key[n]]++;
    first[at] = one[n];
    second[at] = two[n];
  }
  for (let row = 0; row < rows; row++) orderedRange(first, second, start[row], start[row + 1]);
  return { start, first, second };
}

/** Above this many marks in a row an insertion sort gives way to the engine's own. */
const SHORT_RANGE = 24;

function orderedRange(first: Float64Array, second: Float64Array, from: number, to: number): void {
  if (to - from <= SHORT_RANGE) {
    for (let n = from + 1; n < to; n++) {
      const key = first[n];
      const value = second[n];
      let m = n - 1;
      for (; m >= from && (first[m] > key || (first[m] === key && second[m] > value)); m--) {
        first[m + 1] = first[m];
        second[m + 1] = second[m];
      }
      first[m + 1] = key;
      second[m + 1] = value;
    }
    return;
  }
  const order = Array.from({ length: to - from }, (_, n) => from + n);
  order.sort((m, n) => first[m] - first[n] || second[m] - second[n]);
  const keys = order.map((n) => first[n]);
  const values = order.map((n) => second[n]);
  first.set(keys, from);
  second.set(values, from);
}

/**
 * What the boundary does to the rows of motif entry k. A unit too near to a chord is one whose
 * centre lies in the chord swept by the unit and by a disc of the clearance: a convex shape, so
 * each chord blocks one run of places in each row, found without looking at the places between.
 * `touching` false leaves `touch` empty, for whoever only asks which units are whole.
 */
export function rowMarks(
  ground: Ground,
  rows: UnitRows,
  frame: ChordFrame,
  k: number,
  clearance: number,
  touching = true,
): RowMarks {
  const { count, first, start, halfLength, halfWidth } = rows.rows[k];
  const [stepU, stepV] = rows.step;
  const { pitch } = rows;
  const hx = Math.hypot(halfLength[0], halfLength[1]);
  const hy = Math.hypot(halfWidth[0], halfWidth[1]);
  const radius = Math.max(0, clearance - LENGTH_TOLERANCE_MM);
  const shrink = Math.max(0, LENGTH_TOLERANCE_MM - clearance);
  const blockX = Math.max(0, hx - shrink) / hx;
  const blockY = Math.max(0, hy - shrink) / hy;
  const touchX = (hx + TOUCH_MARGIN_MM) / hx;
  const touchY = (hy + TOUCH_MARGIN_MM) / hy;
  const row0V = start[1] + first * stepV;
  const row0U = start[0] + first * stepU;

  const blockedRow: number[] = [];
  const blockedFrom: number[] = [];
  const blockedTo: number[] = [];
  const crossingRow: number[] = [];
  const crossingAt: number[] = [];
  const crossingRise: number[] = [];
  const touchRow: number[] = [];
  const touchAt: number[] = [];
  const touchChord: number[] = [];
  const latest = new Int32Array(count).fill(-1);
  const near = sweptSegmentRoom();
  const met = sweptSegmentRoom();
  const cut = new Float64Array(2);

  for (let n = 0; n < ground.chords.count; n++) {
    const u0 = frame.u0[n];
    const v0 = frame.v0[n];
    const u1 = frame.u1[n];
    const v1 = frame.v1[n];
    const rise = (v1 < v0 ? 1 : -1) * ground.chords.side[n];
    sweepSegment(
      near,
      u0,
      v0,
      u1,
      v1,
      halfLength[0] * blockX,
      halfLength[1] * blockX,
      halfWidth[0] * blockY,
      halfWidth[1] * blockY,
      radius,
    );
    let { least, greatest } = near;
    if (touching) {
      sweepSegment(
        met,
        u0,
        v0,
        u1,
        v1,
        halfLength[0] * touchX,
        halfLength[1] * touchX,
        halfWidth[0] * touchY,
        halfWidth[1] * touchY,
        0,
      );
      least = Math.min(least, met.least);
      greatest = Math.max(greatest, met.greatest);
    }
    const from = Math.max(0, Math.ceil((least - row0V) / stepV));
    const to = Math.min(count - 1, Math.floor((greatest - row0V) / stepV));
    for (let row = from; row <= to; row++) {
      const v = row0V + row * stepV;
      const u = row0U + row * stepU;
      if (sweptSection(near, v, cut)) {
        const low = Math.ceil((cut[0] - u) / pitch);
        const high = Math.floor((cut[1] - u) / pitch);
        if (low <= high) {
          // Neighbouring chords block overlapping runs: one mark for both keeps arcs cheap.
          const last = latest[row];
          if (last >= 0 && low <= blockedTo[last] + 1 && high >= blockedFrom[last] - 1) {
            if (low < blockedFrom[last]) blockedFrom[last] = low;
            if (high > blockedTo[last]) blockedTo[last] = high;
          } else {
            latest[row] = blockedRow.length;
            blockedRow.push(row);
            blockedFrom.push(low);
            blockedTo.push(high);
          }
        }
      }
      if (touching && v >= met.least && v <= met.greatest && sweptSection(met, v, cut)) {
        const low = Math.ceil((cut[0] - u) / pitch);
        const high = Math.floor((cut[1] - u) / pitch);
        for (let place = low; place <= high; place++) {
          touchRow.push(row);
          touchAt.push(place);
          touchChord.push(n);
        }
      }
      if (v0 > v !== v1 > v) {
        crossingRow.push(row);
        crossingAt.push((u0 + ((v - v0) / (v1 - v0)) * (u1 - u0) - u) / pitch);
        crossingRise.push(rise);
      }
    }
  }
  const blocked = gathered(count, blockedRow, blockedFrom, blockedTo);
  const crossing = gathered(count, crossingRow, crossingAt, crossingRise);
  const touch = gathered(count, touchRow, touchAt, touchChord);
  return {
    blocked: { start: blocked.start, from: blocked.first, to: blocked.second },
    crossing: { start: crossing.start, at: crossing.first, rise: crossing.second },
    touch: { start: touch.start, at: touch.first, chord: touch.second },
  };
}
