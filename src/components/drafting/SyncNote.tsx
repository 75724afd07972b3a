import { useStore } from 'zustand';
import { wallTime } from '../ui/times';
import type { DraftSync } from './draft-sync';

/** Where the draft stands, in the title strip. */
export function SyncNote({ sync }: { sync: DraftSync }) {
  const { status, savedAt } = useStore(sync.state);
  const text = {
    saved: `Saved ${wallTime(savedAt)}`,
    saving: 'Saving …',
    offline: 'Kept on this device',
    'signed-out': 'Kept on this device',
    stale: 'Two sides',
    refused: 'Not saved',
  }[status];
  return (
    <span
      data-testid="sync"
      data-status={status}
      className={status === 'saved' || status === 'saving' ? '' : 'text-amber'}
    >
      {text}
    </span>
  );
}

/** What stands between the work and the server, and what to do about it. */
export function SyncBanner({ sync, personId }: { sync: DraftSync; personId: string }) {
  const { status, stale, message, keeps } = useStore(sync.state);
  if (status === 'stale' && stale)
    return (
      <div
        role="alert"
        className="flex flex-wrap items-center gap-x-4 gap-y-2 border-b border-amber bg-amber-wash px-4 py-2"
      >
        <p className="min-w-60 flex-1">
          <b>
            {stale.current.savedBy.id === personId
              ? `You saved this layout in another window at ${wallTime(stale.current.savedAt)}.`
              : `${stale.current.savedBy.name} saved this layout at ${wallTime(stale.current.savedAt)}, while you worked on it.`}
          </b>{' '}
          Nothing is lost: this side is here, and the other is on the server. Choose one to go on
          with; the other is set aside under Versions.
        </p>
        <button type="button" className="button" onClick={() => void sync.goOnWith('theirs')}>
          Go on with the other
        </button>
        <button
          type="button"
          className="button button-primary"
          onClick={() => void sync.goOnWith('mine')}
        >
          Go on with this one
        </button>
      </div>
    );
  if (status === 'signed-out')
    return (
      <p role="alert" className="border-b border-amber bg-amber-wash px-4 py-2">
        You are signed out. Your work is kept on this device;{' '}
        <a
          className="link font-semibold"
          href={`/sign-in?next=${encodeURIComponent(location.pathname)}`}
        >
          sign in
        </a>{' '}
        to send it.
      </p>
    );
  if (status === 'offline')
    return (
      <p role="status" className="border-b border-amber bg-amber-wash px-4 py-2">
        The server cannot be reached.{' '}
        {keeps
          ? 'Go on working: everything is kept on this device and sent when the connection is back.'
          : 'This browser keeps nothing either: leave the page open until the connection is back.'}
      </p>
    );
  if (status === 'refused')
    return (
      <p role="alert" className="border-b border-brick bg-brick-wash px-4 py-2">
        The draft could not be saved: {message} Your work is kept on this device.
      </p>
    );
  return null;
}
