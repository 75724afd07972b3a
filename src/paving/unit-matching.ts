import type { Point } from '@/geometry/point';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import type { LaidMotif, Laying, UnitSet } from './laying';
import type { Unit } from './layout-document';

/** A unit that comes to lie further off than this, mm, has moved; less is what a crew cannot set out. */
export const MOVED_MM = 1;

/** What has become of a unit of one floor on the other. */
export const UNIT_FATE = { single: 0, kept: 1, moved: 2 } as const;

/**
 * Which units of floor A are which of floor B, by place and kind, never by address. Arrays run beside
 * each floor's `laid`. A unit that is `single` is gone (on A) or new (on B).
 */
export interface UnitMatching {
  /** For each laid unit of A its partner's index on B, or −1; and the same for B. */
  readonly partnerOfA: Int32Array;
  readonly partnerOfB: Int32Array;
  /** One of `UNIT_FATE` for each laid unit. */
  readonly fateOfA: Uint8Array;
  readonly fateOfB: Uint8Array;
  readonly kept: number;
  readonly moved: number;
  readonly gone: number;
  readonly added: number;
  /** How far the corner that moved furthest came, mm, of all kept and moved units; 0 when there are none. */
  readonly furthest: number;
  /** Whether what lies near a unit tells nothing of it, as after a large turn: then none counts as moved. */
  readonly anew: boolean;
}

/** A unit's kind, by its sizes alone: two documents may give one slab different ids and names. */
export function unitKind({ length, width, thickness }: Unit): string {
  const hundredths = (mm: number) => Math.round(mm / LENGTH_TOLERANCE_MM);
  const long = Math.max(length, width);
  const short = Math.min(length, width);
  return `${hundredths(long)}×${hundredths(short)}×${hundredths(thickness)}`;
}

/** The halves of a motif entry's unit on the ground, the longer side first. */
function halves({ unit, halfLength, halfWidth }: LaidMotif): readonly [Point, Point] {
  return unit.length >= unit.width
    ? [halfLength, halfWidth]
    : [halfWidth, [-halfLength[0], -halfLength[1]]];
}

/** How a unit of one motif entry must be bent to lie as one of another, when their centres agree. */
interface Bend {
  readonly kindAlike: boolean;
  /** Differences of the two halves, mm: corners part by the centres' difference ± e ± f. */
  readonly e: Point;
  readonly f: Point;
  readonly turned: boolean;
}

const minus = ([ax, ay]: Point, [bx, by]: Point): Point => [ax - bx, ay - by];

function furthestCorner(dx: number, dy: number, { e, f, turned }: Bend): number {
  if (!turned) return Math.hypot(dx, dy);
  return Math.max(
    Math.hypot(dx + e[0] + f[0], dy + e[1] + f[1]),
    Math.hypot(dx + e[0] - f[0], dy + e[1] - f[1]),
    Math.hypot(dx - e[0] + f[0], dy - e[1] + f[1]),
    Math.hypot(dx - e[0] - f[0], dy - e[1] - f[1]),
  );
}

/** A rectangle looks the same turned by 180°, a square by 90° too: the least of these bends. */
function bendOf(one: LaidMotif, other: LaidMotif): Bend {
  const [oneLong, oneShort] = halves(one);
  const [long, short] = halves(other);
  const negative = ([x, y]: Point): Point => [-x, -y];
  const square = Math.abs(one.unit.length - one.unit.width) <= LENGTH_TOLERANCE_MM;
  const ways: (readonly [Point, Point])[] = [
    [long, short],
    [negative(long), negative(short)],
    ...(square
      ? ([
          [short, negative(long)],
          [negative(short), long],
        ] as const)
      : []),
  ];
  const bends = ways.map(([l, s]): Bend => {
    const bend = { kindAlike: true, e: minus(oneLong, l), f: minus(oneShort, s), turned: true };
    return { ...bend, turned: furthestCorner(0, 0, bend) > LENGTH_TOLERANCE_MM };
  });
  return bends.reduce((best, bend) =>
    furthestCorner(0, 0, { ...bend, turned: true }) <
    furthestCorner(0, 0, { ...best, turned: true })
      ? bend
      : best,
  );
}

