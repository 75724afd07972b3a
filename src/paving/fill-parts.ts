import { latticeCell } from '@/geometry/lattice';
import type { Point } from '@/geometry/point';
import { rectangleClip } from '@/geometry/rectangle';
import { rectangleCoverPart } from '@/geometry/rectangle-cover';
import { ringHolds } from '@/geometry/ring';
import { pointTurned, rotation } from '@/geometry/rotation';
import { bondPattern } from './bond';
import type { Ground } from './ground';
import type { LayoutDocument } from './layout-document';
import { layFloor, type Laying, type UnitSet } from './laying';
import {
  patternPieces,
  pieceNarrow,
  piecesMissing,
  type PatternPiece,
  type PlaceStep,
} from './pattern-pieces';

/**
 * What the aggregate takes, told apart. A **place** is where the pattern would put a unit; in chequer
 * the places left open count as places too. A place is whole when a unit there would be whole. A
 * **joint** is a strip or crossing of the pattern, no wider than its joint, with laid units all about
 * it. A **void** is a whole place without a unit, and what the pattern leaves open between whole
 * places and is no joint. The **margin** is the rest. Areas in m²; the three add up to the fill.
 */
export interface FillParts {
  readonly joints: number;
  readonly voids: number;
  readonly margin: number;
  /** Places of the pattern that are left open (chequer), and those of lifted units. */
  readonly openPlaces: number;
  readonly liftedPlaces: number;
  /** False where a pattern of one's own has units at odd turns to one another, or gaps with nothing beyond: what is open there counts as margin. */
  readonly toldApart: boolean;
}

const MM2_PER_M2 = 1e6;
/** Below this a sum of covers, mm², is rounding: the piece is all in or all out. */
const COVER_ROUNDING_MM2 = 1e-3;
/** Share of a lattice's cell that is rounding. */
const MISSING = 1e-6;

/** A chequer's floor with a place wherever it has a unit or a void: a stack of the same units. */
function placesDocument(document: LayoutDocument): LayoutDocument {
  const { bond } = document;
  if (bond.kind !== 'chequer') return document;
  return {
    ...document,
    bond: { ...bond, kind: 'stack' },
    lifted: document.lifted.map(([i, j, k]) => [2 * i + j, j, k]),
  };
}

const LAID = 1;
const WHOLE = 2;

/** Which places are whole, and which of them laid, by address. */
function placeStates(laying: Laying, isPlaceOpen: (i: number, j: number) => boolean) {
  const sets: readonly UnitSet[] = [laying.laid, laying.lifted];
  const min = [Infinity, Infinity];
  const max = [-Infinity, -Infinity];
  for (const { count, i, j } of sets)
    for (let n = 0; n < count; n++) {
      min[0] = Math.min(min[0], i[n]);
      max[0] = Math.max(max[0], i[n]);
      min[1] = Math.min(min[1], j[n]);
      max[1] = Math.max(max[1], j[n]);
    }
  const [wide, high] = [max[0] - min[0] + 1, max[1] - min[1] + 1];
  // A lattice on the skew has few of its addresses on the floor; by row they are kept one by one.
  const dense = wide * high * laying.motif.length <= 64 * (laying.laid.count + 4096);
  const table = dense ? new Uint8Array(wide * high * laying.motif.length) : null;
  const sparse = new Map<number, number>();
  const place = (i: number, j: number, k: number) =>
    (k * high + (j - min[1])) * wide + (i - min[0]);
  sets.forEach((set, which) => {
    for (let n = 0; n < set.count; n++) {
      const open = which === 1 || isPlaceOpen(set.i[n], set.j[n]);
      const at = place(set.i[n], set.j[n], set.k[n]);
      if (table) table[at] = open ? WHOLE : LAID;
      else sparse.set(at, open ? WHOLE : LAID);
    }
  });
  return (i: number, j: number, k: number): number => {
    if (i < min[0] || i > max[0] || j < min[1] || j > max[1]) return 0;
    const at = place(i, j, k);
    return table ? table[at] : (sparse.get(at) ?? 0);
  };
}

/** Chords of the ground by square cells of the plane, so that a piece meets few of them. */
function chordGrid({ chords, box }: Ground, size: number) {
  const cells = new Map<string, number[]>();
  for (let n = 0; n < chords.count; n++) {
    const { ax, ay, bx, by } = chords;
    const across = [Math.min(ax[n], bx[n]), Math.max(ax[n], bx[n])];
    const column = (x: number) => Math.floor((x - box.min[0]) / size);
    for (let c = column(across[0]); c <= column(across[1]); c++) {
      const part = (x: number) => (bx[n] === ax[n] ? 0 : (x - ax[n]) / (bx[n] - ax[n]));
      const from = Math.max(across[0], box.min[0] + c * size);
      const to = Math.min(across[1], box.min[0] + (c + 1) * size);
      const ends =
        bx[n] === ax[n] ? [ay[n], by[n]] : [from, to].map((x) => ay[n] + part(x) * (by[n] - ay[n]));
      const row = (y: number) => Math.floor((y - box.min[1]) / size);
      // A cell more either way, for what rounding does on the line between two.
      for (let r = row(Math.min(...ends)) - 1; r <= row(Math.max(...ends)) + 1; r++) {
        const key = `${c},${r}`;
        const list = cells.get(key);
        if (list) list.push(n);
        else cells.set(key, [n]);
      }
    }
  }
  return (x0: number, y0: number, x1: number, y1: number): ReadonlySet<number> | null => {
    let found: Set<number> | null = null;
    const first = [Math.floor((x0 - box.min[0]) / size) - 1, Math.floor((y0 - box.min[1]) / size)];
    const last = [Math.floor((x1 - box.min[0]) / size) + 1, Math.floor((y1 - box.min[1]) / size)];
    for (let c = first[0]; c <= last[0]; c++)
      for (let r = first[1]; r <= last[1]; r++) {
        for (const n of cells.get(`${c},${r}`) ?? []) (found ??= new Set()).add(n);
      }
    return found;
  };
}

