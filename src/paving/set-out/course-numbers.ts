import type { Course } from './set-out-types';

/** The outermost course that work starts from: that at the strings' right hand, or that at their left. */
export type WorkStart = 'first-row' | 'last-row';

/** Courses by rows numbered in the order of the work, and in that order. */
export function coursesInOrder(byRow: readonly Course[], start: WorkStart): readonly Course[] {
  if (start === 'first-row') return byRow;
  return byRow
    .map((course, n): Course => ({
      ...course,
      number: byRow.length - n,
      step: n + 1 < byRow.length ? byRow[n + 1].step : null,
    }))
    .reverse();
}

/** 1 where each further course lies left of the strings before it, -1 where it lies right of them. */
export const workSide = (courses: readonly Course[]): 1 | -1 =>
  courses.length > 1 && courses[1].row < courses[0].row ? -1 : 1;

/** The course of a row. */
export const courseOfRow = (courses: readonly Course[], row: number): Course | null =>
  courses.find((course) => course.row === row) ?? null;
