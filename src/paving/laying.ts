import { pointTurned, rotation } from '@/geometry/rotation';
import { rectangleClip } from '@/geometry/rectangle';
import { rectangleCoverPart } from '@/geometry/rectangle-cover';
import { ringHolds } from '@/geometry/ring';
import type { Point } from '@/geometry/point';
import { AREA_TOLERANCE_MM2 } from '@/geometry/tolerance';
import { bondPattern, documentUnit } from './bond';
import { documentGround, type Ground } from './ground';
import type { Address, LayoutDocument, Unit } from './layout-document';
import { chordFrame, rowMarks } from './row-marks';
import { blockedRuns, insideRuns, runsParted, type Runs } from './row-runs';
import { addressRow, unitRows, type RowIndex, type UnitRows } from './unit-rows';
import { unitSetClosed, unitSetReserve, unitSetRoom, type UnitSetRoom } from './unit-set';

/** A unit of the motif with what drawing and measuring need worked out once. */
export interface LaidMotif {
  readonly unit: Unit;
  /** Centre in the pattern's frame, mm. */
  readonly at: Point;
  /** Turn of the unit on the ground: the placement's turn plus its own, degrees. */
  readonly turnDeg: number;
  /** Half the length along the unit's own x axis, on the ground: `[hx, hy]`, mm. */
  readonly halfLength: Point;
  /** Half the width along the unit's own y axis, on the ground: `[hx, hy]`, mm. */
  readonly halfWidth: Point;
}

/**
 * Many units as flat arrays, one entry a unit: address `[i, j, k]` and centre on the ground, mm.
 * In order of motif entry, then row, then place along the row.
 */
export interface UnitSet {
  readonly count: number;
  readonly i: Int32Array;
  readonly j: Int32Array;
  readonly k: Uint8Array;
  readonly x: Float64Array;
  readonly y: Float64Array;
}

/** A floor laid: every unit that the document's pattern puts on its ground. */
export interface Laying {
  readonly document: LayoutDocument;
  readonly ground: Ground;
  /** The pattern's lattice on the ground, turned, mm. */
  readonly lattice: { readonly a: Point; readonly b: Point };
  readonly origin: Point;
  /** The joint that edge gaps reckon with, mm. */
  readonly joint: number;
  readonly motif: readonly LaidMotif[];
  readonly laid: UnitSet;
  readonly leftOut: UnitSet;
  readonly lifted: UnitSet;
  readonly rows: UnitRows;
  readonly index: {
    readonly laid: RowIndex;
    readonly leftOut: RowIndex;
    readonly lifted: RowIndex;
  };
}

export type { Address };
export { unitAt, type UnitStatus } from './unit-at';

/** Corners of a unit of that motif entry whose centre is at (x, y): anticlockwise from its own lower left. */
export function unitCorners(motif: LaidMotif, x: number, y: number): [Point, Point, Point, Point] {
  const [lx, ly] = motif.halfLength;
  const [wx, wy] = motif.halfWidth;
  return [
    [x - lx - wx, y - ly - wy],
    [x + lx - wx, y + ly - wy],
    [x + lx + wx, y + ly + wy],
    [x - lx + wx, y - ly + wy],
  ];
}

/** Below this a sum of covers, mm², is rounding: the unit is all in or all out. */
const COVER_ROUNDING_MM2 = 1e-3;
/** Chords that come further than this into such a unit, mm, are slits; its middle alone will not tell. */
const SLIT_DEPTH_MM = 1e-3;

