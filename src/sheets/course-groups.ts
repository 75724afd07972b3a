import { formatCount } from '@/paving/count';
import type { Course } from '@/paving/set-out/set-out-types';
import type { Display } from '@/paving/length';
import { figureText } from './figures';

/** Courses whose strings are marked alike: one list of running lengths, or one marked lath, serves them all. */
export type CourseGroup = readonly Course[];

/** All that is printed of a course along its string, as one text: what is alike in it is alike on the tape. */
function printedAlike({ length, byUnit, endGap, outside, runs }: Course, display: Display): string {
  const figure = (mm: number) => figureText(mm, display);
  return JSON.stringify([
    figure(length),
    figure(endGap),
    Object.entries(byUnit).sort(([a], [b]) => (a < b ? -1 : 1)),
    outside.map(({ from, to, over }) => [figure(from), figure(to), over]),
    runs.map(({ after, ticks }) => [
      after,
      ticks.map(([near, far]) => [figure(near), figure(far)]),
    ]),
  ]);
}

/** Courses that are printed alike, together; groups in the order of their first course. */
export function coursesAlike(courses: readonly Course[], display: Display): readonly CourseGroup[] {
  const groups = new Map<string, Course[]>();
  for (const course of courses) {
    const key = printedAlike(course, display);
    const group = groups.get(key);
    if (group) group.push(course);
    else groups.set(key, [course]);
  }
  return [...groups.values()];
}

const ordinal = (n: number) => (n === 2 ? 'second' : n === 3 ? 'third' : `${formatCount(n)}th`);

/** Fewest numbers evenly apart that are said as one stretch. */
const LEAST_STRETCH = 3;

/** `1`, `4 to 9`, `1 to 199 every second`, and what is left over one by one. */
export function numbersWords(numbers: readonly number[]): string {
  const parts: string[] = [];
  for (let n = 0; n < numbers.length;) {
    const by = numbers[n + 1] - numbers[n];
    let end = n + 1;
    while (end + 1 < numbers.length && numbers[end + 1] - numbers[end] === by) end++;
    if (end < numbers.length && end - n + 1 >= LEAST_STRETCH) {
      const every = by === 1 ? '' : ` every ${ordinal(by)}`;
      parts.push(`${formatCount(numbers[n])} to ${formatCount(numbers[end])}${every}`);
      n = end + 1;
    } else {
      parts.push(formatCount(numbers[n]));
      n++;
    }
  }
  return parts.join(', ');
}
