import { sql, type AnyColumn, type SQL } from 'drizzle-orm';

/**
 * All words that a search gives, each as the beginning of a word. Quoted, so that PostgreSQL's own parser takes each
 * apart as it took the names apart, and nothing typed is an operator.
 */
const wordsSought = (search: string): string =>
  search
    .split(/\s+/)
    .filter((word) => /[\p{L}\p{N}]/u.test(word))
    .map((word) => `'${word.replace(/[\\']/g, '$&$&')}':*`)
    .join(' & ');

/** Whether a column of words holds all that is searched for; no condition where nothing is. */
export const wordsMatch = (words: AnyColumn, search: string | undefined): SQL | undefined => {
  const sought = wordsSought(search ?? '');
  return sought ? sql`${words} @@ to_tsquery('simple', ${sought})` : undefined;
};
