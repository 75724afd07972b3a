import type { Point } from '@/geometry/point';
import type { Address, LayoutDocument } from '../layout-document';

/**
 * Units that run large or small. Lengths in mm; growth is positive where units are larger than the
 * document has them.
 */

/** Units laid tight, one against the next without a joint, and how long they came to. */
export interface UnitMeasure {
  /** Id of the unit. */
  readonly unit: string;
  /** Which of its sides ran along the tape. */
  readonly side: 'length' | 'width';
  readonly count: number;
  readonly total: number;
}

/** Joints that the crew may lay, both included. */
export interface JointLimits {
  readonly least: number;
  readonly greatest: number;
}

export interface CreepInput {
  /** One or several; sides of which nothing was measured are taken to be as planned, or as the square's other side. */
  readonly measures: readonly UnitMeasure[];
  /** Left out: what the trade allows (`tradeJoints`). */
  readonly joints?: JointLimits;
  /** Numbers of the courses that are laid: the outermost of them is held, else the first unit. */
  readonly laid?: readonly number[];
}

export interface ActualUnit {
  readonly unit: string;
  readonly name: string;
  readonly length: number;
  readonly width: number;
  /** A unit's mean growth, and how far that may be off for a tape read to ±2 mm; 0 and 0 where not measured. */
  readonly lengthGrowth: number;
  readonly lengthDoubt: number;
  readonly widthGrowth: number;
  readonly widthDoubt: number;
}

/** What a course grows by when its joints are laid as planned, and the joint that would end it where planned. */
export interface CourseCreep {
  readonly number: number;
  readonly units: number;
  readonly growth: number;
  readonly doubt: number;
  /** Gaps along the string after the last unit: as planned, and as they come with the joints kept; below 0 it runs into the edge. */
  readonly endGap: number;
  readonly comingEndGap: number;
  /** Null for a course of one unit, and where the bond leaves no joint to change. */
  readonly joint: number | null;
  readonly jointDoes: boolean;
}

/** Whether joints can take what single units may be off, in the longest run of joints, by two reckonings. */
export interface JointCapacity {
  readonly direction: 'along' | 'across';
  readonly units: number;
  /** What one unit may be off, and whence it is known: its tolerance, or its measured growth and the doubt about it (below 0 where units run small). */
  readonly each: number;
  readonly from: 'tolerance' | 'measured';
  /** Every unit off the same way: the growth of the row, and the joint that takes it. */
  readonly worst: { readonly growth: number; readonly joint: number; readonly does: boolean };
  /** Large and small by chance: the root of the number of units instead of the number (root-sum-square). */
  readonly chance: { readonly growth: number; readonly joint: number; readonly does: boolean };
}

/** What happens to the gap at an edge when the joints are kept. */
export interface EdgeCreep {
  readonly ring: number;
  readonly edge: number;
  /** As the drawings name it: `AB`, `K1 ab`. */
  readonly name: string;
  /** Least gap as planned, and as it comes; below 0 a unit would lie over the edge. */
  readonly planned: number;
  readonly coming: number;
  readonly holds: boolean;
}

export interface Creep {
  readonly units: readonly ActualUnit[];
  /** The course held where it is drawn while the others grow; null: the first unit is. */
  readonly heldCourse: number | null;
  readonly joints: JointLimits & { readonly planned: number; readonly source: string };
  readonly courses: readonly CourseCreep[];
  /** From the first string to the last, square to them. */
  readonly across: {
    readonly courses: number;
    readonly growth: number;
    readonly doubt: number;
    readonly joint: number | null;
    readonly jointDoes: boolean;
  };
  readonly capacity: readonly JointCapacity[];
  /** Edges that units face, those that suffer most first. */
  readonly edges: readonly EdgeCreep[];
  /** Planned units that would not be whole any more with the joints kept, found by laying. */
  readonly lost: number;
  /** In plain sentences, the gravest first. */
  readonly advice: readonly string[];
}

export interface RefitInput {
  readonly measures: readonly UnitMeasure[];
  /** Numbers of the courses that are laid; they must run on from the first or from the last course. Empty when none is. */
  readonly laid: readonly number[];
  /** Square to the strings: how far the string of the last course laid stands from where the plan has it, mm, positive towards higher numbers. */
  readonly offset: number;
  /** Along the string: how far that course stands from where the plan has it, positive towards the string's end. */
  readonly along?: number;
  readonly joints?: JointLimits;
  /** How far the courses still to lay may be shifted along against those laid, either way, mm. */
  readonly shift?: number;
}

export type RefitResult =
  | { readonly ok: true; readonly refit: Refit }
  /** The input cannot be worked with; says what is wrong and what would do. */
  | { readonly ok: false; readonly message: string };

export interface Refit {
  /** True when every unit still to lay stays whole. */
  readonly keepsAll: boolean;
  /** Planned units in courses still to lay, and those of them that have to be left out. */
  readonly toLay: number;
  readonly dropped: readonly Address[];
  /** Units that will be laid in those courses: `toLay` less those dropped, or, when no course is laid, of the floor started anew. */
  readonly kept: number;
  /** Joint between courses and joint along them; the same where the bond has only one. */
  readonly jointAcross: number;
  readonly jointAlong: number;
  /** Along the string, against the courses laid. */
  readonly shift: number;
  /** Of the units still to lay; null when none is left. */
  readonly leastGap: number | null;
  readonly clearance: number;
  /**
   * Lines of the courses still to lay: from the string of the last course laid, square to it and positive towards higher
   * numbers, and where the first unit starts on it.
   */
  readonly courses: readonly {
    readonly number: number;
    readonly fromLaid: number;
    readonly from: Point;
    readonly to: Point;
    readonly units: number;
    readonly startGap: number;
    readonly endGap: number;
  }[];
  /** The floor with the actual units, joints and start, to draw and to take as a draft; its units to be left out are lifted. */
  readonly document: LayoutDocument;
  readonly advice: readonly string[];
}
