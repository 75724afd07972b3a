import { sql, type AnyColumn, type SQL } from 'drizzle-orm';

/**
 * Pages by the last row of the page before, not by counting rows: the hundredth page costs what the first does.
 * A key is carried as the database writes it, since a Date would lose its microseconds.
 */
export interface Key {
  readonly at: string;
  readonly id: string;
}

/** A moment as the database writes it, for a key. */
export const exactly = (column: AnyColumn | SQL): SQL<string> => sql<string>`${column}::text`;

/** Where a page ended, to be handed back for the next. */
export const keyWritten = ({ at, id }: Key): string =>
  Buffer.from(JSON.stringify([at, id])).toString('base64url');

/** The key that a page was asked `after`; null when there is none, or what is sent is none of ours. */
export const keyRead = (after: string | undefined): Key | null => {
  if (!after) return null;
  try {
    const key: unknown = JSON.parse(Buffer.from(after, 'base64url').toString('utf8'));
    if (!Array.isArray(key)) return null;
    const [at, id]: unknown[] = key;
    return typeof at === 'string' && typeof id === 'string' ? { at, id } : null;
  } catch {
    return null;
  }
};

/** A moment as PostgreSQL writes one: what is not one is not asked for. */
export const MOMENT = /^\d{4,6}-\d\d-\d\d \d\d:\d\d:\d\d(\.\d{1,6})?[+-]\d\d(:\d\d){0,2}$/;

/** A key by time; null for none, or for one that was not written here. */
export const momentKeyRead = (after: string | undefined): Key | null => {
  const key = keyRead(after);
  return key && MOMENT.test(key.at) ? key : null;
};

/** Of rows ordered newest first: those after the key. */
export const olderThan = (
  at: AnyColumn | SQL,
  id: AnyColumn | SQL,
  key: Key | null,
): SQL | undefined => (key ? sql`(${at}, ${id}) < (${key.at}::timestamptz, ${key.id})` : undefined);

/** Of `size` + 1 rows asked for: those of the page, and the key of the next. */
export const pageOf = <Row extends { readonly key: string; readonly id: string }>(
  rows: readonly Row[],
  size: number,
): { readonly page: readonly Row[]; readonly next: string | null } => {
  const page = rows.slice(0, size);
  const last = page.at(-1);
  return {
    page,
    next: rows.length > size && last ? keyWritten({ at: last.key, id: last.id }) : null,
  };
};
