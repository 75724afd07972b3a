import { documentUnit } from '../bond';
import { bondProblems } from '../bond-validation';
import type { LayoutDocument } from '../layout-document';
import { fit } from './fit';

/** Joints to look at: from, from + step … up to `to`, mm. */
export interface JointRange {
  readonly from: number;
  readonly to: number;
  readonly step: number;
}

/** What a joint gives, at the document's turn. Lengths in mm. */
export interface JointFit {
  readonly joint: number;
  readonly wholeUnits: number;
  readonly play: number | null;
  readonly leastGap: number | null;
  readonly placement: LayoutDocument['placement'];
}

export type JointFits =
  | {
      readonly ok: true;
      /** In order of joint. */
      readonly joints: readonly JointFit[];
      /** Joints after which units are lost: each is the widest, of those looked at, that has its count. */
      readonly closing: readonly JointFit[];
      /** Of those with the most units, the one with the most play: where the field ends most evenly. */
      readonly best: JointFit;
    }
  | { readonly ok: false; readonly reason: string };

/** More joints than this are refused. */
const GREATEST_JOINTS = 500;

/** The bond with another joint, or why it has none of its own. */
function withJoint(document: LayoutDocument, joint: number): LayoutDocument | string {
  const { bond } = document;
  switch (bond.kind) {
    case 'stepping':
      return 'stepping stones have a pitch, not a joint; change the pitch instead';
    case 'custom':
      return 'a custom pattern has its units set down one by one; its joint cannot be changed alone';
    case 'basket':
    case 'herringbone': {
      const { length, width } = documentUnit(document, bond.unit);
      const own = Math.round((length - 2 * width) * 1000) / 1000;
      return `a ${bond.kind} of ${length} × ${width} mm units closes with a ${own} mm joint and no other; change the unit to change the joint`;
    }
    default:
      return { ...document, bond: { ...bond, joint } };
  }
}

/**
 * The fit for each joint of a range: which closes an extra row, which lets the field end evenly.
 * Refused, with the reason, for bonds whose joint the unit decides. Throws like `fit`.
 */
export function fitJoints(document: LayoutDocument, { from, to, step }: JointRange): JointFits {
  const count = Math.floor((to - from) / step + 1e-9) + 1;
  if (!(step > 0) || !(count >= 1) || !(from >= 0)) {
    return { ok: false, reason: `joints from ${from} to ${to} mm by ${step} mm are not a range` };
  }
  if (count > GREATEST_JOINTS) {
    return { ok: false, reason: `${count} joints are too many; use a wider step` };
  }
  const joints: JointFit[] = [];
  for (let n = 0; n < count; n++) {
    const joint = Number((from + n * step).toFixed(6));
    const changed = withJoint(document, joint);
    if (typeof changed === 'string') return { ok: false, reason: changed };
    const [problem] = bondProblems(changed);
    if (problem) return { ok: false, reason: problem.message };
    const found = fit(changed, { choices: false })!;
    const { wholeUnits, play, leastGap, placement } = found;
    joints.push({ joint, wholeUnits, play, leastGap, placement });
  }
  const closing = joints.filter(
    ({ wholeUnits }, n) => n + 1 < joints.length && joints[n + 1].wholeUnits < wholeUnits,
  );
  const best = joints.reduce((one, other) =>
    other.wholeUnits > one.wholeUnits ||
    (other.wholeUnits === one.wholeUnits && (other.play ?? -1) > (one.play ?? -1))
      ? other
      : one,
  );
  return { ok: true, joints, closing, best };
}
