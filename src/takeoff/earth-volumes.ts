import { convexPart, regionIntegral, type SignedRings } from '@/geometry/convex-part';
import { levelPlane, planeHeight } from '@/geometry/plane-pieces';
import type { Point } from '@/geometry/point';
import { ringHolds } from '@/geometry/ring';
import { pointSegmentDistance } from '@/geometry/segment-pairs';
import { documentBuildUp } from '@/paving/build-up';
import type { Laying } from '@/paving/laying';
import { cellEarth, earthModel, thickestUnit, type EarthModel } from './earth-cells';
import { levelWarnings, type LevelWarning } from './level-warnings';

export type { LevelWarning } from './level-warnings';

/**
 * What is dug and filled under a floor. Volumes are in m³ **in place**: earth as it lies, base and
 * bedding compacted. Areas in m², levels in mm above the datum. `cut` less `fill` is the volume between
 * the existing ground and the formation, the bottom of the base.
 */
export interface EarthVolumes {
  /** The ground within the edge, keep-outs taken off. */
  readonly area: number;
  /** What is dug and based: the same and the overdig round it. */
  readonly dugArea: number;
  /** Earth above the formation. */
  readonly cut: number;
  /** Room between formation and ground where the ground is lower: filled with base. */
  readonly fill: number;
  /** Area where earth is cut, and where the ground is lower than the formation. */
  readonly cutArea: number;
  readonly fillArea: number;
  /** The same as `cut`: no other earth is moved. */
  readonly excavation: number;
  /** All that is dug leaves: fill is made with base, not with what was dug. */
  readonly spoil: number;
  /** Base altogether: its thickness over the dug area, and the fill. */
  readonly base: number;
  /** Its thickness times the dug area. */
  readonly baseLayer: number;
  /** Bedding altogether: its thickness over the ground, and more under thinner units. */
  readonly bedding: number;
  /** Its thickness times the area. */
  readonly beddingLayer: number;
  /** What units thinner than the thickest take more of it. */
  readonly beddingUnderThin: number;
  /** Greatest depths of cut and fill, mm; 0 where there is none. */
  readonly deepestCut: number;
  readonly deepestFill: number;
  /** From the existing ground's level: `spots`, or `assumed` level with the datum where none was taken. */
  readonly from: 'spots' | 'assumed';
  /** Part of `dugArea` outside the spots, where each place takes the level of the nearest place among them. */
  readonly beyondSpots: number;
  readonly warnings: readonly LevelWarning[];
}

const MM3_PER_M3 = 1e9;
const MM2_PER_M2 = 1e6;

/** Cells must cover the dug area to this share of it: less is rounding, more is a fault. */
const COVER_SHARE = 1e-6;
/** A place this near to the region's border, mm, is in it. */
const BORDER_MM = 1e-3;

function regionHolds(region: SignedRings, point: Point): boolean {
  let inside = false;
  for (const ring of region) {
    if (ringHolds(ring, point)) inside = !inside;
    for (let n = 0, m = ring.length - 1; n < ring.length; m = n++)
      if (pointSegmentDistance(point, ring[m], ring[n]) < BORDER_MM) return true;
  }
  return inside;
}

/** The greatest of `sign` times the depth in the dug region, mm; 0 where there is none. */
function deepest({ cells, dug, dugBins }: EarthModel, sign: 1 | -1): number {
  let most = 0;
  for (const { piece, depth } of cells) {
    const deeper = (point: Point) => sign * planeHeight(depth, point);
    if (piece.outline.every((point) => deeper(point) <= most)) continue;
    // A part may run back along the cell's side outside the region: only what is in it counts.
    const found = convexPart(dug, piece, dugBins)
      .flat()
      .filter((point) => deeper(point) > most)
      .sort((p, q) => deeper(q) - deeper(p))
      .find((point) => regionHolds(dug, point));
    if (found) most = deeper(found);
  }
  return most;
}

/** What the volumes are worked out from: a floor as laid, of a document that has passed. */
export type LevelledFloor = Pick<Laying, 'document' | 'ground' | 'motif' | 'laid'>;

/** Bedding that units thinner than the thickest take beyond its thickness, mm³. */
function beddingUnderThin({ document, motif, laid }: LevelledFloor): number {
  const thickest = thickestUnit(document);
  let volume = 0;
  for (let n = 0; n < laid.count; n++) {
    const { length, width, thickness } = motif[laid.k[n]].unit;
    volume += length * width * (thickest - thickness);
  }
  return volume;
}

/**
 * The volumes of a floor, exact for its surfaces: prisms over the cells in which ground and formation
 * are planes, each parted along the line where the two meet and clipped to the ground. Throws when the
 * cells do not cover the dug area.
 */
export function earthVolumes(
  floor: LevelledFloor,
  model: EarthModel = earthModel(floor.document, floor.ground),
): EarthVolumes {
  const { document, ground } = floor;
  const { bedding, base } = documentBuildUp(document);
  const dugArea = regionIntegral(model.dug, levelPlane(0)).area;
  const sum = { cut: 0, fill: 0, cutArea: 0, fillArea: 0, beyond: 0 };
  for (const cell of model.cells) {
    const earth = cellEarth(cell, model.dug, model.dugBins);
    sum.cut += earth.cut;
    sum.fill += earth.fill;
    sum.cutArea += earth.cutArea;
    sum.fillArea += earth.fillArea;
    if (cell.beyond) sum.beyond += earth.cutArea + earth.fillArea;
  }
  const covered = sum.cutArea + sum.fillArea;
  if (Math.abs(covered - dugArea) > COVER_SHARE * dugArea) {
    throw new Error(
      `cells of ${covered} mm² do not cover the ${dugArea} mm² dug about ${model.dug[0][0].join(', ')}`,
    );
  }
  const area = ground.area / MM2_PER_M2;
  const cut = sum.cut / MM3_PER_M3;
  const fill = sum.fill / MM3_PER_M3;
  const baseLayer = (base * dugArea) / MM3_PER_M3;
  const beddingLayer = (bedding * ground.area) / MM3_PER_M3;
  const underThin = beddingUnderThin(floor) / MM3_PER_M3;
  const beyondSpots = Math.max(0, sum.beyond) / MM2_PER_M2;
  return {
    area,
    dugArea: dugArea / MM2_PER_M2,
    cut,
    fill,
    cutArea: sum.cutArea / MM2_PER_M2,
    fillArea: sum.fillArea / MM2_PER_M2,
    excavation: cut,
    spoil: cut,
    base: baseLayer + fill,
    baseLayer,
    bedding: beddingLayer + underThin,
    beddingLayer,
    beddingUnderThin: underThin,
    deepestCut: deepest(model, 1),
    deepestFill: deepest(model, -1),
    from: model.existing.shape === 'none' ? 'assumed' : 'spots',
    beyondSpots,
    warnings: levelWarnings(document, model, beyondSpots / (dugArea / MM2_PER_M2)),
  };
}
