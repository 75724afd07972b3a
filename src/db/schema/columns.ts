import { timestamp } from 'drizzle-orm/pg-core';

/** A moment, with its zone, as a Date. */
export const instant = (name: string) => timestamp(name, { withTimezone: true, mode: 'date' });

export const createdAt = () => instant('created_at').notNull().defaultNow();
