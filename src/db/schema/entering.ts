import { sql } from 'drizzle-orm';
import { check, foreignKey, index, pgTable, text, unique } from 'drizzle-orm/pg-core';
import type { Role } from '@/api-types/people';
import { createdAt, instant } from './columns';
import { firms, people } from './firms';
import { projects } from './projects';

/** An invitation into a role of the firm, or to one project. Of its token only the SHA-256 is kept. */
export const invitations = pgTable(
  'invitations',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id')
      .notNull()
      .references(() => firms.id),
    email: text('email').notNull(),
    role: text('role').$type<Role>().notNull(),
    projectId: text('project_id'),
    tokenHash: text('token_hash').notNull(),
    invitedBy: text('invited_by')
      .notNull()
      .references(() => people.id),
    createdAt: createdAt(),
    expiresAt: instant('expires_at').notNull(),
    acceptedAt: instant('accepted_at'),
    acceptedBy: text('accepted_by').references(() => people.id),
    withdrawnAt: instant('withdrawn_at'),
  },
  (table) => [
    unique('invitations_token').on(table.tokenHash),
    index('invitations_firm').on(table.firmId, table.createdAt),
    index('invitations_email').on(table.firmId, table.email),
    foreignKey({
      name: 'invitations_project',
      columns: [table.firmId, table.projectId],
      foreignColumns: [projects.firmId, projects.id],
    }),
    check('invitations_email_lower', sql`${table.email} = lower(${table.email})`),
    // A client sees only projects they are put on; owners and designers see them all.
    check(
      'invitations_role_project',
      sql`case ${table.role} when 'client' then ${table.projectId} is not null
        when 'installer' then true when 'owner' then ${table.projectId} is null
        when 'designer' then ${table.projectId} is null else false end`,
    ),
    check(
      'invitations_accepted',
      sql`(${table.acceptedAt} is null) = (${table.acceptedBy} is null)`,
    ),
  ],
);

/** A way to choose a new password, of a person and so of no firm. Of its token only the SHA-256 is kept. */
export const passwordResets = pgTable(
  'password_resets',
  {
    tokenHash: text('token_hash').primaryKey(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    createdAt: createdAt(),
    expiresAt: instant('expires_at').notNull(),
    usedAt: instant('used_at'),
  },
  (table) => [
    index('password_resets_person').on(table.personId, table.createdAt),
    index('password_resets_expiry').on(table.expiresAt),
  ],
);

/** Attempts to sign in or up, or to ask for a new password, counted before anybody is known, and so outside any firm. */
export const signInAttempts = pgTable(
  'sign_in_attempts',
  {
    id: text('id').primaryKey(),
    kind: text('kind').$type<'sign-in' | 'sign-up' | 'reset'>().notNull(),
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
