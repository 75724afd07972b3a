import type { Point } from '@/geometry/point';
import { edgeName } from '../edge-names';
import { gapProfile } from '../gap-profile';
import { layFloor, unitCorners, type Laying } from '../laying';
import type { LayoutDocument } from '../layout-document';
import { parseLayoutDocument } from '../layout-validation';
import { LENGTH_TOLERANCE_MM } from '@/geometry/tolerance';
import { workSide } from '../set-out/course-numbers';
import { setOut, type Course, type SetOut } from '../set-out/set-out';
import { stringStretches } from '../set-out/string-crossings';
import { unitFind } from '../unit-rows';
import { actualDocument, jointFreedom, keptJoints, type Joints } from './actual-pattern';
import { actualUnits, measureProblem } from './actual-units';
import { creepAdvice } from './creep-advice';
import type {
  ActualUnit,
  CourseCreep,
  Creep,
  CreepInput,
  EdgeCreep,
  JointCapacity,
  JointLimits,
} from './creep-types';
import { edgeGap } from './edge-gaps';
import { tradeJoints } from './trade-joints';
import {
  anchored,
  placedCorners,
  unitPlaces,
  unitTouch,
  type UnitAddress,
  type UnitPlaces,
} from './unit-places';

export type * from './creep-types';
export { measureProblem } from './actual-units';
export { tradeJoints } from './trade-joints';

/** Joints are told apart to this, mm. */
const JOINT_ROUNDING_MM = 1e-6;

const within = (joint: number, { least, greatest }: JointLimits) =>
  joint >= least - JOINT_ROUNDING_MM && joint <= greatest + JOINT_ROUNDING_MM;

/**
 * What becomes of a floor with its units as they are, when the crew starts at the first unit, or has started with the
 * courses laid, and keeps to the planned joints (stepping stones: to the planned steps). Throws what `measureProblem` says of measures that cannot be.
 */