/** Units of a set sorted into square cells, so that those near a point are found at once. */
interface Cells {
  readonly left: number;
  readonly bottom: number;
  readonly size: number;
  readonly across: number;
  readonly up: number;
  readonly start: Int32Array;
  readonly unit: Int32Array;
}

function cellsOf(set: UnitSet, units: Int32Array, leastSize: number): Cells {
  let [left, bottom, right, top] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const n of units) {
    left = Math.min(left, set.x[n]);
    right = Math.max(right, set.x[n]);
    bottom = Math.min(bottom, set.y[n]);
    top = Math.max(top, set.y[n]);
  }
  // About one cell a unit, and never many more along one side than there are units.
  const width = right - left;
  const height = top - bottom;
  const count = Math.max(1, units.length);
  const size = Math.max(
    leastSize,
    Math.sqrt((width * height) / count),
    width / count,
    height / count,
  );
  const across = units.length === 0 ? 0 : Math.floor(width / size) + 1;
  const up = units.length === 0 ? 0 : Math.floor(height / size) + 1;
  const start = new Int32Array(across * up + 1);
  const cell = new Int32Array(units.length);
  for (let n = 0; n < units.length; n++) {
    const column = Math.floor((set.x[units[n]] - left) / size);
    const row = Math.floor((set.y[units[n]] - bottom) / size);
    cell[n] = row * across + column;
    start[cell[n] + 1]++;
  }
  for (let c = 0; c < across * up; c++) start[c + 1] += start[c];
  const unit = new Int32Array(units.length);
  const filled = start.slice();
  for (let n = 0; n < units.length; n++) unit[filled[cell[n]]++] = units[n];
  return { left, bottom, size, across, up, start, unit };
}

/** Pairs that could be matched, with how far the furthest corner moved, mm. */
interface Pairs {
  readonly a: number[];
  readonly b: number[];
  readonly move: number[];
}

function pairsWithin(
  a: Laying,
  unitsA: Int32Array,
  b: Laying,
  unitsB: Int32Array,
  bends: readonly (readonly Bend[])[],
  reachOf: (entry: LaidMotif) => number,
  greatestMove: number,
): Pairs {
  const reach = a.motif.map(reachOf);
  const cells = cellsOf(b.laid, unitsB, Math.max(...reach));
  const pairs: Pairs = { a: [], b: [], move: [] };
  const column = (x: number) => Math.floor((x - cells.left) / cells.size);
  const row = (y: number) => Math.floor((y - cells.bottom) / cells.size);
  for (const n of unitsA) {
    const [k, x, y] = [a.laid.k[n], a.laid.x[n], a.laid.y[n]];
    const r = reach[k];
    const toColumn = Math.min(cells.across - 1, column(x + r));
    const toRow = Math.min(cells.up - 1, row(y + r));
    for (let v = Math.max(0, row(y - r)); v <= toRow; v++) {
      for (let u = Math.max(0, column(x - r)); u <= toColumn; u++) {
        const cell = v * cells.across + u;
        for (let at = cells.start[cell]; at < cells.start[cell + 1]; at++) {
          const m = cells.unit[at];
          const bend = bends[k][b.laid.k[m]];
          if (!bend.kindAlike) continue;
          const dx = x - b.laid.x[m];
          const dy = y - b.laid.y[m];
          if (dx * dx + dy * dy > r * r) continue;
          const move = furthestCorner(dx, dy, bend);
          if (move > greatestMove) continue;
          pairs.a.push(n);
          pairs.b.push(m);
          pairs.move.push(move);
        }
      }
    }
  }
  return pairs;
}

