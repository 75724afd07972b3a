import { documentUnit } from '../bond';
import type { LayoutDocument } from '../layout-document';
import { interlockedJoint, interlockedModule, jointFreedom, keptJoints } from './actual-pattern';
import type { ActualUnit, JointLimits } from './creep-types';
import type { Choice } from './refit-floor';
import type { Freedom } from './refit-search';

/** A way from the search's values to joints and shift. */
export interface Search {
  readonly freedoms: readonly Freedom[];
  readonly choice: (values: readonly number[]) => Choice;
  readonly start: readonly number[];
}

/** What may be chosen for the rest, the least change first. */
export function refitSearches(
  document: LayoutDocument,
  units: readonly ActualUnit[],
  { least, greatest }: JointLimits,
  shift: number,
): Search[] {
  const kept = keptJoints(document, units);
  const within = (joint: number) => Math.max(least, Math.min(greatest, joint));
  const shifts: Freedom[] = shift > 0 ? [{ from: -shift, to: shift }] : [];
  const zero = shifts.map(() => 0);
  const range = { from: least, to: greatest };
  const shifted = (values: readonly number[], joints: number): number => values[joints] ?? 0;
  switch (jointFreedom(document.bond)) {
    case 'both':
      return [
        {
          freedoms: [range, ...shifts],
          start: [within(kept.across), ...zero],
          choice: (values) => ({
            joints: { along: kept.along, across: values[0] },
            shift: shifted(values, 1),
          }),
        },
        {
          freedoms: [range, range, ...shifts],
          start: [within(kept.across), within(kept.along), ...zero],
          choice: (values) => ({
            joints: { across: values[0], along: values[1] },
            shift: shifted(values, 2),
          }),
        },
      ];
    case 'across':
      return [
        {
          freedoms: [range, ...shifts],
          start: [within(kept.across), ...zero],
          choice: (values) => ({
            joints: { along: kept.along, across: values[0] },
            shift: shifted(values, 1),
          }),
        },
      ];
    case 'one': {
      if (document.bond.kind !== 'basket' && document.bond.kind !== 'herringbone')
        return [
          {
            freedoms: [range, ...shifts],
            start: [within(kept.across), ...zero],
            choice: (values) => ({
              joints: { along: values[0], across: values[0] },
              shift: shifted(values, 1),
            }),
          },
        ];
      // Units move in a straight line with the module, not with the joint.
      const { unit: id } = document.bond;
      const { length, width } = units.find(({ unit }) => unit === id) ?? documentUnit(document, id);
      const module = (joint: number) => interlockedModule(length, width, joint);
      return [
        {
          freedoms: [{ from: module(least), to: module(greatest) }, ...shifts],
          start: [module(within(kept.across)), ...zero],
          choice: (values) => {
            const joint = interlockedJoint(length, width, values[0]);
            return { joints: { along: joint, across: joint }, shift: shifted(values, 1) };
          },
        },
      ];
    }
    case 'none':
      return [
        {
          freedoms: shifts,
          start: zero,
          choice: (values) => ({ joints: kept, shift: shifted(values, 0) }),
        },
      ];
  }
}
