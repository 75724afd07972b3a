import { createColumnHelper, tableFeatures, useTable } from '@tanstack/react-table';
import type { ProjectSort, ProjectSummary } from '@/api-types/projects';
import { FloorDrawing } from '../ui/FloorDrawing';
import { Peg, statePeg } from '../ui/Peg';
import { Moment } from '../ui/Moment';
import { SortedHead } from '../ui/SortedHead';
import { STATE_WORDS } from '../ui/version-words';

// The server searches, sorts and pages: the table holds columns and rows alone.
const features = tableFeatures({});
const helper = createColumnHelper<typeof features, ProjectSummary>();

/** Columns by which the server sorts, each in its one direction. */
const SORTED: Readonly<Record<string, { by: ProjectSort; order: 'ascending' | 'descending' }>> = {
  name: { by: 'name', order: 'ascending' },
  client: { by: 'client', order: 'ascending' },
  stage: { by: 'stage', order: 'descending' },
  updated: { by: 'updated', order: 'descending' },
};

const columns = helper.columns([
  helper.display({
    id: 'drawing',
    header: () => <span className="sr-only">Drawing</span>,
    cell: ({ row }) =>
      row.original.document ? (
        <FloorDrawing document={row.original.document} width={64} height={44} className="w-16" />
      ) : null,
  }),
  helper.accessor('name', {
    header: 'Project',
    cell: ({ row }) => (
      <a className="font-semibold hover:text-line" href={`/projects/${row.original.id}`}>
        {row.original.name}
      </a>
    ),
  }),
  helper.accessor('clientName', {
    id: 'client',
    header: 'Client',
    cell: ({ getValue }) => getValue() || <span className="text-slate">–</span>,
  }),
  helper.accessor('stage', {
    header: 'State',
    cell: ({ getValue }) => (
      <span className="inline-flex items-center gap-2 align-middle">
        <Peg look={statePeg(getValue())} />
        {STATE_WORDS[getValue()]}
      </span>
    ),
  }),
  helper.accessor('layouts', { header: 'Layouts', cell: ({ getValue }) => getValue() }),
  helper.accessor('updatedAt', {
    id: 'updated',
    header: 'Worked on',
    cell: ({ getValue }) => <Moment iso={getValue()} day />,
  }),
]);

/** Hidden on narrow screens, where name, state and day say enough. */
const WIDE_ONLY = ['client', 'layouts', 'drawing'];

export function ProjectTable({
  projects,
  sort,
  onSort,
}: {
  projects: readonly ProjectSummary[];
  sort: ProjectSort;
  onSort: (sort: ProjectSort) => void;
}) {
  const table = useTable({
    features,
    columns,
    data: projects as ProjectSummary[],
    getRowId: (project) => project.id,
  });
  const hidden = (id: string) => (WIDE_ONLY.includes(id) ? 'max-sm:hidden' : '');
  const number = (id: string) =>
    id === 'layouts' || id === 'updated' ? 'text-right' : 'text-left';
  return (
    <table className="mt-4 w-full">
      <caption className="sr-only">Projects</caption>
      <thead>
        {table.getHeaderGroups().map((group) => (
          <tr key={group.id} className="border-b border-graphite text-sm text-slate">
            {group.headers.map((header) => {
              const { id } = header.column;
              const sorted = SORTED[id];
              return (
                <SortedHead
                  key={header.id}
                  order={sorted?.by === sort ? sorted.order : null}
                  onSort={sorted && (() => onSort(sorted.by))}
                  className={`${number(id)} ${hidden(id)}`}
                >
                  <table.FlexRender header={header} />
                </SortedHead>
              );
            })}
          </tr>
        ))}
      </thead>
      <tbody className="hairlines border-b border-stone-300">
        {table.getRowModel().rows.map((row) => (
          <tr key={row.id}>
            {row.getAllCells().map((cell) => (
              <td
                key={cell.id}
                className={`py-2 pr-4 last:pr-0 ${number(cell.column.id)} ${hidden(cell.column.id)}`}
              >
                <table.FlexRender cell={cell} />
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