/** Area, mm², of the ground inside the unit of motif entry `entry` at (x, y), from the chords that meet it. */
function unitCover(
  ground: Ground,
  entry: LaidMotif,
  x: number,
  y: number,
  chords: Float64Array,
  from: number,
  to: number,
  centreInside: boolean,
): number {
  const hx = entry.unit.length / 2;
  const hy = entry.unit.width / 2;
  const ex = entry.halfLength[0] / hx;
  const ey = entry.halfLength[1] / hx;
  const { ax, ay, bx, by, side } = ground.chords;
  let sum = 0;
  let slit = false;
  for (let at = from; at < to; at++) {
    const n = chords[at];
    const x0 = (ax[n] - x) * ex + (ay[n] - y) * ey;
    const y0 = (ay[n] - y) * ex - (ax[n] - x) * ey;
    const x1 = (bx[n] - x) * ex + (by[n] - y) * ey;
    const y1 = (by[n] - y) * ex - (bx[n] - x) * ey;
    sum +=
      side[n] > 0
        ? rectangleCoverPart(hx, hy, x0, y0, x1, y1)
        : rectangleCoverPart(hx, hy, x1, y1, x0, y0);
    slit ||=
      hx > SLIT_DEPTH_MM &&
      hy > SLIT_DEPTH_MM &&
      rectangleClip(hx - SLIT_DEPTH_MM, hy - SLIT_DEPTH_MM, x0, y0, x1, y1) !== null;
  }
  const whole = 4 * hx * hy;
  if (sum > COVER_ROUNDING_MM2) return Math.min(whole, sum);
  if (sum < -COVER_ROUNDING_MM2) return Math.max(0, whole + sum);
  if (!slit) return centreInside ? whole : 0;
  // Two of three odd points decide where something thinner than its width divides the unit.
  const votes = [
    [0.37, 0.23],
    [-0.41, 0.31],
    [0.13, -0.47],
  ].filter(([s, t]) => {
    const point: Point = [x + s * hx * ex - t * hy * ey, y + s * hx * ey + t * hy * ex];
    return ground.rings.every((ring) => ringHolds(ring.outline, point) === (ring.ring === 0));
  });
  return votes.length >= 2 ? whole : 0;
}

/** True when a run holds the place; `at` is where the last search in this row ended. */
function runsHold(runs: Runs, place: number, at: { n: number }): boolean {
  while (at.n < runs.length && runs[at.n + 1] < place) at.n += 2;
  return at.n < runs.length && runs[at.n] <= place;
}

/** Lifted addresses by row number: places along the row. */
function liftedPlaces(document: LayoutDocument, rows: UnitRows): Map<number, Set<number>> {
  const byRow = new Map<number, Set<number>>();
  for (const [i, j, k] of document.lifted) {
    if (k < 0 || k >= rows.rows.length) continue;
    const { along, row } = addressRow(rows, i, j, k);
    if (row < 0 || row >= rows.rows[k].count) continue;
    const key = rows.rows[k].base + row;
    const places = byRow.get(key);
    if (places) places.add(along);
    else byRow.set(key, new Set([along]));
  }
  return byRow;
}

/** A document's pattern on its ground: the motif's units turned, their centres from the origin, mm, and their rows. */
export function patternRows(document: LayoutDocument, ground: Ground) {
  const pattern = bondPattern(document);
  const { origin, turn } = document.placement;
  const turned = rotation(turn);
  const lattice = { a: pointTurned(pattern.a, turned), b: pointTurned(pattern.b, turned) };
  const motif = pattern.motif.map((entry): LaidMotif => {
    const unit = documentUnit(document, entry.unit);
    const own = rotation(turn + entry.turn);
    return {
      unit,
      at: entry.at,
      turnDeg: turn + entry.turn,
      halfLength: pointTurned([unit.length / 2, 0], own),
      halfWidth: pointTurned([0, unit.width / 2], own),
    };
  });
  const centres = motif.map((entry) => pointTurned(entry.at, turned));
  const rows = unitRows(ground, lattice, origin, motif, centres);
  return { joint: pattern.joint, lattice, motif, centres, rows };
}

/**
 * Lays a valid document's floor. Work grows with the units laid and with the rows that each
 * chord of the boundary touches, never with units times chords: a unit away from the boundary
 * costs only its place in the arrays. `ground` may be handed in when it is worked out already.
 */
