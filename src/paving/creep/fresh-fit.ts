import { formatCount } from '../count';
import { fit } from '../fit/fit';
import type { LayoutDocument } from '../layout-document';
import { parseLayoutDocument } from '../layout-validation';
import { layFloor, type Laying } from '../laying';
import { formatLength } from '../length';
import { setOut } from '../set-out/set-out';
import { actualDocument, jointFreedom, keptJoints } from './actual-pattern';
import type { ActualUnit, JointLimits, Refit } from './creep-types';

/** Joints that are tried, from the narrowest to the widest: as fine as spacers are had, mm. */
const JOINT_STEP_MM = 0.5;
/** No more joints than this. */
const MOST_JOINTS = 20;

/**
 * With nothing laid yet all is free: of the joints within the limits the one that, from its own best start, lays the most
 * units, and of those the one with the most play. Every start is proven by the fit.
 */
export function freshFit(
  laying: Laying,
  units: readonly ActualUnit[],
  { least, greatest }: JointLimits,
): Refit {
  const { document, ground } = laying;
  const kept = keptJoints(document, units);
  const freedom = jointFreedom(document.bond);
  const steps = Math.min(MOST_JOINTS, Math.ceil((greatest - least) / JOINT_STEP_MM));
  const tried =
    freedom === 'both' || freedom === 'one'
      ? [
          ...new Set([
            Math.max(least, Math.min(greatest, kept.across)),
            ...Array.from(
              { length: steps + 1 },
              (_, n) => least + (steps === 0 ? 0 : (n * (greatest - least)) / steps),
            ),
          ]),
        ].map((joint) => ({ along: joint, across: joint }))
      : [kept];
  let best: {
    document: LayoutDocument;
    joints: typeof kept;
    count: number;
    gap: number | null;
  } | null = null;
  for (const joints of tried) {
    const parsed = parseLayoutDocument({ ...actualDocument(document, units, joints), lifted: [] });
    if (!parsed.ok) continue;
    const { wholeUnits, placement, leastGap } = fit(parsed.document, { choices: false });
    const better =
      !best ||
      wholeUnits > best.count ||
      (wholeUnits === best.count && (leastGap ?? 0) > (best.gap ?? 0));
    if (better)
      best = {
        document: { ...parsed.document, placement },
        joints,
        count: wholeUnits,
        gap: leastGap,
      };
  }
  if (!best) throw new Error('no joint within the limits gives a pattern that can be laid');
  const planned = laying.laid.count + laying.lifted.count;
  const shown = (mm: number) => formatLength(mm, document.display, { decimals: 1 });
  const { courses } = setOut(layFloor(best.document, ground));
  let height = 0;
  return {
    keepsAll: best.count >= planned,
    toLay: planned,
    dropped: [],
    kept: best.count,
    jointAcross: best.joints.across,
    jointAlong: best.joints.along,
    shift: 0,
    leastGap: best.gap,
    clearance: document.clearance,
    courses: courses.map(({ number, from, to, units: count, startGap, endGap, step }) => {
      height += step ?? 0;
      return { number, fromLaid: height, from, to, units: count, startGap, endGap };
    }),
    document: best.document,
    advice: [
      best.count >= planned
        ? `Nothing is laid yet, so the floor can start anew: ${formatCount(best.count)} whole units with joints of ${shown(best.joints.across)}${best.gap === null ? '' : `, ${shown(best.gap)} from the edge at the least`}.`
        : `Nothing is laid yet, but no start and no joint within the limits lays the ${formatCount(planned)} units planned: ${formatCount(best.count)} is the most. Ask the designer before you start.`,
      'The start is a new one: the pegs and strings of the plan do not fit it. Ask for a new set-out.',
    ],
  };
}
