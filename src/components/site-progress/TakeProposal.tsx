import { useState } from 'react';
import type { DraftState } from '@/api-types/layouts';
import { api } from '../ui/api';

/** The layout's draft takes the floor that the crew proposes; what it held is set aside. */
export function TakeProposal({ entryId, layoutId }: { entryId: string; layoutId: string }) {
  const [asking, setAsking] = useState(false);
  const [busy, setBusy] = useState(false);
  const [wrong, setWrong] = useState<string | null>(null);
  const take = async () => {
    setBusy(true);
    setWrong(null);
    try {
      const { revision } = await api<DraftState>('GET', `/api/layouts/${layoutId}/draft`);
      await api<DraftState>('POST', `/api/site-proposals/${entryId}/draft`, {
        baseRevision: revision,
      });
      window.location.assign(`/layouts/${layoutId}`);
    } catch (error) {
      setBusy(false);
      setWrong(error instanceof Error ? error.message : 'That did not work. Try again.');
    }
  };
  return (
    <div className="my-2">
      <button
        type="button"
        className="button max-md:min-h-[44px]"
        aria-expanded={asking}
        onClick={() => setAsking(!asking)}
      >
        Take it as the draft
      </button>
      {asking && (
        <div className="mt-2 border-l-2 border-line pl-3">
          <p>
            The draft takes the proposed floor, and what it holds now is set aside, not lost. Look
            it over, save it as a version, have it accepted and issue it.
          </p>
          <button
            type="button"
            className="button button-primary mt-2 max-md:min-h-[44px]"
            disabled={busy}
            onClick={() => void take()}
          >
            {busy ? 'Taking …' : 'Take it'}
          </button>
        </div>
      )}
      {wrong && (
        <p role="alert" className="mt-2 text-brick">
          {wrong}
        </p>
      )}
    </div>
  );
}