export function creep(laying: Laying, input: CreepInput, plan: SetOut = setOut(laying)): Creep {
  const { document, ground, laid } = laying;
  const problem = measureProblem(document, input.measures);
  if (problem) throw new Error(problem);
  const units = actualUnits(document, input.measures);
  const trade = tradeJoints(document);
  const limits = input.joints ? { ...input.joints, source: 'as you set it' } : trade;
  const planned = keptJoints(document, actualUnits(document, []));
  const joints = { planned: planned.across, ...limits };
  if (!plan.firstUnit) {
    return {
      units,
      heldCourse: null,
      joints,
      courses: [],
      across: { courses: 0, growth: 0, doubt: 0, joint: null, jointDoes: true },
      capacity: [],
      edges: [],
      lost: 0,
      advice: ['No unit is laid on this floor yet.'],
    };
  }
  const addressOf = (unit: number): UnitAddress => [laid.i[unit], laid.j[unit], laid.k[unit]];
  const held = heldCorner(laying, plan.courses, input.laid ?? []) ?? {
    course: null,
    unit: plan.firstUnit.unit,
    corner: plan.firstUnit.nearest,
    at: plan.firstUnit.corners[plan.firstUnit.nearest],
  };
  const placed = (sizes: readonly ActualUnit[], by: Joints = keptJoints(document, sizes)) =>
    anchored(
      actualDocument(document, sizes, by),
      ground,
      addressOf(held.unit),
      held.corner,
      held.at,
    );
  const coming = placed(units);
  const kept = keptJoints(document, units);
  const places = (changed: LayoutDocument) => unitPlaces(changed, ground);
  const doubtful = units.map((unit) => ({
    ...unit,
    length: unit.length + unit.lengthDoubt,
    width: unit.width + unit.widthDoubt,
  }));
  const floors = {
    planned: places(document),
    coming: places(coming),
    doubtful: places(placed(doubtful)),
    /** Each joint a millimetre wider: what a course and the whole gain by it. */
    along: places(placed(units, jointsWider(document, kept, 'along'))),
    across: places(placed(units, jointsWider(document, kept, 'across'))),
    /** Every unit a millimetre larger. */
    larger: places(
      placed(
        units.map((unit) => ({ ...unit, length: unit.length + 1, width: unit.width + 1 })),
        kept,
      ),
    ),
  };

  const members = plan.courses.map(({ runs }) =>
    runs.flatMap((run) => run.laid.map((unit) => addressOf(unit))),
  );
  const ends = endGaps(laying, floors.coming, members);
  const courses = plan.courses.map((course, n): CourseCreep => {
    const span = (floor: UnitPlaces) => courseSpan(floor, members[n]);
    const now = span(floors.coming);
    const growth = now - span(floors.planned);
    const gain = span(floors.along) - now;
    const joint = gain > JOINT_ROUNDING_MM ? kept.along - growth / gain : null;
    return {
      number: course.number,
      units: course.units,
      growth,
      doubt: Math.abs(span(floors.doubtful) - now),
      endGap: course.endGap,
      comingEndGap: ends[n],
      joint,
      jointDoes:
        joint === null
          ? ends[n] >= document.clearance - LENGTH_TOLERANCE_MM
          : within(joint, limits),
    };
  });

  const longest = members.reduce((most, all) => (all.length > most.length ? all : most));
  const firstOf = members[0][0];
  const lastOf = members[members.length - 1][0];
  const side = workSide(plan.courses);
  const height = (floor: UnitPlaces) =>
    side * (unitTouch(floor, lastOf, floor.origin).v - unitTouch(floor, firstOf, floor.origin).v);
  const acrossNow = height(floors.coming);
  const acrossGrowth = acrossNow - height(floors.planned);
  const acrossGain = height(floors.across) - acrossNow;
  const acrossJoint =
    acrossGain > JOINT_ROUNDING_MM ? kept.across - acrossGrowth / acrossGain : null;

  const checked = parseLayoutDocument(coming);
  const actual = checked.ok ? layFloor(checked.document, ground) : null;
  let lost = 0;
  for (let unit = 0; unit < laid.count; unit++) {
    if (!actual || unitFind(actual.rows, actual.index.laid, [...addressOf(unit)]) < 0) lost++;
  }

  const found: Omit<Creep, 'advice'> = {
    units,
    heldCourse: held.course,
    joints,
    courses,
    across: {
      courses: courses.length,
      growth: acrossGrowth,
      doubt: Math.abs(height(floors.doubtful) - acrossNow),
      joint: acrossJoint,
      jointDoes:
        acrossJoint === null ? acrossGrowth <= LENGTH_TOLERANCE_MM : within(acrossJoint, limits),
    },
    capacity: capacities(laying, units, kept, limits, [
      {
        direction: 'along',
        count: longest.length,
        sides: courseSpan(floors.larger, longest) - courseSpan(floors.coming, longest),
        joints: courseSpan(floors.along, longest) - courseSpan(floors.coming, longest),
      },
      {
        direction: 'across',
        // From the first string to the last the far side of the last course does not count.
        count: courses.length - 1,
        sides: height(floors.larger) - acrossNow,
        joints: acrossGain,
      },
    ]),
    edges: edgeCreeps(laying, floors.planned, floors.coming, addressOf),
    lost,
  };
  return {
    ...found,
    advice: creepAdvice(document, found, checked.ok ? null : checked.problems[0].message),
  };
}

/**
 * Of the courses laid the outermost, and the corner of its first unit on its outer side. Null when none is laid.
 */
function heldCorner(
  { document, ground, laid, motif }: Laying,
  courses: readonly Course[],
  down: readonly number[],
) {
  const lying = courses.filter(({ number }) => down.includes(number));
  if (lying.length === 0) return null;
  const [least, greatest] = [lying[0], lying[lying.length - 1]];
  const fromFirst = least.number - courses[0].number <= courses.length - greatest.number;
  const course = fromFirst ? least : greatest;
  const [unit] = course.runs[0].laid;
  const { direction, normal } = unitPlaces(document, ground).strings;
  const corners = unitCorners(motif[laid.k[unit]], laid.x[unit], laid.y[unit]);
  const off = ([x, y]: Point, [dx, dy]: Point) => x * dx + y * dy;
  const out = (at: Point) => (fromFirst ? 1 : -1) * workSide(courses) * off(at, normal);
  const corner = [0, 1, 2, 3].reduce((best, n) => {
    const outer = out(corners[n]) - out(corners[best]);
    const level = Math.abs(outer) <= LENGTH_TOLERANCE_MM;
    const earlier = off(corners[n], direction) < off(corners[best], direction);
    return outer < -LENGTH_TOLERANCE_MM || (level && earlier) ? n : best;
  }, 0);
  return { course: course.number, unit, corner, at: corners[corner] };
}

function jointsWider(document: LayoutDocument, joints: Joints, which: keyof Joints): Joints {
  switch (jointFreedom(document.bond)) {
    case 'both':
      return { ...joints, [which]: joints[which] + 1 };
    case 'one':
      return { along: joints.along + 1, across: joints.across + 1 };
    case 'across':
      return which === 'across' ? { ...joints, across: joints.across + 1 } : joints;
    case 'none':
      return joints;
  }
}

