import { useState } from 'react';
import { formatCount } from '@/paving/count';
import { refit, type Refit, type UnitMeasure } from '@/paving/creep/refit';
import type { Laying } from '@/paving/laying';
import { formatLength } from '@/paving/length';
import { Length } from '../ui/Length';
import { LengthField } from '../ui/LengthField';
import type { TabProps } from './PackView';
import { laidNumbers } from './pack-floor';
import { RefitPlan } from './RefitPlan';
import { enter } from './site-state';

/** The courses that are ticked are held; the rest is fitted anew, shown, and proposed to the designer. */
export function Refitting({
  kept,
  floor,
  record,
  display,
  laying,
  measures,
}: TabProps & { laying: Laying; measures: readonly UnitMeasure[] }) {
  const laid = laidNumbers(floor, record);
  const [offset, setOffset] = useState(0);
  const [found, setFound] = useState<Refit | null>(null);
  const [wrong, setWrong] = useState<string | null>(null);
  const [sent, setSent] = useState(false);
  const [asked, setAsked] = useState('');
  const now = JSON.stringify([measures, laid, offset]);
  const stale = found !== null && asked !== now;
  const workOut = () => {
    // Past its place is away from what lies behind it: towards higher numbers where the work goes up from course 1.
    const past = laid.length === 0 || laid.includes(1) ? offset : -offset;
    const result = refit(laying, { measures, laid, offset: past }, floor.setOut);
    setSent(false);
    setAsked(now);
    setFound(result.ok ? result.refit : null);
    setWrong(result.ok ? null : result.message);
  };
  const send = async (proposed: Refit) => {
    const text = proposalText(proposed, laid, display);
    // The tape in hand is the phone's affair: the floor keeps the units that it was drawn in.
    const document = { ...proposed.document, display: kept.pack.document.display };
    const content = { kind: 'proposal', text, document } as const;
    if (await enter(kept.versionId, [{ content }])) setSent(true);
  };
  return (
    <section aria-label="Fit the rest anew" className="mt-8 border-t-2 border-graphite pt-3">
      <h3 className="text-[1.15rem]">Fit the rest anew</h3>
      <p className="mt-1 text-slate">
        {laid.length === 0
          ? 'No course is ticked, so the whole floor may move. Tick the courses that are down first, and they are held.'
          : `The ${laid.length === 1 ? 'course' : `${laid.length} courses`} that you ticked (${rangeWords(laid)}) stay as they lie.`}
      </p>
      {laid.length > 0 && (
        <div className="mt-3 max-w-72">
          <LengthField
            label="How far past its drawn place does the last course laid stand? Short of it: with a minus."
            mm={offset}
            display={display}
            onLength={setOffset}
          />
        </div>
      )}
      <button
        type="button"
        className="button button-primary mt-4 min-h-12 w-full"
        onClick={workOut}
      >
        Work out the rest
      </button>
      {wrong && (
        <p role="alert" className="mt-3 border-l-4 border-brick bg-brick-wash py-1 pl-3 text-brick">
          {wrong}
        </p>
      )}
      {found && (
        <div className={`mt-4 ${stale ? 'opacity-60' : ''}`} data-testid="refit">
          {stale && (
            <p className="font-semibold text-amber">
              What you typed has changed: work it out again.
            </p>
          )}
          <p className="text-[1.15rem] font-bold">
            {found.keepsAll
              ? 'Every unit still to lay stays whole.'
              : `${formatCount(found.dropped.length)} of ${formatCount(found.toLay)} units still to lay would have to stay out.`}
          </p>
          <dl className="mt-2 grid grid-cols-2 gap-3">
            <Figure words="Joint between courses" mm={found.jointAcross} display={display} />
            <Figure words="Joint along a course" mm={found.jointAlong} display={display} />
            {found.leastGap !== null && (
              <Figure words="Least gap at the edge" mm={found.leastGap} display={display} />
            )}
            {found.shift !== 0 && (
              <Figure words="Shift along the string" mm={found.shift} display={display} />
            )}
          </dl>
          <div className="-mx-4 mt-3 h-[42vh] min-h-64 border-y border-stone-300 sm:mx-0 sm:border">
            <RefitPlan found={found} floor={floor} laid={laid} />
          </div>
          <p className="mt-1 text-sm text-slate">
            Hatched: what lies. Pink: the string to pull next.
          </p>
          <ul className="mt-3 space-y-2">
            {found.advice.map((words) => (
              <li key={words} className="border-l-2 border-slate pl-3">
                {words}
              </li>
            ))}
          </ul>
          <details className="mt-2">
            <summary className="flex min-h-11 items-center font-semibold">
              Where each string goes
            </summary>
            <table className="w-full text-right">
              <thead>
                <tr className="text-sm text-slate">
                  <th scope="col" className="text-left font-normal">
                    Course
                  </th>
                  <th scope="col" className="font-normal">
                    from the last laid
                  </th>
                  <th scope="col" className="font-normal">
                    starts in
                  </th>
                  <th scope="col" className="font-normal">
                    units
                  </th>
                </tr>
              </thead>
              <tbody className="hairlines">
                {found.courses.map(({ number, fromLaid, startGap, units }) => (
                  <tr key={number}>
                    <th scope="row" className="py-1 text-left">
                      {number}
                    </th>
                    <td className="py-1 font-semibold">
                      <Length mm={fromLaid} display={display} decimals={1} />
                    </td>
                    <td className="py-1">
                      <Length mm={startGap} display={display} />
                    </td>
                    <td className="py-1">{units}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          </details>
          <div className="mt-4">
            {sent ? (
              <p role="status" className="border-l-2 border-vial pl-3">
                Proposed. It is kept under Notes and goes to the designer, who can take it as a
                draft. Build by it only once it is issued.
              </p>
            ) : (
              <button
                type="button"
                className="button min-h-12 w-full"
                disabled={stale}
                onClick={() => void send(found)}
              >
                Propose this to the designer
              </button>
            )}
          </div>
        </div>
      )}
    </section>
  );
}

function Figure({
  words,
  mm,
  display,
}: {
  words: string;
  mm: number;
  display: TabProps['display'];
}) {
  return (
    <div className="border-t-2 border-graphite pt-1">
      <dt className="text-sm text-slate">{words}</dt>
      <dd className="text-[1.5rem] leading-tight font-bold">
        <Length mm={mm} display={display} decimals={1} />
      </dd>
    </div>
  );
}

/** "1 to 4, 7": numbers that run on as ranges. */
const rangeWords = (numbers: readonly number[]): string => {
  const runs: [number, number][] = [];
  for (const number of numbers) {
    const last = runs.at(-1);
    if (last && number === last[1] + 1) last[1] = number;
    else runs.push([number, number]);
  }
  return runs.map(([from, to]) => (from === to ? `${from}` : `${from} to ${to}`)).join(', ');
};

const proposalText = (
  { jointAcross, jointAlong, advice }: Refit,
  laid: readonly number[],
  display: TabProps['display'],
): string => {
  const said = (mm: number) => formatLength(mm, display, { decimals: 1 });
  return [
    laid.length > 0
      ? `${laid.length === 1 ? 'Course' : 'Courses'} ${rangeWords(laid)} ${laid.length === 1 ? 'is laid and stays as it lies' : 'are laid and stay as they lie'}.`
      : 'No course is laid yet.',
    `The rest with joints of ${said(jointAcross)} between courses and ${said(jointAlong)} along them.`,
    ...advice,
  ].join(' ');
};
