import { useInfiniteQuery, useMutation, useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { Role } from '@/api-types/people';
import {
  projectStages,
  type ProjectChange,
  type ProjectPage,
  type ProjectSummary,
} from '@/api-types/projects';
import { api } from '../ui/api';
import { Queries } from '../ui/Queries';
import { SearchField } from '../ui/SearchField';
import { Segmented } from '../ui/Segmented';
import { SelectField } from '../ui/SelectField';
import { STATE_WORDS } from '../ui/version-words';
import { Wrong } from '../ui/Wrong';
import { isNarrowed, lookAsked, lookWritten, shownWords, type ListLook } from './list-query';
import { ProjectGrid } from './ProjectGrid';
import { ProjectTable } from './ProjectTable';
import { UnreadComments } from './UnreadComments';

interface Props {
  readonly look: ListLook;
  readonly first: ProjectPage;
  readonly role: Role;
  /** Whether there are any projects at all, archived ones included. */
  readonly any: boolean;
}

export default function ProjectList(props: Props) {
  return (
    <Queries>
      <List {...props} />
    </Queries>
  );
}

/** How long typing rests before the list is asked for, ms. */
const REST_MS = 250;

function List({ look: firstLook, first, role, any }: Props) {
  const [look, setLook] = useState(firstLook);
  const [typed, setTyped] = useState(firstLook.search);
  const drafting = role === 'owner' || role === 'designer';
  useEffect(() => {
    if (typed === look.search) return;
    const timer = setTimeout(() => setLook((now) => ({ ...now, search: typed })), REST_MS);
    return () => clearTimeout(timer);
  }, [typed, look.search]);
  useEffect(() => {
    window.history.replaceState(null, '', `/projects${lookWritten(look)}${window.location.hash}`);
  }, [look]);
  const { view, ...asked } = look;
  const { view: _, ...firstAsked } = firstLook;
  const list = useInfiniteQuery({
    queryKey: ['projects', asked],
    queryFn: ({ pageParam }) =>
      api<ProjectPage>(
        'GET',
        `/api/projects?${new URLSearchParams(Object.entries(lookAsked(look, pageParam)).map(([name, value]) => [name, String(value)]))}`,
      ),
    initialPageParam: '',
    getNextPageParam: (page) => page.next,
    initialData:
      JSON.stringify(asked) === JSON.stringify(firstAsked)
        ? { pages: [first], pageParams: [''] }
        : undefined,
    placeholderData: (before) => before,
  });
  const projects = list.data?.pages.flatMap((page) => page.projects) ?? [];
  const total = list.data?.pages[0]?.total ?? null;
  const change = (part: Partial<ListLook>) => setLook((now) => ({ ...now, ...part }));

  if (!any) return <NothingYet role={role} />;
  return (
    <>
      <UnreadComments />
      <Controls
        look={look}
        typed={typed}
        onTyped={setTyped}
        onChange={change}
        drafting={drafting}
      />
      <p role="status" className="mt-4 min-h-6 text-slate" data-testid="shown">
        {list.error
          ? null
          : list.isPlaceholderData || !list.data
            ? 'Reading the list …'
            : projects.length > 0 && shownWords(projects.length, total)}
      </p>
      <Wrong error={list.error} again={() => void list.refetch()} className="mt-4" />
      <div className={list.isPlaceholderData ? 'opacity-60' : ''}>
        {projects.length > 0 &&
          (look.archived ? (
            <Archived projects={projects} drafting={drafting} />
          ) : view === 'table' ? (
            <ProjectTable
              projects={projects}
              sort={look.sort}
              onSort={(sort) => change({ sort })}
            />
          ) : (
            <ProjectGrid projects={projects} naming={drafting} />
          ))}
      </div>
      {list.data && projects.length === 0 && !list.isFetching && (
        <NoneFound
          look={look}
          drafting={drafting}
          onClear={() => {
            setTyped('');
            change({ search: '', stage: '' });
          }}
        />
      )}
      {list.hasNextPage && (
        <div className="mt-8 flex flex-wrap items-center gap-4">
          <button
            type="button"
            className="button"
            disabled={list.isFetchingNextPage}
            onClick={() => void list.fetchNextPage()}
          >
            {list.isFetchingNextPage ? 'Reading …' : 'Show more'}
          </button>
          <span className="text-slate">{shownWords(projects.length, total)}</span>
        </div>
      )}
    </>
  );
}

function Controls({
  look,
  typed,
  onTyped,
  onChange,
  drafting,
}: {
  look: ListLook;
  typed: string;
  onTyped: (text: string) => void;
  onChange: (part: Partial<ListLook>) => void;
  drafting: boolean;
}) {
  return (
    <div
      role="search"
      className="mt-5 grid grid-cols-2 items-end gap-3 sm:flex sm:flex-wrap sm:items-end"
    >
      <SearchField
        label="Find by project or client"
        value={typed}
        onValue={onTyped}
        className="col-span-2 sm:w-72"
      />
      <SelectField
        label="State"
        value={look.stage}
        onValue={(stage) => onChange({ stage })}
        options={[
          ['', 'All'],
          ...projectStages.map((stage) => [stage, STATE_WORDS[stage]] as const),
        ]}
      />
      <SelectField
        label="In order of"
        value={look.sort}
        onValue={(sort) => onChange({ sort })}
        options={[
          ['updated', 'Last worked on'],
          ['name', 'Name'],
          ['client', 'Client'],
          ['stage', 'State, furthest first'],
        ]}
      />
      {!look.archived && (
        <div className="col-span-2 sm:ml-auto sm:w-48">
          <Segmented
            label="Show as"
            hideLabel
            value={look.view}
            onChange={(view) => onChange({ view })}
            options={[
              ['drawings', 'Drawings'],
              ['table', 'List'],
            ]}
          />
        </div>
      )}
      {drafting && (
        <label className="col-span-2 flex min-h-[2.4rem] items-center gap-2">
          <input
            type="checkbox"
            className="size-5 accent-line"
            checked={look.archived}
            onChange={(event) => onChange({ archived: event.target.checked })}
          />
          Archived ones
        </label>
      )}
    </div>
  );
}

function Archived({
  projects,
  drafting,
}: {
  projects: readonly ProjectSummary[];
  drafting: boolean;
}) {
  const queries = useQueryClient();
  const restore = useMutation({
    networkMode: 'always',
    mutationFn: ({ id }: ProjectSummary) =>
      api<ProjectSummary>('PATCH', `/api/projects/${id}`, {
        archived: false,
      } satisfies ProjectChange),
    onSuccess: () => queries.invalidateQueries({ queryKey: ['projects'] }),
  });
  return (
    <>
      <Wrong error={restore.error} className="mt-4" />
      {restore.data && (
        <p role="status" className="mt-4 font-semibold">
          {restore.data.name} is back in the list.
        </p>
      )}
      <ul className="mt-4 max-w-2xl hairlines border-y border-stone-300">
        {projects.map((project) => (
          <li key={project.id} className="flex items-center justify-between gap-4 py-2">
            <span className="min-w-0">
              <a className="link font-semibold" href={`/projects/${project.id}`}>
                {project.name}
              </a>
              {project.clientName && <span className="text-slate"> · {project.clientName}</span>}
            </span>
            {drafting && (
              <button
                type="button"
                className="button"
                disabled={restore.isPending}
                onClick={() => restore.mutate(project)}
              >
                Restore
              </button>
            )}
          </li>
        ))}
      </ul>
    </>
  );
}

function NoneFound({
  look,
  drafting,
  onClear,
}: {
  look: ListLook;
  drafting: boolean;
  onClear: () => void;
}) {
  if (!isNarrowed(look))
    return (
      <p className="mt-6 max-w-xl text-lg text-slate">
        {look.archived
          ? 'Nothing is archived. A project that is done with can be archived from its own page: it is kept whole, but out of the list.'
          : drafting
            ? 'All projects are archived. Begin another below, or tick “Archived ones” to restore one.'
            : 'Nothing here now.'}
      </p>
    );
  return (
    <p className="mt-6 max-w-xl text-lg text-slate">
      No {look.archived ? 'archived ' : ''}project
      {look.stage ? ` that is ${STATE_WORDS[look.stage].toLowerCase()}` : ''}
      {look.search.trim() ? ` with a word that begins like “${look.search.trim()}”` : ''}.{' '}
      <button type="button" className="link" onClick={onClear}>
        Show all
      </button>
    </p>
  );
}

function NothingYet({ role }: { role: Role }) {
  return (
    <p className="mt-4 max-w-xl text-lg text-slate">
      {role === 'client'
        ? 'Nothing is shared with you yet. You will find it here when your designer shares a floor.'
        : role === 'installer'
          ? 'No project is yours yet. You will find those that you are put on here.'
          : 'A project is one site and its client. It holds layouts: ways to lay its ground. Begin with the site’s name.'}
    </p>
  );
}
