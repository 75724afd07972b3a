import type { Point } from '@/geometry/point';
import type { FiguredWords } from '../figured-words';

/**
 * A floor set out: what a crew needs to put it on the ground with two tapes and a string. All a pure
 * function of a laying. Lengths in mm, angles in degrees; points on the ground, y up.
 */
export interface SetOut {
  /** The two fixed corners that tapes are hooked on. */
  readonly datums: readonly [Datum, Datum];
  /** From the first datum to the second. */
  readonly baseline: Baseline;
  /** In the order in which they are set out: corners, arcs, keep-outs, first unit, strings. */
  readonly points: readonly ControlPoint[];
  /** To measure once the corners stand, so that the shape is known to be as drawn. */
  readonly diagonals: readonly Diagonal[];
  /** Null when nothing is laid. */
  readonly firstUnit: FirstUnit | null;
  readonly courses: readonly Course[];
  readonly checks: readonly Check[];
  /** What to know before starting, in plain sentences; the most pressing first. */
  readonly advice: readonly Advice[];
}

/** A corner of the ground by ring (0 the perimeter) and vertex. */
export type CornerAddress = readonly [ring: number, vertex: number];

export interface Datum {
  /** The corner's letter on the drawings: `A`, or `K1 a` on a keep-out. */
  readonly name: string;
  readonly ring: number;
  readonly vertex: number;
  readonly at: Point;
}

export interface Baseline {
  readonly length: number;
  /** Direction from the first datum to the second, anticlockwise from x. */
  readonly bearingDeg: number;
  /** Keep-outs that it crosses, by name as the drawings have it (`K1`). */
  readonly crosses: readonly string[];
  /** False when part of it lies outside the perimeter. */
  readonly inside: boolean;
  /** True when the person chose it, false when the program did. */
  readonly chosen: boolean;
}

export type ControlPointKind = 'corner' | 'arc' | 'keep-out' | 'unit' | 'string';

/** Which side of the line from the first datum to the second, looking along it; `on` within 0.01 mm of it. */
export type Side = 'left' | 'right' | 'on';

/** A point fixed by two tapes. */
export interface TapeCross {
  /** From the first and the second of the two datums. */
  readonly tapes: readonly [number, number];
  /** The angle at which they meet, 0 to 180. */
  readonly crossingDeg: number;
  /** The two arcs cross twice, once on each side: this is the side to take. */
  readonly side: Side;
  /**
   * How far from its true place the point can come to lie when each tape is read to ±2 mm: the farthest
   * corner of the figure that the two reading errors span. Null when the tapes may not meet at all.
   */
  readonly uncertainty: number | null;
  /** Meets between 30° and 150°. */
  readonly clean: boolean;
}

export interface ControlPoint extends TapeCross {
  /** Short and unlike all others: `C`, `AB 1/2`, `K1 a`, `U1`, `7a` (start of string 7), `7b` (its end). */
  readonly name: string;
  readonly kind: ControlPointKind;
  /** In words: "Start of the string of course 7". */
  readonly what: FiguredWords;
  readonly at: Point;
  /** Running offsets: along the baseline from the first datum, and square to it, positive to the left. */
  readonly along: number;
  readonly square: number;
  /** `datum`: it is one of the two. Else how to set it out: by its tapes, by a second pair, or by its offsets. */
  readonly by: 'datum' | 'tapes' | 'second-pair' | 'offsets';
  /** How far from its true place it can come to lie, set out as `by` says and every tape read to ±2 mm; 0 for a datum. */
  readonly doubt: number;
  /** Where `by` is `second-pair`: from these corners, which cross cleanly. */
  readonly secondPair: (TapeCross & { readonly datums: readonly [Datum, Datum] }) | null;
  /** Of a perimeter's corner: the angle inside the ground, where both its edges are straight. */
  readonly angleDeg?: number;
  /** Of a string's ends: its course. */
  readonly course?: number;
}

