import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  timestamp,
  unique,
} from 'drizzle-orm/pg-core';
import type { Display, Role } from '@/api-types/people';
import type { VersionEventKind } from '@/api-types/versions';
import type { LayoutDocument } from '@/paving/layout-document';
import type { Report } from '@/paving/report';

/**
 * Every row of a firm carries `firm_id`, and references between rows of a firm are composite, so that
 * the database itself refuses a layout whose project belongs to another firm. SQL is kept to
 * what PostgreSQL 15 has, since the same migrations run on PGlite and on a PostgreSQL server.
 */

const instant = (name: string) => timestamp(name, { withTimezone: true, mode: 'date' });
const createdAt = () => instant('created_at').notNull().defaultNow();

export const firms = pgTable('firms', {
  id: text('id').primaryKey(),
  name: text('name').notNull(),
  /** Made by the seed, so that the demo sign-ins may be told. */
  demo: boolean('demo').notNull().default(false),
  createdAt: createdAt(),
});

export const people = pgTable(
  'people',
  {
    id: text('id').primaryKey(),
    email: text('email').notNull(),
    name: text('name').notNull(),
    /** Argon2id, in the PHC string format. */
    passwordHash: text('password_hash').notNull(),
    display: text('display').$type<Display>().notNull().default('metric'),
    createdAt: createdAt(),
  },
  (table) => [
    unique('people_email_unique').on(table.email),
    check('people_email_lower', sql`${table.email} = lower(${table.email})`),
    check('people_display', sql`${table.display} in ('metric', 'imperial')`),
  ],
);

export const memberships = pgTable(
  'memberships',
  {
    firmId: text('firm_id')
      .notNull()
      .references(() => firms.id),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    role: text('role').$type<Role>().notNull(),
    createdAt: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.personId] }),
    index('memberships_person').on(table.personId),
    check('memberships_role', sql`${table.role} in ('owner', 'designer', 'installer', 'client')`),
  ],
);

/** Lucia's table; `id` is the SHA-256 of what the cookie holds, so that a leaked copy signs nobody in. */
export const sessions = pgTable(
  'sessions',
  {
    id: text('id').primaryKey(),
    userId: text('person_id').notNull(),
    expiresAt: instant('expires_at').notNull(),
    firmId: text('firm_id').notNull(),
    createdAt: createdAt(),
  },
  (table) => [
    foreignKey({
      name: 'sessions_membership',
      columns: [table.firmId, table.userId],
      foreignColumns: [memberships.firmId, memberships.personId],
    }).onDelete('cascade'),
    index('sessions_person').on(table.userId),
    index('sessions_expiry').on(table.expiresAt),
  ],
);

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
    archivedAt: instant('archived_at'),
    createdAt: createdAt(),
    /** When anything in the project was last worked on. */
    updatedAt: instant('updated_at').notNull().defaultNow(),
  },
  (table) => [
    unique('projects_firm_id').on(table.firmId, table.id),
    index('projects_firm_updated').on(table.firmId, table.updatedAt),
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

export const layouts = pgTable(
  'layouts',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id').notNull(),
    projectId: text('project_id').notNull(),
    name: text('name').notNull(),
    createdAt: createdAt(),
  },
  (table) => [
    unique('layouts_firm_id').on(table.firmId, table.id),
    index('layouts_project').on(table.firmId, table.projectId, table.createdAt),
    foreignKey({
      name: 'layouts_project_fk',
      columns: [table.firmId, table.projectId],
      foreignColumns: [projects.firmId, projects.id],
    }),
  ],
);

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

/** One draft a layout. `revision` counts its saves; a save that started from another is refused. */
export const drafts = pgTable(
  'drafts',
  {
    firmId: text('firm_id').notNull(),
    layoutId: text('layout_id').notNull(),
    document: jsonb('document').$type<LayoutDocument>().notNull(),
    revision: integer('revision').notNull(),
    updatedAt: instant('updated_at').notNull().defaultNow(),
    updatedBy: text('updated_by')
      .notNull()
      .references(() => people.id),
    basedOnVersion: text('based_on_version'),
    /** Which browser tab wrote this revision, and its how-manieth save that was. */
    tabId: text('tab_id'),
    tabSave: integer('tab_save'),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.layoutId] }),
    foreignKey({
      name: 'drafts_layout',
      columns: [table.firmId, table.layoutId],
      foreignColumns: [layouts.firmId, layouts.id],
    }),
    foreignKey({
      name: 'drafts_based_on',
      columns: [table.firmId, table.basedOnVersion],
      foreignColumns: [versions.firmId, versions.id],
    }),
  ],
);

/** Work that was not stored as the draft (a stale save, a draft replaced by a version) is kept here. */
export const setAsideDrafts = pgTable(
  'set_aside_drafts',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id').notNull(),
    layoutId: text('layout_id').notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    baseRevision: integer('base_revision').notNull(),
    document: jsonb('document').$type<LayoutDocument>().notNull(),
    at: instant('at').notNull().defaultNow(),
  },
  (table) => [
    index('set_aside_layout').on(table.firmId, table.layoutId, table.at),
    foreignKey({
      name: 'set_aside_layout_fk',
      columns: [table.firmId, table.layoutId],
      foreignColumns: [layouts.firmId, layouts.id],
    }),
  ],
);

/** Attempts to sign in or up, counted before anybody is known, and so outside any firm. */
export const signInAttempts = pgTable(
  'sign_in_attempts',
  {
    id: text('id').primaryKey(),
    kind: text('kind').$type<'sign-in' | 'sign-up'>().notNull(),
    email: text('email').notNull(),
    address: text('address').notNull(),
    at: instant('at').notNull(),
  },
  (table) => [
    index('sign_in_attempts_pair').on(table.kind, table.email, table.address, table.at),
    index('sign_in_attempts_address').on(table.kind, table.address, table.at),
    index('sign_in_attempts_at').on(table.at),
  ],
);
