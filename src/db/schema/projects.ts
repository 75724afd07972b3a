import { sql } from 'drizzle-orm';
import {
  check,
  customType,
  foreignKey,
  index,
  pgTable,
  primaryKey,
  text,
  unique,
} from 'drizzle-orm/pg-core';
import type { VersionState } from '@/api-types/versions';
import { createdAt, instant } from './columns';
import { firms, memberships } from './firms';

const tsvector = customType<{ data: string }>({ dataType: () => 'tsvector' });

export const projects = pgTable(
  'projects',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id')
      .notNull()
      .references(() => firms.id),
    name: text('name').notNull(),
    clientName: text('client_name').notNull(),
    siteNote: text('site_note').notNull(),
    /** The furthest state of any of its versions; kept by triggers, see the migration `review-and-agreement`. */
    stage: text('stage').$type<VersionState | 'draft'>().notNull().default('draft'),
    /** The words of name and client, for searching. */
    words: tsvector('words')
      .notNull()
      .generatedAlwaysAs(sql`to_tsvector('simple', name || ' ' || client_name)`),
    archivedAt: instant('archived_at'),
    createdAt: createdAt(),
    /** When anything in the project was last worked on. */
    updatedAt: instant('updated_at').notNull().defaultNow(),
  },
  (table) => [
    unique('projects_firm_id').on(table.firmId, table.id),
    // The ways to sort a list, each within current or archived ones; `id` settles what is level.
    index('projects_current_updated')
      .on(table.firmId, table.updatedAt, table.id)
      .where(sql`archived_at is null`),
    index('projects_current_name')
      .on(table.firmId, sql`lower(${table.name})`, table.id)
      .where(sql`archived_at is null`),
    index('projects_current_client')
      .on(table.firmId, sql`lower(${table.clientName})`, table.id)
      .where(sql`archived_at is null`),
    index('projects_current_stage')
      .on(table.firmId, table.stage, table.updatedAt, table.id)
      .where(sql`archived_at is null`),
    index('projects_firm_updated').on(table.firmId, table.updatedAt, table.id),
    index('projects_archived')
      .on(table.firmId, table.archivedAt, table.id)
      .where(sql`archived_at is not null`),
    // Not put off till a vacuum, which PGlite never runs by itself: a search would read what waits one by one.
    index('projects_words').using('gin', table.words).with({ fastupdate: false }),
    check(
      'projects_stage',
      sql`${table.stage} in ('draft', 'superseded', 'saved', 'shared', 'change_asked', 'accepted', 'issued')`,
    ),
  ],
);

/** Installers and clients who are put on a project. */
export const projectPeople = pgTable(
  'project_people',
  {
    firmId: text('firm_id').notNull(),
    projectId: text('project_id').notNull(),
    personId: text('person_id').notNull(),
    createdAt: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.projectId, table.personId] }),
    index('project_people_person').on(table.firmId, table.personId),
    foreignKey({
      name: 'project_people_project',
      columns: [table.firmId, table.projectId],
      foreignColumns: [projects.firmId, projects.id],
    }),
    foreignKey({
      name: 'project_people_membership',
      columns: [table.firmId, table.personId],
      foreignColumns: [memberships.firmId, memberships.personId],
    }).onDelete('cascade'),
  ],
);
