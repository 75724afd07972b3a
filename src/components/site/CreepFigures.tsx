import { Check, TriangleAlert } from 'lucide-react';
import type { Creep, CourseCreep, JointCapacity } from '@/paving/creep/creep';
import type { Display } from '@/paving/length';
import { Length } from '../ui/Length';
import { Signed } from './Signed';

/** Edges and courses listed before the rest is asked for. */
const FIRST = 6;

/** What units of this size come to with the joints kept: in words, then course by course, joint by joint, edge by edge. */
export function CreepFigures({ found, display }: { found: Creep; display: Display }) {
  const worst = [...found.courses].sort((a, b) => Math.abs(b.growth) - Math.abs(a.growth));
  return (
    <div className="mt-6" data-testid="creep">
      <h3 className="border-b border-graphite pb-1">What that comes to</h3>
      <ul className="mt-2 space-y-2" aria-live="polite">
        {found.advice.map((words) => (
          <li key={words} className="border-l-2 border-slate pl-3">
            {words}
          </li>
        ))}
      </ul>
      {worst.length > 0 && <Courses courses={worst} display={display} />}
      {found.capacity.map((capacity) => (
        <Capacity key={capacity.direction} capacity={capacity} display={display} />
      ))}
      {found.edges.length > 0 && (
        <>
          <h4 className="mt-5 font-bold">The gap at each edge, joints kept</h4>
          <p className="text-sm text-slate">
            {found.heldCourse === null
              ? 'Reckoned from the first unit, where it is drawn.'
              : `Reckoned from course ${found.heldCourse}, which is laid.`}
          </p>
          <Rows
            head={['Edge', 'drawn', 'comes to', '']}
            rows={found.edges.map(({ name, planned, coming, holds }) => ({
              key: name,
              cells: [
                name,
                <Length key="planned" mm={planned} display={display} decimals={1} />,
                <Length key="coming" mm={coming} display={display} decimals={1} />,
                <Does
                  key="does"
                  does={holds}
                  yes="holds"
                  no={coming < 0 ? 'over it' : 'too near'}
                />,
              ],
            }))}
          />
        </>
      )}
      <p className="mt-3 text-sm text-slate">
        Joints from <Length mm={found.joints.least} display={display} decimals={1} /> to{' '}
        <Length mm={found.joints.greatest} display={display} decimals={1} />: {found.joints.source}.
      </p>
    </div>
  );
}

function Courses({ courses, display }: { courses: readonly CourseCreep[]; display: Display }) {
  return (
    <>
      <h4 className="mt-5 font-bold">What each course grows by, joints kept</h4>
      <Rows
        head={['Course', 'grows', 'end gap', 'joint that mends it']}
        rows={courses.map(({ number, growth, comingEndGap, joint, jointDoes }) => ({
          key: String(number),
          cells: [
            `${number}`,
            <Signed key="growth" mm={growth} display={display} />,
            <Length key="gap" mm={comingEndGap} display={display} decimals={0} />,
            joint === null ? (
              '–'
            ) : (
              <span key="joint" className={jointDoes ? '' : 'font-semibold text-brick'}>
                <Length mm={joint} display={display} decimals={1} />
                {!jointDoes && ' no'}
              </span>
            ),
          ],
        }))}
      />
    </>
  );
}

function Capacity({ capacity, display }: { capacity: JointCapacity; display: Display }) {
  const { direction, units, each, from, worst, chance } = capacity;
  return (
    <>
      <h4 className="mt-5 font-bold">
        Can the joints {direction === 'along' ? 'along a course' : 'between courses'} take{' '}
        {from === 'tolerance' ? 'what the maker allows' : 'what you measured'}?
      </h4>
      <p className="text-sm text-slate">
        {units} units in a run, each up to <Length mm={each} display={display} decimals={1} /> off
        either way ({from === 'tolerance' ? 'the unit’s tolerance' : 'as measured'}).
      </p>
      <Rows
        head={['If they are', 'grow', 'joint', '']}
        rows={(
          [
            ['all off one way', worst],
            ['off by chance', chance],
          ] as const
        ).map(([words, { growth, joint, does }]) => ({
          key: words,
          cells: [
            words,
            <Signed key="growth" mm={growth} display={display} />,
            <Length key="joint" mm={joint} display={display} decimals={1} />,
            <Does key="does" does={does} yes="takes it" no="does not" />,
          ],
        }))}
      />
    </>
  );
}

function Does({ does, yes, no }: { does: boolean; yes: string; no: string }) {
  return (
    <span
      className={`inline-flex items-center gap-1 ${does ? 'text-vial-ink' : 'font-semibold text-brick'}`}
    >
      {does ? (
        <Check size={16} strokeWidth={3} aria-hidden />
      ) : (
        <TriangleAlert size={16} aria-hidden />
      )}
      {does ? yes : no}
    </span>
  );
}

interface Row {
  readonly key: string;
  readonly cells: readonly React.ReactNode[];
}

function Rows({ head, rows }: { head: readonly string[]; rows: readonly Row[] }) {
  const table = (some: readonly Row[]) => (
    <table className="w-full text-right">
      <thead>
        <tr className="text-sm text-slate">
          {head.map((words, n) => (
            <th key={n} scope="col" className="font-normal first:text-left">
              {words}
            </th>
          ))}
        </tr>
      </thead>
      <tbody className="hairlines">
        {some.map(({ key, cells }) => (
          <tr key={key}>
            {cells.map((cell, n) =>
              n === 0 ? (
                <th key={n} scope="row" className="py-1 text-left font-semibold">
                  {cell}
                </th>
              ) : (
                <td key={n} className="py-1">
                  {cell}
                </td>
              ),
            )}
          </tr>
        ))}
      </tbody>
    </table>
  );
  return (
    <>
      {table(rows.slice(0, FIRST))}
      {rows.length > FIRST && (
        <details>
          <summary className="flex min-h-11 items-center font-semibold">
            The other {rows.length - FIRST}
          </summary>
          {table(rows.slice(FIRST))}
        </details>
      )}
    </>
  );
}
