import type { ReactNode } from 'react';
import { formatArea } from '@/paving/area';
import { formatCount } from '@/paving/count';
import type { LayoutDocument } from '@/paving/layout-document';
import type { DocumentProblem } from '@/paving/layout-validation';
import type { Report } from '@/paving/report';
import { Length } from '../ui/Length';
import { PlaySentence } from './PlaySentence';
import { useSettledFloor, useShownFloor } from './table-context';

function Figure({ name, now, before }: { name: string; now: ReactNode; before: ReactNode | null }) {
  return (
    <div className="flex min-w-0 flex-col border-l border-stone-300 pl-2.5 first:border-l-0 first:pl-0">
      <dt className="order-2 text-sm text-slate">{name}</dt>
      <dd className="order-1 text-[1.45rem] leading-tight font-bold tracking-tight whitespace-nowrap">
        {now}
      </dd>
      <dd className="order-3 min-h-[1.3rem] text-sm text-line">
        {before !== null && <>was {before}</>}
      </dd>
    </div>
  );
}

function Row({ name, now, before }: { name: string; now: ReactNode; before: ReactNode | null }) {
  return (
    <div className="flex items-baseline justify-between gap-3 py-1.5">
      <dt className="text-slate">{name}</dt>
      <dd className="text-right font-semibold whitespace-nowrap">
        {before !== null && <span className="mr-2 font-normal text-line">was {before}</span>}
        {now}
      </dd>
    </div>
  );
}

/** The report, live, with what each figure stood at before the gesture in hand. `brief`: the three that matter most. */
export function FloorFigures({ brief = false }: { brief?: boolean }) {
  const shown = useShownFloor();
  const settled = useSettledFloor();
  const { report } = shown;
  if (!report) return <FloorProblems />;
  const { display } = shown.document;
  // What the pieces come to takes longer; the section on cutting has it.
  const cut = shown.document.cutting === 'edge';
  const was = settled !== shown ? settled.report : null;
  const before = <T,>(
    pick: (r: Report) => T,
    draw: (value: T) => ReactNode,
    text: (value: T) => string,
  ) => (was && text(pick(was)) !== text(pick(report)) ? draw(pick(was)) : null);
  const length = (mm: number | null) =>
    mm === null ? '–' : <Length mm={mm} display={display} decimals={Math.abs(mm) < 10 ? 1 : 0} />;
  const tenth = (mm: number | null) => (mm === null ? '–' : mm.toFixed(1));
  const area = (m2: number) => formatArea(m2, display);

  return (
    <section aria-label="Figures of the floor">
      <dl
        className="grid grid-cols-[0.85fr_1fr_1.1fr] border-t border-b border-t-graphite border-b-stone-300 py-2"
        data-testid="figures"
      >
        <Figure
          name="whole units"
          now={<span data-testid="whole-units">{formatCount(report.wholeUnits)}</span>}
          before={before((r) => r.wholeUnits, formatCount, String)}
        />
        <Figure
          name="least gap"
          now={<span data-testid="least-gap">{length(report.leastGap)}</span>}
          before={before((r) => r.leastGap, length, tenth)}
        />
        <Figure
          name="play"
          now={
            <span data-testid="play">
              {report.play === null ? '–' : <>±{length(Math.max(0, report.play))}</>}
            </span>
          }
          before={before((r) => r.play, length, tenth)}
        />
      </dl>
      {!brief && (
        <>
          <p className="mt-2 text-sm text-slate">
            <PlaySentence />
          </p>
          <dl className="mt-3 hairlines text-[0.95rem]">
            <Row
              name={cut ? 'Units cut at the edge' : 'Left out at the edge'}
              now={formatCount(report.leftOut)}
              before={before((r) => r.leftOut, formatCount, String)}
            />
            {(report.lifted > 0 || (was?.lifted ?? 0) > 0) && (
              <Row
                name="Lifted"
                now={formatCount(report.lifted)}
                before={before((r) => r.lifted, formatCount, String)}
              />
            )}
            {Object.keys(report.byUnit).length > 1 &&
              shown.document.units
                .filter((unit) => unit.id in report.byUnit)
                .map((unit) => (
                  <Row
                    key={unit.id}
                    name={unit.name}
                    now={formatCount(report.byUnit[unit.id])}
                    before={before((r) => r.byUnit[unit.id] ?? 0, formatCount, String)}
                  />
                ))}
            <Row
              name="Ground"
              now={area(report.groundArea)}
              before={before((r) => r.groundArea, area, area)}
            />
            <Row
              name={cut ? 'Under whole units' : 'Under units'}
              now={area(report.coveredArea)}
              before={before((r) => r.coveredArea, area, area)}
            />
            <Row
              name={cut ? 'Pieces and aggregate' : 'Left for aggregate'}
              now={<span data-testid="fill-area">{area(report.fillArea)}</span>}
              before={before((r) => r.fillArea, area, area)}
            />
          </dl>
        </>
      )}
    </section>
  );
}

/** What a problem is about, in the words of the table. */
export function problemSubject(
  { ground, units }: LayoutDocument,
  path: DocumentProblem['path'],
): string {
  const [part, second, index] = path;
  if (part === 'ground' && second === 'perimeter') return 'The perimeter';
  if (part === 'ground' && second === 'keepOuts' && typeof index === 'number')
    return `The keep-out “${ground.keepOuts[index]?.name ?? ''}”`;
  if (part === 'units' && typeof second === 'number')
    return `The unit “${units[second]?.name ?? ''}”`;
  if (part === 'bond')
    return second === 'motif' && typeof index === 'number'
      ? `In the bond, unit ${index + 1}`
      : 'The bond';
  if (part === 'clearance') return 'The clearance';
  if (part === 'placement') return 'The start';
  if (part === 'levels')
    return second === 'spots' && typeof index === 'number' ? `Spot ${index + 1}` : 'The fall';
  if (part === 'buildUp') return 'A layer';
  return 'The floor';
}

/** Why the floor cannot be laid, and that nothing is lost. */
export function FloorProblems() {
  const { problems, document } = useShownFloor();
  return (
    <section role="alert" className="border-t-2 border-brick bg-brick-wash px-3 py-3">
      <h3>This floor cannot be laid yet</h3>
      <ul className="mt-1 list-disc pl-5">
        {problems.slice(0, 6).map((problem, n) => (
          <li key={n}>
            {problemSubject(document, problem.path)} {problem.message}.
          </li>
        ))}
      </ul>
      <p className="mt-2 text-sm">What you drew is kept. Undo takes the last change back.</p>
    </section>
  );
}
