import { convexApart } from '@/geometry/convex-gap';
import { groupPlaces, partedByCuts, PLACE_TOLERANCE_MM, sharesFit } from './group-places';
import { leastUnits } from './least-units';
import { mostPairs } from './matching';
import { SHAPE_GRID_MM, type PieceShape, type Place } from './piece-shape';

/** What one whole unit is sawn into. */
export interface SawnUnit {
  /** Which pieces, by their place in the list that was handed in. */
  readonly pieces: readonly number[];
  /** Where each piece's hull lies in the unit's own frame, mm. */
  readonly places: readonly Place[];
}

/** The whole units to saw, and the pieces that come out of each. */
export interface Nesting {
  readonly units: readonly SawnUnit[];
  /** No nesting takes fewer units: how far this one can be from the best is `units.length` less this. */
  readonly leastUnits: number;
}

/** Up to so many pieces are paired by the most pairs there are; of more, each looks among a few units only. */
const PAIRED_EXACTLY = 320;
const FEW_UNITS = 40;

/** Nests pieces of one kind of unit; shapes must all be of units of one size. */
export function nesting(shapes: readonly PieceShape[], kerf: number): Nesting {
  const place = placer(shapes, kerf);
  const together = (one: number, other: number) => place([one, other]) !== null;
  const never = (one: number, other: number) => {
    if (!sharesFit([shapes[one], shapes[other]])) return true;
    return !shapes[one].loose && !shapes[other].loose && !together(one, other);
  };
  const least = leastUnits(shapes, kerf, (one, other) => !never(one, other));
  const few = shapes.length <= PAIRED_EXACTLY;
  let best = filled(shapes, [], place, few ? Infinity : FEW_UNITS);
  if (few && best.length > least) {
    // By pairs: as many as there can be, then the units that hold least are emptied into others.
    const near = shapes.map((_, n) =>
      shapes.flatMap((_, m) => (m !== n && together(n, m) ? [m] : [])),
    );
    const mate = mostPairs(near);
    const pairs = shapes.flatMap((_, n) => (mate[n] > n ? [[n, mate[n]]] : []));
    const single = shapes.flatMap((_, n) => (mate[n] < 0 ? [[n]] : []));
    const paired = emptied(shapes, [...pairs, ...single], place);
    if (paired.length < best.length) best = paired;
  }
  best = emptied(shapes, best, place, few ? Infinity : FEW_UNITS);
  const units = best.map((pieces): SawnUnit => ({ pieces, places: place(pieces)! }));
  units.forEach((unit) => sawnChecked(shapes, unit, kerf));
  return { units, leastUnits: least };
}

type Placer = (pieces: readonly number[]) => Place[] | null;

/** Places for a group of pieces; groups of like pieces are worked out once. */
function placer(shapes: readonly PieceShape[], kerf: number): Placer {
  const names = new Map<string, number>();
  const name = shapes.map(({ key }) => {
    if (!names.has(key)) names.set(key, names.size);
    return names.get(key)!;
  });
  const known = new Map<string, Place[] | null>();
  return (pieces) => {
    if (!sharesFit(pieces.map((piece) => shapes[piece]))) return null;
    const key = pieces.map((piece) => name[piece]).join();
    let places = known.get(key);
    if (places === undefined) {
      places = groupPlaces(
        pieces.map((piece) => shapes[piece]),
        kerf,
      );
      known.set(key, places);
    }
    return places;
  };
}

const areaOf = (shapes: readonly PieceShape[], pieces: readonly number[]): number =>
  pieces.reduce((sum, piece) => sum + shapes[piece].hullArea, 0);

/** Puts the pieces, the largest first, each into the fullest unit that has a place for it, or into one more. */
function filled(
  shapes: readonly PieceShape[],
  start: readonly (readonly number[])[],
  place: Placer,
  tries: number,
): number[][] {
  const groups = start.map((group) => [...group]);
  const taken = new Set(groups.flat());
  const rest = shapes
    .map((_, n) => n)
    .filter((n) => !taken.has(n))
    .sort((m, n) => shapes[n].hullArea - shapes[m].hullArea);
  for (const piece of rest) {
    const home = roomFor(shapes, groups, piece, place, tries);
    if (home) home.push(piece);
    else groups.push([piece]);
  }
  return groups;
}

function roomFor(
  shapes: readonly PieceShape[],
  groups: readonly number[][],
  piece: number,
  place: Placer,
  tries: number,
): number[] | null {
  const { half } = shapes[piece];
  const room = 4 * half[0] * half[1] - shapes[piece].hullArea;
  const fitting = groups
    .map((group) => ({ group, area: areaOf(shapes, group) }))
    .filter(({ area }) => area <= room * (1 + 1e-9))
    .sort((one, other) => other.area - one.area);
  let tried = 0;
  for (const { group } of fitting) {
    if (!sharesFit([...group, piece].map((n) => shapes[n]))) continue;
    if (place([...group, piece])) return group;
    if (++tried >= tries) return null;
  }
  return null;
}

/** Empties units into others, the least filled first, as long as that saves one. */
function emptied(
  shapes: readonly PieceShape[],
  start: readonly (readonly number[])[],
  place: Placer,
  tries = Infinity,
): number[][] {
  let groups = start.map((pieces, id) => ({ id, pieces: [...pieces] }));
  const order = [...groups].sort((m, n) => areaOf(shapes, m.pieces) - areaOf(shapes, n.pieces));
  for (const { id } of order) {
    const group = groups.find((other) => other.id === id)!;
    const others = groups
      .filter((other) => other !== group)
      .map((other) => ({ id: other.id, pieces: [...other.pieces] }));
    const homes = others.map(({ pieces }) => pieces);
    const moved = [...group.pieces]
      .sort((m, n) => shapes[n].hullArea - shapes[m].hullArea)
      .every((piece) => {
        const home = roomFor(shapes, homes, piece, place, tries);
        home?.push(piece);
        return home !== null;
      });
    if (moved) groups = others;
  }
  return groups.map(({ pieces }) => pieces);
}

/** Holds what one unit is sawn into against the geometry alone; what does not hold is thrown, never an answer. */
export function sawnChecked(
  shapes: readonly PieceShape[],
  { pieces, places }: SawnUnit,
  kerf: number,
): void {
  places.forEach((one, n) => {
    const { half } = shapes[pieces[n]];
    const inside = one.every(
      ([x, y]) => Math.abs(x) <= half[0] + SHAPE_GRID_MM && Math.abs(y) <= half[1] + SHAPE_GRID_MM,
    );
    const apart = places.every(
      (other, m) => m <= n || convexApart(one, other, kerf - PLACE_TOLERANCE_MM),
    );
    if (!inside || !apart || !partedByCuts(places, kerf)) {
      throw new Error(
        `pieces ${pieces.join(', ')} do not come out of one unit of ${2 * half[0]} × ${2 * half[1]} mm as worked out, at ${JSON.stringify(places)}`,
      );
    }
  });
}
