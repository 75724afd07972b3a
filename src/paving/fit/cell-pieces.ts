import type { ClearBoundary } from '@/geometry/clear-region';
import { pieceCrossing } from './count';
import type { FitFrame } from './fit-frame';

/**
 * The boundaries of all units' regions folded into one cell of the lattice, 0 ≤ u ≤ pitch and
 * 0 ≤ v ≤ rise, and cut where they leave it. An origin on the left of a piece has the piece's units
 * whole, as far as that piece goes; on its right it has not. Sorted by family, then by height.
 */
export interface CellPieces {
  readonly count: number;
  readonly x0: Float64Array;
  readonly y0: Float64Array;
  readonly x1: Float64Array;
  readonly y1: Float64Array;
  /** Centre and radius of an arc within one quarter, clockwise; radius 0 for a straight piece. */
  readonly cx: Float64Array;
  readonly cy: Float64Array;
  readonly radius: Float64Array;
  /** Unit vector along a straight piece, and its length, mm; 0 for an arc. */
  readonly ux: Float64Array;
  readonly uy: Float64Array;
  readonly length: Float64Array;
  /** Straight pieces of one direction are a family; −1 for arcs. */
  readonly family: Int32Array;
  /** Height of a straight piece along its family's normal, mm. */
  readonly height: Float64Array;
  /** How many units the piece belongs to, with the sign of the step in count as height grows. */
  readonly step: Int32Array;
  /** Units of piece n: `units[unitStart[n] … unitStart[n + 1] − 1]`, in order. */
  readonly unitStart: Int32Array;
  readonly units: Float64Array;
  /** What each of a piece's units adds to the one before; 0 where that differs or there is but one. */
  readonly stride: Float64Array;
  readonly families: { readonly nx: Float64Array; readonly ny: Float64Array };
  /** What one step along the row, and one row up, add to a unit's number. */
  readonly unitStep: { readonly along: number; readonly up: number };
}

/** Directions nearer than this, radians, are one: on a cell of metres they part by 10⁻⁷ mm. */
const SAME_DIRECTION_RAD = 1e-10;
/** Pieces of different units that lie within this of each other, mm, all along are one piece of both. */
const SAME_PLACE_MM = 1e-7;

function familiesOf(clear: readonly ClearBoundary[]) {
  const angles: number[] = [];
  const place: [number, number][] = [];
  clear.forEach((boundary, k) => {
    for (let n = 0; n < boundary.count; n++) {
      if (boundary.radius[n] > 0) continue;
      let angle = Math.atan2(boundary.y1[n] - boundary.y0[n], boundary.x1[n] - boundary.x0[n]);
      if (angle < 0) angle += Math.PI;
      if (angle > Math.PI - SAME_DIRECTION_RAD) angle -= Math.PI;
      angles.push(angle);
      place.push([k, n]);
    }
  });
  const order = angles.map((_, n) => n).sort((m, n) => angles[m] - angles[n]);
  const of = clear.map((boundary) => new Int32Array(boundary.count).fill(-1));
  const nx: number[] = [];
  const ny: number[] = [];
  let last = -Infinity;
  for (const n of order) {
    if (angles[n] - last > SAME_DIRECTION_RAD) {
      const [k, at] = place[n];
      const dx = clear[k].x1[at] - clear[k].x0[at];
      const dy = clear[k].y1[at] - clear[k].y0[at];
      const size = Math.hypot(dx, dy) * (Math.abs(Math.atan2(dy, dx) - angles[n]) < 1 ? 1 : -1);
      nx.push(-dy / size);
      ny.push(dx / size);
      last = angles[n];
    }
    of[place[n][0]][place[n][1]] = nx.length - 1;
  }
  return { of, nx: Float64Array.from(nx), ny: Float64Array.from(ny) };
}

/** Growing arrays of pieces cut to the cell. */
interface Cut {
  x0: number[];
  y0: number[];
  x1: number[];
  y1: number[];
  from: number[];
  unit: number[];
}

