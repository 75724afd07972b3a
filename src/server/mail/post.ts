import type { Attachment } from '@/db/schema';

/** A letter as the outbox holds it, ready to travel. */
export interface PostedLetter {
  readonly id: string;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  readonly replyTo: string | null;
  readonly attachments: readonly Attachment[];
  readonly messageId: string;
  readonly createdAt: Date;
}

export type Delivery =
  /** The server has answered that it has the letter. */
  | { readonly kind: 'sent' }
  /** The server has answered that it will never take this letter: the address is not there, say. */
  | { readonly kind: 'refused'; readonly reason: string }
  /** The server does not have it, or did not say that it has; try again. */
  | { readonly kind: 'failed'; readonly reason: string }
  /** Just before the letter was handed over it turned out that somebody else has it in hand. */
  | { readonly kind: 'not-ours' };

/** What carries letters away: SMTP in every case, to a server of the world or to the one in this process. */
export interface Post {
  /**
   * @param stillOurs asked once the server is ready to take the letter, and nothing of it was said yet
   * @returns what became of it; it never throws
   */
  readonly deliver: (letter: PostedLetter, stillOurs: () => Promise<boolean>) => Promise<Delivery>;
  /** Lets go of the connection, if one is open. */
  readonly rest: () => void;
}