/**
 * Order in which pairs are matched: the least move first. Moves that differ by rounding alone must count as
 * one, or a field shifted by half its pitch would be matched at random; such pairs go course by course
 * by the middle between the two units. All of it is the same seen from either floor.
 */
function pairOrder(a: UnitSet, b: UnitSet, pairs: Pairs, which: Uint32Array): Uint32Array {
  const steps = (mm: number) => Math.round(mm / LENGTH_TOLERANCE_MM + 0.317);
  const move = pairs.move.map(steps);
  const sum = (one: Float64Array, other: Float64Array) =>
    pairs.a.map((n, at) => steps(one[n] + other[pairs.b[at]]));
  const [x, y] = [sum(a.x, b.x), sum(a.y, b.y)];
  const slope = (n: number) =>
    (a.x[pairs.a[n]] - b.x[pairs.b[n]]) * (a.y[pairs.a[n]] - b.y[pairs.b[n]]);
  return which.sort(
    (n, m) => move[n] - move[m] || y[n] - y[m] || x[n] - x[m] || slope(n) - slope(m),
  );
}

function matchInto(
  a: Laying,
  b: Laying,
  pairs: Pairs,
  partnerOfA: Int32Array,
  partnerOfB: Int32Array,
  matched: (n: number, m: number, move: number) => void,
): void {
  const choicesOfA = new Uint16Array(a.laid.count);
  const choicesOfB = new Uint16Array(b.laid.count);
  const count = pairs.a.length;
  for (let at = 0; at < count; at++) {
    choicesOfA[pairs.a[at]]++;
    choicesOfB[pairs.b[at]]++;
  }
  const contested: number[] = [];
  const take = (at: number) => {
    const [n, m] = [pairs.a[at], pairs.b[at]];
    if (partnerOfA[n] >= 0 || partnerOfB[m] >= 0) return;
    partnerOfA[n] = m;
    partnerOfB[m] = n;
    matched(n, m, pairs.move[at]);
  };
  for (let at = 0; at < count; at++) {
    if (choicesOfA[pairs.a[at]] === 1 && choicesOfB[pairs.b[at]] === 1) take(at);
    else contested.push(at);
  }
  if (contested.length > 0) {
    pairOrder(a.laid, b.laid, pairs, Uint32Array.from(contested)).forEach(take);
  }
}

const unmatched = (partners: Int32Array): Int32Array => {
  const left = new Int32Array(partners.length);
  let count = 0;
  for (let n = 0; n < partners.length; n++) if (partners[n] < 0) left[count++] = n;
  return left.subarray(0, count);
};

/** Of the pairs found, at least so many must tell something, or the floor is laid anew. */
const TELLING_SHARE = 0.5;
/** A unit that stays within this part of its own width is taken for the same one. */
const STAYING_PART = 0.25;
/** Moves that agree to this are one and the same move, mm. */
const SAME_MOVE_MM = 2;
/** Moves are shorter than a unit, so than so many steps of `SAME_MOVE_MM` either way. */
const MOST_STEPS = 1e5;

/**
 * How many moved pairs tell something: the unit stays within a quarter of its width, or goes the very way that most go.
 * After a large turn neither holds of more than a chance few, whatever was matched with whatever lies near.
 */
function tellingPairs(a: Laying, b: Laying, partnerOfA: Int32Array, fateOfA: Uint8Array): number {
  const staying = a.motif.map(
    ({ unit }) => (STAYING_PART * Math.min(unit.length, unit.width)) ** 2,
  );
  const step = (mm: number) => Math.sign(mm) * Math.round(Math.abs(mm) / SAME_MOVE_MM + 0.317);
  const ways = new Map<number, number>();
  let stays = 0;
  let commonest = 0;
  for (let n = 0; n < partnerOfA.length; n++) {
    if (fateOfA[n] !== UNIT_FATE.moved) continue;
    const dx = b.laid.x[partnerOfA[n]] - a.laid.x[n];
    const dy = b.laid.y[partnerOfA[n]] - a.laid.y[n];
    if (dx * dx + dy * dy <= staying[a.laid.k[n]]) stays++;
    else {
      const way = step(dx) * MOST_STEPS + step(dy);
      const alike = (ways.get(way) ?? 0) + 1;
      ways.set(way, alike);
      commonest = Math.max(commonest, alike);
    }
  }
  return stays + commonest;
}

