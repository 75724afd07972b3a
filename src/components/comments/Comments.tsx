import { useState } from 'react';
import type { Point } from '@/geometry/point';
import { Wrong } from '../ui/Wrong';
import { Composer } from './Composer';
import { ThreadView } from './ThreadView';
import { pinNumbers, useMentionable, useThreadActions, useThreads } from './threads';

interface Props {
  readonly versionId: string;
  /** The spot that the next comment is pinned to. */
  readonly spot: Point | null;
  readonly onSpot: (spot: Point | null) => void;
  /** Begins picking a spot on the floor. */
  readonly onPickSpot: () => void;
  readonly picked: string | null;
  readonly onPick: (thread: string | null) => void;
}

/** The comments on a version: pinned to a spot or about the whole, in threads. */
export function Comments({ versionId, spot, onSpot, onPickSpot, picked, onPick }: Props) {
  const threads = useThreads(versionId);
  const people = useMentionable(versionId);
  const actions = useThreadActions(versionId);
  const [writing, setWriting] = useState(false);
  const [settled, setSettled] = useState(false);
  const all = threads.data ?? [];
  const numbers = pinNumbers(all);
  const open = all.filter((thread) => !thread.resolved);
  const resolved = all.filter((thread) => thread.resolved);
  const unread = all.reduce((sum, thread) => sum + thread.unread, 0);
  const showsResolved = settled || resolved.some(({ id }) => id === picked);
  const shown = showsResolved ? [...open, ...resolved] : open;

  return (
    <section aria-label="Comments" id="comments">
      <div className="flex items-baseline justify-between border-b border-graphite pb-1">
        <h2 className="text-base">Comments</h2>
        {unread > 0 && (
          <span className="text-sm font-semibold text-amber" data-testid="unread">
            {unread} not read yet
          </span>
        )}
      </div>
      {writing || spot ? (
        <div className="border-l-2 border-line py-3 pl-3">
          <p className="mb-1 text-sm font-semibold text-line">
            {spot ? 'Pinned to the marked spot' : 'About the whole floor'}
          </p>
          <Composer
            label="Comment"
            send="Send the comment"
            rows={3}
            people={people.data ?? []}
            busy={actions.begin.isPending}
            error={actions.begin.error}
            autoFocus
            onCancel={() => {
              setWriting(false);
              onSpot(null);
            }}
            onSend={async (body) => {
              const thread = await actions.begin.mutateAsync({
                body,
                pin: spot ? [spot[0], spot[1]] : null,
              });
              setWriting(false);
              onSpot(null);
              if (thread.pin) onPick(thread.id);
            }}
          />
        </div>
      ) : (
        <div className="flex flex-wrap gap-2 py-3">
          <button type="button" className="button" onClick={onPickSpot}>
            Pin a comment to a spot
          </button>
          <button type="button" className="button button-quiet" onClick={() => setWriting(true)}>
            About the whole floor
          </button>
        </div>
      )}
      {threads.isPending && <p className="text-slate">Reading the comments …</p>}
      <Wrong error={threads.error} again={() => void threads.refetch()} />
      {threads.data && all.length === 0 && !writing && !spot && (
        <p className="text-slate">
          Nothing said yet. A comment can be pinned to a spot of the floor; everybody who sees this
          version can answer it.
        </p>
      )}
      <ul className="hairlines">
        {shown.map((thread) => (
          <ThreadView
            key={thread.id}
            thread={thread}
            number={numbers.get(thread.id)}
            people={people.data ?? []}
            actions={actions}
            picked={picked === thread.id}
            onPick={() => onPick(picked === thread.id ? null : thread.id)}
          />
        ))}
      </ul>
      {resolved.length > 0 && (
        <button
          type="button"
          className="button button-quiet -ml-2"
          aria-expanded={showsResolved}
          onClick={() => setSettled(!settled)}
        >
          {showsResolved ? 'Hide' : 'Show'} {resolved.length} resolved
        </button>
      )}
    </section>
  );
}
