declare module 'jsts/org/locationtech/jts/geom/GeometryFactory.js' {
  import type { Coordinate } from 'jsts/org/locationtech/jts/geom/Coordinate.js';
  export interface Geometry {
    getArea(): number;
    isEmpty(): boolean;
    getBoundary(): Geometry;
  }
  export default class GeometryFactory {
    createLinearRing(coordinates: Coordinate[]): Geometry;
    createLineString(coordinates: Coordinate[]): Geometry;
    createPolygon(shell: Geometry, holes?: Geometry[]): Geometry;
    createPoint(coordinate: Coordinate): Geometry;
  }
}
declare module 'jsts/org/locationtech/jts/geom/Coordinate.js' {
  export class Coordinate {
    constructor(x: number, y: number);
  }
  export default Coordinate;
}
declare module 'jsts/org/locationtech/jts/operation/distance/DistanceOp.js' {
  import type { Geometry } from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
  const DistanceOp: { distance(one: Geometry, other: Geometry): number };
  export default DistanceOp;
}
declare module 'jsts/org/locationtech/jts/operation/overlay/snap/SnapIfNeededOverlayOp.js' {
  import type { Geometry } from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
  const SnapIfNeededOverlayOp: {
    intersection(one: Geometry, other: Geometry): Geometry;
    difference(one: Geometry, other: Geometry): Geometry;
  };
  export default SnapIfNeededOverlayOp;
}
