import { useState } from 'react';
import type { DraftFromVersion, DraftState } from '@/api-types/layouts';
import { ApiError, api } from '../ui/api';

/** Makes the layout's draft begin from this version; what the draft held is set aside. */
export default function StartDraft({
  layoutId,
  versionId,
  versionNumber,
  baseRevision,
}: {
  layoutId: string;
  versionId: string;
  versionNumber: number;
  baseRevision: number;
}) {
  const [asking, setAsking] = useState(false);
  const [busy, setBusy] = useState(false);
  const [wrong, setWrong] = useState<{ message: string; stale: boolean } | null>(null);
  const start = async () => {
    setBusy(true);
    setWrong(null);
    try {
      const body: DraftFromVersion = { versionId, baseRevision };
      await api<DraftState>('POST', `/api/layouts/${layoutId}/draft/from-version`, body);
      window.location.assign(`/layouts/${layoutId}`);
    } catch (error) {
      setBusy(false);
      setWrong({
        message:
          error instanceof Error ? error.message : 'The draft could not be started. Try again.',
        stale: error instanceof ApiError && error.status === 409,
      });
    }
  };
  return (
    <div>
      <button
        type="button"
        className="button max-md:min-h-[44px]"
        aria-expanded={asking}
        onClick={() => setAsking(!asking)}
      >
        Start a draft from this
      </button>
      {asking && (
        <div className="mt-3 border-l-2 border-line pl-3">
          <p>
            The draft takes the floor of version {versionNumber}. What the draft holds now is set
            aside, not lost. This version stays as it is.
          </p>
          <button
            type="button"
            className="button button-primary mt-2 max-md:min-h-[44px]"
            disabled={busy}
            onClick={() => void start()}
          >
            {busy ? 'Starting …' : `Start from version ${versionNumber}`}
          </button>
        </div>
      )}
      {wrong && (
        <p role="alert" className="mt-2 text-brick">
          {wrong.message}{' '}
          {wrong.stale && (
            <button
              type="button"
              className="link max-md:min-h-[44px]"
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
