import { sql } from 'drizzle-orm';
import { numberSequences } from '@/db/schema';
import type { Db } from '../database';

/** Figures of a number, so that papers sort by it. */
const DIGITS = 4;

/**
 * The number of a firm's next quote or order. Taken in the transaction that sends it, whose row it locks until then: numbers
 * have no gaps, and no two papers one number.
 */
export const nextNumber = async (
  tx: Db,
  firmId: string,
  kind: 'quote' | 'order',
  prefix: string,
): Promise<string> => {
  const [{ next }] = await tx
    .insert(numberSequences)
    .values({ firmId, kind, next: 2 })
    .onConflictDoUpdate({
      target: [numberSequences.firmId, numberSequences.kind],
      set: { next: sql`${numberSequences.next} + 1` },
    })
    .returning({ next: numberSequences.next });
  return `${prefix}${String(next - 1).padStart(DIGITS, '0')}`;
};

/** A file's name out of a paper's number. */
export const numberedFile = (kind: string, number: string, ending: string): string =>
  `${kind}-${number.replace(/[^\p{L}\p{N}._-]+/gu, '-')}.${ending}`;
