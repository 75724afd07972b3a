import fc from 'fast-check';
import { expect, test } from 'vitest';
import { layFloor, unitCorners } from '@/paving/laying';
import { checkById, checksWithReadings } from '@/paving/set-out/checks';
import { layingCourses } from '@/paving/set-out/courses';
import { courseOfRow, workSide } from '@/paving/set-out/course-numbers';
import { setOut } from '@/paving/set-out/set-out';
import { anyDocument, documentOf, parsed } from '../../../oracle/documents';

/** A floor from any two corners of its perimeter. */
const chosen = fc.tuple(anyDocument(), fc.nat(1000), fc.nat(1000)).map(([document, one, other]) => {
  const count = document.ground.perimeter.length;
  const first = one % count;
  const second = (first + 1 + (other % (count - 1))) % count;
  const at = (vertex: number): [number, number] => [0, vertex];
  return {
    ...document,
    setOut: { datums: [at(first), at(second)] as [[number, number], [number, number]] },
  };
});

test('work starts at course 1, with the first unit in it, and goes on to the other side one string after another', () => {
  fc.assert(
    fc.property(chosen, (document) => {
      const laying = layFloor(document);
      const { courses, firstUnit, datums } = setOut(laying);
      fc.pre(firstUnit !== null);
      expect(firstUnit!.course).toBe(1);
      expect(courses[0].runs.flatMap((run) => run.laid)[firstUnit!.place - 1]).toBe(
        firstUnit!.unit,
      );
      expect(courses.map(({ number }) => number)).toEqual(courses.map((_, n) => n + 1));
      // One way through: how far each string is left of the first one's line, by its own points.
      const [{ from, to, length }] = courses;
      const left = courses.map(
        (course) =>
          ((to[0] - from[0]) * (course.from[1] - from[1]) -
            (to[1] - from[1]) * (course.from[0] - from[0])) /
          length,
      );
      courses.forEach(({ step }, n) => {
        if (n === 0) expect(step).toBeNull();
        else expect(workSide(courses) * (left[n] - left[n - 1])).toBeCloseTo(step!, 5);
      });
      // No unit of either outermost course has a corner nearer to the first datum.
      const [x, y] = datums[0].at;
      const near = (unit: number) =>
        Math.min(
          ...unitCorners(
            laying.motif[laying.laid.k[unit]],
            laying.laid.x[unit],
            laying.laid.y[unit],
          ).map(([px, py]) => Math.hypot(px - x, py - y)),
        );
      const outermost = [courses[0], courses.at(-1)!].flatMap(({ runs }) =>
        runs.flatMap((run) => run.laid),
      );
      for (const unit of outermost)
        expect(near(unit)).toBeGreaterThan(near(firstUnit!.unit) - 0.011);
    }),
    { numRuns: 80 },
  );
});

test('rows hang on the floor alone: whatever the datums, a row is the same units on the same string', () => {
  fc.assert(
    fc.property(chosen, (document) => {
      const laying = layFloor(document);
      const { courses } = setOut(laying);
      const byRow = layingCourses(laying).courses;
      expect(courses).toHaveLength(byRow.length);
      byRow.forEach(({ row, from, to, runs }) => {
        const course = courseOfRow(courses, row)!;
        expect(course).toMatchObject({ from, to });
        expect(course.runs).toEqual(runs);
      });
      expect(courseOfRow(courses, byRow.length + 1)).toBeNull();
      expect(courseOfRow(courses, 0)).toBeNull();
    }),
    { numRuns: 40 },
  );
});

test('the strings from course 1 on: checks are named by rows, so that a reading keeps its place', () => {
  const at = (first: number, second: number) =>
    setOut(
      layFloor(
        parsed(
          documentOf({
            placement: { origin: [300, 300], turn: 0 },
            setOut: {
              datums: [
                [0, first],
                [0, second],
              ],
            },
          }),
        ),
      ),
    );
  const up = at(0, 1);
  const down = at(2, 3);
  const rows = up.courses.length;
  expect(up.checks.filter(({ kind }) => kind === 'rows').at(-1)).toMatchObject({
    id: `rows-1-${rows}`,
    to: String(rows),
  });
  expect(down.checks.filter(({ kind }) => kind === 'rows').at(-1)).toMatchObject({
    id: `rows-${rows}-1`,
    to: String(rows),
  });
});

test('a reading between two strings that are not on the list today is still read as what it was', () => {
  const laying = layFloor(
    parsed(
      documentOf({
        placement: { origin: [300, 300], turn: 0 },
        setOut: {
          datums: [
            [0, 2],
            [0, 3],
          ],
        },
      }),
    ),
  );
  const plan = setOut(laying);
  const rows = plan.courses.length;
  // From the lowest string to the third, as the list had it when courses counted from below: two pitches.
  const pitch = plan.courses[1].step!;
  const check = checkById(laying, plan, 'rows-1-3')!;
  expect(check.what).toBe(
    `From the string of course ${rows} to that of course ${rows - 2}, square to them`,
  );
  expect(check.expected).toBeCloseTo(2 * pitch, 9);
  expect(checksWithReadings(laying, plan, ['rows-1-3', 'flatness']).map(({ id }) => id)).toEqual([
    ...plan.checks.map(({ id }) => id),
    'rows-1-3',
  ]);
  for (const id of [`rows-1-${rows + 1}`, 'rows-2-2', 'rows-0-1', 'rows-1', 'edge-XY'])
    expect(checkById(laying, plan, id)).toBeNull();
});
