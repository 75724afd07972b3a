import type { Point } from '@/geometry/point';
import type { Ground } from '../ground';
import type { LayoutDocument } from '../layout-document';
import { patternRows, unitCorners, type LaidMotif } from '../laying';
import { courseFrame, type CourseFrame } from '../set-out/course-frame';

/** Where a document puts the unit of any address, laid or not. Points on the ground, mm. */
export interface UnitPlaces {
  readonly origin: Point;
  readonly lattice: { readonly a: Point; readonly b: Point };
  readonly motif: readonly LaidMotif[];
  readonly centres: readonly Point[];
  readonly strings: CourseFrame;
}

export type UnitAddress = readonly [i: number, j: number, k: number];

/** How the addresses of a floor become places, also of units that are not laid. */
export function unitPlaces(document: LayoutDocument, ground: Ground): UnitPlaces {
  const { lattice, motif, centres } = patternRows(document, ground);
  return {
    origin: document.placement.origin,
    lattice,
    motif,
    centres,
    strings: courseFrame({ document, lattice, motif }),
  };
}

/** Centre of the unit of an address, mm. */
export function unitPlace(
  { origin, lattice: { a, b }, centres }: UnitPlaces,
  [i, j, k]: UnitAddress,
): Point {
  return [
    origin[0] + i * a[0] + j * b[0] + centres[k][0],
    origin[1] + i * a[1] + j * b[1] + centres[k][1],
  ];
}

/** Corners of the unit of an address, anticlockwise, mm. */
export function placedCorners(places: UnitPlaces, address: UnitAddress) {
  const [x, y] = unitPlace(places, address);
  return unitCorners(places.motif[address[2]], x, y);
}

/** Where the unit touches its string, and the string's line: u along it and v square to it, from the point `from`. */
export function unitTouch(places: UnitPlaces, address: UnitAddress, from: Point) {
  const { direction, normal, entries } = places.strings;
  const [x, y] = unitPlace(places, address);
  const entry = entries[address[2]];
  const u = (x - from[0]) * direction[0] + (y - from[1]) * direction[1];
  const { halfLength, halfWidth } = places.motif[address[2]];
  const reach = [halfLength, halfWidth].reduce(
    (sum, half) => sum + Math.abs(half[0] * normal[0] + half[1] * normal[1]),
    0,
  );
  const v = (x - from[0]) * normal[0] + (y - from[1]) * normal[1] - reach;
  return { from: u + entry.from, to: u + entry.to, v };
}

/** The document with its pattern moved so that a corner of the unit at `address` stands at `at`. */
export function anchored(
  document: LayoutDocument,
  ground: Ground,
  address: UnitAddress,
  corner: number,
  at: Point,
): LayoutDocument {
  const now = placedCorners(unitPlaces(document, ground), address)[corner];
  const [x, y] = document.placement.origin;
  return {
    ...document,
    placement: {
      ...document.placement,
      origin: [x + at[0] - now[0], y + at[1] - now[1]],
    },
  };
}
