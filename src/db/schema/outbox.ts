import { sql } from 'drizzle-orm';
import { index, integer, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core';
import { createdAt, instant } from './columns';
import { firms } from './firms';

/** A file that goes with a letter. */
export interface Attachment {
  /** With its ending, such as `order.pdf`. */
  readonly name: string;
  /** Such as `application/pdf`. */
  readonly type: string;
  /** Its bytes in base64. */
  readonly content: string;
}

/** Letters, written in the same transaction as what they tell of, and sent from here; see server/outbox. */
export const outbox = pgTable(
  'outbox',
  {
    id: text('id').primaryKey(),
    /** Null for a letter to a person as such, such as one for a new password. */
    firmId: text('firm_id').references(() => firms.id),
    /** What the letter is, such as `invitation`. */
    kind: text('kind').notNull(),
    to: text('to_address').notNull(),
    subject: text('subject').notNull(),
    text: text('text_part').notNull(),
    html: text('html_part').notNull(),
    /** Where answers go, when not to whom letters come from. */
    replyTo: text('reply_to'),
    /** Files that go with it; wiped, like its words, once it is sent. */
    attachments: jsonb('attachments').$type<readonly Attachment[]>(),
    /** The same at every try, so that whoever receives a letter twice can tell. */
    messageId: text('message_id').notNull(),
    createdAt: createdAt(),
    /** Not tried before; moved on after each failure. */
    dueAt: instant('due_at').notNull().defaultNow(),
    tries: integer('tries').notNull().default(0),
    /** Which sender has it in hand, and until when nobody else takes it. */
    claimedBy: text('claimed_by'),
    claimedUntil: instant('claimed_until'),
    sentAt: instant('sent_at'),
    /** Refused for good by the receiving server: not tried again, and kept. */
    refusedAt: instant('refused_at'),
    lastError: text('last_error'),
  },
  (table) => [
    unique('outbox_message_id').on(table.messageId),
    index('outbox_waiting')
      .on(table.dueAt, table.id)
      .where(sql`sent_at is null and refused_at is null`),
    index('outbox_firm').on(table.firmId, table.createdAt),
  ],
);