export function layFloor(
  document: LayoutDocument,
  ground: Ground = documentGround(document),
): Laying {
  const { origin } = document.placement;
  const { joint, lattice, motif, centres, rows } = patternRows(document, ground);
  const frame = chordFrame(ground, rows);
  const lifts = liftedPlaces(document, rows);
  const cell = Math.abs(lattice.a[0] * lattice.b[1] - lattice.a[1] * lattice.b[0]);
  const likely = Math.ceil((ground.area / cell) * motif.length * 1.02) + 64;
  const { basis } = rows;
  const alongIsI = basis.i.a === 1 && basis.i.b === 0;
  const laid = unitSetRoom(Math.max(64, Math.min(likely, 1 << 22)), alongIsI);
  const leftOut = unitSetRoom(256, alongIsI);
  const lifted = unitSetRoom(document.lifted.length > 0 ? 64 : 0, alongIsI);
  const laidStart = new Int32Array(rows.total + 1);
  const leftOutStart = new Int32Array(rows.total + 1);
  const liftedStart = new Int32Array(rows.total + 1);
  const inside: Runs = [];
  const blocked: Runs = [];
  const free: Runs = [];
  const held: Runs = [];
  const out: Runs = [];

  motif.forEach((entry, k) => {
    const marks = rowMarks(ground, rows, frame, k, document.clearance);
    const { touch } = marks;
    const kRows = rows.rows[k];
    const countsAlone = entry.unit.length * entry.unit.width > AREA_TOLERANCE_MM2;
    for (let row = 0; row < kRows.count; row++) {
      const number = kRows.base + row;
      laidStart[number] = laid.count;
      leftOutStart[number] = leftOut.count;
      liftedStart[number] = lifted.count;
      const n = kRows.first + row;
      const rowI = n * basis.i.b;
      const rowJ = n * basis.j.b;
      const rowX = origin[0] + (n * basis.b[0] + centres[k][0]);
      const rowY = origin[1] + (n * basis.b[1] + centres[k][1]);
      const put = (room: UnitSetRoom, from: number, to: number) => {
        unitSetReserve(room, to - from + 1);
        const { i, j, x, y, along } = room;
        const [ax, ay] = basis.a;
        const { a: stepI } = basis.i;
        const { a: stepJ } = basis.j;
        let { count } = room;
        for (let place = from; place <= to; place++, count++) {
          along[count] = place;
          i[count] = rowI + place * stepI;
          j[count] = rowJ + place * stepJ;
          x[count] = rowX + place * ax;
          y[count] = rowY + place * ay;
        }
        room.k.fill(k, room.count, count);
        room.count = count;
      };
      const touchFrom = touch.start[row];
      const touchTo = touch.start[row + 1];
      insideRuns(marks, row, inside);
      if (inside.length === 0 && touchFrom === touchTo) continue;
      blockedRuns(marks, row, blocked);
      runsParted(inside, blocked, free, held);

      // Laid: in the ground and clear of its edge, less what was lifted by hand.
      const lift = lifts.get(number);
      for (let r = 0; r < free.length; r += 2) {
        if (!lift) {
          put(laid, free[r], free[r + 1]);
          continue;
        }
        for (let place = free[r]; place <= free[r + 1]; place++) {
          put(lift.has(place) ? lifted : laid, place, place);
        }
      }

      // Left out: too near to the edge, or divided by it with more than a sliver in the ground.
      out.length = 0;
      const freeAt = { n: 0 };
      const insideAt = { n: 0 };
      const heldAt = { n: 0 };
      for (let at = touchFrom; at < touchTo;) {
        const place = touch.at[at];
        let next = at + 1;
        while (next < touchTo && touch.at[next] === place) next++;
        if (!runsHold(free, place, freeAt)) {
          const x = rowX + place * basis.a[0];
          const y = rowY + place * basis.a[1];
          const centreInside = runsHold(inside, place, insideAt);
          const cover = unitCover(ground, entry, x, y, touch.chord, at, next, centreInside);
          const counted = runsHold(held, place, heldAt);
          if (cover > AREA_TOLERANCE_MM2 !== (counted && countsAlone)) out.push(place);
        }
        at = next;
      }
      outRuns(countsAlone ? held : [], out, (from, to) => put(leftOut, from, to));
    }
  });
  laidStart[rows.total] = laid.count;
  leftOutStart[rows.total] = leftOut.count;
  liftedStart[rows.total] = lifted.count;
  const laidClosed = unitSetClosed(laid);
  const leftOutClosed = unitSetClosed(leftOut);
  const liftedClosed = unitSetClosed(lifted);
  return {
    document,
    ground,
    lattice,
    origin,
    joint,
    motif,
    laid: laidClosed.set,
    leftOut: leftOutClosed.set,
    lifted: liftedClosed.set,
    rows,
    index: {
      laid: { rowStart: laidStart, along: laidClosed.along },
      leftOut: { rowStart: leftOutStart, along: leftOutClosed.along },
      lifted: { rowStart: liftedStart, along: liftedClosed.along },
    },
  };
}

/**
 * Hands out, in order, the places of `runs` with each place of `changed` put the other way: one
 * that is in a run is left out of it, one that is not stands on its own.
 */
function outRuns(runs: Runs, changed: Runs, put: (from: number, to: number) => void): void {
  let m = 0;
  const alone = (before: number) => {
    for (; m < changed.length && changed[m] < before; m++) put(changed[m], changed[m]);
  };
  for (let n = 0; n < runs.length; n += 2) {
    let from = runs[n];
    const to = runs[n + 1];
    alone(from);
    for (; m < changed.length && changed[m] <= to; m++) {
      if (from < changed[m]) put(from, changed[m] - 1);
      from = changed[m] + 1;
    }
    if (from <= to) put(from, to);
  }
  alone(Infinity);
}