export interface Diagonal {
  /** Names of two control points. */
  readonly from: string;
  readonly to: string;
  readonly length: number;
  /** Set where another diagonal must read the same, as in a rectangle: that one's ends. */
  readonly sameAs: readonly [string, string] | null;
}

/**
 * The unit that work starts from, in course 1: of the two outermost courses the one that comes nearer to the first datum,
 * and of it the unit that does.
 */
export interface FirstUnit {
  /** Index into the laid units. */
  readonly unit: number;
  readonly unitId: string;
  readonly course: number;
  /** Its place in the course, from 1. */
  readonly place: number;
  /** Anticlockwise from its own lower left; control points `U1` … `U4`. */
  readonly corners: readonly [Point, Point, Point, Point];
  /** The corner nearest to the first datum, 0 to 3. */
  readonly nearest: number;
  /** Turn of the strings from the baseline, more than −90 and at most 90. */
  readonly turnDeg: number;
}

/**
 * One course: the units that touch its string with their near side, or with a corner where no side is
 * parallel to it. Strings run from left to right on the plan (upwards where upright), and the units stand on their left.
 * Running lengths are measured along the string from its start.
 */
export interface Course {
  /** In the order of the work, from 1: the course of the first unit, then on to the other side of the floor. */
  readonly number: number;
  /**
   * Its place among the strings, from 1 at their right hand to their left. It hangs on the floor alone, not on where
   * the work starts: records of what is laid hold on to it.
   */
  readonly row: number;
  /** The string's ends: where its line meets the edge before its first unit and after its last. */
  readonly from: Point;
  readonly to: Point;
  readonly length: number;
  readonly units: number;
  readonly byUnit: Readonly<Record<string, number>>;
  /** Along the string from its start to the first unit, and from the last unit to its end. */
  readonly startGap: number;
  readonly endGap: number;
  /** How far its string is from that of the course before, square to it; null for the first. */
  readonly step: number | null;
  /** Units one after another as the bond has them, without one missing between. */
  readonly runs: readonly CourseRun[];
  /** Stretches of the string that are not over the ground: a keep-out, or a notch of the edge. */
  readonly outside: readonly {
    readonly from: number;
    readonly to: number;
    readonly over: string;
  }[];
}

export interface CourseRun {
  readonly from: number;
  readonly to: number;
  readonly units: number;
  /** Where each unit touches the string, to tick: its two edges, running lengths. Alike where it is a corner. */
  readonly ticks: readonly (readonly [number, number])[];
  /** Indices into the laid units, in the same order. */
  readonly laid: readonly number[];
  /** What is before it: the string's start, a keep-out or notch, or units missing. */
  readonly after: 'start' | 'outside' | 'lifted' | 'left-out';
}

/**
 * What a check measures: a ground edge; a diagonal; a right angle by 3-4-5; the gap at an edge; strings apart; units along a
 * string; a joint; straightness of a course; flatness under a straightedge; a step between two units; a layer under the units.
 */
export type CheckKind =
  | 'edge'
  | 'diagonal'
  | 'square'
  | 'gap'
  | 'rows'
  | 'run'
  | 'joint'
  | 'line'
  | 'flatness'
  | 'step'
  | 'layer';

/** Something to measure once it is laid or pegged. */
export interface Check {
  /** The same for the same floor and datums: `edge-AB`, `square-A`, `rows-1-10` (rows, not the courses' numbers). */
  readonly id: string;
  readonly kind: CheckKind;
  /** An instruction: "Measure edge AB". Its lengths are written by whoever shows it. */
  readonly what: FiguredWords;
  /** Control points or courses that it is measured between. */
  readonly from?: string;
  readonly to?: string;
  readonly expected: number;
  /** Readings that will do, both included; null where there is no such limit. */
  readonly least: number | null;
  readonly greatest: number | null;
  /** Whence the limits come, to print. */
  readonly source: string;
}

export interface Advice {
  readonly kind: 'datums' | 'points' | 'baseline' | 'floor';
  readonly text: FiguredWords;
  /** Names of the control points that it is about. */
  readonly points: readonly string[];
}
