import { convexHull, convexWidth } from '@/geometry/convex-hull';
import { regionArea } from '@/geometry/clipping';
import type { Point } from '@/geometry/point';
import { AREA_TOLERANCE_MM2 } from '@/geometry/tolerance';
import type { Address } from '../layout-document';
import { unitCorners, type Laying } from '../laying';
import { eachGroundWindow } from './ground-windows';
import { unitCut, unitWindow, type Part } from './unit-cut';

/**
 * A strip no wider than the saw's own cut cannot be sawn: aggregate takes its place. About the thickness
 * of a stone saw's blade, mm (common practice).
 */
export const LEAST_SAWN_WIDTH_MM = 3;

/**
 * A bent sliver is wide as a whole and thin everywhere: one whose area is less than this times half its
 * outline, mm, is left to aggregate too. A triangle of the least width just passes.
 */
export const LEAST_MEAN_THICKNESS_MM = 1;

/** Pieces narrower than this, mm, are advised against: 3/8 in, as the CMHA (ICPI) construction tolerances sheet has it for floors without vehicles. */
export const NARROW_PIECE_MM = 10;

/** A piece of a unit, on the ground. */
export interface CutPiece {
  /** The unit that it is what is left of; one unit may leave several pieces. */
  readonly unit: Address;
  /** Its outer ring, anticlockwise, in whole micrometres, not closed, mm. */
  readonly polygon: readonly Point[];
  /** Rings of what is cut out of its middle, clockwise; only where there are any. */
  readonly holes?: readonly (readonly Point[])[];
  /** m². */
  readonly area: number;
  /**
   * Least distance between two parallel lines that hold the piece between them, mm: the narrowest slot that
   * it passes. A notched piece is measured over its notch.
   */
  readonly width: number;
  /** Narrower than `NARROW_PIECE_MM`, or, notched, no thicker than that for the most part. */
  readonly narrow: boolean;
  /** Smaller than a third of its unit. */
  readonly underThird: boolean;
  /** Cut into a corner or hollowed, so that it is not convex: hard to saw, and it breaks from the notch. */
  readonly notched: boolean;
}

/** The pieces of a floor cut at its edge. */
export interface CutPieces {
  readonly pieces: readonly CutPiece[];
  /** Units that the clipping library could not cut; they are left to aggregate. */
  readonly failed: readonly Address[];
}

const MM2_PER_M2 = 1e6;
/** A hull no larger than its piece by this, mm², is rounding: the piece is convex. */
const NOTCH_MM2 = 1;

function ringLength(ring: readonly Point[]): number {
  return ring.reduce((sum, [x, y], n) => {
    const [nx, ny] = ring[(n + 1) % ring.length];
    return sum + Math.hypot(nx - x, ny - y);
  }, 0);
}

function cutPiece(unit: Address, unitArea: number, part: Part): CutPiece | null {
  const [polygon, ...holes] = part;
  const area = regionArea([part]);
  if (area <= AREA_TOLERANCE_MM2) return null;
  const hull = convexHull(polygon);
  const width = convexWidth(hull);
  const thickness = (2 * area) / part.reduce((sum, ring) => sum + ringLength(ring), 0);
  if (width < LEAST_SAWN_WIDTH_MM || thickness < LEAST_MEAN_THICKNESS_MM) return null;
  const notched = regionArea([[hull]]) - area > NOTCH_MM2;
  return {
    unit,
    polygon,
    ...(holes.length > 0 ? { holes } : {}),
    area: area / MM2_PER_M2,
    width,
    underThird: area < unitArea / 3 - AREA_TOLERANCE_MM2,
    narrow: width < NARROW_PIECE_MM || (notched && thickness < NARROW_PIECE_MM),
    notched,
  };
}

/**
 * Cuts every unit left out at the edge to the ground less the clearance. Whole units stay as they are
 * laid; a unit lifted by hand is not cut. Work grows with the units at the edge and the chords there.
 */
export function cutPieces(laying: Laying): CutPieces {
  const { document, ground, leftOut, motif } = laying;
  const lifted = new Set(document.lifted.map((address) => address.join()));
  const units: { address: Address; corners: readonly Point[]; area: number }[] = [];
  for (let n = 0; n < leftOut.count; n++) {
    const address: Address = [leftOut.i[n], leftOut.j[n], leftOut.k[n]];
    if (lifted.has(address.join())) continue;
    const entry = motif[address[2]];
    units.push({
      address,
      corners: unitCorners(entry, leftOut.x[n], leftOut.y[n]),
      area: entry.unit.length * entry.unit.width,
    });
  }
  const { clearance } = document;
  const found: CutPiece[][] = units.map(() => []);
  const failed: Address[] = [];
  eachGroundWindow(
    ground,
    units.map(({ corners }) => unitWindow(corners, clearance)),
    (item, window) => {
      const { address, corners, area } = units[item];
      const parts = unitCut(corners, window, clearance);
      if (!parts) failed.push(address);
      found[item] = (parts ?? []).flatMap((part) => cutPiece(address, area, part) ?? []);
    },
  );
  return { pieces: found.flat(), failed };
}