/**
 * Matches the laid units of two floors that share a ground's coordinates.
 *
 * Two units are of one **kind** when their sizes agree (`unitKind`). A unit is **kept** when one of its
 * kind lies on the other floor with no corner more than `MOVED_MM` off. Of the rest, a unit has
 * **moved** to one of its kind whose centre lies within half its diagonal, the unit that moved least being
 * matched first; a unit turned where it stands has moved too. What then stands alone is gone or new. So
 * a field pushed along by less than half a unit has moved, one pushed by a whole pitch is kept but for its
 * borders, and after a change of bond each unit is told by what lies where it lay. Where that tells nothing of most
 * (`tellingPairs`), the floor is laid **anew**, and none counts as moved.
 *
 * No unit is matched twice, and matching B with A gives the same pairs. Work grows with the units.
 */
export function unitsMatched(a: Laying, b: Laying): UnitMatching {
  const kindsB = b.motif.map(({ unit }) => unitKind(unit));
  const bends = a.motif.map((one) =>
    b.motif.map((other, k): Bend => {
      const alike = unitKind(one.unit) === kindsB[k];
      return alike ? bendOf(one, other) : { kindAlike: false, e: [0, 0], f: [0, 0], turned: false };
    }),
  );
  const partnerOfA = new Int32Array(a.laid.count).fill(-1);
  const partnerOfB = new Int32Array(b.laid.count).fill(-1);
  const fateOfA = new Uint8Array(a.laid.count);
  const fateOfB = new Uint8Array(b.laid.count);
  let furthest = 0;
  let kept = 0;
  let moved = 0;
  const note = (fate: number) => (n: number, m: number, move: number) => {
    fateOfA[n] = fate;
    fateOfB[m] = fate;
    if (fate === UNIT_FATE.kept) kept++;
    else moved++;
    furthest = Math.max(furthest, move);
  };
  const stillOff = MOVED_MM + LENGTH_TOLERANCE_MM;
  const match = (reachOf: (entry: LaidMotif) => number, greatest: number, fate: number) => {
    const [unitsA, unitsB] = [unmatched(partnerOfA), unmatched(partnerOfB)];
    if (unitsA.length === 0 || unitsB.length === 0) return;
    const pairs = pairsWithin(a, unitsA, b, unitsB, bends, reachOf, greatest);
    matchInto(a, b, pairs, partnerOfA, partnerOfB, note(fate));
  };
  match(() => stillOff, stillOff, UNIT_FATE.kept);
  const furthestKept = furthest;
  match(({ unit }) => Math.hypot(unit.length, unit.width) / 2, Infinity, UNIT_FATE.moved);
  const anew =
    moved > 0 && kept + tellingPairs(a, b, partnerOfA, fateOfA) < TELLING_SHARE * (kept + moved);
  if (anew) {
    for (let n = 0; n < partnerOfA.length; n++) {
      if (fateOfA[n] !== UNIT_FATE.moved) continue;
      fateOfA[n] = UNIT_FATE.single;
      fateOfB[partnerOfA[n]] = UNIT_FATE.single;
      partnerOfB[partnerOfA[n]] = -1;
      partnerOfA[n] = -1;
    }
    moved = 0;
    furthest = furthestKept;
  }
  const paired = kept + moved;
  return {
    partnerOfA,
    partnerOfB,
    fateOfA,
    fateOfB,
    kept,
    moved,
    gone: a.laid.count - paired,
    added: b.laid.count - paired,
    furthest,
    anew,
  };
}
