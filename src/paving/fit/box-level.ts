/** Boxes of origins, all halved equally often, each with the pieces that matter in it. */
export interface BoxLevel {
  count: number;
  /** West, south, east and north of each box, mm. */
  sides: Float64Array;
  /** Units whole at the point of each that `SPLIT` tells. */
  depth: Int32Array;
  /** Pieces of each are listed as far off as this, mm; no origin of it has more slack. */
  reach: Float64Array;
  /** Pieces of box n: `list[n === 0 ? 0 : end[n − 1] … end[n] − 1]`. */
  end: Int32Array;
  list: Int32Array;
  /** Where the next box's pieces begin. */
  top: number;
}

/** Boxes that a level has room for at first. */
const FIRST_BOXES = 64;

export const boxLevel = (pieces: number): BoxLevel => ({
  count: 0,
  sides: new Float64Array(4 * FIRST_BOXES),
  depth: new Int32Array(FIRST_BOXES),
  reach: new Float64Array(FIRST_BOXES),
  end: new Int32Array(FIRST_BOXES),
  list: new Int32Array(pieces),
  top: 0,
});

export function levelEmptied(level: BoxLevel): void {
  level.count = 0;
  level.top = 0;
}

/** Where the pieces of a level's box begin. */
export const boxFrom = ({ end }: BoxLevel, box: number): number => (box === 0 ? 0 : end[box - 1]);

/** Makes sure that so many pieces can be listed from `top` on. */
export function levelRoom(level: BoxLevel, pieces: number): void {
  if (level.top + pieces <= level.list.length) return;
  const larger = new Int32Array(2 * (level.top + pieces));
  larger.set(level.list);
  level.list = larger;
}

/** Keeps a box whose pieces have been listed from `top` to `end`. */
export function boxKept(
  level: BoxLevel,
  ax: number,
  ay: number,
  bx: number,
  by: number,
  depth: number,
  reach: number,
  end: number,
): void {
  const at = level.count++;
  if (at === level.depth.length) {
    const grown = <T extends Float64Array | Int32Array>(values: T, empty: T): T => {
      empty.set(values);
      return empty;
    };
    level.sides = grown(level.sides, new Float64Array(8 * at));
    level.depth = grown(level.depth, new Int32Array(2 * at));
    level.reach = grown(level.reach, new Float64Array(2 * at));
    level.end = grown(level.end, new Int32Array(2 * at));
  }
  level.sides[4 * at] = ax;
  level.sides[4 * at + 1] = ay;
  level.sides[4 * at + 2] = bx;
  level.sides[4 * at + 3] = by;
  level.depth[at] = depth;
  level.reach[at] = reach;
  level.end[at] = end;
  level.top = end;
}
