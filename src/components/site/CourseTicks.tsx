import type { Display } from '@/paving/length';
import type { Course, CourseRun } from '@/paving/set-out/set-out';
import { Length } from '../ui/Length';

const AFTER: Readonly<Record<CourseRun['after'], string>> = {
  start: 'From the start of the string',
  outside: 'Beyond the keep-out or notch',
  lifted: 'After units that stay out',
  'left-out': 'After units left out at the edge',
};

const HEIGHT = 46;
const WIDTH = 1000;
/** More units than this are drawn as one bar. */
const MOST_DRAWN = 120;

/** A course along its string: where each unit begins and ends, as running lengths to tick off one tape. */
export function CourseTicks({
  course,
  side,
  display,
}: {
  course: Course;
  /** Where each further string lies of the one before. */
  side: 'left' | 'right';
  display: Display;
}) {
  return (
    <>
      <Strip course={course} />
      <p className="mt-1 flex justify-between text-sm text-slate">
        <span>{course.number}a, zero</span>
        <span>
          <Length mm={course.length} display={display} /> at {course.number}b
        </span>
      </p>
      {course.step !== null && (
        <p className="mt-2">
          String{' '}
          <strong>
            <Length mm={course.step} display={display} decimals={1} />
          </strong>{' '}
          square from the one before, to its {side} as you look from a to b.
        </p>
      )}
      {course.runs.map((run, n) => (
        <section key={n} className="mt-3">
          {(course.runs.length > 1 || run.after !== 'start') && (
            <h3>
              {AFTER[run.after]}: {run.units} {run.units === 1 ? 'unit' : 'units'}
            </h3>
          )}
          <table className="mt-1 w-full max-w-sm text-right text-[1.1rem]">
            <thead>
              <tr className="text-sm text-slate">
                <th scope="col" className="text-left font-normal">
                  Unit
                </th>
                <th scope="col" className="font-normal">
                  begins
                </th>
                <th scope="col" className="font-normal">
                  ends
                </th>
              </tr>
            </thead>
            <tbody className="hairlines">
              {run.ticks.map(([from, to], unit) => (
                <tr key={unit}>
                  <th scope="row" className="py-1 text-left font-normal text-slate">
                    {unit + 1}
                  </th>
                  <td className="py-1 font-semibold">
                    <Length mm={from} display={display} unit={false} />
                  </td>
                  <td className="py-1">
                    {to === from ? (
                      <span className="text-slate">corner</span>
                    ) : (
                      <Length mm={to} display={display} unit={false} />
                    )}
                  </td>
                </tr>
              ))}
            </tbody>
          </table>
        </section>
      ))}
      <p className="mt-2">
        End gap{' '}
        <strong>
          <Length mm={course.endGap} display={display} />
        </strong>
      </p>
    </>
  );
}

/** The string with its units on it, to the course's own scale. */
function Strip({ course }: { course: Course }) {
  const at = (mm: number) => (mm / Math.max(1, course.length)) * WIDTH;
  const ticks = course.runs.flatMap((run) => run.ticks);
  const corners = ticks.every(([from, to]) => to === from);
  return (
    <svg
      viewBox={`-6 0 ${WIDTH + 12} ${HEIGHT}`}
      preserveAspectRatio="none"
      className="h-12 w-full"
      role="img"
      aria-label={`Course ${course.number}: ${course.units} units along its string.`}
    >
      {course.outside.map(({ from, to }, n) => (
        <rect
          key={n}
          x={at(from)}
          y={4}
          width={at(to) - at(from)}
          height={HEIGHT - 12}
          fill="var(--stone-300)"
        />
      ))}
      {ticks.length > MOST_DRAWN
        ? course.runs.map(({ from, to }, n) => (
            <rect
              key={n}
              x={at(from)}
              y={8}
              width={Math.max(2, at(to) - at(from))}
              height={HEIGHT - 20}
              fill="var(--stone-100)"
              stroke="var(--graphite)"
              vectorEffect="non-scaling-stroke"
            />
          ))
        : ticks.map(([from, to], n) =>
            corners ? (
              <path
                key={n}
                d={`M${at(from)} ${HEIGHT - 12}l-14 -22h28z`}
                fill="var(--stone-100)"
                stroke="var(--graphite)"
                vectorEffect="non-scaling-stroke"
              />
            ) : (
              <rect
                key={n}
                x={at(from)}
                y={8}
                width={Math.max(2, at(to) - at(from))}
                height={HEIGHT - 20}
                fill="var(--stone-100)"
                stroke="var(--graphite)"
                vectorEffect="non-scaling-stroke"
              />
            ),
          )}
      <path
        d={`M-6 ${HEIGHT - 12}H${WIDTH + 6}`}
        stroke="var(--line)"
        strokeWidth="2.5"
        vectorEffect="non-scaling-stroke"
      />
    </svg>
  );
}
