import { useEffect, useState } from 'react';
import type { VersionDetail } from '@/api-types/versions';
import { Peg, statePeg } from '../ui/Peg';
import { Moment } from '../ui/Moment';
import { STATE_WORDS } from '../ui/version-words';
import { Wrong } from '../ui/Wrong';
import { AcceptForm } from './AcceptForm';
import { useSteps, type useAgreement } from './agreement';
import { AskChangeForm, type ChangePin } from './AskChangeForm';
import { CLIENT_STATES, currentPlanNote } from './state-words';

interface Props {
  readonly version: VersionDetail;
  readonly agreement: ReturnType<typeof useAgreement>;
  readonly pins: readonly ChangePin[];
  readonly onPins: (pins: readonly ChangePin[]) => void;
  readonly picking: boolean;
  readonly onPickSpot: () => void;
}

/** What a client answers: yes, or what should change. */
export function ClientAnswer(props: Props) {
  const { version, agreement, pins, onPins, picking, onPickSpot } = props;
  const steps = useSteps(version.id);
  const [accepting, setAccepting] = useState(false);
  const [asking, setAsking] = useState(false);
  const { data } = agreement;
  const [mayAccept, mayAsk] = [data?.steps.accept.may ?? false, data?.steps.askChange.may ?? false];

  useEffect(() => {
    if (window.location.hash === '#accept' && mayAccept) setAccepting(true);
    if (window.location.hash === '#ask' && mayAsk) setAsking(true);
  }, [mayAccept, mayAsk]);

  const other = data && currentPlanNote(data);
  return (
    <section aria-label="Your answer" className="border-y border-graphite py-3">
      <p className="flex items-center gap-3">
        <Peg look={statePeg(version.state)} />
        <strong data-testid="state">{STATE_WORDS[version.state]}</strong>
      </p>
      <p className="mt-1">
        {version.state === 'shared' && data?.steps.accept.why
          ? data.steps.accept.why
          : CLIENT_STATES[version.state]}
      </p>
      {data?.acceptance && (
        <p className="mt-1">
          Accepted by {data.acceptance.typedName}, <Moment iso={data.acceptance.at} />.{' '}
          <a className="link" href={`/versions/${version.id}/acceptance`}>
            Record of acceptance
          </a>
        </p>
      )}
      {other && data.issued && (
        <p className="mt-1">
          <a className="link" href={`/versions/${data.issued.id}`}>
            {other}
          </a>
        </p>
      )}
      <Wrong error={agreement.error} again={() => void agreement.refetch()} />
      {agreement.isPending && <p className="mt-2 text-slate">Reading how it stands …</p>}
      {(mayAccept || mayAsk) && (
        <div className="mt-3 grid grid-cols-2 gap-2 max-lg:sticky max-lg:bottom-0 max-lg:bg-stone-50 max-lg:py-2">
          <button
            type="button"
            className="button"
            disabled={!mayAsk}
            aria-expanded={asking}
            onClick={() => setAsking(!asking)}
          >
            Ask for a change
          </button>
          <button
            type="button"
            className="button button-primary"
            disabled={!mayAccept}
            onClick={() => setAccepting(true)}
          >
            Accept version {version.number}
          </button>
        </div>
      )}
      {asking && mayAsk && (
        <AskChangeForm
          pins={pins}
          onPins={onPins}
          picking={picking}
          onPickSpot={onPickSpot}
          askChange={steps.askChange}
          onLeave={() => {
            setAsking(false);
            onPins([]);
          }}
        />
      )}
      {data && (
        <AcceptForm
          open={accepting}
          onClose={() => setAccepting(false)}
          version={version}
          agreement={data}
          accept={steps.accept}
        />
      )}
    </section>
  );
}
