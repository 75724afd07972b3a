import { useQuery } from '@tanstack/react-query';
import type { Unread } from '@/api-types/comments';
import { api } from '../ui/api';
import { Moment } from '../ui/Moment';

/** Threads shown before the rest is unfolded. */
const SHOWN = 3;

/** What was said and this person has not read, newest first; nothing when all is read. */
export function UnreadComments() {
  const { data } = useQuery({
    queryKey: ['unread'],
    queryFn: () => api<Unread>('GET', '/api/unread'),
    refetchInterval: 60_000,
  });
  const threads = data?.threads ?? [];
  if (threads.length === 0) return null;
  return (
    <section
      aria-label="Not read yet"
      className="mt-5 border-l-2 border-amber py-1 pl-4"
      data-testid="unread-list"
    >
      <h2 className="text-base">Not read yet</h2>
      <Threads threads={threads.slice(0, SHOWN)} />
      {threads.length > SHOWN && (
        <details>
          <summary className="py-1">{threads.length - SHOWN} more</summary>
          <Threads threads={threads.slice(SHOWN)} />
        </details>
      )}
    </section>
  );
}

function Threads({ threads }: { threads: Unread['threads'] }) {
  return (
    <ul>
      {threads.map((thread) => (
        <li key={thread.threadId} className="py-1">
          <a
            className="line-clamp-1 hover:text-line"
            href={`/versions/${thread.versionId}?thread=${thread.threadId}`}
          >
            <strong>{thread.latest.person.name}</strong>: {thread.latest.body}
          </a>
          <p className="text-sm text-slate">
            {thread.projectName}, version {thread.versionNumber} of {thread.layoutName},{' '}
            <Moment iso={thread.latest.at} />
          </p>
        </li>
      ))}
    </ul>
  );
}
