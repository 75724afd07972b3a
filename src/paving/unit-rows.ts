import { latticeRows, type LatticeBasis } from '@/geometry/lattice';
import type { Point } from '@/geometry/point';
import type { Ground } from './ground';
import type { LaidMotif } from './laying';

/**
 * The floor as rows of units. Each row runs along `basis.a`; in the rows' frame u runs along
 * them and v square to them, from `from`. The units of motif entry k have their rows numbered
 * from 0 to `rows[k].count`, and row r of k is number `rows[k].base + r` among all.
 */
export interface UnitRows {
  readonly basis: LatticeBasis;
  readonly from: Point;
  /** Direction of the rows on the ground, a unit vector. */
  readonly direction: Point;
  /** From one unit to the next along a row, mm. */
  readonly pitch: number;
  /** From one row to the next: along u and along v, mm. */
  readonly step: Point;
  readonly total: number;
  readonly rows: readonly {
    readonly base: number;
    readonly count: number;
    /** Lattice number of row 0 along `basis.b`. */
    readonly first: number;
    /** Centre of unit 0 of lattice row 0, in the rows' frame. */
    readonly start: Point;
    /** Half length and half width of the unit as vectors of the rows' frame. */
    readonly halfLength: Point;
    readonly halfWidth: Point;
  }[];
}

/** The rows that any unit touching the ground can stand in. */
export function unitRows(
  ground: Ground,
  lattice: { a: Point; b: Point },
  origin: Point,
  motif: readonly LaidMotif[],
  centres: readonly Point[],
): UnitRows {
  const basis = latticeRows(lattice);
  const pitch = Math.hypot(basis.a[0], basis.a[1]);
  const direction: Point = [basis.a[0] / pitch, basis.a[1] / pitch];
  const turned = ([x, y]: Point): Point => [
    x * direction[0] + y * direction[1],
    y * direction[0] - x * direction[1],
  ];
  const from: Point = [ground.chords.ax[0], ground.chords.ay[0]];
  const step = turned(basis.b);
  let least = Infinity;
  let greatest = -Infinity;
  for (let n = 0; n < ground.chords.count; n++) {
    if (ground.chords.side[n] < 0) break;
    const v = turned([ground.chords.ax[n] - from[0], ground.chords.ay[n] - from[1]])[1];
    least = Math.min(least, v);
    greatest = Math.max(greatest, v);
  }
  let total = 0;
  const rows = motif.map((entry, k) => {
    const halfLength = turned(entry.halfLength);
    const halfWidth = turned(entry.halfWidth);
    const reach = Math.abs(halfLength[1]) + Math.abs(halfWidth[1]);
    const start = turned([
      origin[0] - from[0] + centres[k][0],
      origin[1] - from[1] + centres[k][1],
    ]);
    const first = Math.ceil((least - reach - start[1]) / step[1]);
    const last = Math.floor((greatest + reach - start[1]) / step[1]);
    const count = Math.max(0, last - first + 1);
    const base = total;
    total += count;
    return { base, count, first, start, halfLength, halfWidth };
  });
  return { basis, from, direction, pitch, step, total, rows };
}

/** Row and place along it of the unit with address (i, j) and motif entry k; the row may not exist. */
export function addressRow({ basis, rows }: UnitRows, i: number, j: number, k: number) {
  const cell = basis.i.a * basis.j.b - basis.i.b * basis.j.a;
  const along = (i * basis.j.b - j * basis.i.b) / cell;
  const lattice = (j * basis.i.a - i * basis.j.a) / cell;
  return { along, row: lattice - rows[k].first };
}

/** For each row, where its units begin in a unit set; within a row they are in order along it. */
export interface RowIndex {
  readonly rowStart: Int32Array;
  readonly along: Int32Array;
}

/** First unit of the row, in the set that the index is of, whose place is at least `along`. */
export function rowSearch(index: RowIndex, row: number, along: number): number {
  let low = index.rowStart[row];
  let high = index.rowStart[row + 1];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (index.along[middle] < along) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Position of the unit with that address in the set that the index is of, or −1. */
export function unitFind(
  unitRowsOf: UnitRows,
  index: RowIndex,
  [i, j, k]: readonly [number, number, number],
): number {
  if (k < 0 || k >= unitRowsOf.rows.length) return -1;
  const { along, row } = addressRow(unitRowsOf, i, j, k);
  if (row < 0 || row >= unitRowsOf.rows[k].count) return -1;
  const all = unitRowsOf.rows[k].base + row;
  const at = rowSearch(index, all, along);
  return at < index.rowStart[all + 1] && index.along[at] === along ? at : -1;
}
