import {
  convexPart,
  convexPiece,
  convexPieceIn,
  pointsBox,
  regionIntegral,
  type ConvexPiece,
  type SignedRings,
} from '@/geometry/convex-part';
import {
  planeHeight,
  planeLess,
  planeRaised,
  planeTurned,
  type Plane,
} from '@/geometry/plane-pieces';
import { regionBins, type RegionBins } from '@/geometry/region-bins';
import { bondPattern, documentUnit } from '@/paving/bond';
import { documentBuildUp } from '@/paving/build-up';
import { finishSurface } from '@/paving/finish-level';
import { documentGround, type Ground } from '@/paving/ground';
import type { LayoutDocument } from '@/paving/layout-document';
import { documentLevels } from '@/paving/levels';
import { dugRegion, groundRegion } from './dug-region';
import { existingGround, type ExistingGround } from './existing-ground';

/** A convex part of the plane over which existing ground and formation are a plane each. */
export interface EarthCell {
  /** It may reach past the ground. */
  readonly piece: ConvexPiece;
  readonly existing: Plane;
  readonly formation: Plane;
  /** Existing ground less formation, mm: what is cut, or filled where negative. */
  readonly depth: Plane;
  /** Outside the spots. */
  readonly beyond: boolean;
}

/** Ground and formation of a floor in one: what volumes, level map and pegs are worked out from. */
export interface EarthModel {
  readonly ground: Ground;
  readonly existing: ExistingGround;
  /** Within the edge, keep-outs taken off. */
  readonly floor: SignedRings;
  /** The same with the overdig. */
  readonly dug: SignedRings;
  /** The chords of `floor` and of `dug`, sorted by place. */
  readonly floorBins: RegionBins;
  readonly dugBins: RegionBins;
  /** The overdig could not be worked out, and `dug` is without it. */
  readonly overdigLeftOut: boolean;
  readonly cells: readonly EarthCell[];
}

/** Thickness of the thickest unit that the bond lays, mm. */
export const thickestUnit = (document: LayoutDocument): number =>
  bondPattern(document).motif.reduce(
    (most, { unit }) => Math.max(most, documentUnit(document, unit).thickness),
    0,
  );

/** From the finish down to the formation, mm: unit, bedding and base. */
export function buildUpDepth(document: LayoutDocument): number {
  const { bedding, base } = documentBuildUp(document);
  return thickestUnit(document) + bedding + base;
}

/** The model of a document that has passed, with its ground where the caller has it already. */
export function earthModel(
  document: LayoutDocument,
  ground: Ground = documentGround(document),
): EarthModel {
  const { spots } = documentLevels(document);
  const existing = existingGround(spots);
  const floor = groundRegion(ground);
  const joined = dugRegion(ground, documentBuildUp(document).overdig);
  const dug = joined ?? floor;
  const box = pointsBox(dug.flat());
  const below = buildUpDepth(document);
  const finish = finishSurface(document);
  const floorBins = regionBins(floor);
  const dugBins = dug === floor ? floorBins : regionBins(dug);
  const cells: EarthCell[] = [];
  existing.surface.forEach((piece, n) => {
    if (!convexPiece(box, piece.sides)) return;
    for (const { plane, sides } of finish) {
      const both = convexPiece(box, [...piece.sides, ...sides]);
      if (!both) continue;
      const formation = planeRaised(plane, -below);
      cells.push({
        piece: both,
        existing: piece.plane,
        formation,
        depth: planeLess(piece.plane, formation),
        beyond: n >= existing.within,
      });
    }
  });
  return {
    ground,
    existing,
    floor,
    dug,
    floorBins,
    dugBins,
    overdigLeftOut: joined === null,
    cells,
  };
}

/** What one cell holds of a region: areas in mm² and volumes in mm³, cut and fill apart, none negative. */
export interface CellEarth {
  readonly cutArea: number;
  readonly fillArea: number;
  readonly cut: number;
  readonly fill: number;
}

/**
 * Cut and fill of a cell within the region, exactly: the cell is parted along the straight line where
 * ground and formation meet, and each part is clipped to the region and summed by prisms.
 */
export function cellEarth(
  { piece, depth }: EarthCell,
  region: SignedRings,
  bins?: RegionBins,
): CellEarth {
  const part = (side: Plane) => {
    const within = convexPieceIn(piece, side);
    return within
      ? regionIntegral(convexPart(region, within, bins), depth)
      : { area: 0, volume: 0 };
  };
  const low = piece.outline.reduce(
    (least, point) => Math.min(least, planeHeight(depth, point)),
    Infinity,
  );
  const over = part(depth);
  // Where ground and formation are one, that is neither; it counts as cut of no depth.
  const under = low < 0 ? part(planeTurned(depth)) : { area: 0, volume: 0 };
  return {
    cutArea: over.area,
    cut: Math.max(0, over.volume),
    fillArea: under.area,
    fill: Math.max(0, -under.volume),
  };
}
