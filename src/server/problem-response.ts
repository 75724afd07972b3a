import type { FieldProblem, Problem, ProblemKind } from '@/api-types/problem';
import type { Refusal } from './outcomes';

const PROBLEMS: Readonly<Record<ProblemKind, readonly [status: number, title: string]>> = {
  'signed-out': [401, 'Not signed in'],
  'not-allowed': [403, 'Not allowed'],
  'wrong-origin': [403, 'Not from this site'],
  'not-found': [404, 'Not found'],
  'wrong-method': [405, 'Not possible here'],
  changed: [409, 'Changed meanwhile'],
  'too-large': [413, 'Too large'],
  'wrong-type': [415, 'Not JSON'],
  invalid: [422, 'Not right yet'],
  'too-many': [429, 'Too many attempts'],
  failed: [500, 'Something went wrong'],
};

interface Extras {
  readonly errors?: readonly FieldProblem[];
  readonly sides?: Readonly<Record<string, unknown>>;
  readonly headers?: Readonly<Record<string, string>>;
}

/** An error as `application/problem+json` (RFC 9457); `sides` are its extension members. */
export const problemResponse = (
  kind: ProblemKind,
  detail: string,
  { errors, sides, headers }: Extras = {},
): Response => {
  const [status, title] = PROBLEMS[kind];
  const problem: Problem = {
    type: `urn:evenlay:problem:${kind}`,
    title,
    status,
    detail,
    ...(errors ? { errors } : {}),
  };
  return new Response(JSON.stringify({ ...sides, ...problem }), {
    status,
    headers: {
      'content-type': 'application/problem+json; charset=utf-8',
      'cache-control': 'no-store',
      ...headers,
    },
  });
};

/** A refusal as application/problem+json, with its status. */
export const refusalResponse = (refusal: Refusal): Response => {
  switch (refusal.kind) {
    case 'invalid':
      return problemResponse('invalid', refusal.detail, { errors: refusal.errors });
    case 'changed':
      return problemResponse('changed', refusal.detail, refusal.sides && { sides: refusal.sides });
    case 'too-many':
      return problemResponse('too-many', refusal.detail, {
        headers: { 'retry-after': String(refusal.retryAfterSeconds) },
      });
    default:
      return problemResponse(refusal.kind, refusal.detail);
  }
};
