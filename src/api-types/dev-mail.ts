/** GET /api/dev/mail → `{ letters: LocalLetterSummary[] }`, newest first; 404 when letters are really sent. */
export interface LocalLetterSummary {
  readonly id: string;
  readonly at: string;
  readonly from: string;
  readonly to: string;
  readonly subject: string;
  readonly messageId: string;
}

/** GET /api/dev/mail/{id}. */
export interface LocalLetter extends LocalLetterSummary {
  readonly text: string;
  readonly html: string;
}