/** Area, mm², of the ground inside a rectangle turned by `turned` about its centre. */
function groundWithin(
  ground: Ground,
  chords: ReadonlySet<number>,
  [x, y]: Point,
  hx: number,
  hy: number,
  [cos, sin]: Point,
): number {
  const { ax, ay, bx, by, side } = ground.chords;
  let sum = 0;
  let met = false;
  for (const n of chords) {
    const x0 = (ax[n] - x) * cos + (ay[n] - y) * sin;
    const y0 = (ay[n] - y) * cos - (ax[n] - x) * sin;
    const x1 = (bx[n] - x) * cos + (by[n] - y) * sin;
    const y1 = (by[n] - y) * cos - (bx[n] - x) * sin;
    if (rectangleClip(hx, hy, x0, y0, x1, y1) === null) continue;
    met = true;
    sum +=
      side[n] > 0
        ? rectangleCoverPart(hx, hy, x0, y0, x1, y1)
        : rectangleCoverPart(hx, hy, x1, y1, x0, y0);
  }
  const whole = 4 * hx * hy;
  if (!met) return whole;
  if (sum > COVER_ROUNDING_MM2) return Math.min(whole, sum);
  if (sum < -COVER_ROUNDING_MM2) return Math.max(0, whole + sum);
  const inside = ground.rings.every(
    (ring) => ringHolds(ring.outline, [x, y]) === (ring.ring === 0),
  );
  return inside ? whole : 0;
}

/** The fill of a laying, told apart; its work grows with the units laid. */
export function fillParts(laying: Laying): FillParts {
  const { document, ground, laid, motif } = laying;
  let covered = 0;
  for (let n = 0; n < laid.count; n++) {
    const { unit } = motif[laid.k[n]];
    covered += unit.length * unit.width;
  }
  const fill = ground.area - covered;
  const isChequer = document.bond.kind === 'chequer';
  const places = isChequer ? layFloor(placesDocument(document), ground) : laying;
  const isOpen = (i: number, j: number) => isChequer && ((i - j) & 1) !== 0;
  const pattern = bondPattern(places.document);
  const patternPlaces = pattern.motif.map(({ at, turn }, k) => {
    const { length, width } = places.motif[k].unit;
    return { at, turn, length, width };
  });
  const known = patternPieces(patternPlaces, pattern);
  // Units of stepping do not touch: between them are voids, however narrow.
  const jointOf = (piece: PatternPiece) =>
    document.bond.kind !== 'stepping' && pieceNarrow(piece, pattern.joint);

  let openPlaces = 0;
  let voids = 0;
  for (const set of [places.laid, places.lifted]) {
    for (let n = 0; n < set.count; n++) {
      const open = isOpen(set.i[n], set.j[n]);
      if (!open && set === places.laid) continue;
      const { unit } = places.motif[set.k[n]];
      voids += unit.length * unit.width;
      if (open) openPlaces += 1;
    }
  }
  let joints = 0;
  if (known && places.laid.count + places.lifted.count > 0) {
    const state = placeStates(places, isOpen);
    const chordsNear = chordGrid(
      ground,
      Math.max(Math.hypot(...pattern.a), Math.hypot(...pattern.b), Math.sqrt(ground.area) / 512),
    );
    const turned = rotation(document.placement.turn + known.turn);
    const [cos, sin] = turned;
    const onGround = (i: number, j: number, [x, y]: Point): Point => {
      const [px, py] = pointTurned([x, y], turned);
      const { a, b } = places.lattice;
      return [
        places.origin[0] + i * a[0] + j * b[0] + px,
        places.origin[1] + i * a[1] + j * b[1] + py,
      ];
    };
    for (const piece of known.pieces) {
      const narrow = jointOf(piece);
      const [first, ...others] = piece.against;
      const area = piece.width * piece.height;
      const [hx, hy] = [piece.width / 2, piece.height / 2];
      const [wide, high] = [
        Math.abs(hx * cos) + Math.abs(hy * sin),
        Math.abs(hx * sin) + Math.abs(hy * cos),
      ];
      for (const set of [places.laid, places.lifted]) {
        for (let n = 0; n < set.count; n++) {
          if (set.k[n] !== first.k) continue;
          const [i, j] = [set.i[n], set.j[n]];
          let allLaid = state(i, j, first.k) === LAID;
          const whole = others.every((step: PlaceStep) => {
            const found = state(i + step.i, j + step.j, step.k);
            if (found !== LAID) allLaid = false;
            return found !== 0;
          });
          if (!whole) continue;
          const centre = onGround(i, j, piece.centre);
          const near = chordsNear(
            centre[0] - wide,
            centre[1] - high,
            centre[0] + wide,
            centre[1] + high,
          );
          const inGround = near ? groundWithin(ground, near, centre, hx, hy, turned) : area;
          if (narrow && allLaid) joints += inGround;
          else voids += inGround;
        }
      }
    }
  }
  // The two sums are of many terms; what rounding leaves beyond the fill is none of the margin's.
  const margin = Math.max(0, fill - joints - voids);
  return {
    joints: joints / MM2_PER_M2,
    voids: voids / MM2_PER_M2,
    margin: margin / MM2_PER_M2,
    openPlaces,
    liftedPlaces: laying.lifted.count,
    toldApart:
      known !== null &&
      piecesMissing(known, patternPlaces, pattern) < MISSING * Math.abs(latticeCell(pattern)),
  };
}
