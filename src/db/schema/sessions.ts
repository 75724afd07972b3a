import { foreignKey, index, pgTable, text } from 'drizzle-orm/pg-core';
import { createdAt, instant } from './columns';
import { memberships } from './firms';

/** Lucia's table; `id` is the SHA-256 of what the cookie holds, so that a leaked copy signs nobody in. */
export const sessions = pgTable(
  'sessions',
  {
    id: text('id').primaryKey(),
    userId: text('person_id').notNull(),
    expiresAt: instant('expires_at').notNull(),
    firmId: text('firm_id').notNull(),
    createdAt: createdAt(),
    /** What the browser called itself, so that its owner knows it in a list. */
    userAgent: text('user_agent').notNull().default(''),
    /** When it was last used, to within some minutes. */
    lastSeenAt: instant('last_seen_at').notNull().defaultNow(),
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
