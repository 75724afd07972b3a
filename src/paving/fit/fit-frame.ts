import { clearBoundary, type BoundaryChords, type ClearBoundary } from '@/geometry/clear-region';
import { latticeReduced, type LatticeBasis } from '@/geometry/lattice';
import type { Point } from '@/geometry/point';
import { pointTurned, rotation } from '@/geometry/rotation';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import { bondPattern, documentUnit } from '../bond';
import { documentGround, type Ground } from '../ground';
import type { LayoutDocument } from '../layout-document';

/**
 * Regions are drawn in by this much more than the clearance asks, mm, and by up to twice as much
 * chord by chord: what doubles lose on a floor 100 km from the origin (some 10⁻⁷ mm) then never
 * makes a start look better than it is, and boundaries that would coincide lie apart. A start that
 * holds its count only within this distance is not found, and could not be set out.
 */
export const FIT_MARGIN_MM = 1e-6;

/**
 * A floor at one turn, made ready for the fit. Everything is in the frame of the lattice's shortest
 * basis: u along `a` and v square to it, mm, from the first corner of the perimeter.
 */
export interface FitFrame {
  readonly document: LayoutDocument;
  readonly ground: Ground;
  readonly turn: number;
  /** The lattice's shortest basis on the ground. */
  readonly basis: LatticeBasis;
  readonly from: Point;
  readonly direction: Point;
  /** From one unit to the next along a row; from one row to the next; how far each row is shifted, mm. */
  readonly pitch: number;
  readonly rise: number;
  readonly shift: number;
  /** The ground's chords in the frame. */
  readonly chords: BoundaryChords;
  /** For each motif entry, half its length and its width as vectors, and where its centre stands from the origin. */
  readonly entries: readonly {
    readonly lx: number;
    readonly ly: number;
    readonly wx: number;
    readonly wy: number;
    readonly atU: number;
    readonly atV: number;
  }[];
  /** For each motif entry, the boundary of where its units' centres may be, moved by −at: where origins may be. */
  readonly clear: readonly ClearBoundary[];
}

/** A number from 0 up to 1 for each chord: the same each time, and unlike its neighbours'. */
function chordShare(n: number): number {
  return ((n + 1) * 0.6180339887498949) % 1;
}

/** Point of the frame for a point on the ground. */
export function frameFromGround(
  { from, direction }: Pick<FitFrame, 'from' | 'direction'>,
  [x, y]: Point,
): Point {
  const dx = x - from[0];
  const dy = y - from[1];
  return [dx * direction[0] + dy * direction[1], dy * direction[0] - dx * direction[1]];
}

/** Point on the ground for a point of the frame. */
export function groundFromFrame({ from, direction }: FitFrame, [u, v]: Point): Point {
  return [
    from[0] + u * direction[0] - v * direction[1],
    from[1] + v * direction[0] + u * direction[1],
  ];
}

/** The same origin in the cell, 0 ≤ u < pitch and 0 ≤ v < rise. */
export function cellPoint(
  { pitch, rise, shift }: Pick<FitFrame, 'pitch' | 'rise' | 'shift'>,
  [u, v]: Point,
): [number, number] {
  const j = Math.floor(v / rise);
  const x = u - j * shift;
  const inU = x - Math.floor(x / pitch) * pitch;
  const inV = v - j * rise;
  // A hair below 0 rounds to the far side, which is outside the cell and the same as 0.
  return [inU < pitch ? inU : 0, inV < rise ? inV : 0];
}

/** The frame without its regions, which cost the most: enough to tell which way units and edges lie. */
export function holdFrame(
  document: LayoutDocument,
  turn: number,
  ground: Ground,
): Omit<FitFrame, 'clear'> {
  const pattern = bondPattern(document);
  const turned = rotation(turn);
  const basis = latticeReduced({
    a: pointTurned(pattern.a, turned),
    b: pointTurned(pattern.b, turned),
  });
  const pitch = Math.hypot(basis.a[0], basis.a[1]);
  const direction: Point = [basis.a[0] / pitch, basis.a[1] / pitch];
  const [dx, dy] = direction;
  const into = ([x, y]: Point): Point => [x * dx + y * dy, y * dx - x * dy];
  const from: Point = [ground.chords.ax[0], ground.chords.ay[0]];
  const { count, side } = ground.chords;
  const chords = {
    count,
    ax: new Float64Array(count),
    ay: new Float64Array(count),
    bx: new Float64Array(count),
    by: new Float64Array(count),
    side,
  };
  for (let n = 0; n < count; n++) {
    [chords.ax[n], chords.ay[n]] = into([
      ground.chords.ax[n] - from[0],
      ground.chords.ay[n] - from[1],
    ]);
    [chords.bx[n], chords.by[n]] = into([
      ground.chords.bx[n] - from[0],
      ground.chords.by[n] - from[1],
    ]);
  }
  const entries = pattern.motif.map((entry) => {
    const unit = documentUnit(document, entry.unit);
    // The frame is turned with the pattern; a right angle stays exact.
    const own = rotation(turn + entry.turn);
    const [lx, ly] = into(pointTurned([unit.length / 2, 0], own));
    const [wx, wy] = into(pointTurned([0, unit.width / 2], own));
    const [atU, atV] = into(pointTurned(entry.at, turned));
    return { lx, ly, wx, wy, atU, atV };
  });
  const [shift, rise] = into(basis.b);
  return {
    document,
    ground,
    turn,
    basis,
    from,
    direction,
    pitch,
    rise,
    shift,
    chords,
    entries,
  };
}

/** Makes a valid document's floor ready for the fit at `turn`. */
export function fitFrame(
  document: LayoutDocument,
  turn: number = document.placement.turn,
  ground: Ground = documentGround(document),
): FitFrame {
  const frame = holdFrame(document, turn, ground);
  const { chords, entries } = frame;
  const least = document.clearance - LENGTH_TOLERANCE_MM;
  const margin = (n: number) => FIT_MARGIN_MM * (1 + chordShare(n));
  const reach = (n: number) => Math.max(0, least + margin(n));
  const grow = (n: number) => Math.min(0, least + margin(n));
  const shapes = new Map<string, ClearBoundary>();
  const clear = entries.map((entry) => {
    const key = [entry.lx, entry.ly, entry.wx, entry.wy].map((half) => half.toFixed(9)).join();
    let shape = shapes.get(key);
    if (!shape) {
      shape = clearBoundary(chords, entry, reach, grow);
      shapes.set(key, shape);
    }
    return boundaryMoved(shape, -entry.atU, -entry.atV);
  });
  return { ...frame, clear };
}

function boundaryMoved(boundary: ClearBoundary, du: number, dv: number): ClearBoundary {
  const moved = (values: Float64Array, by: number) => values.map((value) => value + by);
  return {
    count: boundary.count,
    x0: moved(boundary.x0, du),
    y0: moved(boundary.y0, dv),
    x1: moved(boundary.x1, du),
    y1: moved(boundary.y1, dv),
    cx: moved(boundary.cx, du),
    cy: moved(boundary.cy, dv),
    radius: boundary.radius,
  };
}
