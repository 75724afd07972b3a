import { Check, ChevronDown } from 'lucide-react';
import { useEffect, useRef, useState } from 'react';
import type { PersonName } from '@/api-types/people';
import { workSide } from '@/paving/set-out/course-numbers';
import type { Course } from '@/paving/set-out/set-out';
import type { RecordedEntry } from '@/paving/site/site-record';
import { Length } from '../ui/Length';
import { Moment } from '../ui/Moment';
import { Peg } from '../ui/Peg';
import { CourseTicks } from './CourseTicks';
import type { TabProps } from './PackView';
import { enter } from './site-state';

/** The courses as pegs on the string, in the order in which they are laid; the next one is the live one. */
export function CoursesTab({ kept, floor, record, display }: TabProps) {
  const { courses } = floor.setOut;
  const next = courses.find(({ row }) => !record.laid.has(row))?.number ?? null;
  const [open, setOpen] = useState<number | null>(next);
  const [seen, setSeen] = useState(next);
  // When the live course is ticked, the string goes on to the next.
  if (seen !== next) {
    setSeen(next);
    if (open === seen) setOpen(next);
  }
  const list = useRef<HTMLOListElement>(null);
  const first = useRef(true);
  // The live course is in view when the string is come to, and when it goes on to the next.
  useEffect(() => {
    const live = list.current?.querySelector('[data-live=true]');
    const far = first.current && next !== null && next > 3;
    live?.scrollIntoView({ block: far ? 'center' : 'nearest' });
    first.current = false;
  }, [next]);
  const tick = (ticked: readonly Course[], laid: boolean) =>
    void enter(
      kept.versionId,
      ticked.map(({ row }) => ({ content: { kind: 'course', course: row, laid } })),
    );
  if (courses.length === 0) {
    return <p>Nothing is laid on this floor, so there are no courses to tick.</p>;
  }
  const side = workSide(courses) === 1 ? 'left' : 'right';
  const laid = courses.filter(({ row }) => record.laid.has(row));
  const units = (of: readonly Course[]) => of.reduce((sum, course) => sum + course.units, 0);
  return (
    <section aria-label="Courses">
      <h2>
        {laid.length} of {courses.length} courses laid
      </h2>
      <p className="text-slate">
        {units(laid)} of {units(courses)} units. Tick a course once it is down and checked.
      </p>
      <ol ref={list} className="relative mt-3">
        {courses.map((course) => (
          <CourseRow
            key={course.number}
            course={course}
            side={side}
            live={course.number === next}
            entry={record.laid.get(course.row)}
            open={open === course.number}
            display={display}
            onOpen={() => setOpen(open === course.number ? null : course.number)}
            onTick={(is) => tick([course], is)}
            before={
              record.laid.has(course.row)
                ? []
                : courses.filter(
                    ({ number, row }) => number < course.number && !record.laid.has(row),
                  )
            }
            onTickAll={(ticked) => tick(ticked, true)}
          />
        ))}
      </ol>
      {next === null && (
        <p className="mt-4 border-l-2 border-vial pl-3">
          Every course is ticked. Go through the checks before the joints are filled.
        </p>
      )}
    </section>
  );
}

function CourseRow({
  course,
  side,
  live,
  entry,
  open,
  display,
  before,
  onOpen,
  onTick,
  onTickAll,
}: {
  course: Course;
  side: 'left' | 'right';
  live: boolean;
  entry: RecordedEntry<PersonName> | undefined;
  open: boolean;
  display: TabProps['display'];
  /** Courses before this one that are not ticked. */
  before: readonly Course[];
  onOpen: () => void;
  onTick: (laid: boolean) => void;
  onTickAll: (ticked: readonly Course[]) => void;
}) {
  const laid = entry !== undefined;
  return (
    <li
      className="relative scroll-mb-20 border-b border-stone-300"
      data-testid="course"
      data-laid={laid}
      data-live={live}
    >
      <span
        aria-hidden="true"
        className={`absolute top-0 bottom-0 left-[6px] border-l ${live ? 'border-line' : 'border-slate'}`}
      />
      <div className="relative flex items-stretch gap-3">
        <Peg look={laid ? 'holds' : live ? 'live' : 'empty'} className="mt-4" />
        <button
          type="button"
          aria-expanded={open}
          onClick={onOpen}
          className="flex min-h-14 min-w-0 flex-1 items-center gap-2 py-2 text-left"
        >
          <span className="min-w-0 flex-1">
            <span
              className={`block text-[1.1rem] ${live ? 'font-bold text-line' : 'font-semibold'}`}
            >
              Course {course.number}
              {live && <span className="font-normal"> · next</span>}
            </span>
            <span className="block text-slate">
              {course.units} {course.units === 1 ? 'unit' : 'units'}, starts{' '}
              <Length mm={course.startGap} display={display} /> in
            </span>
          </span>
          <ChevronDown size={20} aria-hidden className={`shrink-0 ${open ? 'rotate-180' : ''}`} />
        </button>
        <button
          type="button"
          aria-pressed={laid}
          aria-label={
            laid
              ? `Course ${course.number} is laid: take it back`
              : `Course ${course.number} is laid`
          }
          onClick={() => onTick(!laid)}
          className={`my-1 flex min-h-12 w-14 shrink-0 items-center justify-center border-2 ${
            laid
              ? 'border-vial bg-vial text-stone-50'
              : live
                ? 'border-line text-line'
                : 'border-slate'
          }`}
        >
          {laid && <Check size={26} strokeWidth={3} aria-hidden />}
        </button>
      </div>
      {open && (
        <div className="relative pb-4 pl-7">
          <CourseTicks course={course} side={side} display={display} />
          {entry && (
            <p className="mt-3 text-sm text-slate">
              Ticked by {entry.by.name}, <Moment iso={entry.madeAt} />
            </p>
          )}
          {before.length > 0 && (
            <button
              type="button"
              className="button mt-3"
              onClick={() => onTickAll([...before, course])}
            >
              Tick this one and {before.length === 1 ? 'the one' : `the ${before.length}`} before it
            </button>
          )}
        </div>
      )}
    </li>
  );
}
