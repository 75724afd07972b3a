import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useId, useState } from 'react';
import type { DuplicateLayout, LayoutChange, LayoutSummary } from '@/api-types/layouts';
import type { ProjectPage } from '@/api-types/projects';
import { api } from '../ui/api';
import { Dialog } from '../ui/Dialog';
import { SearchField } from '../ui/SearchField';
import { Wrong } from '../ui/Wrong';

type Doing = 'rename' | 'duplicate' | 'move' | null;

/** What can be done with a layout as a whole: another name, a copy, another project, out of the way. */
export function LayoutActions({
  layout,
  onSaid,
}: {
  layout: LayoutSummary;
  onSaid: (said: string) => void;
}) {
  const queries = useQueryClient();
  const [doing, setDoing] = useState<Doing>(null);
  const refreshed = () => queries.invalidateQueries({ queryKey: ['project', layout.projectId] });
  const change = useMutation({
    networkMode: 'always',
    mutationFn: (body: LayoutChange) =>
      api<LayoutSummary>('PATCH', `/api/layouts/${layout.id}`, body),
    onSuccess: async () => {
      await refreshed();
      setDoing(null);
    },
  });
  const copy = useMutation({
    networkMode: 'always',
    mutationFn: (body: DuplicateLayout) =>
      api<LayoutSummary>('POST', `/api/layouts/${layout.id}/duplicate`, body),
    onSuccess: async (made) => {
      await refreshed();
      setDoing(null);
      onSaid(`${made.name} was made. Its versions begin anew; those of ${layout.name} stay.`);
    },
  });
  const archived = layout.archivedAt !== null;
  const archive = () =>
    change.mutate(
      { archived: !archived },
      {
        onSuccess: () =>
          onSaid(
            archived
              ? `${layout.name} is back among the layouts.`
              : `${layout.name} is archived: kept, but out of the way.`,
          ),
      },
    );
  return (
    <>
      {(
        [
          ['rename', 'Rename'],
          ['duplicate', 'Duplicate'],
          ['move', 'Move'],
        ] as const
      ).map(([what, name]) => (
        <button
          key={what}
          type="button"
          className="button button-quiet"
          onClick={() => {
            change.reset();
            copy.reset();
            setDoing(what);
          }}
        >
          {name}
        </button>
      ))}
      <button
        type="button"
        className="button button-quiet"
        disabled={change.isPending}
        onClick={archive}
      >
        {archived ? 'Restore' : 'Archive'}
      </button>
      {doing === null && <Wrong error={change.error} />}
      <NameDialog
        open={doing === 'rename'}
        onClose={() => setDoing(null)}
        title={`Rename ${layout.name}`}
        first={layout.name}
        act="Rename it"
        busy={change.isPending}
        error={change.error}
        onName={(name) => change.mutate({ name })}
      />
      <NameDialog
        open={doing === 'duplicate'}
        onClose={() => setDoing(null)}
        title={`Duplicate ${layout.name}`}
        first={`${layout.name}, another way`.slice(0, 80)}
        hint="The copy starts from the draft as it stands. Versions and comments stay with the first."
        act="Make the copy"
        busy={copy.isPending}
        error={copy.error}
        onName={(name) => copy.mutate({ name })}
      />
      <MoveDialog
        open={doing === 'move'}
        onClose={() => setDoing(null)}
        layout={layout}
        busy={change.isPending}
        error={change.error}
        onMove={(projectId, project) =>
          change.mutate(
            { projectId },
            { onSuccess: () => onSaid(`${layout.name} was moved to ${project}.`) },
          )
        }
      />
    </>
  );
}

function NameDialog({
  open,
  onClose,
  title,
  first,
  hint,
  act,
  busy,
  error,
  onName,
}: {
  open: boolean;
  onClose: () => void;
  title: string;
  first: string;
  hint?: string;
  act: string;
  busy: boolean;
  error: Error | null;
  onName: (name: string) => void;
}) {
  const id = useId();
  return (
    <Dialog open={open} onClose={onClose} title={title}>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          onName(String(new FormData(event.currentTarget).get('name')));
        }}
      >
        {hint && <p className="mb-3">{hint}</p>}
        <label htmlFor={id} className="field-label">
          Name
        </label>
        <input id={id} name="name" className="field" defaultValue={first} required maxLength={80} />
        <Wrong error={error} className="mt-2" />
        <button className="button button-primary mt-3" disabled={busy}>
          {act}
        </button>
      </form>
    </Dialog>
  );
}

function MoveDialog({
  open,
  onClose,
  layout,
  busy,
  error,
  onMove,
}: {
  open: boolean;
  onClose: () => void;
  layout: LayoutSummary;
  busy: boolean;
  error: Error | null;
  onMove: (projectId: string, name: string) => void;
}) {
  const [search, setSearch] = useState('');
  const [picked, setPicked] = useState<{ id: string; name: string } | null>(null);
  const found = useQuery({
    queryKey: ['projects', 'to move to', search],
    enabled: open,
    queryFn: () =>
      api<ProjectPage>(
        'GET',
        `/api/projects?${new URLSearchParams({ archived: 'no', size: '20', search })}`,
      ),
    placeholderData: (before) => before,
  });
  const others = (found.data?.projects ?? []).filter((each) => each.id !== layout.projectId);
  return (
    <Dialog open={open} onClose={onClose} title={`Move ${layout.name}`}>
      <p>
        The layout goes with its draft, versions and comments. Whoever sees the other project then
        sees it there.
      </p>
      <SearchField label="Find a project" value={search} onValue={setSearch} className="mt-3" />
      <fieldset className="mt-2 max-h-60 overflow-y-auto">
        <legend className="sr-only">Projects</legend>
        {others.map((project) => (
          <label
            key={project.id}
            className="flex min-h-10 cursor-pointer items-center gap-3 border-b border-stone-300"
          >
            <input
              type="radio"
              name="project"
              className="size-4 accent-line"
              checked={picked?.id === project.id}
              onChange={() => setPicked(project)}
            />
            <span>
              {project.name}
              {project.clientName && <span className="text-slate"> · {project.clientName}</span>}
            </span>
          </label>
        ))}
      </fieldset>
      {found.data && others.length === 0 && (
        <p className="mt-2 text-slate">No other project of that name.</p>
      )}
      <Wrong error={found.error ?? error} className="mt-2" />
      <button
        type="button"
        className="button button-primary mt-3"
        disabled={busy || !picked}
        onClick={() => picked && onMove(picked.id, picked.name)}
      >
        {picked ? `Move to ${picked.name}` : 'Choose a project'}
      </button>
    </Dialog>
  );
}
