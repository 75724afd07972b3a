import { convexHull } from '@/geometry/convex-hull';
import type { Point } from '@/geometry/point';
import { ringArea } from '@/geometry/ring';
import type { LaidMotif } from '../laying';
import type { CutPiece } from './cut-pieces';
import { sawnEdges, type SawCuts } from './saw-cuts';

/** Sides of a unit in its own frame, in order: that x grows to, that y grows to, and those across. */
export type Side = 0 | 1 | 2 | 3;

/** Corners nearer to a side of the unit than this, mm, are on it; shapes are told apart by as much. */
export const SHAPE_GRID_MM = 0.01;

/** A way for a piece to lie in the unit that it is sawn from: its hull there. */
export type Place = readonly Point[];

/** A piece as it is sawn: its hull in its unit's own frame, the unit's middle at (0, 0). */
export interface PieceShape {
  /** Half the unit's length and width, mm. */
  readonly half: Point;
  /** The same for pieces alike to a hundredth of a millimetre. */
  readonly key: string;
  /** mm². */
  readonly hullArea: number;
  /** Every way that is tried; for a piece that is not `loose` every way that there is. */
  readonly places: readonly Place[];
  /** Its factory edges leave it free to slide along the unit's sides. */
  readonly loose: boolean;
  /** Shares of a unit that it takes wherever it lies, each 0 to 1: of area, of corners and of factory edges. */
  readonly shares: readonly [area: number, corners: number, edges: number];
  /** For each side of a place, from its corner of that number on, whether it is sawn in one straight cut. */
  readonly sawnSides: readonly boolean[];
  /** What is left to saw along its own outline: curves and notches. */
  readonly bent: SawCuts;
}

/** A piece's ring in its unit's own frame, corners on a side of the unit put exactly there. */
export function ownRing(
  { unit, halfLength }: LaidMotif,
  [cx, cy]: Point,
  ring: readonly Point[],
): Point[] {
  const [hx, hy] = [unit.length / 2, unit.width / 2];
  const [ex, ey] = [halfLength[0] / hx, halfLength[1] / hx];
  const snapped = (value: number, half: number) => {
    if (Math.abs(value - half) < SHAPE_GRID_MM) return half;
    if (Math.abs(value + half) < SHAPE_GRID_MM) return -half;
    return Math.round(value / SHAPE_GRID_MM) * SHAPE_GRID_MM;
  };
  return ring.map(([x, y]): Point => {
    const [dx, dy] = [x - cx, y - cy];
    return [snapped(dx * ex + dy * ey, hx), snapped(dy * ex - dx * ey, hy)];
  });
}

/** The unit's side that an edge lies along, or null where it is sawn. */
export function factorySide([ax, ay]: Point, [bx, by]: Point, [hx, hy]: Point): Side | null {
  if (ax === hx && bx === hx) return 0;
  if (ay === hy && by === hy) return 1;
  if (ax === -hx && bx === -hx) return 2;
  if (ay === -hy && by === -hy) return 3;
  return null;
}

const quarterTurned = (ring: readonly Point[], quarters: number): Point[] => {
  let turned = ring.map((point) => point);
  for (let n = 0; n < quarters; n++) turned = turned.map(([x, y]): Point => [-y + 0, x + 0]);
  return turned;
};

/** Factory edge along each side, mm. */
function contacts(hull: readonly Point[], half: Point): [number, number, number, number] {
  const along: [number, number, number, number] = [0, 0, 0, 0];
  hull.forEach((a, n) => {
    const b = hull[(n + 1) % hull.length];
    const side = factorySide(a, b, half);
    if (side !== null) along[side] += Math.hypot(b[0] - a[0], b[1] - a[1]);
  });
  return along;
}

/** Angle that a hull takes at the corners of its unit, as a share of their four right angles. */
function cornerShare(hull: readonly Point[], [hx, hy]: Point): number {
  let angle = 0;
  hull.forEach(([x, y], n) => {
    if (Math.abs(x) !== hx || Math.abs(y) !== hy) return;
    const [px, py] = hull[(n + hull.length - 1) % hull.length];
    const [qx, qy] = hull[(n + 1) % hull.length];
    angle += Math.atan2(
      (qx - x) * (py - y) - (qy - y) * (px - x),
      (qx - x) * (px - x) + (qy - y) * (py - y),
    );
  });
  return angle / (2 * Math.PI);
}

/** Moves along one axis that put the hull where its factory edges are factory edges again; none when it does not fit. */
function moves(low: number, high: number, half: number, onLow: boolean, onHigh: boolean): number[] {
  const toLow = -half - low;
  const toHigh = half - high;
  if (toHigh < toLow - SHAPE_GRID_MM) return [];
  const same = toHigh - toLow < SHAPE_GRID_MM;
  if (same || onLow) return onHigh && !same ? [] : [toLow];
  return onHigh ? [toHigh] : [toLow, toHigh];
}

/**
 * How a piece may be sawn from a whole unit of its own kind: turned by quarter turns, never flipped, for
 * its face must stay up, and with each factory edge of it along a factory edge of the unit again.
 */
export function pieceShape(entry: LaidMotif, centre: Point, piece: CutPiece): PieceShape {
  const half: Point = [entry.unit.length / 2, entry.unit.width / 2];
  const rings = [piece.polygon, ...(piece.holes ?? [])].map((ring) => ownRing(entry, centre, ring));
  const hull = convexHull(rings[0]);
  const { sides, bent } = sawnEdges(rings, half, hull);
  const unitArea = 4 * half[0] * half[1];
  const hullArea = ringArea(hull);
  const places: Place[] = [];
  let loose = false;
  let corners = Infinity;
  for (let quarters = 0; quarters < 4; quarters++) {
    const turned = quarterTurned(hull, quarters);
    // The sides go round with the piece.
    const own = contacts(hull, half);
    const on = (side: number) => own[(side - quarters + 4) % 4] > 0;
    const xs = turned.map(([x]) => x);
    const ys = turned.map(([, y]) => y);
    const across = moves(Math.min(...xs), Math.max(...xs), half[0], on(2), on(0));
    const up = moves(Math.min(...ys), Math.max(...ys), half[1], on(3), on(1));
    loose ||= across.length > 1 || up.length > 1;
    for (const dx of across) {
      for (const dy of up) {
        const place = turned.map(([x, y]): Point => [
          sideSnapped(x + dx, half[0]),
          sideSnapped(y + dy, half[1]),
        ]);
        places.push(place);
        corners = Math.min(corners, cornerShare(place, half));
      }
    }
  }
  const edges = contacts(hull, half).reduce((sum, length) => sum + length, 0);
  return {
    half,
    key: hull.map(([x, y]) => `${x.toFixed(2)},${y.toFixed(2)}`).join(' '),
    hullArea,
    places,
    loose,
    shares: [
      hullArea / unitArea,
      // What can slide need not lie in a corner.
      loose ? 0 : corners,
      edges / (4 * (half[0] + half[1])),
    ],
    sawnSides: sides,
    bent,
  };
}

const sideSnapped = (value: number, half: number): number =>
  Math.abs(Math.abs(value) - half) < SHAPE_GRID_MM ? Math.sign(value) * half : value;
