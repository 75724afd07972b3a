import type { LayoutDocument } from '../layout-document';
import { formatLength } from '../length';
import type { Course } from '../set-out/set-out-types';
import { measureProblem } from './actual-units';
import type { RefitInput } from './creep-types';

/** A string is not measured to have gone farther off than this, mm. */
const GREATEST_OFFSET_MM = 500;

/** Why the input cannot be worked with, and what would do; null when it can. */
export function refitProblem(
  document: LayoutDocument,
  courses: readonly Course[],
  { measures, laid, offset, along = 0, joints, shift = 0 }: RefitInput,
): string | null {
  const measured = measureProblem(document, measures);
  if (measured) return measured;
  const shown = (mm: number) => formatLength(mm, document.display);
  if (courses.length === 0) return 'No unit is laid on this floor, so there is nothing to re-fit.';
  if (new Set(laid).size !== laid.length) return 'A course is named twice among those laid.';
  const numbers = [...laid].sort((one, other) => one - other);
  const unknown = numbers.find((number) => !courses.some((course) => course.number === number));
  if (unknown !== undefined)
    return `There is no course ${unknown}; they are numbered from 1 to ${courses.length}.`;
  if (numbers.length > 0) {
    const runsOn = numbers.every((number, n) => n === 0 || number === numbers[n - 1] + 1);
    const atEnd = numbers[0] === 1 || numbers[numbers.length - 1] === courses.length;
    if (!runsOn || !atEnd)
      return `The courses laid must run on from course 1 or from course ${courses.length} without one missing, so that the rest has one string to start from.`;
  }
  for (const [value, what] of [
    [offset, 'The string of the last course laid'],
    [along, 'The last course laid'],
  ] as const)
    if (!(Math.abs(value) <= GREATEST_OFFSET_MM))
      return `${what} cannot be more than ${shown(GREATEST_OFFSET_MM)} from its place; look at the figure again.`;
  if (joints && !(joints.least >= 0 && joints.greatest >= joints.least))
    return 'The joints run from the narrowest to the widest that may be laid.';
  if (!(shift >= 0 && shift <= GREATEST_OFFSET_MM))
    return `The shift along the strings is a length from 0 to ${shown(GREATEST_OFFSET_MM)}.`;
  return null;
}
