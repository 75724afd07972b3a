import { useId, useState } from 'react';
import type { Agreement } from '@/api-types/agreement';
import type { VersionDetail } from '@/api-types/versions';
import { ApiError } from '../ui/api';
import { Dialog } from '../ui/Dialog';
import { Wrong } from '../ui/Wrong';
import type { useSteps } from './agreement';

interface Props {
  readonly open: boolean;
  readonly onClose: () => void;
  readonly version: VersionDetail;
  readonly agreement: Agreement;
  readonly accept: ReturnType<typeof useSteps>['accept'];
}

/** A client says yes: with their name typed, under the terms as shown, to the document of this fingerprint. */
export function AcceptForm({ open, onClose, version, agreement, accept }: Props) {
  const [name, setName] = useState('');
  const [note, setNote] = useState('');
  const [asked, setAsked] = useState(false);
  const id = useId();
  const missing = asked && name.trim() === '';
  const changed = accept.error instanceof ApiError && accept.error.status === 409;
  const send = () => {
    setAsked(true);
    if (name.trim() === '') return;
    accept.mutate(
      {
        typedName: name.trim(),
        fingerprint: agreement.fingerprint,
        terms: agreement.terms,
        note: note.trim(),
      },
      { onSuccess: onClose },
    );
  };
  return (
    <Dialog open={open} onClose={onClose} title={`Accept version ${version.number}`}>
      <form
        noValidate
        onSubmit={(event) => {
          event.preventDefault();
          send();
        }}
      >
        <p>
          You agree that {version.firmName} builds <strong>{version.label}</strong>, version{' '}
          {version.number} of {version.layoutName}, as it is shown and figured here.
        </p>
        <h3 className="mt-4">Terms</h3>
        {agreement.terms ? (
          <div
            tabIndex={0}
            className="mt-1 max-h-48 overflow-y-auto border border-stone-300 p-3 whitespace-pre-line"
            data-testid="terms"
          >
            {agreement.terms}
          </div>
        ) : (
          <p className="mt-1 text-slate">{version.firmName} has set no terms of its own.</p>
        )}
        <label htmlFor={`${id}-name`} className="field-label mt-4">
          Type your full name
        </label>
        <input
          id={`${id}-name`}
          className="field"
          autoComplete="name"
          maxLength={120}
          value={name}
          aria-invalid={missing}
          aria-describedby={`${id}-wrong`}
          onChange={(event) => setName(event.target.value)}
        />
        <p id={`${id}-wrong`} className="mt-1 text-sm text-brick">
          {missing && 'Type your name: it stands on the record.'}
        </p>
        <label htmlFor={`${id}-note`} className="field-label mt-3">
          A word to your designer (optional)
        </label>
        <textarea
          id={`${id}-note`}
          className="field"
          rows={2}
          maxLength={4000}
          value={note}
          onChange={(event) => setNote(event.target.value)}
        />
        <p className="mt-3 text-sm text-slate">
          Your name, the time, these terms and the fingerprint of the floor (
          <span className="font-semibold break-all">{agreement.fingerprint.slice(0, 10)}</span>) are
          kept. The fingerprint changes with any change of the floor, so nobody can alter it
          afterwards unseen.
        </p>
        <Wrong error={accept.error} className="mt-3" />
        {changed && (
          <p className="mt-1">
            Nothing was accepted. What is shown now is up to date; read it and decide again.
          </p>
        )}
        <div className="mt-4 flex flex-wrap gap-2">
          <button className="button button-primary" disabled={accept.isPending}>
            {accept.isPending ? 'Sending …' : 'I accept this floor'}
          </button>
          <button type="button" className="button button-quiet" onClick={onClose}>
            Not yet
          </button>
        </div>
      </form>
    </Dialog>
  );
}
