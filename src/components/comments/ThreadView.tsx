import { useEffect, useRef, useState } from 'react';
import type { Comment, Mentionable, Thread } from '@/api-types/comments';
import { Moment } from '../ui/Moment';
import { Composer } from './Composer';
import { bodyParts } from './mention-text';
import type { useThreadActions } from './threads';

interface Props {
  readonly thread: Thread;
  readonly number: number | undefined;
  readonly people: readonly Mentionable[];
  readonly actions: ReturnType<typeof useThreadActions>;
  readonly picked: boolean;
  readonly onPick: () => void;
}

/** How long a thread is in view before it counts as read, ms. */
const READ_AFTER_MS = 1200;

/** One thread: what was said, a reply, resolving it. In view for a moment, it is read. */
export function ThreadView({ thread, number, people, actions, picked, onPick }: Props) {
  const [replying, setReplying] = useState(false);
  const item = useRef<HTMLLIElement>(null);
  const unread = thread.unread > 0;
  const upTo = thread.comments.at(-1)?.id;
  const read = actions.read.mutate;
  useEffect(() => {
    if (!unread || !upTo || typeof IntersectionObserver === 'undefined') return;
    let timer: ReturnType<typeof setTimeout> | undefined;
    const observer = new IntersectionObserver(([entry]) => {
      clearTimeout(timer);
      if (entry.isIntersecting)
        timer = setTimeout(() => read({ id: thread.id, upTo }), READ_AFTER_MS);
    });
    observer.observe(item.current!);
    return () => {
      clearTimeout(timer);
      observer.disconnect();
    };
  }, [unread, upTo, thread.id, read]);
  useEffect(() => {
    if (picked) item.current?.scrollIntoView({ block: 'nearest' });
  }, [picked]);

  return (
    <li
      ref={item}
      id={`thread-${thread.id}`}
      className={`border-l-2 py-3 pl-3 ${picked ? 'border-line' : 'border-transparent'}`}
      data-testid="thread"
    >
      <div className="flex items-center justify-between gap-3">
        {number === undefined ? (
          <span className="text-sm text-slate">About the whole floor</span>
        ) : (
          <button
            type="button"
            className={`text-sm font-semibold hover:text-line ${picked ? 'text-line' : ''}`}
            onClick={onPick}
            aria-pressed={picked}
          >
            Pin {number}
          </button>
        )}
        {unread && (
          <span className="bg-amber-wash px-1.5 text-sm font-semibold text-amber">
            {thread.unread} new
          </span>
        )}
      </div>
      <ul className="mt-1 space-y-2.5">
        {thread.comments.map((comment) => (
          <CommentView key={comment.id} comment={comment} />
        ))}
      </ul>
      {thread.resolved && (
        <p className="mt-2 text-sm text-slate">
          Resolved by {thread.resolved.by.name}, <Moment iso={thread.resolved.at} />
        </p>
      )}
      {replying ? (
        <div className="mt-2">
          <Composer
            label="Reply"
            send="Send the reply"
            people={people}
            busy={actions.reply.isPending}
            error={actions.reply.error}
            autoFocus
            onCancel={() => setReplying(false)}
            onSend={async (body) => {
              await actions.reply.mutateAsync({ id: thread.id, body, upTo });
              setReplying(false);
            }}
          />
        </div>
      ) : (
        <div className="-ml-2 flex gap-1">
          <button type="button" className="button button-quiet" onClick={() => setReplying(true)}>
            Reply
          </button>
          {thread.mayResolve && (
            <button
              type="button"
              className="button button-quiet"
              disabled={actions.change.isPending}
              onClick={() => actions.change.mutate({ id: thread.id, resolved: !thread.resolved })}
            >
              {thread.resolved ? 'Open it again' : 'Resolve'}
            </button>
          )}
        </div>
      )}
      {actions.change.error && actions.change.variables?.id === thread.id && (
        <p role="alert" className="text-brick">
          {actions.change.error.message}
        </p>
      )}
    </li>
  );
}

function CommentView({ comment }: { comment: Comment }) {
  return (
    <li>
      <p className="text-sm text-slate">
        <strong className="text-graphite">{comment.person.name}</strong>,{' '}
        <Moment iso={comment.at} />
        {comment.unread && <span className="sr-only">, not read yet</span>}
      </p>
      <p className="break-words whitespace-pre-line">
        {bodyParts(comment.body, comment.mentions).map((part, n) =>
          part.mention ? <strong key={n}>{part.text}</strong> : <span key={n}>{part.text}</span>,
        )}
      </p>
    </li>
  );
}
