import { foreignKey, index, pgTable, text, unique } from 'drizzle-orm/pg-core';
import { createdAt, instant } from './columns';
import { projects } from './projects';

export const layouts = pgTable(
  'layouts',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id').notNull(),
    projectId: text('project_id').notNull(),
    name: text('name').notNull(),
    archivedAt: instant('archived_at'),
    createdAt: createdAt(),
  },
  (table) => [
    unique('layouts_firm_id').on(table.firmId, table.id),
    // What hangs on both, such as comments, follows a layout that is moved to another project.
    unique('layouts_project_id').on(table.firmId, table.projectId, table.id),
    index('layouts_project').on(table.firmId, table.projectId, table.createdAt),
    foreignKey({
      name: 'layouts_project_fk',
      columns: [table.firmId, table.projectId],
      foreignColumns: [projects.firmId, projects.id],
    }),
  ],
);
