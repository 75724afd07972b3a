import type { Thread } from '@/api-types/comments';
import type { Point } from '@/geometry/point';
import { pinNumbers } from './threads';

interface Props {
  readonly threads: readonly Thread[];
  readonly place: (at: Point) => Point;
  readonly picked?: string | null;
  readonly onPick?: (thread: string) => void;
  readonly href?: (thread: string) => string;
  /** Pins not sent yet. */
  readonly drafts?: readonly Point[];
}

/** Pins standing at their spots of the floor. Resolved ones are left out. */
export function PinMarks({ threads, place, picked, onPick, href, drafts = [] }: Props) {
  const numbers = pinNumbers(threads);
  return (
    <>
      {threads
        .filter((thread) => thread.pin && (!thread.resolved || thread.id === picked))
        .map((thread) => {
          const [x, y] = place(thread.pin!);
          const label = `Comment ${numbers.get(thread.id)} by ${thread.comments[0]?.person.name ?? ''}${thread.unread > 0 ? ', not read yet' : ''}`;
          const shared = {
            'aria-label': label,
            title: thread.comments[0]?.body.slice(0, 120),
            className: 'absolute top-0 left-0 block h-9 w-7 hover:z-10',
            style: { transform: `translate(${x - 14}px, ${y - 34}px)` },
          };
          const mark = (
            <PinShape
              text={String(numbers.get(thread.id))}
              live={thread.id === picked}
              unread={thread.unread > 0}
            />
          );
          return href ? (
            <a key={thread.id} href={href(thread.id)} {...shared}>
              {mark}
            </a>
          ) : (
            <button key={thread.id} type="button" onClick={() => onPick?.(thread.id)} {...shared}>
              {mark}
            </button>
          );
        })}
      {drafts.map((at, n) => {
        const [x, y] = place(at);
        return (
          <span
            key={n}
            aria-hidden="true"
            className="pointer-events-none absolute top-0 left-0 block h-9 w-7"
            style={{ transform: `translate(${x - 14}px, ${y - 34}px)` }}
          >
            <PinShape text={drafts.length > 1 ? String(n + 1) : ''} live unread={false} />
          </span>
        );
      })}
    </>
  );
}

function PinShape({ text, live, unread }: { text: string; live: boolean; unread: boolean }) {
  return (
    <svg width="28" height="36" viewBox="0 0 28 36" aria-hidden="true">
      <path
        d="M3 2h22l-2.6 19L14 34 5.6 21z"
        fill={live ? 'var(--line)' : 'var(--graphite)'}
        stroke="var(--stone-50)"
        strokeWidth="1.6"
      />
      <text
        x="14"
        y="17"
        textAnchor="middle"
        fontSize="12.5"
        fontWeight="700"
        fill={live ? 'var(--on-line)' : 'var(--stone-50)'}
      >
        {text}
      </text>
      {unread && (
        <circle
          cx="23"
          cy="5"
          r="4.4"
          fill="var(--amber)"
          stroke="var(--stone-50)"
          strokeWidth="1.4"
        />
      )}
    </svg>
  );
}
