import type { LayoutDocument, Placement } from '../layout-document';
import { parseLayoutDocument } from '../layout-validation';
import { fit, type FitHold } from './fit';

/** What a joint gives. Lengths in mm. */
export interface JointFit {
  readonly joint: number;
  readonly wholeUnits: number;
  readonly play: number | null;
  readonly leastGap: number | null;
  readonly placement: Placement;
  /** The widest joint with this many units: any wider and a row falls out, so here the field just closes. */
  readonly closes: boolean;
}

/** Joints to be tried, mm: from one to another by a step. */
export interface JointRange {
  readonly from: number;
  readonly to: number;
  readonly step: number;
}

export type JointFits =
  | { readonly ok: true; readonly joints: readonly JointFit[] }
  | { readonly ok: false; readonly message: string };

/** No more joints than this are tried in one go. */
const MOST_JOINTS = 400;
/** The widest joint that keeps a count is sought to this, mm: finer than a spacer can be had. */
const JOINT_FINENESS_MM = 0.01;

function jointRefused(document: LayoutDocument, { from, to, step }: JointRange): string | null {
  const { bond } = document;
  if (bond.kind === 'basket' || bond.kind === 'herringbone')
    return `The joint of a ${bond.kind} is fixed by its unit, which must be twice as long as wide with it; change the unit instead.`;
  if (bond.kind === 'stepping')
    return 'Stepping units have gaps, not a joint; change the gaps instead.';
  if (bond.kind === 'custom')
    return 'The joint of a bond of one’s own lies in its steps; change the steps instead.';
  if (!(from >= 0) || !(to >= from) || !(step > 0))
    return 'The range runs from the narrower to the wider joint.';
  if ((to - from) / step > MOST_JOINTS)
    return `That is more than ${MOST_JOINTS} joints; take a wider step or a shorter range.`;
  return null;
}

function withJoint(document: LayoutDocument, joint: number): LayoutDocument | null {
  const parsed = parseLayoutDocument({
    ...document,
    bond: { ...document.bond, joint },
    lifted: [],
  });
  return parsed.ok ? parsed.document : null;
}

/**
 * The most units and their play for each joint of the range, and, between neighbours of which the
 * wider lays fewer, the widest joint that still lays as many: where an extra row just closes.
 * Narrowest first, with the pattern held as given. Refused for bonds whose joint is not free.
 */
export function fitJoints(
  document: LayoutDocument,
  range: JointRange,
  hold: readonly FitHold[] = [],
  progress: (share: number) => void = () => {},
): JointFits {
  const message = jointRefused(document, range);
  if (message) return { ok: false, message };
  const at = (joint: number, closes = false): JointFit | null => {
    const jointed = withJoint(document, Math.round(joint * 1e4) / 1e4);
    if (!jointed) return null;
    const { wholeUnits, play, leastGap, placement } = fit(jointed, { choices: false, hold });
    return { joint: Math.round(joint * 1e4) / 1e4, wholeUnits, play, leastGap, placement, closes };
  };

  const steps = Math.floor((range.to - range.from) / range.step + 1e-9);
  const found: JointFit[] = [];
  for (let n = 0; n <= steps; n++) {
    const here = at(range.from + n * range.step);
    progress((n + 1) / (steps + 1));
    const before = found.at(-1);
    if (before && here && here.wholeUnits < before.wholeUnits) {
      const widest = widestWith(before, here.joint, at);
      if (widest) found.push(widest);
    }
    if (here) found.push(here);
  }
  return { ok: true, joints: found };
}

/** Between a joint and a wider one that lays fewer: the widest that lays as many as the first. */
function widestWith(
  narrow: JointFit,
  wide: number,
  at: (joint: number, closes: boolean) => JointFit | null,
): JointFit | null {
  let low = narrow.joint;
  let high = wide;
  let best: JointFit | null = null;
  while (high - low > JOINT_FINENESS_MM) {
    const middle = (low + high) / 2;
    const here = at(middle, true);
    if (here && here.wholeUnits >= narrow.wholeUnits) {
      best = here;
      low = middle;
    } else high = middle;
  }
  return best;
}