function yAtX(x: number, b: ClearBoundary, n: number): number {
  if (b.radius[n] === 0) {
    return b.y0[n] + ((x - b.x0[n]) / (b.x1[n] - b.x0[n])) * (b.y1[n] - b.y0[n]);
  }
  const away = x - b.cx[n];
  const reach = Math.sqrt(Math.max(0, b.radius[n] * b.radius[n] - away * away));
  return (b.y0[n] + b.y1[n]) / 2 >= b.cy[n] ? b.cy[n] + reach : b.cy[n] - reach;
}

function yInRow(x: number, b: ClearBoundary, n: number, j: number, rise: number): number {
  return Math.max(0, Math.min(rise, yAtX(x, b, n) - j * rise));
}

/** Cuts one boundary piece at the cell's rows and columns; what is put is in the cell. */
function cutPiece(
  b: ClearBoundary,
  n: number,
  { pitch, rise, shift }: FitFrame,
  put: (x0: number, y0: number, x1: number, y1: number, i: number, j: number) => void,
): void {
  const x0 = b.x0[n];
  const y0 = b.y0[n];
  const x1 = b.x1[n];
  const y1 = b.y1[n];
  const up = y1 >= y0;
  const low = Math.floor(Math.min(y0, y1) / rise);
  const high = Math.floor(Math.max(y0, y1) / rise);
  for (let count = 0; count <= high - low; count++) {
    const j = up ? low + count : high - count;
    const first = count === 0;
    const last = count === high - low;
    // The stretch in this row, in the row's own coordinates.
    const ya = first ? y0 - j * rise : up ? 0 : rise;
    const yb = last ? y1 - j * rise : up ? rise : 0;
    const yAtA = (up ? j : j + 1) * rise;
    const yAtB = (up ? j + 1 : j) * rise;
    const xa =
      (first ? x0 : pieceCrossing(yAtA, x0, y0, x1, y1, b.cx[n], b.cy[n], b.radius[n])) - j * shift;
    const xb =
      (last ? x1 : pieceCrossing(yAtB, x0, y0, x1, y1, b.cx[n], b.cy[n], b.radius[n])) - j * shift;
    const right = xb >= xa;
    const west = Math.floor(Math.min(xa, xb) / pitch);
    const east = Math.floor(Math.max(xa, xb) / pitch);
    for (let column = 0; column <= east - west; column++) {
      const i = right ? west + column : east - column;
      const begin = column === 0;
      const end = column === east - west;
      const xFrom = begin ? xa - i * pitch : right ? 0 : pitch;
      const xTo = end ? xb - i * pitch : right ? pitch : 0;
      const x = i * pitch + j * shift;
      const yFrom = begin ? ya : yInRow(x + (right ? 0 : pitch), b, n, j, rise);
      const yTo = end ? yb : yInRow(x + (right ? pitch : 0), b, n, j, rise);
      if (xFrom === xTo && yFrom === yTo) continue;
      put(xFrom, yFrom, xTo, yTo, i, j);
    }
  }
}

/** Pieces of a family that fall into one of so many equal steps of height as there are of them are put in order one by one, up to this many. */
const FEW_TOGETHER = 16;

/**
 * Numbers of the pieces, arcs first, then family by family, each by height; those at one height as `before`
 * tells, or in the order that they came in. Heights spread over a cell, so that nearly all fall into
 * place without being compared.
 */
export function familyOrder(
  family: ArrayLike<number>,
  families: number,
  height: ArrayLike<number>,
  before: (m: number, n: number) => number = () => 0,
): Int32Array {
  const start = new Int32Array(families + 2);
  for (let n = 0; n < family.length; n++) start[family[n] + 2]++;
  for (let f = 0; f <= families; f++) start[f + 1] += start[f];
  const order = new Int32Array(family.length);
  for (let n = 0; n < family.length; n++) order[start[family[n] + 1]++] = n;
  const sooner = (m: number, n: number) => height[m] - height[n] || before(m, n) || m - n;
  // Filling moved each start on to the next.
  for (let f = 0; f <= families; f++) {
    const from = f === 0 ? 0 : start[f - 1];
    orderedByHeight(order.subarray(from, start[f]), height, sooner);
  }
  return order;
}

