import { useState, type ReactNode } from 'react';
import { ApiError } from './api';

/** A button that first says what it would do, and does it once that is confirmed. */
export function AskFirst({
  name,
  go,
  going,
  children,
  onGo,
  className = '',
}: {
  /** On the button that asks. */
  name: string;
  /** On the button that does it, and while it is being done. */
  go: string;
  going: string;
  /** What it would do. */
  children: ReactNode;
  /** Does it and leaves the page. What it throws is shown. */
  onGo: () => Promise<void>;
  className?: string;
}) {
  const [asking, setAsking] = useState(false);
  const [busy, setBusy] = useState(false);
  const [wrong, setWrong] = useState<{ message: string; stale: boolean } | null>(null);
  const run = async () => {
    setBusy(true);
    setWrong(null);
    try {
      await onGo();
    } catch (error) {
      setBusy(false);
      setWrong({
        message: error instanceof Error ? error.message : 'That did not work. Try again.',
        stale: error instanceof ApiError && error.status === 409,
      });
    }
  };
  return (
    <div className={className}>
      <button
        type="button"
        className="button"
        aria-expanded={asking}
        onClick={() => setAsking(!asking)}
      >
        {name}
      </button>
      {asking && (
        <div className="mt-3 border-l-2 border-line pl-3">
          {children}
          <button
            type="button"
            className="button button-primary mt-2"
            disabled={busy}
            onClick={() => void run()}
          >
            {busy ? going : go}
          </button>
        </div>
      )}
      {wrong && (
        <p role="alert" className="mt-2 text-brick">
          {wrong.message}{' '}
          {wrong.stale && (
            <button
              type="button"
              className="link max-md:min-h-11"
              onClick={() => window.location.reload()}
            >
              Look again
            </button>
          )}
        </p>
      )}
    </div>
  );
}
