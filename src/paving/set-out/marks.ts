import { arcIsStraight } from '@/geometry/arc';
import type { Point } from '@/geometry/point';
import { cornerName, edgeName, keepOutName } from '../edge-names';
import type { GroundEdge, GroundRing } from '../ground';
import type { Laying } from '../laying';
import { figured } from '../figured-words';
import { ringCircle } from '../ring-circle';
import type { ControlPoint, Course } from './set-out-types';

/** A point to set out, before it is known from which corners. */
export type Mark = Pick<ControlPoint, 'name' | 'kind' | 'what' | 'at' | 'angleDeg' | 'course'> & {
  /** The corner that it is, by ring and vertex. */
  readonly corner: readonly [number, number] | null;
};

/** An outline that turns by less than this has no corner there to be seen, degrees. */
export const LEAST_CORNER_DEG = 5;
/** Arcs that rise less than this over their chord, mm, are set out by their ends alone. */
const LEAST_ARC_RISE_MM = 1;

const degrees = (radians: number) => (radians * 180) / Math.PI;

/** Name of a corner as the drawings letter it: `A`, or `K1 a` on a keep-out. */
export const cornerLabel = (ring: number, vertex: number): string =>
  ring === 0 ? cornerName(0, vertex) : `${keepOutName(ring)} ${cornerName(ring, vertex)}`;

/** Direction of the edge as it leaves its start and as it comes to its end, degrees. */
function edgeHeadings({ start, end, bulge }: GroundEdge): readonly [number, number] {
  const chord = degrees(Math.atan2(end[1] - start[1], end[0] - start[0]));
  const half = degrees(2 * Math.atan(bulge));
  return [chord - half, chord + half];
}

/** How far the outline turns to the left at each corner of the ring, degrees, more than −180 and at most 180. */
export function cornerTurns({ edges }: Pick<GroundRing, 'edges'>): number[] {
  return edges.map((edge, n) => {
    const before = edgeHeadings(edges[(n + edges.length - 1) % edges.length])[1];
    const turn = edgeHeadings(edge)[0] - before;
    return 180 - ((((180 - turn) % 360) + 360) % 360);
  });
}

/** The point that far along an arc, `share` from 0 to 1. */
function arcPoint({ start, end, bulge }: GroundEdge, share: number): Point {
  const sweep = 4 * Math.atan(bulge);
  const chord = Math.hypot(end[0] - start[0], end[1] - start[1]);
  const heading = Math.atan2(end[1] - start[1], end[0] - start[0]) - sweep / 2;
  const reach = (chord / Math.sin(sweep / 2)) * Math.sin((share * sweep) / 2);
  const along = heading + (share * sweep) / 2;
  return [start[0] + reach * Math.cos(along), start[1] + reach * Math.sin(along)];
}

const QUARTERS = [
  [0.25, '1/4', 'a quarter along'],
  [0.5, '1/2', 'half-way along'],
  [0.75, '3/4', 'three quarters along'],
] as const;

function ringMarks(ring: GroundRing): Mark[] {
  const { edges } = ring;
  const perimeter = ring.ring === 0;
  const kind = perimeter ? 'corner' : 'keep-out';
  const circle = perimeter ? null : ringCircle(ring);
  if (circle) {
    const what = figured`Middle of ${ring.name ?? keepOutName(ring.ring)}, a circle of ${{ mm: circle.radius, decimals: 1 }} radius`;
    return [{ name: keepOutName(ring.ring), kind, what, at: circle.centre, corner: null }];
  }
  const straight = edges.map(({ start, end, bulge }) => arcIsStraight(start, end, bulge));
  const turns = cornerTurns(ring);
  const corners = edges.map(({ start }, n): Mark => {
    const name = cornerLabel(ring.ring, n);
    const before = (n + edges.length - 1) % edges.length;
    return {
      name,
      kind,
      what: perimeter
        ? `${Math.abs(turns[n]) < LEAST_CORNER_DEG ? 'Point' : 'Corner'} ${name} of the edge`
        : `Corner ${cornerName(ring.ring, n)} of ${ring.name}`,
      at: start,
      corner: [ring.ring, n],
      ...(perimeter && straight[n] && straight[before] && { angleDeg: 180 - turns[n] }),
    };
  });
  const arcs = edges.flatMap((edge, n): Mark[] => {
    const rise =
      (Math.abs(edge.bulge) *
        Math.hypot(edge.end[0] - edge.start[0], edge.end[1] - edge.start[1])) /
      2;
    if (straight[n] || rise < LEAST_ARC_RISE_MM) return [];
    const name = edgeName(ring.ring, n, edges.length);
    return QUARTERS.map(([share, figure, words]) => ({
      name: `${name} ${figure}`,
      kind: 'arc',
      what: `On the arc ${name}, ${words}`,
      at: arcPoint(edge, share),
      corner: null,
    }));
  });
  return [...corners, ...arcs];
}

/** The corners of the first unit. */
export const unitMarks = (corners: readonly Point[]): Mark[] =>
  corners.map((at, n) => ({
    name: `U${n + 1}`,
    kind: 'unit',
    what: `Corner ${n + 1} of the first unit`,
    at,
    corner: null,
  }));

/** Every point to set out, in the order of the work; `corners` are the first unit's. Names are all different. */
export function setOutMarks(
  laying: Laying,
  courses: readonly Course[],
  corners: readonly Point[],
): Mark[] {
  const { ground } = laying;
  const strings = courses.flatMap(({ number, from, to }): Mark[] => [
    {
      name: `${number}a`,
      kind: 'string',
      what: `Start of the string of course ${number}`,
      at: from,
      corner: null,
      course: number,
    },
    {
      name: `${number}b`,
      kind: 'string',
      what: `End of the string of course ${number}`,
      at: to,
      corner: null,
      course: number,
    },
  ]);
  return [...ground.rings.flatMap((ring) => ringMarks(ring)), ...unitMarks(corners), ...strings];
}
