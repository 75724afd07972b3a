import type { Point } from '@/geometry/point';

/** One thing wrong with what was sent: the path of the field in the body, why, and where on the ground. */
export interface FieldProblem {
  readonly path: readonly (string | number)[];
  readonly message: string;
  /** Where on the ground, mm, when the fault has a place (a ring that crosses itself). */
  readonly at?: Point;
}

export type ProblemKind =
  | 'signed-out'
  | 'not-allowed'
  | 'not-found'
  | 'changed'
  | 'invalid'
  | 'too-many'
  | 'too-large'
  | 'wrong-type'
  | 'wrong-method'
  | 'wrong-origin'
  | 'failed';

/** An error as RFC 9457 `application/problem+json`. `title` and `detail` are written for the person. */
export interface Problem {
  /** `urn:evenlay:problem:` and the kind. */
  readonly type: `urn:evenlay:problem:${ProblemKind}`;
  readonly title: string;
  readonly status: number;
  readonly detail: string;
  /** Only for `invalid`: every field that is wrong. */
  readonly errors?: readonly FieldProblem[];
}
