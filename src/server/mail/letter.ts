import { letterHtml } from './letter-html';
import { letterText } from './letter-text';

export type LetterBlock =
  | { readonly kind: 'paragraph'; readonly text: string }
  /** Somebody's own words. */
  | { readonly kind: 'quote'; readonly by: string; readonly text: string }
  /** The one thing to do now; `path` is of this site. */
  | { readonly kind: 'action'; readonly label: string; readonly path: string }
  | { readonly kind: 'list'; readonly items: readonly LetterItem[] };

/** A line of a list in a letter. */
export interface LetterItem {
  readonly text: string;
  /** Of this site, such as `/versions/…`. */
  readonly path?: string;
}

/** A letter before it is set: what it says, in order. */
export interface Letter {
  /** What kind of letter it is, such as `invitation`. */
  readonly kind: string;
  readonly subject: string;
  /** Whom it greets; nobody by name when it is not known. */
  readonly name?: string;
  readonly blocks: readonly LetterBlock[];
  /** Why it came to them, and what to do if it should not have; set small at the foot. */
  readonly why: string;
}

/** A letter as its parts travel. */
export interface LetterParts {
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/** Longest subject, characters: the rest would not be shown anyway. */
const SUBJECT_LIMIT = 150;

/** On one line, so that nothing typed into a name can become a header of its own. */
const subjectLine = (subject: string): string => {
  const line = subject.replace(/[\p{Cc}\p{Zl}\p{Zp}\s]+/gu, ' ').trim();
  return line.length <= SUBJECT_LIMIT ? line : `${line.slice(0, SUBJECT_LIMIT - 1).trimEnd()}…`;
};

/** Sets a letter as plain text and as HTML, both complete. `origin` is this site's, for its links. */
export const letterParts = (letter: Letter, origin: string): LetterParts => ({
  subject: subjectLine(letter.subject),
  text: letterText(letter, origin),
  html: letterHtml(letter, origin),
});
