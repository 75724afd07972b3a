import MinimumDiameter from 'jsts/org/locationtech/jts/algorithm/MinimumDiameter.js';
import Coordinate from 'jsts/org/locationtech/jts/geom/Coordinate.js';
import GeometryFactory, { type Geometry } from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
import BufferOp from 'jsts/org/locationtech/jts/operation/buffer/BufferOp.js';
import SnapIfNeededOverlayOp from 'jsts/org/locationtech/jts/operation/overlay/snap/SnapIfNeededOverlayOp.js';
import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '@/paving/layout-document';
import { oracleGround } from './brute-force';

/** What JSTS leaves of one unit: area, mm², and least width, mm, of each part, the largest first. */
export interface OraclePart {
  readonly area: number;
  readonly width: number;
  /** Twice the area over the outline, mm. */
  readonly thickness: number;
}

/** Chords to a quarter circle where the clearance goes round a corner. */
const QUADRANT_SEGMENTS = 200;

const factory = new GeometryFactory();
export const jstsPolygon = (ring: readonly Point[]): Geometry =>
  factory.createPolygon(
    factory.createLinearRing([...ring, ring[0]].map(([x, y]) => new Coordinate(x, y))),
  );

/** The ground drawn in by the clearance, as JSTS buffers it. */
export function oracleInset(document: LayoutDocument): Geometry {
  const { ground } = oracleGround(document);
  return document.clearance === 0
    ? ground
    : BufferOp.bufferOp(ground, -document.clearance, QUADRANT_SEGMENTS);
}

/** Units are drawn in by so much, mm, that where one touches the boundary no hair of rounding hangs on a part. */
const HAIR_MM = 1e-6;

export function oracleParts(inset: Geometry, corners: readonly Point[]): OraclePart[] {
  const [cx, cy] = [(corners[0][0] + corners[2][0]) / 2, (corners[0][1] + corners[2][1]) / 2];
  const drawnIn = corners.map(([x, y]): Point => [
    x - HAIR_MM * Math.sign(x - cx),
    y - HAIR_MM * Math.sign(y - cy),
  ]);
  const left = SnapIfNeededOverlayOp.intersection(inset, jstsPolygon(drawnIn));
  return Array.from({ length: left.getNumGeometries() }, (_, n) => left.getGeometryN(n))
    .filter((part) => part.getArea() > 0)
    .map((part) => ({
      area: part.getArea(),
      width: new MinimumDiameter(part).getLength(),
      thickness: (2 * part.getArea()) / part.getLength(),
    }))
    .sort((one, other) => other.area - one.area);
}
