import { useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useState } from 'react';
import type { Role } from '@/api-types/people';
import type { VersionDetail } from '@/api-types/versions';
import { floorComparison } from '@/paving/comparison';
import { floorOf } from '../drafting/floor';
import { useLiveRefresh } from '../live/live-refresh';
import { api } from '../ui/api';
import { Queries } from '../ui/Queries';
import { Wrong } from '../ui/Wrong';
import { compareLink, type CompareView } from './compare-link';
import { CompareCosts } from './CompareCosts';
import { ComparedFloors } from './ComparedFloors';
import { CompareTable } from './CompareTable';
import { CopyLink } from './CopyLink';
import { differenceHeading, differenceSentence, figureRows } from './difference-words';
import { VersionString, type PegLayout } from './VersionString';

interface Props {
  readonly a: VersionDetail;
  readonly b: VersionDetail;
  readonly layouts: readonly PegLayout[];
  readonly view: CompareView | null;
  readonly role: Role;
}

/** Below this width one floor over the other is shown first, px. */
const NARROW_PX = 700;

export default function Compare(props: Props) {
  return (
    <Queries>
      <Comparing {...props} />
    </Queries>
  );
}

function Comparing({ a: firstA, b: firstB, layouts, view: firstView, role }: Props) {
  const [ids, setIds] = useState({ from: firstA.id, to: firstB.id });
  const [view, setView] = useState<CompareView>(
    () => firstView ?? (window.innerWidth < NARROW_PX ? 'over' : 'side'),
  );
  const a = useVersion(ids.from, firstA);
  const b = useVersion(ids.to, firstB);
  useLiveRefresh(firstA.projectId);
  useEffect(() => {
    window.history.replaceState(null, '', compareLink(ids.from, ids.to, view));
  }, [ids, view]);
  const both = a.data && b.data ? { a: a.data, b: b.data } : null;
  useStripFollows(a.data, b.data);
  return (
    <div className="mx-auto flex max-w-[96rem] flex-col gap-7 px-5 py-6 lg:px-12">
      {both ? (
        <Both
          key={`${both.a.id} ${both.b.id}`}
          {...both}
          several={layouts.length > 1}
          view={view}
          onView={setView}
          role={role}
        />
      ) : (
        <div className="min-h-96">
          {a.error || b.error ? (
            <Wrong
              error={a.error ?? b.error}
              again={() => void Promise.all([a.refetch(), b.refetch()])}
            />
          ) : (
            <p className="text-slate">Laying the floor …</p>
          )}
        </div>
      )}
      <section aria-label="Pick two versions" className="border-t border-stone-300 pt-5">
        <VersionString
          layouts={layouts}
          {...ids}
          onPick={(side, id) => setIds((now) => ({ ...now, [side]: id }))}
        />
      </section>
    </div>
  );
}

const useVersion = (id: string, first: VersionDetail) =>
  useQuery({
    queryKey: ['version', id],
    queryFn: () => api<VersionDetail>('GET', `/api/versions/${id}`),
    initialData: id === first.id ? first : undefined,
    staleTime: Infinity,
  });

/** The strip over the page and the window's title are the page's own; they must name what is compared now. */
function useStripFollows(a: VersionDetail | undefined, b: VersionDetail | undefined) {
  useEffect(() => {
    const cell = document.querySelector('[data-cell=layout]');
    if (!cell || !a || !b) return;
    const one = a.layoutId === b.layoutId;
    cell.textContent = one ? a.layoutName : `${a.layoutName}, ${b.layoutName}`;
    if (cell.previousElementSibling)
      cell.previousElementSibling.textContent = one ? 'Layout' : 'Layouts';
    document.title = `Compare ${a.number} and ${b.number}, ${a.projectName} · Evenlay`;
  }, [a, b]);
}

interface BothProps {
  readonly a: VersionDetail;
  readonly b: VersionDetail;
  readonly several: boolean;
  readonly view: CompareView;
  readonly onView: (view: CompareView) => void;
  readonly role: Role;
}

function Both({ a, b, several, view, onView, role }: BothProps) {
  const { display } = b.document;
  const laid = useMemo(() => {
    const [layingA, layingB] = [floorOf(a.document).laying, floorOf(b.document).laying];
    if (!layingA || !layingB) return null;
    return {
      a: layingA,
      b: layingB,
      comparison: floorComparison(layingA, layingB, [a.figures, b.figures]),
    };
  }, [a, b]);
  const named = (version: VersionDetail) =>
    several && a.layoutId !== b.layoutId
      ? `version ${version.number} of ${version.layoutName}`
      : `version ${version.number}`;
  const mayAnswer = role === 'client' && b.state === 'shared';

  if (!laid)
    return (
      <p className="text-brick">One of these versions can no longer be laid out to compare.</p>
    );
  const { comparison } = laid;
  return (
    <>
      <header className="flex flex-wrap items-start justify-between gap-x-8 gap-y-3">
        <div className="max-w-4xl">
          <h1>{differenceHeading(a.document, b.document, comparison)}</h1>
          <p className="mt-1 text-lg text-slate" data-testid="difference">
            {differenceSentence(
              { name: named(a), document: a.document },
              { name: named(b), document: b.document },
              comparison.figures,
              comparison,
              display,
            )}
          </p>
        </div>
        <div className="flex flex-wrap items-center gap-2">
          <CopyLink a={a.id} b={b.id} view={view} />
          {mayAnswer && (
            <>
              <a className="button" href={`/versions/${b.id}#ask`}>
                Ask for a change
              </a>
              <a className="button button-primary" href={`/versions/${b.id}#accept`}>
                Accept version {b.number}
              </a>
            </>
          )}
        </div>
      </header>
      <div className="grid gap-x-10 gap-y-7 lg:grid-cols-[minmax(0,1fr)_22rem]">
        <div className="min-w-0">
          <ComparedFloors a={a} b={b} laid={laid} view={view} onView={onView} />
        </div>
        <div>
          <CompareTable
            rows={figureRows(a.document, b.document, comparison.figures, display)}
            a={
              several && a.layoutId !== b.layoutId ? `${a.layoutName}, ${a.number}` : `${a.number}`
            }
            b={
              several && a.layoutId !== b.layoutId ? `${b.layoutName}, ${b.number}` : `${b.number}`
            }
          />
          <CompareCosts a={a.id} b={b.id} names={[`Version ${a.number}`, `Version ${b.number}`]} />
        </div>
      </div>
    </>
  );
}
