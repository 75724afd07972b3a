import type { Point } from '@/geometry/point';
import type { Laying } from '../laying';
import type { LayoutDocument } from '../layout-document';
import { workSide } from '../set-out/course-numbers';
import type { Course } from '../set-out/set-out-types';
import { actualDocument, type Joints } from './actual-pattern';
import type { ActualUnit, RefitInput } from './creep-types';
import { anchored, placedCorners, unitPlaces, unitTouch, type UnitAddress } from './unit-places';

/** What is chosen: the joints and the shift along the strings. */
export interface Choice {
  readonly joints: Joints;
  readonly shift: number;
}

/** The courses laid and still to lay, and where the last one laid stands. */
export interface RefitFloor {
  /** First unit of the last course laid, and its corner at the start of the string, where it stands now. */
  readonly anchor: UnitAddress;
  readonly corner: number;
  readonly at: Point;
  readonly last: Course;
  readonly left: readonly Course[];
  readonly rest: readonly UnitAddress[];
  readonly direction: Point;
  /** 1 where courses of higher numbers lie left of the strings, -1 where they lie right. */
  readonly side: 1 | -1;
}

export function refitFloor(
  laying: Laying,
  courses: readonly Course[],
  { laid: numbers, offset, along = 0 }: RefitInput,
): RefitFloor {
  const { laid, document, ground } = laying;
  const onwards = numbers.includes(1);
  const edge = onwards ? Math.max(...numbers) : Math.min(...numbers);
  const done = new Set(numbers);
  const last = courses[edge - 1];
  const left = courses.filter(({ number }) => !done.has(number));
  const addressOf = (unit: number): UnitAddress => [laid.i[unit], laid.j[unit], laid.k[unit]];
  const places = unitPlaces(document, ground);
  const anchor = addressOf(last.runs[0].laid[0]);
  const { direction, normal } = places.strings;
  const side = workSide(courses);
  // The corner that touches the string first.
  const touch = unitTouch(places, anchor, document.placement.origin);
  const start: Point = [
    document.placement.origin[0] + touch.from * direction[0] + touch.v * normal[0],
    document.placement.origin[1] + touch.from * direction[1] + touch.v * normal[1],
  ];
  const corners = placedCorners(places, anchor);
  const distances = corners.map((corner) => Math.hypot(corner[0] - start[0], corner[1] - start[1]));
  return {
    anchor,
    corner: distances.indexOf(Math.min(...distances)),
    at: [
      start[0] + along * direction[0] + side * offset * normal[0],
      start[1] + along * direction[1] + side * offset * normal[1],
    ],
    last,
    left,
    rest: left.flatMap(({ runs }) => runs.flatMap((run) => run.laid.map(addressOf))),
    direction,
    side,
  };
}

/** The document with the rest of the floor laid on from the last course, by that choice. */
export function chosenDocument(
  { document, ground }: Laying,
  { anchor, corner, at, direction }: RefitFloor,
  units: readonly ActualUnit[],
  { joints, shift }: Choice,
): LayoutDocument {
  return anchored(actualDocument(document, units, joints), ground, anchor, corner, [
    at[0] + shift * direction[0],
    at[1] + shift * direction[1],
  ]);
}
