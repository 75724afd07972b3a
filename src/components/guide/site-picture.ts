import { layFloor } from '@/paving/laying';
import { workSide } from '@/paving/set-out/course-numbers';
import { setOut, type Course } from '@/paving/set-out/set-out';
import { COURT } from './sample-floors';

/** Courses of the sample court that count as laid in the picture. */
const LAID = 4;

/** The sample court part way through, for the guide. */
export const siteCourses = (): {
  readonly laid: number;
  readonly courses: readonly { readonly number: number; readonly laid: boolean }[];
  readonly next: Course;
  readonly side: 'left' | 'right';
} => {
  const { courses } = setOut(layFloor(COURT));
  return {
    laid: LAID,
    courses: courses.map(({ number }) => ({ number, laid: number <= LAID })),
    next: courses[LAID],
    side: workSide(courses) === 1 ? 'left' : 'right',
  };
};
