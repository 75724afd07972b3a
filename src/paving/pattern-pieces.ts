import { latticeCell, latticeReduced, type Lattice } from '@/geometry/lattice';
import type { Point } from '@/geometry/point';
import { pointTurned, rotation } from '@/geometry/rotation';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';

/**
 * What an endless pattern leaves open between its places, in rectangles: a strip between two
 * neighbours, a crossing where joints meet. From every corner of a place a wall runs level to the
 * next place; places and walls are floors below and ceilings above, and each piece is what lies
 * between one floor and one ceiling. Every piece knows the places that it lies against.
 */

/** A place of the pattern: its centre in the pattern's frame, mm, and its own size and turn. */
export interface PatternPlace {
  readonly at: Point;
  readonly length: number;
  readonly width: number;
  readonly turn: number;
}

/** A place by motif entry and steps of the lattice. */
export interface PlaceStep {
  readonly k: number;
  readonly i: number;
  readonly j: number;
}

/** A rectangle of open ground of the endless pattern, mm. */
export interface PatternPiece {
  /** Centre in the frame that is turned by `turn` against the pattern's, mm. */
  readonly centre: Point;
  readonly width: number;
  readonly height: number;
  /** Places against it; the first has i = j = 0. */
  readonly against: readonly PlaceStep[];
}

/** All open ground of one repeat of the pattern, parted into rectangles. */
export interface PatternPieces {
  /** The turn of all places against the pattern's frame, within a right angle, degrees. */
  readonly turn: number;
  readonly pieces: readonly PatternPiece[];
}

/** Turns that differ from a right angle by less, degrees, are square. */
const SQUARE_DEG = 1e-9;
/** Lengths under this, mm, are rounding. */
const NOTHING_MM = 1e-6;

interface Box {
  readonly x0: number;
  readonly x1: number;
  readonly y0: number;
  readonly y1: number;
}

/** A level line, a side of a place or a wall between two; the first owner has i = j = 0. */
interface Level {
  readonly x0: number;
  readonly x1: number;
  readonly y: number;
  readonly owners: readonly PlaceStep[];
}

/** Boxes of the places in a frame in which all stand square, or null where they stand at odd turns. */
function squareBoxes(
  places: readonly PatternPlace[],
  lattice: Lattice,
): { turn: number; lattice: Lattice; boxes: Box[] } | null {
  const turn = places[0].turn - Math.round(places[0].turn / 90) * 90;
  const back = rotation(-turn);
  const boxes: Box[] = [];
  for (const { at, length, width, turn: own } of places) {
    const quarters = Math.round((own - turn) / 90);
    if (Math.abs(own - turn - 90 * quarters) > SQUARE_DEG) return null;
    const [x, y] = pointTurned(at, back);
    const [half, high] = quarters % 2 === 0 ? [length / 2, width / 2] : [width / 2, length / 2];
    boxes.push({ x0: x - half, x1: x + half, y0: y - high, y1: y + high });
  }
  return {
    turn,
    lattice: { a: pointTurned(lattice.a, back), b: pointTurned(lattice.b, back) },
    boxes,
  };
}

/** Steps of the lattice that can bring any box within `reach` of any other, both ways. */
function nearSteps({ a, b }: Lattice, boxes: readonly Box[], reach: number): readonly Point[] {
  const wide = Math.max(...boxes.map(({ x1 }) => x1)) - Math.min(...boxes.map(({ x0 }) => x0));
  const high = Math.max(...boxes.map(({ y1 }) => y1)) - Math.min(...boxes.map(({ y0 }) => y0));
  const far = Math.hypot(wide, high) + reach;
  // With the shortest basis a step of length d has addresses of at most 2d over the vector's length.
  const short = latticeReduced({ a, b });
  const steps: Point[] = [];
  const most = (v: Point) => Math.ceil((2 * far) / Math.hypot(v[0], v[1]));
  for (let m = -most(short.a); m <= most(short.a); m++)
    for (let n = -most(short.b); n <= most(short.b); n++) {
      const x = m * short.a[0] + n * short.b[0];
      const y = m * short.a[1] + n * short.b[1];
      if (Math.hypot(x, y) <= far)
        steps.push([m * short.i.a + n * short.i.b, m * short.j.a + n * short.j.b]);
    }
  return steps;
}

