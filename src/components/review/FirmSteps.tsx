import { useId, useState, type ReactNode } from 'react';
import type { Agreement, Step } from '@/api-types/agreement';
import type { VersionDetail } from '@/api-types/versions';
import { Peg, statePeg } from '../ui/Peg';
import { STATE_WORDS } from '../ui/version-words';
import { Wrong } from '../ui/Wrong';
import { ChoicePicker } from '../choices/ChoicePicker';
import { pickableOf } from '../choices/choice-words';
import { useChoices, usePicking } from '../choices/use-choices';
import { useAgreement, useSteps } from './agreement';
import { currentPlanNote, FIRM_STATES } from './state-words';

const OFFERS = {
  share: {
    name: 'Share with the client',
    ask: (version: VersionDetail) =>
      `Everybody invited to ${version.projectName} as a client will see version ${version.number}, with its figures and plan, and can accept it or ask for a change.`,
    note: 'A word to the client (optional)',
    act: 'Share it',
  },
  issue: {
    name: 'Issue for set-out',
    ask: (version: VersionDetail) =>
      `The crew will see version ${version.number} and build from it. A version of this layout issued before is superseded.`,
    note: 'A word to the crew (optional)',
    act: 'Issue it',
  },
} as const;

/** Where a version stands and what its designer or owner may do about it; what may not be done is said with its reason. */
export function FirmSteps({ version }: { version: VersionDetail }) {
  const agreement = useAgreement(version.id);
  const [asking, setAsking] = useState<keyof typeof OFFERS | null>(null);
  const steps = useSteps(version.id);
  const { data } = agreement;
  const { data: before } = useChoices(version.projectId);
  const picking = usePicking(version.projectId);
  // Until something is ticked or moved the choices stay as they are, with this version after them.
  const [picked, setPicked] = useState<readonly string[] | null>(null);
  const offered = [...(before?.versions ?? []), ...(before?.others ?? [])].filter(
    ({ id }) => id !== version.id,
  );
  const thisOne = pickableOf(version);
  const takenBack =
    version.state === 'shared' && before?.others.some(({ id }) => id === version.id);
  return (
    <section aria-label="Agreement" className="border-y border-graphite py-3">
      <p className="flex items-center gap-3">
        <Peg look={statePeg(version.state)} />
        <strong data-testid="state">{STATE_WORDS[version.state]}</strong>
      </p>
      <p className="mt-1">
        {takenBack
          ? 'The client can look at it, but it is not among the choices, so they cannot accept it.'
          : FIRM_STATES[version.state]}
      </p>
      {data && <Standing agreement={data} />}
      <Wrong error={agreement.error} again={() => void agreement.refetch()} />
      {data && (
        <div className="mt-3 space-y-2">
          {(['share', 'issue'] as const).map((step) => (
            <Offer
              key={step}
              step={step}
              agreement={data}
              asking={asking === step}
              onAsk={() => setAsking(asking === step ? null : step)}
            />
          ))}
        </div>
      )}
      {asking && data?.steps[asking].may && (
        <NoteForm
          version={version}
          offer={OFFERS[asking]}
          busy={steps[asking].isPending}
          onSend={(note) =>
            steps[asking].mutate(
              { note },
              {
                onSuccess: () => {
                  if (asking === 'share' && picked) {
                    picking.pick.mutate({ versionIds: [...picked], note: before?.picked?.note });
                  }
                  setPicked(null);
                  setAsking(null);
                },
              },
            )
          }
          onLeave={() => setAsking(null)}
        >
          {asking === 'share' && offered.length > 0 && (
            <fieldset className="mt-3">
              <legend className="field-label">
                What the client chooses from then, in this order
              </legend>
              <ChoicePicker
                versions={[...offered.map(pickableOf), thisOne]}
                picked={picked ?? [...(before?.versions ?? []).map(({ id }) => id), version.id]}
                onPick={setPicked}
                fixed={version.id}
              />
            </fieldset>
          )}
        </NoteForm>
      )}
      <Wrong error={steps.share.error ?? steps.issue.error} className="mt-2" />
      {picking.pick.error && (
        <p role="alert" className="mt-2 text-brick">
          The version is shared, but the choices stayed as they were: {picking.pick.error.message}{' '}
          <a className="link" href={`/projects/${version.projectId}`}>
            Pick them on the project’s page
          </a>
          .
        </p>
      )}
    </section>
  );
}

function Standing({ agreement }: { agreement: Agreement }) {
  const other = currentPlanNote(agreement);
  const { acceptance } = agreement;
  return (
    <>
      {acceptance && (
        <p className="mt-1">
          Accepted as “{acceptance.typedName}”.{' '}
          <a className="link" href={`/versions/${agreement.versionId}/acceptance`}>
            Record of acceptance
          </a>
        </p>
      )}
      {other && agreement.issued && (
        <p className="mt-1">
          <a className="link" href={`/versions/${agreement.issued.id}`}>
            {other}
          </a>
        </p>
      )}
    </>
  );
}

function Offer({
  step,
  agreement,
  asking,
  onAsk,
}: {
  step: keyof typeof OFFERS & Step;
  agreement: Agreement;
  asking: boolean;
  onAsk: () => void;
}) {
  const standing = agreement.steps[step];
  const id = useId();
  if (!standing.may && !standing.why) return null;
  return (
    <div>
      <button
        type="button"
        className={`button w-full ${standing.may ? 'button-primary' : ''}`}
        disabled={!standing.may}
        aria-expanded={asking}
        aria-describedby={standing.why ? id : undefined}
        onClick={onAsk}
      >
        {OFFERS[step].name}
      </button>
      {!standing.may && (
        <p id={id} className="mt-1 text-sm text-slate">
          {standing.why}
        </p>
      )}
    </div>
  );
}

function NoteForm({
  version,
  offer,
  busy,
  onSend,
  onLeave,
  children,
}: {
  version: VersionDetail;
  offer: (typeof OFFERS)[keyof typeof OFFERS];
  busy: boolean;
  onSend: (note: string) => void;
  onLeave: () => void;
  children?: ReactNode;
}) {
  const [note, setNote] = useState('');
  const id = useId();
  return (
    <form
      className="mt-3 border-l-2 border-line pl-3"
      onSubmit={(event) => {
        event.preventDefault();
        onSend(note);
      }}
    >
      <p>{offer.ask(version)}</p>
      <label htmlFor={id} className="field-label mt-2">
        {offer.note}
      </label>
      <textarea
        id={id}
        className="field"
        rows={2}
        maxLength={4000}
        value={note}
        onChange={(event) => setNote(event.target.value)}
      />
      {children}
      <div className="mt-2 flex gap-2">
        <button className="button button-primary" disabled={busy}>
          {busy ? 'Sending …' : offer.act}
        </button>
        <button type="button" className="button button-quiet" onClick={onLeave}>
          Not now
        </button>
      </div>
    </form>
  );
}
