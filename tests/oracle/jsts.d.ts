declare module 'jsts/org/locationtech/jts/geom/GeometryFactory.js' {
  import type { Coordinate } from 'jsts/org/locationtech/jts/geom/Coordinate.js';
  export interface Geometry {
    getArea(): number;
    getLength(): number;
    isEmpty(): boolean;
    getBoundary(): Geometry;
    getCoordinates(): { readonly x: number; readonly y: number }[];
    getNumGeometries(): number;
    getGeometryN(n: number): Geometry;
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
declare module 'jsts/org/locationtech/jts/operation/union/CascadedPolygonUnion.js' {
  import type { Geometry } from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
  const CascadedPolygonUnion: { union(polygons: unknown): Geometry };
  export default CascadedPolygonUnion;
}
declare module 'jsts/org/locationtech/jts/operation/buffer/BufferOp.js' {
  import type { Geometry } from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
  import type BufferParameters from 'jsts/org/locationtech/jts/operation/buffer/BufferParameters.js';
  const BufferOp: {
    bufferOp(geometry: Geometry, distance: number, how: BufferParameters | number): Geometry;
  };
  export default BufferOp;
}
declare module 'jsts/org/locationtech/jts/operation/buffer/BufferParameters.js' {
  export default class BufferParameters {
    static JOIN_MITRE: number;
    static CAP_FLAT: number;
    constructor(quadrantSegments: number, cap: number, join: number, mitreLimit: number);
    setSimplifyFactor(factor: number): void;
  }
}
declare module 'jsts/java/util/ArrayList.js' {
  export default class ArrayList {
    add(item: unknown): boolean;
  }
}
declare module 'jsts/org/locationtech/jts/algorithm/MinimumDiameter.js' {
  import type { Geometry } from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
  export default class MinimumDiameter {
    constructor(geometry: Geometry);
    getLength(): number;
  }
}
declare module 'jsts/org/locationtech/jts/algorithm/Centroid.js' {
  import type { Geometry } from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
  const Centroid: { getCentroid(geometry: Geometry): { readonly x: number; readonly y: number } };
  export default Centroid;
}