/** The pieces of a pattern; null where places stand at odd turns to one another. */
export function patternPieces(
  places: readonly PatternPlace[],
  patternLattice: Lattice,
): PatternPieces | null {
  const square = squareBoxes(places, patternLattice);
  if (!square) return null;
  const { turn, lattice, boxes } = square;
  const { a, b } = lattice;
  const reach =
    Math.hypot(a[0], a[1]) +
    Math.hypot(b[0], b[1]) +
    Math.max(...boxes.map((box) => Math.hypot(box.x1 - box.x0, box.y1 - box.y0)));
  const shifted = nearSteps(lattice, boxes, reach).map(([i, j]) => ({
    i,
    j,
    x: i * a[0] + j * b[0],
    y: i * a[1] + j * b[1],
  }));
  const around = shifted.flatMap(({ i, j, x, y }) =>
    boxes.map((box, k) => ({
      step: { k, i, j },
      x0: box.x0 + x,
      x1: box.x1 + x,
      y0: box.y0 + y,
      y1: box.y1 + y,
    })),
  );

  // Walls: level from each corner to the next place, each once, its left owner at the lattice's origin.
  const walls = new Map<string, Level>();
  boxes.forEach((box, k) => {
    for (const y of [box.y0, box.y1]) {
      for (const way of [1, -1]) {
        const from = way > 0 ? box.x1 : box.x0;
        let best: (typeof around)[number] | null = null;
        let room = reach;
        for (const other of around) {
          if (other.y0 > y + NOTHING_MM || other.y1 < y - NOTHING_MM) continue;
          const gap = way > 0 ? other.x0 - from : from - other.x1;
          if (gap > -NOTHING_MM && gap < room) {
            best = other;
            room = gap;
          }
        }
        if (!best || room <= NOTHING_MM) continue;
        const { i, j, k: met } = best.step;
        const [dx, dy] = way > 0 ? [0, 0] : [-(i * a[0] + j * b[0]), -(i * a[1] + j * b[1])];
        const x0 = way > 0 ? from : best.x1 + dx;
        const owners =
          way > 0
            ? [{ k, i: 0, j: 0 }, best.step]
            : [
                { k: met, i: 0, j: 0 },
                { k, i: -i || 0, j: -j || 0 },
              ];
        const [left, right] = owners;
        const key = [left.k, right.k, right.i, right.j, Math.round((y + dy) * 1000)].join();
        walls.set(key, { x0, x1: x0 + room, y: y + dy, owners });
      }
    }
  });
  const wallList = [...walls.values()];
  const own = (k: number): PlaceStep[] => [{ k, i: 0, j: 0 }];
  const floors: Level[] = [
    ...boxes.map(({ x0, x1, y1 }, k) => ({ x0, x1, y: y1, owners: own(k) })),
    ...wallList,
  ];
  const undersides: Level[] = [
    ...boxes.map(({ x0, x1, y0 }, k) => ({ x0, x1, y: y0, owners: own(k) })),
    ...wallList,
  ];
  const ceilings = shifted.flatMap(({ i, j, x, y }) =>
    undersides.map((under) => ({
      under,
      i,
      j,
      x0: under.x0 + x,
      x1: under.x1 + x,
      y: under.y + y,
    })),
  );

  const pieces: PatternPiece[] = [];
  for (const floor of floors) {
    const above = ceilings.filter(
      (ceiling) =>
        ceiling.y > floor.y - NOTHING_MM &&
        ceiling.y < floor.y + reach &&
        Math.min(ceiling.x1, floor.x1) - Math.max(ceiling.x0, floor.x0) > NOTHING_MM &&
        !(ceiling.under === floor && ceiling.i === 0 && ceiling.j === 0),
    );
    const breaks = [floor.x0, floor.x1];
    for (const { x0, x1 } of above)
      for (const x of [x0, x1]) if (x > floor.x0 && x < floor.x1) breaks.push(x);
    breaks.sort((p, q) => p - q);
    let open: { ceiling: (typeof above)[number]; x0: number; x1: number } | null = null;
    const close = () => {
      if (!open) return;
      const { ceiling, x0, x1 } = open;
      const height = ceiling.y - floor.y;
      open = null;
      if (height <= NOTHING_MM || x1 - x0 <= NOTHING_MM) return;
      const against = new Map<string, PlaceStep>();
      for (const step of floor.owners) against.set(`${step.k},${step.i},${step.j}`, step);
      for (const { k, i, j } of ceiling.under.owners) {
        const step = { k, i: i + ceiling.i, j: j + ceiling.j };
        against.set(`${step.k},${step.i},${step.j}`, step);
      }
      pieces.push({
        centre: [(x0 + x1) / 2, floor.y + height / 2],
        width: x1 - x0,
        height,
        against: [...against.values()],
      });
    };
    for (let n = 0; n + 1 < breaks.length; n++) {
      const [x0, x1] = [breaks[n], breaks[n + 1]];
      if (x1 - x0 <= NOTHING_MM) continue;
      const middle = (x0 + x1) / 2;
      let lowest: (typeof above)[number] | null = null;
      for (const ceiling of above) {
        if (ceiling.x0 > middle || ceiling.x1 < middle) continue;
        if (!lowest || ceiling.y < lowest.y) lowest = ceiling;
      }
      if (open && open.ceiling !== lowest) close();
      if (!lowest) continue;
      if (open) open.x1 = x1;
      else open = { ceiling: lowest, x0, x1 };
    }
    close();
  }
  return { turn, pieces };
}

/** What of the lattice's cell is neither place nor piece, mm²: 0 but where walls and ceilings meet nothing. */
export function piecesMissing(
  { pieces }: PatternPieces,
  places: readonly PatternPlace[],
  lattice: Lattice,
): number {
  const open = pieces.reduce((sum, { width, height }) => sum + width * height, 0);
  const taken = places.reduce((sum, { length, width }) => sum + length * width, 0);
  return Math.abs(latticeCell(lattice)) - taken - open;
}

/** True when the piece is a joint no wider than `joint`, mm. */
export const pieceNarrow = ({ width, height }: PatternPiece, joint: number): boolean =>
  Math.min(width, height) <= joint + LENGTH_TOLERANCE_MM;
