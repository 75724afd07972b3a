import { useQuery } from '@tanstack/react-query';
import type { LayoutSummary } from '@/api-types/layouts';
import type { LiveLayout } from '@/api-types/live';
import type { VersionWithDrawing } from '@/api-types/versions';
import { formatLength } from '@/paving/length';
import { formatCount } from '@/paving/count';
import { compareLink } from '../compare/compare-link';
import { CoursesLaid } from '../site-progress/CoursesLaid';
import { presentWords } from '../live/present-words';
import { api } from '../ui/api';
import { FloorDrawing } from '../ui/FloorDrawing';
import { Peg, statePeg } from '../ui/Peg';
import { Moment } from '../ui/Moment';
import { STATE_WORDS } from '../ui/version-words';
import { LayoutActions } from './LayoutActions';

interface Props {
  readonly layout: LayoutSummary;
  readonly versions: readonly VersionWithDrawing[] | undefined;
  readonly live: LiveLayout | undefined;
  readonly drafting: boolean;
  readonly onSaid: (said: string) => void;
}

/** Versions shown before the rest is asked for. */
const SHOWN = 8;

/** A layout: its drawing, what can be done with it, and its versions as pegs, newest first. */
export function LayoutSection({ layout, versions: first, live, drafting, onSaid }: Props) {
  const { data: versions = [] } = useQuery({
    queryKey: ['versions', layout.id],
    queryFn: () =>
      api<{ versions: VersionWithDrawing[] }>('GET', `/api/layouts/${layout.id}/versions`).then(
        (answer) => answer.versions,
      ),
    initialData: first && [...first],
  });
  const open = drafting
    ? `/layouts/${layout.id}`
    : layout.latest
      ? `/versions/${layout.latest.id}`
      : undefined;
  const present = live && presentWords(live.present);
  const [newest, before] = versions;
  return (
    <section
      className="mb-12 border-t-2 last:mb-0 border-graphite pt-4"
      aria-label={layout.name}
      data-testid="layout"
    >
      <div className="grid gap-x-8 gap-y-4 md:grid-cols-[17rem_minmax(0,1fr)]">
        <a
          href={open}
          className="flex min-h-44 items-center self-start justify-center border border-stone-300 p-4 hover:border-line"
          aria-label={`Open ${layout.name}`}
        >
          <FloorDrawing document={layout.document} width={300} height={200} className="w-full" />
        </a>
        <div className="min-w-0">
          <div className="flex flex-wrap items-baseline justify-between gap-3">
            <h2>{layout.name}</h2>
            {drafting && !layout.archivedAt && (
              <a className="button button-primary" href={`/layouts/${layout.id}`}>
                Open the drafting table
              </a>
            )}
          </div>
          {present && (
            <p className="mt-1 text-amber" role="status">
              {present}
            </p>
          )}
          {versions.length === 0 && drafting && (
            <p className="mt-2 text-slate">
              Only a draft so far. Save a version to freeze its figures and print its plan.
            </p>
          )}
          <Versions versions={versions.slice(0, SHOWN)} live={live} />
          {versions.length > SHOWN && (
            <details>
              <summary className="py-2 font-semibold">
                {versions.length - SHOWN} earlier versions
              </summary>
              <Versions versions={versions.slice(SHOWN)} live={live} />
            </details>
          )}
          <div className="mt-2 flex flex-wrap items-center gap-x-1">
            {before && (
              <a className="button button-quiet -ml-2" href={compareLink(before.id, newest.id)}>
                Compare versions
              </a>
            )}
            {drafting && <LayoutActions layout={layout} onSaid={onSaid} />}
          </div>
        </div>
      </div>
    </section>
  );
}

function Versions({
  versions,
  live,
}: {
  versions: readonly VersionWithDrawing[];
  live: LiveLayout | undefined;
}) {
  return (
    <ol className="mt-3 hairlines">
      {versions.map((version) => {
        const unread = live?.versions.find(({ id }) => id === version.id)?.unread ?? 0;
        return (
          <li
            key={version.id}
            data-testid="version"
            className="grid grid-cols-[14px_minmax(0,1fr)_auto] items-center gap-x-3 gap-y-0.5 py-2"
          >
            <Peg look={statePeg(version.state)} />
            <p className="min-w-0">
              <a className="font-semibold hover:text-line" href={`/versions/${version.id}`}>
                {version.number}. {version.label}
              </a>
              {unread > 0 && (
                <span className="ml-2 bg-amber-wash px-1.5 text-sm font-semibold whitespace-nowrap text-amber">
                  {unread} new
                </span>
              )}
            </p>
            <a className="link" href={`/versions/${version.id}/plan`}>
              Plan
            </a>
            <p className="col-span-2 col-start-2 text-sm">
              {formatCount(version.figures.wholeUnits)} whole units,{' '}
              {version.figures.leastGap === null
                ? 'no unit laid'
                : `${formatLength(version.figures.leastGap, version.document.display)} least gap`}
              <span className="text-slate">
                {' · '}
                {STATE_WORDS[version.state]}, <Moment iso={version.createdAt} day />
              </span>
            </p>
            {version.state === 'issued' && (
              <div className="col-span-2 col-start-2">
                <CoursesLaid versionId={version.id} document={version.document} />
              </div>
            )}
          </li>
        );
      })}
    </ol>
  );
}
