import { formatCount } from '../count';
import type { Laying } from '../laying';
import { formatLength } from '../length';
import { jointFreedom, keptJoints } from './actual-pattern';
import type { ActualUnit } from './creep-types';
import type { Choice, RefitFloor } from './refit-floor';
import type { SearchResult } from './refit-search';

/** What the crew does with the rest, in plain sentences. */
export function refitAdvice(
  { document }: Laying,
  floor: RefitFloor,
  units: readonly ActualUnit[],
  { joints, shift }: Choice,
  dropped: number,
  leastGap: number | null,
  result: SearchResult | null,
): string[] {
  const { display } = document;
  const shown = (mm: number) => formatLength(mm, display, { decimals: 1 });
  if (floor.rest.length === 0) return ['All courses are laid; there is nothing left to fit.'];
  const advice: string[] = [];
  const kept = keptJoints(document, units);
  const freedom = jointFreedom(document.bond);
  const count = (n: number) => (n === 1 ? '1 unit' : `${formatCount(n)} units`);
  if (dropped > 0)
    advice.push(
      `${count(dropped)} of the ${formatCount(floor.rest.length)} still to lay ${dropped === 1 ? 'has' : 'have'} to be left out: no joint within the limits keeps ${dropped === 1 ? 'it' : 'all'} whole. Ask the designer before you go on.`,
    );
  else
    advice.push(
      `All ${count(floor.rest.length)} still to lay stay whole${leastGap === null ? '' : `, ${shown(leastGap)} from the edge at the least`}.`,
    );
  if (freedom === 'none')
    advice.push('The steps of this bond stay as they are; go on from the last string.');
  else if (freedom === 'one') advice.push(`Lay the rest with joints of ${shown(joints.across)}.`);
  else if (freedom === 'across')
    advice.push(`Lay the rest with gaps of ${shown(joints.across)} between the courses.`);
  else if (Math.abs(joints.along - kept.along) < 1e-9)
    advice.push(
      `Lay the rest with joints of ${shown(joints.across)} between the courses, and along them as before, ${shown(joints.along)}.`,
    );
  else
    advice.push(
      `Lay the rest with joints of ${shown(joints.across)} between the courses and ${shown(joints.along)} along them. Joints across the courses then run out of line with those laid, little by little.`,
    );
  if (Math.abs(shift) >= 0.05)
    advice.push(
      `Shift the rest ${shown(Math.abs(shift))} ${shift > 0 ? 'towards the end' : 'towards the start'} of the strings.`,
    );
  if (result && !result.proven)
    advice.push('This is the best that was found; there may be a little better.');
  return advice;
}
