import type { ProjectSummary } from '@/api-types/projects';
import { FloorDrawing } from '../ui/FloorDrawing';
import { Moment } from '../ui/Moment';
import { STATE_WORDS } from '../ui/version-words';

interface Props {
  readonly projects: readonly ProjectSummary[];
  /** Whoever may name a project's client is told that it has none yet. */
  readonly naming: boolean;
}

export function ProjectGrid({ projects, naming }: Props) {
  return (
    <ul className="mt-6 grid gap-x-8 gap-y-10 sm:grid-cols-2 lg:grid-cols-3">
      {projects.map((project) => (
        <li key={project.id}>
          <a
            href={`/projects/${project.id}`}
            className="group block border-t-2 border-graphite pt-3"
          >
            <div className="flex items-baseline justify-between gap-3">
              <h2 className="truncate group-hover:text-line">{project.name}</h2>
              <span className="shrink-0 text-sm text-slate">{STATE_WORDS[project.stage]}</span>
            </div>
            <p className="truncate text-slate">
              {[
                project.clientName || (naming && 'No client named yet'),
                project.layouts === 1 ? '1 layout' : `${project.layouts} layouts`,
              ]
                .filter(Boolean)
                .join(' · ')}
            </p>
            <div className="mt-3 flex h-56 items-center justify-center border border-stone-300 p-4">
              {project.document ? (
                <FloorDrawing
                  document={project.document}
                  width={340}
                  height={200}
                  className="w-full"
                />
              ) : (
                <span className="text-slate">No layout yet</span>
              )}
            </div>
            <p className="mt-2 text-sm text-slate">
              Last worked on <Moment iso={project.updatedAt} day />
            </p>
          </a>
        </li>
      ))}
    </ul>
  );
}
