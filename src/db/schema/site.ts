import { sql } from 'drizzle-orm';
import {
  check,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
} from 'drizzle-orm/pg-core';
import type { SiteEntryContent } from '@/paving/site/site-entry';
import { instant } from './columns';
import { memberships, people } from './firms';
import { versions } from './versions';

/**
 * What a crew wrote down for a version on the ground, each entry an event. Its id is made by the phone, so that an
 * entry sent twice is kept once. A trigger refuses UPDATE and DELETE; see the migration `on-site`.
 */
export const siteEntries = pgTable(
  'site_entries',
  {
    firmId: text('firm_id').notNull(),
    id: text('id').notNull(),
    versionId: text('version_id').notNull(),
    /** The phone that it was made on, and which of its entries it is, from 1. */
    device: text('device').notNull(),
    place: integer('place').notNull(),
    kind: text('kind').$type<SiteEntryContent['kind']>().notNull(),
    content: jsonb('content').$type<SiteEntryContent>().notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    /** By the phone's clock. */
    madeAt: instant('made_at').notNull(),
    receivedAt: instant('received_at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.id] }),
    index('site_entries_version').on(table.firmId, table.versionId, table.device, table.place),
    foreignKey({
      name: 'site_entries_version_fk',
      columns: [table.firmId, table.versionId],
      foreignColumns: [versions.firmId, versions.id],
    }),
    check(
      'site_entries_kind',
      sql`${table.kind} in ('course', 'check', 'note', 'photo', 'proposal')`,
    ),
  ],
);

/** A photo's image as it is kept: its bytes are in the file store, under its own name. Kept by the same trigger. */
export const sitePhotos = pgTable(
  'site_photos',
  {
    firmId: text('firm_id').notNull(),
    /** The entry's id. */
    entryId: text('entry_id').notNull(),
    /** Of the full size, px. */
    width: integer('width').notNull(),
    height: integer('height').notNull(),
    /** SHA-256 of each size as kept, so that a file that was changed or lost is known. */
    fullHash: text('full_hash').notNull(),
    phoneHash: text('phone_hash').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.entryId] }),
    foreignKey({
      name: 'site_photos_entry',
      columns: [table.firmId, table.entryId],
      foreignColumns: [siteEntries.firmId, siteEntries.id],
    }),
  ],
);

/**
 * What a person's phone locks the entries with that wait on it while nobody is signed in, AES-256, base64. It is handed to
 * that person alone, so whoever signs in next on the phone cannot read them.
 */
export const siteKeys = pgTable(
  'site_keys',
  {
    firmId: text('firm_id').notNull(),
    personId: text('person_id').notNull(),
    key: text('key').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.personId] }),
    foreignKey({
      name: 'site_keys_membership',
      columns: [table.firmId, table.personId],
      foreignColumns: [memberships.firmId, memberships.personId],
    }).onDelete('cascade'),
  ],
);
