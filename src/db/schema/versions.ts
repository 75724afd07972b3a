import { sql } from 'drizzle-orm';
import {
  check,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  text,
  unique,
} from 'drizzle-orm/pg-core';
import type { VersionEventKind } from '@/api-types/versions';
import type { LayoutDocument } from '@/paving/layout-document';
import type { Report } from '@/paving/report';
import { createdAt, instant } from './columns';
import { people } from './firms';
import { layouts } from './layouts';

/** A frozen document. A trigger refuses UPDATE and DELETE; see the migration `keep-versions`. */
export const versions = pgTable(
  'versions',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id').notNull(),
    layoutId: text('layout_id').notNull(),
    number: integer('number').notNull(),
    label: text('label').notNull(),
    note: text('note').notNull(),
    document: jsonb('document').$type<LayoutDocument>().notNull(),
    report: jsonb('report').$type<Report>().notNull(),
    fingerprint: text('fingerprint').notNull(),
    /** The browser's own mark of the request, so that asking twice saves once. */
    requestId: text('request_id'),
    createdBy: text('created_by')
      .notNull()
      .references(() => people.id),
    createdAt: createdAt(),
  },
  (table) => [
    unique('versions_firm_id').on(table.firmId, table.id),
    unique('versions_number').on(table.firmId, table.layoutId, table.number),
    unique('versions_request').on(table.firmId, table.layoutId, table.requestId),
    foreignKey({
      name: 'versions_layout',
      columns: [table.firmId, table.layoutId],
      foreignColumns: [layouts.firmId, layouts.id],
    }),
  ],
);

/** What happened to a version; its state is derived from these. Kept by the same trigger. */
export const versionEvents = pgTable(
  'version_events',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id').notNull(),
    versionId: text('version_id').notNull(),
    /** Order of the events of one version, from 1. */
    place: integer('place').notNull(),
    kind: text('kind').$type<VersionEventKind>().notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    at: instant('at').notNull().defaultNow(),
    note: text('note').notNull(),
  },
  (table) => [
    unique('version_events_place').on(table.firmId, table.versionId, table.place),
    unique('version_events_firm_id').on(table.firmId, table.id),
    index('version_events_at').on(table.firmId, table.at),
    index('version_events_kind').on(table.firmId, table.versionId, table.kind),
    foreignKey({
      name: 'version_events_version',
      columns: [table.firmId, table.versionId],
      foreignColumns: [versions.firmId, versions.id],
    }),
    check(
      'version_events_kind_known',
      sql`${table.kind} in ('saved', 'shared', 'accepted', 'change_asked', 'issued', 'superseded')`,
    ),
  ],
);
