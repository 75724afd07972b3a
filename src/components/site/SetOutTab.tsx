import { useMemo, useState } from 'react';
import type { ControlPoint } from '@/paving/set-out/set-out';
import { FiguredWords } from '../ui/FiguredWords';
import { Segmented } from '../ui/Segmented';
import { PointCard } from './PointCard';
import type { TabProps } from './PackView';
import { TapePlan } from './TapePlan';

const GROUPS = [
  ['edge', 'Edge'],
  ['unit', 'First unit'],
  ['string', 'Strings'],
] as const;
type Group = (typeof GROUPS)[number][0];

const groupOf = ({ kind }: ControlPoint): Group =>
  kind === 'unit' ? 'unit' : kind === 'string' ? 'string' : 'edge';

/** The points to peg, one at a time, with their tapes; the plan shows where each lies. */
export function SetOutTab({ kept, floor, display }: TabProps) {
  const { setOut } = floor;
  const [group, setGroup] = useState<Group>('edge');
  const [name, setName] = useState<string | null>(null);
  const own = useMemo(
    () => setOut.points.filter((point) => groupOf(point) === group),
    [setOut, group],
  );
  const first = own.findIndex(({ by }) => by !== 'datum');
  const picked = own.findIndex((point) => point.name === name);
  const at = picked < 0 ? Math.max(0, first) : picked;
  const point = own.at(at);
  const step = (by: number) => setName(own[(at + by + own.length) % own.length].name);
  const [a, b] = setOut.datums;
  return (
    <section aria-label="Set out">
      <h2 className="sr-only">Set out</h2>
      {kept.pack.issueNote && (
        <p className="mb-3 border-l-2 border-slate pl-3">“{kept.pack.issueNote}”</p>
      )}
      {kept.pack.siteNote && (
        <p className="mb-3 whitespace-pre-line text-slate">{kept.pack.siteNote}</p>
      )}
      <div className="-mx-4 h-[42vh] min-h-64 border-y border-stone-300 sm:mx-0 sm:border">
        <TapePlan
          document={kept.pack.document}
          datums={setOut.datums}
          points={own}
          point={point ?? null}
          onPick={setName}
        />
      </div>
      <div className="mt-3">
        <Segmented
          label="Points"
          hideLabel
          value={group}
          onChange={(next) => {
            setGroup(next);
            setName(null);
          }}
          options={GROUPS}
        />
      </div>
      {point ? (
        <>
          <PointCard point={point} datums={setOut.datums} display={display} />
          <div className="mt-4 flex items-center gap-3">
            <button type="button" className="button min-h-12 flex-1" onClick={() => step(-1)}>
              ‹ Before
            </button>
            <span className="text-slate">
              {at + 1} of {own.length}
            </span>
            <button type="button" className="button min-h-12 flex-1" onClick={() => step(1)}>
              Next ›
            </button>
          </div>
        </>
      ) : (
        <p className="mt-4 text-slate">There are none on this floor.</p>
      )}
      <h3 className="mt-6 border-b border-graphite pb-1">Before you start</h3>
      <ul className="mt-2 space-y-2">
        <li className="border-l-2 border-slate pl-3">
          Hook one tape on {a.name} and one on {b.name}. Pull both level and tight; the point is
          where they cross.
        </li>
        {setOut.advice.map(({ text }, n) => (
          <li key={n} className="border-l-2 border-amber pl-3">
            <FiguredWords words={text} display={display} />
          </li>
        ))}
      </ul>
      <p className="mt-6 border-t border-stone-300 pt-3 text-sm text-slate">
        Call before you dig: pegs and pins find buried pipes and cables too. Units over 23 kg (51
        lb) are lifted by two people or a machine. Figures are aids to setting out, not a design
        certificate; local codes and licensed practice decide.
      </p>
    </section>
  );
}
