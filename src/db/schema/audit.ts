import { index, jsonb, pgTable, text } from 'drizzle-orm/pg-core';
import { instant } from './columns';
import { firms, people } from './firms';

/** Who did what in a firm. A trigger refuses UPDATE and DELETE. */
export const auditEvents = pgTable(
  'audit_events',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id')
      .notNull()
      .references(() => firms.id),
    /** Null for what the server does by itself. */
    personId: text('person_id').references(() => people.id),
    at: instant('at').notNull().defaultNow(),
    /** Such as `person.invited`: subject and past participle. */
    what: text('what').notNull(),
    /** What it was done to, such as `version`; with its id. */
    subjectType: text('subject_type').notNull(),
    subjectId: text('subject_id').notNull(),
    detail: jsonb('detail').$type<Readonly<Record<string, unknown>>>().notNull(),
  },
  (table) => [
    index('audit_events_at').on(table.firmId, table.at, table.id),
    index('audit_events_person').on(table.firmId, table.personId, table.at),
    index('audit_events_subject').on(table.firmId, table.subjectType, table.subjectId, table.at),
    index('audit_events_what').on(table.firmId, table.what, table.at),
  ],
);
