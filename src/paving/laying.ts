import type { Point } from '@/geometry/point';
import type { Address, Unit } from './layout-document';

/** A unit of the motif with what drawing and measuring need worked out once. */
export interface LaidMotif {
  readonly unit: Unit;
  /** Centre in the pattern's frame, mm. */
  readonly at: Point;
  /** Turn of the unit on the ground: the placement's turn plus its own, degrees. */
  readonly turnDeg: number;
  /** Half the length along the unit's own x axis, on the ground: `[hx, hy]`, mm. */
  readonly halfLength: Point;
  /** Half the width along the unit's own y axis, on the ground: `[hx, hy]`, mm. */
  readonly halfWidth: Point;
}

/** Many units as flat arrays, one entry a unit: address `[i, j, k]` and centre on the ground, mm. */
export interface UnitSet {
  readonly count: number;
  readonly i: Int32Array;
  readonly j: Int32Array;
  readonly k: Uint8Array;
  readonly x: Float64Array;
  readonly y: Float64Array;
}

export type { Address };
