import { foreignKey, index, integer, jsonb, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import type { LayoutDocument } from '@/paving/layout-document';
import { instant } from './columns';
import { memberships, people } from './firms';
import { layouts } from './layouts';
import { versions } from './versions';

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

/** Who has a layout open just now, and whether they are changing its draft. Stale rows count as gone. */
export const draftPresence = pgTable(
  'draft_presence',
  {
    firmId: text('firm_id').notNull(),
    layoutId: text('layout_id').notNull(),
    personId: text('person_id').notNull(),
    seenAt: instant('seen_at').notNull(),
    /** When they last changed the draft; null when they have only looked. */
    editedAt: instant('edited_at'),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.layoutId, table.personId] }),
    index('draft_presence_seen').on(table.seenAt),
    foreignKey({
      name: 'draft_presence_layout',
      columns: [table.firmId, table.layoutId],
      foreignColumns: [layouts.firmId, layouts.id],
    }),
    foreignKey({
      name: 'draft_presence_membership',
      columns: [table.firmId, table.personId],
      foreignColumns: [memberships.firmId, memberships.personId],
    }).onDelete('cascade'),
  ],
);
