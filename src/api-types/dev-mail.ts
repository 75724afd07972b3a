/** GET /api/dev/mail → `{ letters: LocalLetterSummary[] }`, newest first; 404 when letters are really sent. */
export interface LocalLetterSummary {
  readonly id: string;
  readonly at: string;
  readonly from: string;
  readonly to: string;
  readonly subject: string;
  readonly messageId: string;
}

export interface LocalAttachment {
  readonly name: string;
  readonly type: string;
  /** In bytes. */
  readonly size: number;
  /** In base64. */
  readonly content: string;
}

/** GET /api/dev/mail/{id}. */
export interface LocalLetter extends LocalLetterSummary {
  readonly text: string;
  readonly html: string;
  readonly attachments: readonly LocalAttachment[];
}
