import { ringInHalfPlane } from '@/geometry/convex-part';
import type { Point } from '@/geometry/point';
import { PLACE_TOLERANCE_MM } from './group-places';
import type { PieceShape, Place } from './piece-shape';
import type { SawCuts } from './saw-cuts';

/** A side of a piece nearer than this, mm, to the side of what is left of the unit lies on it: nothing is left to saw there. */
const ON_SIDE_MM = 0.05;
/** Of up to so many pieces or sides every order is tried; of more, the shortest cut is taken first. */
const PIECES_IN_EVERY_ORDER = 3;
const SIDES_IN_EVERY_ORDER = 5;
/** Directions that differ by less are one, radians. */
const SAME_DIRECTION_RAD = 1e-6;

const NO_CUT: SawCuts = { cuts: 0, length: 0 };

/** A straight cut; what is kept has `x · normal ≤ at`. */
interface Line {
  readonly normal: Point;
  readonly at: number;
}

/** A piece where it lies in its unit, and which of its sides are sawn straight. */
interface PlacedPiece {
  readonly place: Place;
  readonly lines: readonly Line[];
}

const dot = ([ax, ay]: Point, [bx, by]: Point): number => ax * bx + ay * by;

/** Along the side from one corner to the next, the ring's inside kept. */
function sideLine([ax, ay]: Point, [bx, by]: Point): Line {
  const length = Math.hypot(bx - ax, by - ay);
  const normal: Point = [(by - ay) / length, (ax - bx) / length];
  return { normal, at: dot(normal, [ax, ay]) };
}

function reach(ring: readonly Point[], normal: Point): readonly [number, number] {
  const along = ring.map((point) => dot(point, normal));
  return [Math.min(...along), Math.max(...along)];
}

const kept = (stock: readonly Point[], { normal: [nx, ny], at }: Line): readonly Point[] =>
  ringInHalfPlane(stock, { a: -nx, b: -ny, at: [nx * at, ny * at], height: 0 });

/** How far the saw goes through the stock along a line, mm. */
function through(stock: readonly Point[], { normal, at }: Line): number {
  const along: number[] = [];
  stock.forEach((from, n) => {
    const to = stock[(n + 1) % stock.length];
    const [a, b] = [dot(from, normal) - at, dot(to, normal) - at];
    if (a < 0 === b < 0) return;
    const t = a / (a - b);
    const [x, y] = [from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1])];
    along.push(y * normal[0] - x * normal[1]);
  });
  return along.length < 2 ? 0 : Math.max(...along) - Math.min(...along);
}

const shorter = (one: SawCuts | null, other: SawCuts): SawCuts =>
  one && one.length <= other.length ? one : other;

/** One piece out of what is left of the unit: a cut along each of its straight sides that does not lie on a side of it. */
function cutOut(stock: readonly Point[], lines: readonly Line[]): SawCuts {
  const open = lines.filter((line) => reach(stock, line.normal)[1] > line.at + ON_SIDE_MM);
  if (open.length === 0) return NO_CUT;
  const cuts = open.map((line) => ({ line, long: through(stock, line) }));
  const tried =
    open.length <= SIDES_IN_EVERY_ORDER
      ? cuts
      : [cuts.reduce((least, cut) => (cut.long < least.long ? cut : least))];
  return tried.reduce<SawCuts | null>((best, { line, long }) => {
    const rest = cutOut(
      kept(stock, line),
      open.filter((other) => other !== line),
    );
    return shorter(best, { cuts: rest.cuts + 1, length: rest.length + long });
  }, null)!;
}

/** A cut that parts pieces: the line that the saw goes along, and what it leaves on either side. */
interface Parting {
  readonly long: number;
  readonly near: readonly PlacedPiece[];
  readonly far: readonly PlacedPiece[];
  readonly nearStock: readonly Point[];
  readonly farStock: readonly Point[];
}

/** Directions square to the sides of the pieces, each once; where no side parts them, that from corner to corner. */
function normalsOf(pieces: readonly PlacedPiece[]): Point[] {
  const found: Point[] = [];
  for (const { place } of pieces) {
    place.forEach((from, n) => {
      const { normal } = sideLine(from, place[(n + 1) % place.length]);
      const known = found.some(
        ([x, y]) => Math.abs(x * normal[1] - y * normal[0]) < SAME_DIRECTION_RAD,
      );
      if (!known) found.push(normal);
    });
  }
  return found;
}

