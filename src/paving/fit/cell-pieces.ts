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
  /** Straight pieces of one direction are a family; −1 for arcs. */
  readonly family: Int32Array;
  /** Height of a straight piece along its family's normal, mm. */
  readonly height: Float64Array;
  /** How many units the piece belongs to, with the sign of the step in count as height grows. */
  readonly step: Int32Array;
  /** Units of piece n: `units[unitStart[n] … unitStart[n + 1] − 1]`, in order. */
  readonly unitStart: Int32Array;
  readonly units: Float64Array;
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
    const across = (y: number) =>
      pieceCrossing(y, x0, y0, x1, y1, b.cx[n], b.cy[n], b.radius[n]) - j * shift;
    const xa = first ? x0 - j * shift : across(yAtA);
    const xb = last ? x1 - j * shift : across(yAtB);
    const right = xb >= xa;
    const west = Math.floor(Math.min(xa, xb) / pitch);
    const east = Math.floor(Math.max(xa, xb) / pitch);
    for (let column = 0; column <= east - west; column++) {
      const i = right ? west + column : east - column;
      const begin = column === 0;
      const end = column === east - west;
      const xFrom = begin ? xa - i * pitch : right ? 0 : pitch;
      const xTo = end ? xb - i * pitch : right ? pitch : 0;
      const at = (x: number) => yAtX(x + i * pitch + j * shift, b, n) - j * rise;
      const yFrom = begin ? ya : Math.max(0, Math.min(rise, at(right ? 0 : pitch)));
      const yTo = end ? yb : Math.max(0, Math.min(rise, at(right ? pitch : 0)));
      if (xFrom === xTo && yFrom === yTo) continue;
      put(xFrom, yFrom, xTo, yTo, i, j);
    }
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
      for (const [x, y] of [
        [b.x0[n], b.y0[n]],
        [b.x1[n], b.y1[n]],
      ]) {
        const j = Math.floor(y / rise);
        left = Math.min(left, (x - j * shift) / pitch);
        right = Math.max(right, (x - j * shift) / pitch);
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
  clear.forEach((b, k) => {
    for (let n = 0; n < b.count; n++) {
      const f = families.of[k][n];
      const nx = f < 0 ? 0 : families.nx[f];
      const ny = f < 0 ? 0 : families.ny[f];
      const rises = (b.x1[n] - b.x0[n]) * -ny + (b.y1[n] - b.y0[n]) * nx < 0;
      cutPiece(b, n, frame, (x0, y0, x1, y1, i, j) => {
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
        sign.push(rises ? 1 : -1);
      });
    }
  });
  const order = Array.from({ length: radius.length }, (_, n) => n).sort(
    (m, n) =>
      family[m] - family[n] ||
      height[m] - height[n] ||
      cut.x0[m] - cut.x0[n] ||
      cut.y0[m] - cut.y0[n],
  );
  const same = (m: number, n: number) =>
    family[m] === family[n] &&
    sign[m] === sign[n] &&
    radius[m] === radius[n] &&
    Math.abs(cut.x0[m] - cut.x0[n]) < SAME_PLACE_MM &&
    Math.abs(cut.y0[m] - cut.y0[n]) < SAME_PLACE_MM &&
    Math.abs(cut.x1[m] - cut.x1[n]) < SAME_PLACE_MM &&
    Math.abs(cut.y1[m] - cut.y1[n]) < SAME_PLACE_MM;
  // Among those at nearly the same height, pieces that lie on one another are one.
  const kept: number[] = [];
  const owners: number[][] = [];
  for (const n of order) {
    let twin = -1;
    for (let m = kept.length - 1; m >= 0 && m >= kept.length - 40; m--) {
      const other = kept[m];
      if (family[other] !== family[n]) break;
      if (family[n] >= 0 && height[n] - height[other] > SAME_PLACE_MM) break;
      if (same(other, n)) {
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
  const units: number[] = [];
  owners.forEach((own, n) => {
    own.sort((p, q) => p - q);
    units.push(...own);
    unitStart[n + 1] = units.length;
  });
  return {
    count,
    x0: Float64Array.from(kept, (n) => cut.x0[n]),
    y0: Float64Array.from(kept, (n) => cut.y0[n]),
    x1: Float64Array.from(kept, (n) => cut.x1[n]),
    y1: Float64Array.from(kept, (n) => cut.y1[n]),
    cx: Float64Array.from(kept, (n) => cx[n]),
    cy: Float64Array.from(kept, (n) => cy[n]),
    radius: Float64Array.from(kept, (n) => radius[n]),
    family: Int32Array.from(kept, (n) => family[n]),
    height: Float64Array.from(kept, (n) => height[n]),
    step: Int32Array.from(kept, (n, m) => sign[n] * owners[m].length),
    unitStart,
    units: Float64Array.from(units),
    families: { nx: families.nx, ny: families.ny },
    unitStep: { along: 1, up: columns },
  };
}
