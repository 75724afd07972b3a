import { sql } from 'drizzle-orm';
import {
  check,
  doublePrecision,
  foreignKey,
  index,
  pgTable,
  primaryKey,
  text,
  unique,
} from 'drizzle-orm/pg-core';
import { instant } from './columns';
import { memberships, people } from './firms';
import { layouts } from './layouts';
import { versions } from './versions';

/**
 * A remark on a version, or an answer to one. The first of a thread carries its own id as `threadId`, the
 * pin if it has one, and whether the thread is resolved; answers carry only the thread's id.
 */
export const comments = pgTable(
  'comments',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id').notNull(),
    /** Follows the layout when that is moved to another project. */
    projectId: text('project_id').notNull(),
    layoutId: text('layout_id').notNull(),
    versionId: text('version_id').notNull(),
    threadId: text('thread_id').notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    body: text('body').notNull(),
    /** Where on the ground it is pinned, mm; null when it is about the version as a whole. */
    pinX: doublePrecision('pin_x'),
    pinY: doublePrecision('pin_y'),
    resolvedAt: instant('resolved_at'),
    resolvedBy: text('resolved_by').references(() => people.id),
    at: instant('at').notNull().defaultNow(),
  },
  (table) => [
    unique('comments_firm_id').on(table.firmId, table.id),
    index('comments_thread').on(table.firmId, table.threadId, table.at),
    index('comments_version').on(table.firmId, table.versionId, table.at),
    index('comments_layout').on(table.firmId, table.layoutId, table.at),
    index('comments_project').on(table.firmId, table.projectId, table.at),
    index('comments_at').on(table.firmId, table.at),
    foreignKey({
      name: 'comments_layout_fk',
      columns: [table.firmId, table.projectId, table.layoutId],
      foreignColumns: [layouts.firmId, layouts.projectId, layouts.id],
    }).onUpdate('cascade'),
    foreignKey({
      name: 'comments_version_fk',
      columns: [table.firmId, table.versionId],
      foreignColumns: [versions.firmId, versions.id],
    }),
    foreignKey({
      name: 'comments_thread_fk',
      columns: [table.firmId, table.threadId],
      foreignColumns: [table.firmId, table.id],
    }),
    check('comments_pin', sql`(${table.pinX} is null) = (${table.pinY} is null)`),
    check(
      'comments_answer',
      sql`${table.threadId} = ${table.id} or (${table.pinX} is null and ${table.resolvedAt} is null)`,
    ),
    check('comments_resolved', sql`(${table.resolvedAt} is null) = (${table.resolvedBy} is null)`),
  ],
);

/** Who is named in a comment, and so is told of it. */
export const mentions = pgTable(
  'mentions',
  {
    firmId: text('firm_id').notNull(),
    commentId: text('comment_id').notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.commentId, table.personId] }),
    index('mentions_person').on(table.firmId, table.personId),
    foreignKey({
      name: 'mentions_comment',
      columns: [table.firmId, table.commentId],
      foreignColumns: [comments.firmId, comments.id],
    }),
  ],
);

/** Up to when a person has read a thread; what others wrote later is unread. */
export const commentReads = pgTable(
  'comment_reads',
  {
    firmId: text('firm_id').notNull(),
    threadId: text('thread_id').notNull(),
    personId: text('person_id').notNull(),
    readAt: instant('read_at').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.personId, table.threadId] }),
    index('comment_reads_thread').on(table.firmId, table.threadId),
    foreignKey({
      name: 'comment_reads_thread_fk',
      columns: [table.firmId, table.threadId],
      foreignColumns: [comments.firmId, comments.id],
    }),
    foreignKey({
      name: 'comment_reads_membership',
      columns: [table.firmId, table.personId],
      foreignColumns: [memberships.firmId, memberships.personId],
    }).onDelete('cascade'),
  ],
);
