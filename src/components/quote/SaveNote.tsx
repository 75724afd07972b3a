import type { SavedDraft } from './use-saved-draft';

/** Whether what was typed is stored, and what to do when it is not. */
export function SaveNote({
  draft: { saving, error, theirs, keepMine, takeTheirs, again },
}: {
  draft: Pick<
    SavedDraft<never, never>,
    'saving' | 'error' | 'keepMine' | 'takeTheirs' | 'again'
  > & { readonly theirs: unknown };
}) {
  const clash = theirs !== null;
  if (!error)
    return (
      <p role="status" className="text-sm text-slate">
        {saving ? 'Saving …' : 'Saved'}
      </p>
    );
  return (
    <div role="alert" className={`p-3 ${clash ? 'bg-amber-wash' : 'bg-brick-wash'}`}>
      <p>
        {error.message}{' '}
        {(error.problem?.errors ?? []).map(({ message }) => `${message}.`).join(' ')}
      </p>
      <div className="mt-2 flex flex-wrap gap-2">
        {clash ? (
          <>
            <button type="button" className="button" onClick={keepMine}>
              Store mine all the same
            </button>
            <button type="button" className="button" onClick={takeTheirs}>
              See theirs
            </button>
          </>
        ) : (
          <button type="button" className="button" onClick={again}>
            Try again
          </button>
        )}
      </div>
    </div>
  );
}
