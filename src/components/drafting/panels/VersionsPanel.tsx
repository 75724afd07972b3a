import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type {
  DraftFromVersion,
  DraftState,
  SetAsideDetail,
  SetAsideSummary,
} from '@/api-types/layouts';
import type { VersionWithDrawing } from '@/api-types/versions';
import { formatCount } from '@/paving/count';
import { formatLength } from '@/paving/length';
import { floorThumbnailSvg } from '@/sheets/floor-thumbnail';
import { api } from '../../ui/api';
import { dayAndTime } from '../../ui/times';
import { STATE_WORDS } from '../../ui/version-words';
import type { DraftSync } from '../draft-sync';
import { useTable, useTableStore } from '../table-context';

export const useVersions = (layoutId: string) =>
  useQuery({
    queryKey: ['versions', layoutId],
    queryFn: () =>
      api<{ versions: VersionWithDrawing[] }>('GET', `/api/layouts/${layoutId}/versions`).then(
        (a) => a.versions,
      ),
  });

export function VersionsPanel({
  layoutId,
  sync,
  onSave,
}: {
  layoutId: string;
  sync: DraftSync;
  onSave: () => void;
}) {
  const versions = useVersions(layoutId);
  return (
    <div className="space-y-5">
      <button type="button" className="button button-primary w-full" onClick={onSave}>
        Save this draft as a version
      </button>
      {versions.isPending && <p className="text-slate">Reading the versions …</p>}
      {versions.error && (
        <p role="alert" className="text-brick">
          {versions.error.message}{' '}
          <button type="button" className="link" onClick={() => void versions.refetch()}>
            Try again
          </button>
        </p>
      )}
      {versions.data?.length === 0 && (
        <p className="text-slate">
          No version yet. A version freezes the floor with its figures, so that you can share it,
          compare it and print its plan.
        </p>
      )}
      {versions.data && versions.data.length > 0 && (
        <ol className="hairlines border-t border-graphite">
          {versions.data.map((version) => (
            <Version key={version.id} version={version} layoutId={layoutId} sync={sync} />
          ))}
        </ol>
      )}
      <SetAside layoutId={layoutId} />
    </div>
  );
}

function Version({
  version,
  layoutId,
  sync,
}: {
  version: VersionWithDrawing;
  layoutId: string;
  sync: DraftSync;
}) {
  const table = useTableStore();
  const queries = useQueryClient();
  const [asking, setAsking] = useState(false);
  const take = useMutation({
    networkMode: 'always',
    mutationFn: async () => {
      const baseRevision = await sync.flush();
      if (baseRevision === null)
        throw new Error('The draft has not reached the server yet. Try again when it has.');
      const body: DraftFromVersion = { versionId: version.id, baseRevision };
      return api<DraftState>('POST', `/api/layouts/${layoutId}/draft/from-version`, body);
    },
    onSuccess: async (draft) => {
      sync.replaced(draft);
      setAsking(false);
      table.getState().set({
        said: `The draft now starts from version ${version.number}. What it held is set aside.`,
      });
      await queries.invalidateQueries({ queryKey: ['set-aside', layoutId] });
    },
  });
  const { figures, document } = version;
  const gap =
    figures.leastGap === null
      ? 'no unit laid'
      : `${formatLength(figures.leastGap, document.display)} least gap`;
  return (
    <li className="py-3">
      <div className="flex gap-3">
        <a
          href={`/versions/${version.id}`}
          className="block w-20 shrink-0"
          aria-label={`Open version ${version.number}`}
        >
          <span
            className="block"
            dangerouslySetInnerHTML={{ __html: floorThumbnailSvg(document, 80, 64) }}
          />
        </a>
        <div className="min-w-0 flex-1">
          <a href={`/versions/${version.id}`} className="font-bold wrap-anywhere hover:text-line">
            {version.number}. {version.label}
          </a>
          <p>
            {formatCount(figures.wholeUnits)} whole units, {gap}
          </p>
          <p className="text-sm text-slate">
            {STATE_WORDS[version.state]} · {version.createdBy.name}, {dayAndTime(version.createdAt)}
          </p>
          {version.note && <p className="mt-1 text-sm wrap-anywhere">{version.note}</p>}
        </div>
      </div>
      <div className="mt-1 flex flex-wrap gap-x-2">
        <a className="button button-quiet" href={`/versions/${version.id}`}>
          Open
        </a>
        <a className="button button-quiet" href={`/versions/${version.id}/plan`}>
          Plan
        </a>
        <button
          type="button"
          className="button button-quiet"
          onClick={() => setAsking(!asking)}
          aria-expanded={asking}
        >
          Start the draft from it
        </button>
      </div>
      {asking && (
        <div className="border-l-2 border-line pl-3">
          <p>
            The draft takes version {version.number}’s floor. What the draft holds now is set aside,
            not lost.
          </p>
          <button
            type="button"
            className="button button-primary mt-2"
            disabled={take.isPending}
            onClick={() => take.mutate()}
          >
            Start from version {version.number}
          </button>
        </div>
      )}
      {take.error && (
        <p role="alert" className="text-brick">
          {take.error.message}
        </p>
      )}
    </li>
  );
}

/** Drafts that gave way to another: kept, and taken up again by one click. */
function SetAside({ layoutId }: { layoutId: string }) {
  const table = useTableStore();
  const said = useTable((state) => state.said);
  const list = useQuery({
    queryKey: ['set-aside', layoutId, said],
    queryFn: () =>
      api<{ setAside: SetAsideSummary[] }>('GET', `/api/layouts/${layoutId}/set-aside`).then(
        (a) => a.setAside,
      ),
  });
  const open = useMutation({
    networkMode: 'always',
    mutationFn: (id: string) => api<SetAsideDetail>('GET', `/api/set-aside/${id}`),
    onSuccess: (aside) => {
      table.getState().edit(() => aside.document);
      table.getState().set({ said: 'The draft holds what was set aside. Undo takes it back.' });
    },
  });
  if (!list.data || list.data.length === 0) return null;
  return (
    <section>
      <h3 className="border-b border-graphite pb-1">Set aside</h3>
      <ul className="hairlines">
        {list.data.slice(0, 20).map((aside) => (
          <li key={aside.id} className="flex items-center justify-between gap-2 py-1">
            <span>
              {dayAndTime(aside.at)}, {aside.person.name}
            </span>
            <button
              type="button"
              className="button button-quiet"
              onClick={() => open.mutate(aside.id)}
            >
              Take up again
            </button>
          </li>
        ))}
      </ul>
      {open.error && (
        <p role="alert" className="text-brick">
          {open.error.message}
        </p>
      )}
    </section>
  );
}
