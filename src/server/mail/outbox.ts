import { outbox } from '@/db/schema';
import type { Db } from '../database';
import { environment } from '../environment';
import { newId } from '../ids';
import { siteOrigin } from '../site-origin';
import { letterParts, type Letter } from './letter';

export interface Addressed {
  /** The e-mail address. */
  readonly to: string;
  /** The firm that it is about; null for a letter to a person as such. */
  readonly firmId: string | null;
  /** The letter's id, when what it tells of must find it again. */
  readonly id?: string;
}

/** The domain of MAIL_FROM, for Message-IDs (RFC 5322, 3.6.4: the right side is the sender's domain). */
const senderDomain = (): string =>
  /@([^\s@>]+)>?\s*$/.exec(environment().mailFrom)?.[1] ?? 'localhost';

/**
 * Puts a letter in the outbox. Give it the transaction of what the letter tells of: then both are kept or
 * neither is, and a mail server that is slow or dead holds up nobody. The sender takes it from there.
 */
export const postLetter = async (
  tx: Db,
  { to, firmId, id = newId() }: Addressed,
  letter: Letter,
): Promise<string> => {
  await tx.insert(outbox).values({
    id,
    firmId,
    kind: letter.kind,
    to,
    ...letterParts(letter, siteOrigin()),
    messageId: `<${id}@${senderDomain()}>`,
  });
  return id;
};
