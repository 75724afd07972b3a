import Coordinate from 'jsts/org/locationtech/jts/geom/Coordinate.js';
import GeometryFactory, { type Geometry } from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
import BufferOp from 'jsts/org/locationtech/jts/operation/buffer/BufferOp.js';
import BufferParameters from 'jsts/org/locationtech/jts/operation/buffer/BufferParameters.js';
import SnapIfNeededOverlayOp from 'jsts/org/locationtech/jts/operation/overlay/snap/SnapIfNeededOverlayOp.js';
import CascadedPolygonUnion from 'jsts/org/locationtech/jts/operation/union/CascadedPolygonUnion.js';
import ArrayList from 'jsts/java/util/ArrayList.js';
import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '@/paving/layout-document';
import { oracleFloor, oracleGround } from './brute-force';

/**
 * The fill told apart the slow way: joints are what a closing of the laid units by a square a hair
 * wider than the joint adds to them (JSTS: each unit grown, the union shrunk again, sharp corners
 * both ways), voids what a closing of all whole places adds beyond that. Areas in mm².
 */

const factory = new GeometryFactory();
const sharp = new BufferParameters(8, BufferParameters.CAP_FLAT, BufferParameters.JOIN_MITRE, 10);
// Without this JSTS drops corners that lie within a hundredth of the distance from a line.
sharp.setSimplifyFactor(0);
/** How much wider than the joint the square is, mm. */
const HAIR_MM = 0.02;

/** The rectangle grown by `by` on every side. */
function grown(corners: readonly Point[], by: number): Geometry {
  const ring = corners.map(([x, y], n): Point => {
    const outward = (other: Point): Point => {
      const length = Math.hypot(x - other[0], y - other[1]);
      return [((x - other[0]) / length) * by, ((y - other[1]) / length) * by];
    };
    const [before, after] = [outward(corners[(n + 3) % 4]), outward(corners[(n + 1) % 4])];
    return onGrid([x + before[0] + after[0], y + before[1] + after[1]]);
  });
  const closed = [...ring, ring[0]].map(([x, y]) => new Coordinate(x, y));
  return factory.createPolygon(factory.createLinearRing(closed));
}

/** Area inside `ground` of the closing of rectangles by a square of that side. */
function closedArea(
  rectangles: readonly (readonly Point[])[],
  side: number,
  ground: Geometry,
): number {
  if (rectangles.length === 0) return 0;
  const list = new ArrayList();
  for (const corners of rectangles) list.add(grown(corners, side / 2));
  const closed = BufferOp.bufferOp(CascadedPolygonUnion.union(list), -side / 2, sharp);
  return SnapIfNeededOverlayOp.intersection(closed, ground).getArea();
}

/** The document turned so that its pattern stands square: JSTS cuts corners off shapes that stand a hair askew. */
function squared(document: LayoutDocument): LayoutDocument {
  const { origin, turn } = document.placement;
  const [cos, sin] = [Math.cos((-turn * Math.PI) / 180), Math.sin((-turn * Math.PI) / 180)];
  const back = <V extends readonly number[]>([x, y, ...bulge]: V): V =>
    [
      (x - origin[0]) * cos - (y - origin[1]) * sin,
      (x - origin[0]) * sin + (y - origin[1]) * cos,
      ...bulge,
    ] as unknown as V;
  const { perimeter, keepOuts } = document.ground;
  return {
    ...document,
    ground: {
      perimeter: perimeter.map(back),
      keepOuts: keepOuts.map(({ name, ring }) => ({ name, ring: ring.map(back) })),
    },
    placement: { origin: [0, 0], turn: 0 },
  };
}

/** A nanometre: corners of one line lie on one line. */
const onGrid = ([x, y]: Point): Point => [Math.round(x * 1e6) / 1e6, Math.round(y * 1e6) / 1e6];

/** For every bond but stepping and one's own, whose voids no square closes. */
export function oracleFillParts(given: LayoutDocument): {
  joints: number;
  voids: number;
  margin: number;
  undecided: number;
} {
  const document = squared(given);
  const { bond } = document;
  if (bond.kind === 'stepping' || bond.kind === 'custom') throw new Error(bond.kind);
  const floor = oracleFloor(document);
  const placed: LayoutDocument = {
    ...document,
    lifted: [],
    bond: bond.kind === 'chequer' ? { ...bond, kind: 'stack' } : bond,
  };
  const places = oracleFloor(placed);
  const { ground } = oracleGround(document);
  const side = bond.joint + HAIR_MM;
  const laid = [...floor.laid.values()].map(({ corners }) => corners.map(onGrid));
  const whole = [...places.laid.values()].map(({ corners }) => corners.map(onGrid));
  const joints = closedArea(laid, side, ground) - floor.coveredArea;
  const voids = closedArea(whole, side, ground) - floor.coveredArea - joints;
  return {
    joints,
    voids,
    margin: floor.groundArea - floor.coveredArea - joints - voids,
    undecided: floor.undecided.size + places.undecided.size,
  };
}
