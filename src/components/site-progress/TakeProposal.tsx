import type { DraftState } from '@/api-types/layouts';
import { api } from '../ui/api';
import { AskFirst } from '../ui/AskFirst';

/** The layout's draft takes the floor that the crew proposes; what it held is set aside. */
export function TakeProposal({ entryId, layoutId }: { entryId: string; layoutId: string }) {
  const take = async () => {
    const { revision } = await api<DraftState>('GET', `/api/layouts/${layoutId}/draft`);
    await api<DraftState>('POST', `/api/site-proposals/${entryId}/draft`, {
      baseRevision: revision,
    });
    window.location.assign(`/layouts/${layoutId}`);
  };
  return (
    <AskFirst
      name="Take it as the draft"
      go="Take it"
      going="Taking …"
      onGo={take}
      className="my-2"
    >
      <p>
        The draft takes the proposed floor, and what it holds now is set aside, not lost. Look it
        over, save it as a version, have it accepted and issue it.
      </p>
    </AskFirst>
  );
}
