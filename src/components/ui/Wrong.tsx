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
      {error.message}{' '}
      {again && (
        <button type="button" className="link" onClick={again}>
          Try again
        </button>
      )}
    </p>
  );
}
