import type { Point } from '@/geometry/point';

/** What is wrong with one field of a document: where, why and what would do. */
export interface DocumentProblem {
  readonly path: (string | number)[];
  readonly message: string;
  /** The place on the ground, mm, when there is one to show. */
  readonly at?: Point;
}

/** A length or coordinate for a message: to a tenth of a millimetre, without needless zeros. */
export function shownMm(mm: number): string {
  return String(Math.round(mm * 10) / 10 + 0);
}

/** A place for a message. */
export function shownPlace([x, y]: Point): string {
  return `(${shownMm(x)}, ${shownMm(y)})`;
}
