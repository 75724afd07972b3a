import type { DraftFromVersion, DraftState } from '@/api-types/layouts';
import { api } from '../ui/api';
import { AskFirst } from '../ui/AskFirst';

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
  const start = async () => {
    const body: DraftFromVersion = { versionId, baseRevision };
    await api<DraftState>('POST', `/api/layouts/${layoutId}/draft/from-version`, body);
    window.location.assign(`/layouts/${layoutId}`);
  };
  return (
    <AskFirst
      name="Start a draft from this"
      go={`Start from version ${versionNumber}`}
      going="Starting …"
      onGo={start}
    >
      <p>
        The draft takes the floor of version {versionNumber}. What the draft holds now is set aside,
        not lost. This version stays as it is.
      </p>
    </AskFirst>
  );
}
