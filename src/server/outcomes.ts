import type { FieldProblem } from '@/api-types/problem';

/** Why a service did not do what it was asked. `detail` is written for the person. */
export type Refusal =
  | { readonly ok: false; readonly kind: 'signed-out'; readonly detail: string }
  | { readonly ok: false; readonly kind: 'not-found'; readonly detail: string }
  | { readonly ok: false; readonly kind: 'not-allowed'; readonly detail: string }
  | {
      readonly ok: false;
      readonly kind: 'changed';
      readonly detail: string;
      /** Both sides, for whoever has to choose between them. */
      readonly sides?: Readonly<Record<string, unknown>>;
    }
  | {
      readonly ok: false;
      readonly kind: 'invalid';
      readonly detail: string;
      readonly errors: readonly FieldProblem[];
    }
  | {
      readonly ok: false;
      readonly kind: 'too-many';
      readonly detail: string;
      readonly retryAfterSeconds: number;
    };

/** The value that a service came to. */
export interface Done<T> {
  readonly ok: true;
  readonly value: T;
}

/** What every service answers: a value, or why not. */
export type Outcome<T> = Done<T> | Refusal;

/** It worked. */
export const done = <T>(value: T): Done<T> => ({ ok: true, value });

/** Nobody is signed in, or not with these words. */
/** Said to whoever is in the middle of something when their session ends. */
export const SIGNED_OUT =
  'You are signed out. Sign in again in another tab, then try again here: nothing on this page is lost.';

export const signedOut = (detail = SIGNED_OUT): Refusal => ({
  ok: false,
  kind: 'signed-out',
  detail,
});

/** Also for what exists but may not be seen: the two must not be told apart. */
export const notFound = (what: string): Refusal => ({
  ok: false,
  kind: 'not-found',
  detail: `There is no such ${what}, or it is not yours to see.`,
});

/** Seen, but not for this person to do. */
export const notAllowed = (detail: string): Refusal => ({ ok: false, kind: 'not-allowed', detail });

/** Somebody was quicker; `sides` goes into the answer, so that both can be looked at. */
export const changedMeanwhile = (
  detail: string,
  sides?: Readonly<Record<string, unknown>>,
): Refusal => ({ ok: false, kind: 'changed', detail, ...(sides ? { sides } : {}) });

/** Something sent will not do: `errors` says what, by the path of its field. */
export const invalid = (detail: string, errors: readonly FieldProblem[]): Refusal => ({
  ok: false,
  kind: 'invalid',
  detail,
  errors,
});

/** Tried too often; again after so many seconds. */
export const tooMany = (detail: string, retryAfterSeconds: number): Refusal => ({
  ok: false,
  kind: 'too-many',
  detail,
  retryAfterSeconds,
});
