import { sql } from 'drizzle-orm';
import { boolean, check, index, pgTable, primaryKey, text, unique } from 'drizzle-orm/pg-core';
import type { Display, MailDigest, Role } from '@/api-types/people';
import { createdAt, instant } from './columns';

export const firms = pgTable('firms', {
  id: text('id').primaryKey(),
  name: text('name').notNull(),
  /** Made by the seed, so that the demo sign-ins may be told. */
  demo: boolean('demo').notNull().default(false),
  /** What a client is shown and agrees to when accepting a version; may be empty. */
  terms: text('terms').notNull().default(''),
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
    /** A letter at once when somebody mentions them. */
    mailMentions: boolean('mail_mentions').notNull().default(true),
    /** A letter at once when a version is shared, accepted, issued …, or a change is asked for. */
    mailSteps: boolean('mail_steps').notNull().default(true),
    /** How often comments that they have not read are gathered into one letter. */
    mailDigest: text('mail_digest').$type<MailDigest>().notNull().default('daily'),
    createdAt: createdAt(),
  },
  (table) => [
    unique('people_email_unique').on(table.email),
    check('people_email_lower', sql`${table.email} = lower(${table.email})`),
    check('people_display', sql`${table.display} in ('metric', 'imperial')`),
    check('people_mail_digest', sql`${table.mailDigest} in ('hourly', 'daily', 'never')`),
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
    /** Up to when comments have gone into a digest of this person's; null before the first. */
    digestedAt: instant('digested_at'),
    createdAt: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.personId] }),
    index('memberships_person').on(table.personId),
    index('memberships_digest').on(table.digestedAt),
    check('memberships_role', sql`${table.role} in ('owner', 'designer', 'installer', 'client')`),
  ],
);