function orderedByHeight(
  list: Int32Array,
  height: ArrayLike<number>,
  sooner: (m: number, n: number) => number,
): void {
  const size = list.length;
  let low = Infinity;
  let high = -Infinity;
  for (let m = 0; m < size; m++) {
    low = Math.min(low, height[list[m]]);
    high = Math.max(high, height[list[m]]);
  }
  const perMm = high > low && size > FEW_TOGETHER ? (size - 1) / (high - low) : 0;
  if (perMm === 0) {
    oneByOne(list, 0, size, sooner);
    return;
  }
  const stepOf = (n: number) => Math.floor((height[n] - low) * perMm);
  const start = new Int32Array(size + 1);
  for (let m = 0; m < size; m++) start[stepOf(list[m]) + 1]++;
  for (let m = 0; m < size; m++) start[m + 1] += start[m];
  const given = list.slice();
  const next = start.slice();
  for (let m = 0; m < size; m++) list[next[stepOf(given[m])]++] = given[m];
  for (let m = 0; m < size; m++) {
    if (start[m + 1] - start[m] > 1) oneByOne(list, start[m], start[m + 1], sooner);
  }
}

function oneByOne(
  list: Int32Array,
  from: number,
  to: number,
  sooner: (m: number, n: number) => number,
): void {
  if (to - from > FEW_TOGETHER) {
    list.subarray(from, to).sort(sooner);
    return;
  }
  for (let m = from + 1; m < to; m++) {
    const n = list[m];
    let place = m;
    for (; place > from && sooner(list[place - 1], n) > 0; place--) list[place] = list[place - 1];
    list[place] = n;
  }
}