/** The direction of the shortest way from a corner of one piece to a corner of the other. */
function cornerNormal(one: Place, other: Place): Point {
  let [least, best]: [number, Point] = [Infinity, [1, 0]];
  for (const [ax, ay] of one) {
    for (const [bx, by] of other) {
      const length = Math.hypot(bx - ax, by - ay);
      if (length < least) [least, best] = [length, [(bx - ax) / length, (by - ay) / length]];
    }
  }
  return best;
}

function partings(
  stock: readonly Point[],
  pieces: readonly PlacedPiece[],
  normals: readonly Point[],
  kerf: number,
): Parting[] {
  return normals.flatMap((normal) => {
    const order = pieces
      .map((piece) => ({ piece, at: reach(piece.place, normal) }))
      .sort((one, other) => one.at[0] - other.at[0]);
    let high = -Infinity;
    return order.slice(0, -1).flatMap(({ at }, n): Parting[] => {
      high = Math.max(high, at[1]);
      const low = order[n + 1].at[0];
      if (low < high + kerf - PLACE_TOLERANCE_MM) return [];
      const near = order.slice(0, n + 1).map(({ piece }) => piece);
      const far = order.slice(n + 1).map(({ piece }) => piece);
      const back: Point = [-normal[0], -normal[1]];
      const parting = (long: number, upTo: number, from: number): Parting => ({
        long,
        near,
        far,
        nearStock: kept(stock, { normal, at: upTo }),
        farStock: kept(stock, { normal: back, at: -from }),
      });
      // Along the one or along the other; where just the saw's cut lies between them that is the same cut.
      const along = parting(through(stock, { normal, at: high }), high, Math.min(high + kerf, low));
      if (low <= high + kerf + PLACE_TOLERANCE_MM) return [along];
      return [along, parting(through(stock, { normal, at: low }), low - kerf, low)];
    });
  });
}

/** Pieces parted one after another, then each cut out: the shortest way of those tried. */
function sawnApart(stock: readonly Point[], pieces: readonly PlacedPiece[], kerf: number): SawCuts {
  if (pieces.length === 1) return cutOut(stock, pieces[0].lines);
  let ways = partings(stock, pieces, normalsOf(pieces), kerf);
  if (ways.length === 0) {
    const normal = cornerNormal(pieces[0].place, pieces[1].place);
    ways = partings(stock, pieces, [normal], kerf);
  }
  if (pieces.length > PIECES_IN_EVERY_ORDER) {
    ways = [ways.reduce((least, way) => (way.long < least.long ? way : least))];
  }
  return ways.reduce<SawCuts | null>((best, { long, near, far, nearStock, farStock }) => {
    const [one, other] = [sawnApart(nearStock, near, kerf), sawnApart(farStock, far, kerf)];
    return shorter(best, {
      cuts: one.cuts + other.cuts + 1,
      length: one.length + other.length + long,
    });
  }, null)!;
}

/**
 * The way that the saw goes to make pieces out of one whole unit, mm, and in how many cuts. Pieces are parted by
 * straight cuts right through what is left of the unit; then each has its own straight sides cut right through what is left
 * of its part. A cut that makes a side of two pieces is one. Curves and notches come last, along their own outline.
 */
export function sawWay(
  shapes: readonly PieceShape[],
  places: readonly Place[],
  kerf: number,
): SawCuts {
  const [hx, hy] = shapes[0].half;
  const unit: Point[] = [[-hx, -hy], [hx, -hy], [hx, hy], [-hx, hy]]; // prettier-ignore
  const pieces = places.map((place, n): PlacedPiece => ({
    place,
    lines: place.flatMap((from, m) =>
      shapes[n].sawnSides[m] ? [sideLine(from, place[(m + 1) % place.length])] : [],
    ),
  }));
  const straight = sawnApart(unit, pieces, kerf);
  return shapes.reduce<SawCuts>(
    (sum, { bent }) => ({ cuts: sum.cuts + bent.cuts, length: sum.length + bent.length }),
    straight,
  );
}
