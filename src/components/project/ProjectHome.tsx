import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { LayoutSummary } from '@/api-types/layouts';
import type { LiveState } from '@/api-types/live';
import type { Role } from '@/api-types/people';
import type { ProjectDetail } from '@/api-types/projects';
import type { TimelinePage } from '@/api-types/timeline';
import type { VersionWithDrawing } from '@/api-types/versions';
import { ChoicesOffered } from '../choices/ChoicesOffered';
import { YourChoices } from '../choices/YourChoices';
import { useLiveRefresh } from '../live/live-refresh';
import { api } from '../ui/api';
import { Queries } from '../ui/Queries';
import { LayoutSection } from './LayoutSection';
import { Timeline } from './Timeline';

interface Props {
  readonly project: ProjectDetail;
  readonly versions: Readonly<Record<string, readonly VersionWithDrawing[]>>;
  readonly timeline: TimelinePage | null;
  readonly role: Role;
}

/** A project's layouts with their drawings and versions, and what happened, kept up to date while it is open. */
export default function ProjectHome(props: Props) {
  return (
    <Queries>
      <Home {...props} />
    </Queries>
  );
}

function Home({ project: first, versions, timeline, role }: Props) {
  const { data: project } = useQuery({
    queryKey: ['project', first.id],
    queryFn: () => api<ProjectDetail>('GET', `/api/projects/${first.id}`),
    initialData: first,
  });
  const { state: live, gone } = useLiveRefresh(first.id);
  const [said, setSaid] = useState('');
  const drafting = role === 'owner' || role === 'designer';
  const current = project.layouts.filter(({ archivedAt }) => !archivedAt);
  const archived = project.layouts.filter(({ archivedAt }) => archivedAt);
  const section = (layout: LayoutSummary) => (
    <LayoutSection
      key={layout.id}
      layout={layout}
      versions={versions[layout.id]}
      live={liveLayout(live, layout.id)}
      drafting={drafting}
      onSaid={setSaid}
    />
  );
  return (
    <>
      <p role="status" className="mt-4 font-semibold empty:mt-0">
        {said}
      </p>
      {gone && (
        <p role="alert" className="mt-4 bg-amber-wash p-3">
          This project is no longer yours to see. What stands here is not kept up to date.
        </p>
      )}
      <div className="mt-8 grid gap-x-12 gap-y-12 xl:grid-cols-[minmax(0,1fr)_20rem]">
        <div className="min-w-0">
          {role === 'client' && (
            <div className="mb-12 empty:hidden">
              <YourChoices projectId={project.id} />
            </div>
          )}
          {current.map(section)}
          {drafting && (
            <div className="mt-12 empty:hidden">
              <ChoicesOffered projectId={project.id} />
            </div>
          )}
          {current.length === 0 && (
            <p className="max-w-xl text-lg text-slate">
              {drafting
                ? 'No layout yet. A layout is one way to lay this ground: draw the edge, choose unit and bond, find where to start.'
                : 'Nothing to see here yet. You will find it here once it is shared.'}
            </p>
          )}
          {archived.length > 0 && (
            <details className="mt-10 border-t border-stone-300 pt-4">
              <summary className="font-semibold">Archived layouts ({archived.length})</summary>
              <div className="mt-6">{archived.map(section)}</div>
            </details>
          )}
        </div>
        <Timeline projectId={project.id} first={timeline} />
      </div>
    </>
  );
}

const liveLayout = (state: LiveState | null, id: string) =>
  state?.layouts.find((layout) => layout.id === id);
