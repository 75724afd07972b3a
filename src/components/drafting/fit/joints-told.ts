import { formatCount } from '@/paving/count';
import type { JointFit } from '@/paving/fit/joint-range';
import { formatLength, type Display } from '@/paving/length';

/** A joint to the hundredth of a millimetre, in feet and inches too: a sixteenth too much, and the row does not close. */
export const jointText = (mm: number, display: Display): string => {
  const metric = formatLength(mm, 'metric', { decimals: 2 });
  return display === 'metric' ? metric : `${formatLength(mm, display)} (${metric})`;
};

/** What a range of joints comes to, in a sentence. */
export function jointsTold(found: readonly JointFit[], display: Display): string {
  const length = (mm: number) => jointText(mm, display);
  const counts = found.map((joint) => joint.wholeUnits);
  const most = Math.max(...counts);
  if (Math.min(...counts) === most)
    return `Every joint of this range lays ${formatCount(most)} whole, so none of them lets one more row close.`;
  const widest = found.filter((joint) => joint.wholeUnits === most).at(-1)!;
  const wider = counts.slice(found.indexOf(widest) + 1);
  if (wider.length === 0)
    return `The most, ${formatCount(most)} whole, lie with joints of ${length(widest.joint)}.`;
  return `The most, ${formatCount(most)} whole, still close with joints of ${length(widest.joint)}; wider ones lay ${formatCount(Math.max(...wider))} or fewer.`;
}
