import { outbox, type Attachment } from '@/db/schema';
import type { Db } from '../database';
import { environment } from '../environment';
import { newId } from '../ids';
import { siteOrigin } from '../site-origin';
import { letterParts, type Letter } from './letter';

/** To whom a letter goes and what goes with it. */
export interface Addressed {
  /** The e-mail address. */
  readonly to: string;
  /** The firm that it is about; null for a letter to a person as such. */
  readonly firmId: string | null;
  /** The letter's id, when what it tells of must find it again. */
  readonly id?: string;
  /** Where answers go, when not to MAIL_FROM. */
  readonly replyTo?: string;
  /** Files that go with it: kept in the same row, so that letter and files are there together or not at all. */
  readonly attachments?: readonly Attachment[];
}

/** The domain of MAIL_FROM, for Message-IDs (RFC 5322, 3.6.4: the right side is the sender's domain). */
const senderDomain = (): string =>
  /@([^\s@>]+)>?\s*$/.exec(environment().mailFrom)?.[1] ?? 'localhost';

/** A file for a letter. */
export const attachment = (name: string, type: string, bytes: Uint8Array): Attachment => ({
  name,
  type,
  content: Buffer.from(bytes).toString('base64'),
});

/**
 * Puts a letter in the outbox. Give it the transaction of what the letter tells of: then both are kept or
 * neither is, and a mail server that is slow or dead holds up nobody. The sender takes it from there.
 */
export const postLetter = async (
  tx: Db,
  { to, firmId, id = newId(), replyTo, attachments = [] }: Addressed,
  letter: Letter,
): Promise<string> => {
  await tx.insert(outbox).values({
    id,
    firmId,
    kind: letter.kind,
    to,
    ...letterParts(letter, siteOrigin()),
    replyTo: replyTo || null,
    attachments: attachments.length > 0 ? attachments : null,
    messageId: `<${id}@${senderDomain()}>`,
  });
  return id;
};
