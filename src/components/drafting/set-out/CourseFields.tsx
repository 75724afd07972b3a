import { ChevronLeft, ChevronRight } from 'lucide-react';
import { formatCount } from '@/paving/count';
import { workSide } from '@/paving/set-out/course-numbers';
import type { Course, CourseRun, SetOut } from '@/paving/set-out/set-out';
import { Length } from '../../ui/Length';
import { useShownFloor, useTable, useTableStore } from '../table-context';
import { pointShown } from './set-out-picture';

const BREAKS: Record<Exclude<CourseRun['after'], 'start'>, string> = {
  outside: 'after a keep-out or a notch in the edge',
  lifted: 'after units lifted out',
  'left-out': 'after units that do not fit whole',
};

const WIDTH = 300;
const HEIGHT = 30;

/** The string with its units end to end, gaps and keep-outs between them. */
function CoursePicture({ course }: { course: Course }) {
  const scale = WIDTH / course.length;
  return (
    <svg
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      className="my-1 block w-full"
      role="img"
      aria-label={`The string of course ${course.number} with its ${course.units} units`}
    >
      {course.outside.map(({ from, to }) => (
        <rect
          key={from}
          x={from * scale}
          y={2}
          width={Math.max(1, (to - from) * scale)}
          height={HEIGHT - 8}
          fill="var(--stone-300)"
        />
      ))}
      {course.runs.flatMap(({ ticks }) =>
        ticks.map(([from, to]) => (
          <rect
            key={from}
            x={from * scale}
            y={6}
            width={Math.max(0.8, (to - from) * scale)}
            height={HEIGHT - 14}
            fill="var(--stone-100)"
            stroke="var(--graphite)"
            strokeWidth={0.7}
          />
        )),
      )}
      <path d={`M0 ${HEIGHT - 8}H${WIDTH}`} stroke="var(--line)" strokeWidth={1.4} />
      <path
        d={`M0.7 0V${HEIGHT}M${WIDTH - 0.7} 0V${HEIGHT}`}
        stroke="var(--graphite)"
        strokeWidth={1.4}
      />
    </svg>
  );
}

/** One course: how many units, the gaps at its ends, and the lengths to tick along its string. */
export function CourseFields({ setOut }: { setOut: SetOut }) {
  const table = useTableStore();
  const { document } = useShownFloor();
  const point = useTable((state) => state.point);
  const { courses } = setOut;
  if (courses.length === 0) return null;
  const number = pointShown(setOut, { point, pointed: null })?.course ?? 1;
  const course = courses[number - 1];
  const side = workSide(courses) === 1 ? 'left' : 'right';
  const length = (mm: number) => <Length mm={mm} display={document.display} decimals={1} />;
  const figure = (mm: number) => (
    <Length
      mm={mm}
      display={document.display}
      decimals={1}
      unit={document.display === 'imperial'}
    />
  );
  const before = course.runs.map((_, r) =>
    course.runs.slice(0, r).reduce((sum, { units }) => sum + units, 0),
  );
  const take = (to: number) => table.getState().set({ point: `${to}a`, pointed: null });
  return (
    <section aria-label="Courses">
      <div className="flex items-center justify-between gap-2 border-b border-graphite">
        <h2 className="text-base">Course by course</h2>
        <div className="flex items-center">
          <button
            type="button"
            className="button button-quiet px-2"
            aria-label="The course before"
            disabled={number === 1}
            onClick={() => take(number - 1)}
          >
            <ChevronLeft size={18} aria-hidden />
          </button>
          <span className="min-w-16 text-center" data-testid="course">
            {formatCount(number)} of {formatCount(courses.length)}
          </span>
          <button
            type="button"
            className="button button-quiet px-2"
            aria-label="The course after"
            disabled={number === courses.length}
            onClick={() => take(number + 1)}
          >
            <ChevronRight size={18} aria-hidden />
          </button>
        </div>
      </div>
      <CoursePicture course={course} />
      <p>
        <b>{course.units === 1 ? '1 unit' : `${formatCount(course.units)} units`}</b> on a string of{' '}
        {length(course.length)}: {length(course.startGap)} to the first, {length(course.endGap)}{' '}
        after the last.
        {course.step !== null && (
          <>
            {' '}
            {length(course.step)} from the string before, to its {side}.
          </>
        )}
      </p>
      <div className="mt-2 max-h-72 overflow-y-auto">
        <table className="w-full text-right text-[0.93rem]">
          <caption className="pb-1 text-left text-sm text-slate">
            Running lengths from the start of the string, to tick on it
            {document.display === 'metric' && ', mm'}.
          </caption>
          <thead className="sticky top-0 bg-stone-50 text-sm text-slate">
            <tr>
              <th scope="col" className="py-1 text-left font-normal">
                Unit
              </th>
              <th scope="col" className="font-normal">
                near side
              </th>
              <th scope="col" className="font-normal">
                far side
              </th>
            </tr>
          </thead>
          <tbody className="hairlines">
            {course.runs.flatMap((run, r) => [
              ...(run.after === 'start'
                ? []
                : [
                    <tr key={`break ${run.from}`}>
                      <td colSpan={3} className="py-1 text-left text-sm text-slate">
                        {length(run.from - course.runs[r - 1].to)} on, {BREAKS[run.after]}:
                      </td>
                    </tr>,
                  ]),
              ...run.ticks.map(([from, to], n) => (
                <tr key={from}>
                  <th scope="row" className="py-0.5 text-left font-normal text-slate">
                    {formatCount(before[r] + n + 1)}
                  </th>
                  <td colSpan={from === to ? 2 : 1}>{figure(from)}</td>
                  {from !== to && <td>{figure(to)}</td>}
                </tr>
              )),
            ])}
          </tbody>
        </table>
      </div>
    </section>
  );
}
