import { useRef, useState } from 'react';
import { api, ApiError } from '../ui/api';

/** What is saved part by part, each time with the revision that it started from. */
interface Revised {
  readonly id: string;
  readonly revision: number;
}

export interface SavedDraft<T extends Revised, C extends object> {
  /** As the server has it, with its own sums. */
  readonly saved: T;
  /** Changes that are on their way, or were refused. */
  readonly pending: Partial<C>;
  readonly saving: boolean;
  readonly error: ApiError | null;
  /** The other side, when somebody else was quicker. */
  readonly theirs: T | null;
  readonly change: (part: Partial<C>) => void;
  /** Stores one's own over theirs. */
  readonly keepMine: () => void;
  readonly takeTheirs: () => void;
  readonly again: () => void;
  readonly replace: (saved: T) => void;
}

/**
 * A draft that is saved as it is changed. Saves go one after another: what is changed while one is on its way is gathered and
 * sent next, so that a slow line never makes a person refuse themselves.
 */
export function useSavedDraft<T extends Revised, C extends object>(
  first: T,
  path: string,
  onSaved?: (saved: T) => void,
): SavedDraft<T, C> {
  const [saved, setSaved] = useState(first);
  const [pending, setPending] = useState<Partial<C>>({});
  const [saving, setSaving] = useState(false);
  const [error, setError] = useState<ApiError | null>(null);
  const [theirs, setTheirs] = useState<T | null>(null);
  const now = useRef({ saved: first, pending: {} as Partial<C>, busy: false });

  const put = (parts: Partial<{ saved: T; pending: Partial<C> }>) => {
    Object.assign(now.current, parts);
    if (parts.saved) setSaved(parts.saved);
    if (parts.pending) setPending(parts.pending);
  };

  const run = async () => {
    if (now.current.busy) return;
    now.current.busy = true;
    setSaving(true);
    setError(null);
    try {
      while (Object.keys(now.current.pending).length > 0) {
        const sent = now.current.pending;
        const answer = await api<T>('PATCH', path, {
          ...sent,
          revision: now.current.saved.revision,
        });
        // What was typed meanwhile stays to be sent; what was sent as it still is, is done with.
        const left = Object.fromEntries(
          Object.entries(now.current.pending).filter(
            ([name, value]) => (sent as Record<string, unknown>)[name] !== value,
          ),
        ) as Partial<C>;
        put({ saved: answer, pending: left });
        onSaved?.(answer);
      }
    } catch (failure) {
      const refused =
        failure instanceof ApiError ? failure : new ApiError(0, null, 'That did not work.');
      setError(refused);
      setTheirs(refused.status === 409 ? ((refused.problem?.current as T) ?? null) : null);
    } finally {
      now.current.busy = false;
      setSaving(false);
    }
  };

  return {
    saved,
    pending,
    saving,
    error,
    theirs,
    change: (part) => {
      put({ pending: { ...now.current.pending, ...part } });
      void run();
    },
    keepMine: () => {
      if (theirs) put({ saved: { ...now.current.saved, revision: theirs.revision } });
      setTheirs(null);
      void run();
    },
    takeTheirs: () => {
      if (theirs) put({ saved: theirs, pending: {} });
      setTheirs(null);
      setError(null);
    },
    again: () => void run(),
    replace: (next) => {
      put({ saved: next, pending: {} });
      setError(null);
      setTheirs(null);
    },
  };
}