/** The boundaries of a frame's regions in one cell. */
export function cellPieces(frame: FitFrame): CellPieces {
  const { clear, pitch, rise, shift } = frame;
  const families = familiesOf(clear);
  let left = Infinity;
  let right = -Infinity;
  let low = Infinity;
  let high = -Infinity;
  for (const b of clear) {
    for (let n = 0; n < b.count; n++) {
      for (let end = 0; end < 2; end++) {
        const j = Math.floor((end === 0 ? b.y0[n] : b.y1[n]) / rise);
        const along = ((end === 0 ? b.x0[n] : b.x1[n]) - j * shift) / pitch;
        left = Math.min(left, along);
        right = Math.max(right, along);
        low = Math.min(low, j);
        high = Math.max(high, j);
      }
    }
  }
  // Room for the neighbours of every unit that has a boundary, so that no two share a number.
  const columns = Number.isFinite(left) ? Math.ceil(right - left) + 12 : 1;
  const rows = Number.isFinite(low) ? high - low + 12 : 1;
  const firstI = Number.isFinite(left) ? Math.floor(left) - 6 : 0;
  const firstJ = Number.isFinite(low) ? low - 6 : 0;
  const cut: Cut = { x0: [], y0: [], x1: [], y1: [], from: [], unit: [] };
  const radius: number[] = [];
  const cx: number[] = [];
  const cy: number[] = [];
  const family: number[] = [];
  const height: number[] = [];
  const sign: number[] = [];
  let b = clear[0];
  let k = 0;
  let n = 0;
  let f = -1;
  let nx = 0;
  let ny = 0;
  let rises = 1;
  const put = (x0: number, y0: number, x1: number, y1: number, i: number, j: number) => {
    cut.x0.push(x0);
    cut.y0.push(y0);
    cut.x1.push(x1);
    cut.y1.push(y1);
    cut.unit.push((k * rows + (j - firstJ)) * columns + (i - firstI));
    radius.push(b.radius[n]);
    cx.push(b.cx[n] - i * pitch - j * shift);
    cy.push(b.cy[n] - j * rise);
    family.push(f);
    height.push(((x0 + x1) / 2) * nx + ((y0 + y1) / 2) * ny);
    sign.push(rises);
  };
  for (k = 0; k < clear.length; k++) {
    b = clear[k];
    for (n = 0; n < b.count; n++) {
      f = families.of[k][n];
      nx = f < 0 ? 0 : families.nx[f];
      ny = f < 0 ? 0 : families.ny[f];
      rises = (b.x1[n] - b.x0[n]) * -ny + (b.y1[n] - b.y0[n]) * nx < 0 ? 1 : -1;
      cutPiece(b, n, frame, put);
    }
  }
  const before = (m: number, n: number) => cut.x0[m] - cut.x0[n] || cut.y0[m] - cut.y0[n];
  const order = familyOrder(family, families.nx.length, height, before);
  // Among those at nearly the same height, pieces that lie on one another are one.
  const kept: number[] = [];
  const owners: number[][] = [];
  for (const n of order) {
    let twin = -1;
    for (let m = kept.length - 1; m >= 0 && m >= kept.length - 40; m--) {
      const other = kept[m];
      if (family[other] !== family[n]) break;
      if (family[n] >= 0 && height[n] - height[other] > SAME_PLACE_MM) break;
      if (
        sign[other] === sign[n] &&
        radius[other] === radius[n] &&
        Math.abs(cut.x0[other] - cut.x0[n]) < SAME_PLACE_MM &&
        Math.abs(cut.y0[other] - cut.y0[n]) < SAME_PLACE_MM &&
        Math.abs(cut.x1[other] - cut.x1[n]) < SAME_PLACE_MM &&
        Math.abs(cut.y1[other] - cut.y1[n]) < SAME_PLACE_MM
      ) {
        twin = m;
        break;
      }
    }
    if (twin < 0) {
      kept.push(n);
      owners.push([cut.unit[n]]);
    } else {
      owners[twin].push(cut.unit[n]);
    }
  }
  const count = kept.length;
  const unitStart = new Int32Array(count + 1);
  const units = new Float64Array(cut.unit.length);
  const stride = new Float64Array(count);
  for (let n = 0; n < count; n++) {
    const own = owners[n];
    const from = unitStart[n];
    for (let at = 0; at < own.length; at++) units[from + at] = own[at];
    unitStart[n + 1] = from + own.length;
    if (own.length < 2) continue;
    units.subarray(from, from + own.length).sort();
    const by = units[from + 1] - units[from];
    let at = from + 2;
    while (at < from + own.length && units[at] - units[at - 1] === by) at++;
    if (at === from + own.length) stride[n] = by;
  }
  const pieces = {
    count,
    x0: new Float64Array(count),
    y0: new Float64Array(count),
    x1: new Float64Array(count),
    y1: new Float64Array(count),
    cx: new Float64Array(count),
    cy: new Float64Array(count),
    radius: new Float64Array(count),
    ux: new Float64Array(count),
    uy: new Float64Array(count),
    length: new Float64Array(count),
    family: new Int32Array(count),
    height: new Float64Array(count),
    step: new Int32Array(count),
  };
  for (let m = 0; m < count; m++) {
    const n = kept[m];
    pieces.x0[m] = cut.x0[n];
    pieces.y0[m] = cut.y0[n];
    pieces.x1[m] = cut.x1[n];
    pieces.y1[m] = cut.y1[n];
    pieces.cx[m] = cx[n];
    pieces.cy[m] = cy[n];
    pieces.radius[m] = radius[n];
    if (radius[n] === 0) {
      const ex = cut.x1[n] - cut.x0[n];
      const ey = cut.y1[n] - cut.y0[n];
      const length = Math.sqrt(ex * ex + ey * ey);
      pieces.ux[m] = ex / length;
      pieces.uy[m] = ey / length;
      pieces.length[m] = length;
    }
    pieces.family[m] = family[n];
    pieces.height[m] = height[n];
    pieces.step[m] = sign[n] * owners[m].length;
  }
  return {
    ...pieces,
    unitStart,
    units,
    stride,
    families: { nx: families.nx, ny: families.ny },
    unitStep: { along: 1, up: columns },
  };
}