/** The gap along each string after the last unit, with the units where they come to stand. */
function endGaps(
  { ground }: Laying,
  coming: UnitPlaces,
  members: readonly (readonly UnitAddress[])[],
): number[] {
  const { direction } = coming.strings;
  const touches = members.map((all) => unitTouch(coming, all[all.length - 1], coming.origin));
  const order = touches.map((_, n) => n).sort((one, other) => touches[one].v - touches[other].v);
  const stretches = stringStretches(
    ground,
    coming.origin,
    direction,
    order.map((n) => touches[n].v),
  );
  const gaps = new Array<number>(members.length).fill(0);
  order.forEach((n, at) => {
    const { from, to } = touches[n];
    const middle = (from + to) / 2;
    // The stretch that the last unit stands on, or the one that it has been pushed out of.
    const off = (stretch: { from: number; to: number }) =>
      Math.max(0, stretch.from - middle, middle - stretch.to);
    const stretch = stretches[at].reduce<{ from: number; to: number } | null>(
      (best, each) => (!best || off(each) < off(best) ? each : best),
      null,
    );
    // The whole string outside: the course has been pushed over the edge altogether.
    gaps[n] = stretch ? stretch.to - to : from - to;
  });
  return gaps;
}

function edgeCreeps(
  laying: Laying,
  planned: UnitPlaces,
  coming: UnitPlaces,
  addressOf: (unit: number) => UnitAddress,
): EdgeCreep[] {
  const { ground, document } = laying;
  return gapProfile(laying)
    .flatMap((profile): EdgeCreep[] => {
      const edge = ground.rings[profile.ring].edges[profile.edge];
      const least = (places: UnitPlaces) =>
        profile.units.reduce((min, { unit }) => {
          const gap = edgeGap(edge, placedCorners(places, addressOf(unit)));
          return gap === null ? min : Math.min(min, gap);
        }, Infinity);
      const before = least(planned);
      const after = least(coming);
      if (!Number.isFinite(before) || !Number.isFinite(after)) return [];
      return [
        {
          ring: profile.ring,
          edge: profile.edge,
          name: edgeName(profile.ring, profile.edge, ground.rings[profile.ring].edges.length),
          planned: before,
          coming: after,
          holds: after >= document.clearance - LENGTH_TOLERANCE_MM,
        },
      ];
    })
    .sort((one, other) => one.coming - one.planned - (other.coming - other.planned));
}

/** Along a course, from the near side of its first unit to the far side of its last, mm. */
function courseSpan(floor: UnitPlaces, all: readonly UnitAddress[]): number {
  const last = unitTouch(floor, all[all.length - 1], floor.origin);
  return last.to - unitTouch(floor, all[0], floor.origin).from;
}

/** A row of units: how many sides and how many joints it is long. */
interface Row {
  readonly direction: JointCapacity['direction'];
  readonly count: number;
  readonly sides: number;
  readonly joints: number;
}

/** Whether joints take what single units are off, along the longest course and across all of them. */
function capacities(
  { motif }: Laying,
  units: readonly ActualUnit[],
  kept: Joints,
  limits: JointLimits,
  rows: readonly Row[],
): JointCapacity[] {
  const [unit] = units;
  const { tolerance } = motif.find((entry) => entry.unit.id === unit.unit)!.unit;
  return rows
    .filter(({ count, joints }) => count > 1 && joints > JOINT_ROUNDING_MM)
    .flatMap(({ direction, count, sides, joints }) => {
      const [growth, doubt] =
        direction === 'along'
          ? [unit.lengthGrowth, unit.lengthDoubt]
          : [unit.widthGrowth, unit.widthDoubt];
      const capacity = (each: number, from: JointCapacity['from']): JointCapacity => {
        const taken = (total: number) => {
          const joint = kept[direction] - total / joints;
          return { growth: total, joint, does: within(joint, limits) };
        };
        return {
          direction,
          units: count,
          each,
          from,
          worst: taken(sides * each),
          chance: taken(Math.sqrt(sides) * each),
        };
      };
      return [
        // Units that run small only leave more at the edge: the joints must take the large ones.
        ...(tolerance ? [capacity(tolerance, 'tolerance')] : []),
        ...(doubt > 0 ? [capacity(growth + Math.sign(growth) * doubt, 'measured')] : []),
      ];
    });
}
