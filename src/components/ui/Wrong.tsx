import { ApiError } from './api';

/** What went wrong, in the server's words or ours, and the way to try again. */
export function Wrong({
  error,
  again,
  className = '',
}: {
  error: Error | null;
  again?: () => void;
  className?: string;
}) {
  if (!error) return null;
  return (
    <p role="alert" className={`text-brick ${className}`}>
      {error.message} {error instanceof ApiError && error.status === 401 && <SignInLink />}{' '}
      {again && (
        <button type="button" className="link" onClick={again}>
          Try again
        </button>
      )}
    </p>
  );
}

/** In another tab, so that what is typed here stays. */
export const SignInLink = () => (
  <a className="link" href="/sign-in" target="_blank">
    Sign in
  </a>
);
