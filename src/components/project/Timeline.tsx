import { useInfiniteQuery } from '@tanstack/react-query';
import type { TimelineEntry, TimelinePage } from '@/api-types/timeline';
import { api } from '../ui/api';
import { Peg, statePeg, type PegLook } from '../ui/Peg';
import { Moment } from '../ui/Moment';
import { Wrong } from '../ui/Wrong';
import { deedWords, entryLink, entryText } from './timeline-words';

const PAGE = '20';

const pegOf = (entry: TimelineEntry): PegLook =>
  entry.kind === 'commented' || entry.kind === 'replied' ? 'empty' : statePeg(entry.kind);

/** What happened in a project, newest first, on a string. */
export function Timeline({ projectId, first }: { projectId: string; first: TimelinePage | null }) {
  const timeline = useInfiniteQuery({
    queryKey: ['timeline', projectId],
    queryFn: ({ pageParam }) =>
      api<TimelinePage>(
        'GET',
        `/api/projects/${projectId}/timeline?${new URLSearchParams({ size: PAGE, ...(pageParam ? { after: pageParam } : {}) })}`,
      ),
    initialPageParam: '',
    getNextPageParam: (page) => page.next,
    initialData: first ? { pages: [first], pageParams: [''] } : undefined,
  });
  const entries = timeline.data?.pages.flatMap((page) => page.entries) ?? [];
  return (
    <section aria-label="What happened">
      <h2 className="border-b border-graphite pb-1 text-base">What happened</h2>
      {timeline.isPending && <p className="mt-3 text-slate">Reading what happened …</p>}
      <Wrong error={timeline.error} again={() => void timeline.refetch()} className="mt-3" />
      {timeline.data && entries.length === 0 && (
        <p className="mt-3 text-slate">
          Nothing yet. Each saved version, comment and answer is noted here with its time.
        </p>
      )}
      <ol className="mt-3">
        {entries.map((entry, n) => (
          <li key={entry.id} className="relative flex gap-3 pb-3.5" data-testid="happened">
            {(n < entries.length - 1 || timeline.hasNextPage) && (
              <span
                aria-hidden="true"
                className="absolute top-3 bottom-0 left-[6px] border-l border-slate"
              />
            )}
            <Peg look={pegOf(entry)} className="relative mt-0.5" />
            <div className="min-w-0">
              <p className="leading-snug">
                <strong>{entry.person.name}</strong> {deedWords(entry)}{' '}
                <a className="link" href={entryLink(entry)}>
                  version {entry.version.number}
                </a>{' '}
                of {entry.layout.name}
              </p>
              {entryText(entry) && (
                <p className="mt-0.5 line-clamp-3 text-sm break-words">{entryText(entry)}</p>
              )}
              <p className="text-sm text-slate">
                <Moment iso={entry.at} />
              </p>
            </div>
          </li>
        ))}
      </ol>
      {timeline.hasNextPage && (
        <button
          type="button"
          className="button button-quiet -ml-2"
          disabled={timeline.isFetchingNextPage}
          onClick={() => void timeline.fetchNextPage()}
        >
          {timeline.isFetchingNextPage ? 'Reading …' : 'Show what was before'}
        </button>
      )}
    </section>
  );
}
