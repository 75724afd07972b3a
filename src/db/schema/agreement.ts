import { foreignKey, index, integer, pgTable, primaryKey, text, unique } from 'drizzle-orm/pg-core';
import { createdAt, instant } from './columns';
import { people } from './firms';
import { projects } from './projects';
import { versionEvents, versions } from './versions';

/** What a client agreed to, word for word. A trigger refuses UPDATE and DELETE. */
export const acceptances = pgTable(
  'acceptances',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id').notNull(),
    versionId: text('version_id').notNull(),
    /** The event `accepted` that it is the record of. */
    eventId: text('event_id').notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    /** The name as the client typed it. */
    typedName: text('typed_name').notNull(),
    /** The firm's terms as they were shown. */
    terms: text('terms').notNull(),
    /** Of the version's document, as shown. */
    fingerprint: text('fingerprint').notNull(),
    at: instant('at').notNull().defaultNow(),
  },
  (table) => [
    unique('acceptances_event').on(table.firmId, table.eventId),
    index('acceptances_version').on(table.firmId, table.versionId, table.at),
    foreignKey({
      name: 'acceptances_version_fk',
      columns: [table.firmId, table.versionId],
      foreignColumns: [versions.firmId, versions.id],
    }),
    foreignKey({
      name: 'acceptances_event_fk',
      columns: [table.firmId, table.eventId],
      foreignColumns: [versionEvents.firmId, versionEvents.id],
    }),
  ],
);

/** Shared versions that a designer puts side by side for the client to choose from. */
export const choices = pgTable(
  'choices',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id').notNull(),
    projectId: text('project_id').notNull(),
    title: text('title').notNull(),
    note: text('note').notNull().default(''),
    offeredBy: text('offered_by')
      .notNull()
      .references(() => people.id),
    createdAt: createdAt(),
    withdrawnAt: instant('withdrawn_at'),
  },
  (table) => [
    unique('choices_firm_id').on(table.firmId, table.id),
    index('choices_project').on(table.firmId, table.projectId, table.createdAt),
    foreignKey({
      name: 'choices_project_fk',
      columns: [table.firmId, table.projectId],
      foreignColumns: [projects.firmId, projects.id],
    }),
  ],
);

/** The versions of a choice, in the order they are offered. */
export const choiceVersions = pgTable(
  'choice_versions',
  {
    firmId: text('firm_id').notNull(),
    choiceId: text('choice_id').notNull(),
    versionId: text('version_id').notNull(),
    place: integer('place').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.choiceId, table.versionId] }),
    unique('choice_versions_place').on(table.firmId, table.choiceId, table.place),
    index('choice_versions_version').on(table.firmId, table.versionId),
    foreignKey({
      name: 'choice_versions_choice',
      columns: [table.firmId, table.choiceId],
      foreignColumns: [choices.firmId, choices.id],
    }).onDelete('cascade'),
    foreignKey({
      name: 'choice_versions_version_fk',
      columns: [table.firmId, table.versionId],
      foreignColumns: [versions.firmId, versions.id],
    }),
  ],
);
