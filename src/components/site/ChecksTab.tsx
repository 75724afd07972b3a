import { Check as CheckMark, TriangleAlert } from 'lucide-react';
import { useRef } from 'react';
import { checksWithReadings } from '@/paving/set-out/checks';
import type { Check } from '@/paving/set-out/set-out';
import {
  allowedWords,
  readingRemedy,
  readingVerdict,
  verdictWords,
} from '@/paving/site/reading-verdict';
import type { SiteRecord } from '@/paving/site/site-record';
import type { PersonName } from '@/api-types/people';
import { FiguredWords } from '../ui/FiguredWords';
import { Length } from '../ui/Length';
import { LengthField } from '../ui/LengthField';
import { Moment } from '../ui/Moment';
import type { TabProps } from './PackView';
import { enter } from './site-state';

const GROUPS: readonly { readonly title: string; readonly kinds: readonly Check['kind'][] }[] = [
  { title: 'Before laying: is the ground as drawn?', kinds: ['edge', 'diagonal', 'square'] },
  { title: 'Under the floor', kinds: ['layer'] },
  { title: 'While laying: does it still close?', kinds: ['gap', 'rows', 'run', 'joint', 'line'] },
  { title: 'Once it lies', kinds: ['flatness', 'step'] },
];

/** What to measure, each reading judged at once. */
export function ChecksTab({ kept, floor, record, display }: TabProps) {
  const checks = checksWithReadings(floor.laying, floor.setOut, record.readings.keys());
  const measured = checks.filter(({ id }) => record.readings.has(id));
  const wrong = measured.filter(
    (check) => !readingVerdict(check, record.readings.get(check.id)!.measured).within,
  );
  if (checks.length === 0) return <p>There is nothing to check on this floor.</p>;
  return (
    <section aria-label="Checks">
      <h2>
        {measured.length} of {checks.length} measured
        {wrong.length > 0 && <span className="text-brick">, {wrong.length} not within</span>}
      </h2>
      <p className="text-slate">Type what the tape reads. The answer comes at once.</p>
      {GROUPS.map(({ title, kinds }) => {
        const own = checks.filter(({ kind }) => kinds.includes(kind));
        if (own.length === 0) return null;
        return (
          <section key={title} className="mt-5">
            <h3 className="border-b border-graphite pb-1">{title}</h3>
            <ul className="hairlines">
              {own.map((check) => (
                <CheckCard
                  key={check.id}
                  check={check}
                  reading={record.readings.get(check.id)}
                  display={display}
                  onRead={(mm) =>
                    void enter(kept.versionId, [
                      { content: { kind: 'check', check: check.id, measured: mm } },
                    ])
                  }
                />
              ))}
            </ul>
          </section>
        );
      })}
    </section>
  );
}

type Reading = SiteRecord<PersonName>['readings'] extends ReadonlyMap<string, infer R> ? R : never;

function CheckCard({
  check,
  reading,
  display,
  onRead,
}: {
  check: Check;
  reading: Reading | undefined;
  display: TabProps['display'];
  onRead: (mm: number | null) => void;
}) {
  const input = useRef<HTMLInputElement>(null);
  const verdict = reading && readingVerdict(check, reading.measured);
  const remedy = verdict && readingRemedy(check, verdict);
  const allowed = allowedWords(check, display);
  return (
    <li className="py-3" data-testid="check" data-check={check.id}>
      <p className="font-semibold">
        <FiguredWords words={check.what} display={display} />
      </p>
      <p className="mt-0.5">
        Drawn:{' '}
        <strong className="text-[1.2rem]">
          <Length mm={check.expected} display={display} decimals={1} />
        </strong>
        {allowed && <span className="text-slate"> · will do: {allowed}</span>}
      </p>
      <div className="mt-2 flex items-end gap-2">
        <div className="w-44 text-[1.1rem]">
          <LengthField
            label={reading ? 'Measured' : 'What the tape reads'}
            mm={reading ? reading.measured : null}
            display={display}
            inputRef={input}
            refuse={(read) => (read < 0 ? 'A tape reads nothing less than 0.' : null)}
            onLength={onRead}
          />
        </div>
        {/* Leaving the field takes what is in it: the keypad of many phones has no key for that. */}
        <button type="button" className="button" onClick={() => input.current?.blur()}>
          Keep
        </button>
        {reading && (
          <button type="button" className="button button-quiet" onClick={() => onRead(null)}>
            Take back
          </button>
        )}
      </div>
      {verdict && reading && (
        <div
          role="status"
          data-testid="verdict"
          data-within={verdict.within}
          className={`mt-2 border-l-4 py-1 pl-3 ${verdict.within ? 'border-vial' : 'border-brick bg-brick-wash'}`}
        >
          <p
            className={`flex items-center gap-1.5 font-bold ${verdict.within ? 'text-vial-ink' : 'text-brick'}`}
          >
            {verdict.within ? (
              <CheckMark size={18} strokeWidth={3} aria-hidden />
            ) : (
              <TriangleAlert size={18} aria-hidden />
            )}
            {verdictWords(verdict, display)}
          </p>
          {remedy && <p className="mt-1">{remedy}</p>}
          <p className="mt-1 text-sm text-slate">
            {reading.by.name}, <Moment iso={reading.madeAt} />
          </p>
        </div>
      )}
      <p className="mt-1 text-sm text-slate">Limits: {check.source}.</p>
    </li>
  );
}
