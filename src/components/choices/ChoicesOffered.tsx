import { useState } from 'react';
import type { ClientChoices } from '@/api-types/choices';
import { Moment } from '../ui/Moment';
import { Wrong } from '../ui/Wrong';
import { ChoicePicker } from './ChoicePicker';
import { pickableOf, pickedSentence } from './choice-words';
import { useChoices, usePicking } from './use-choices';

/** Where the firm says which shared versions its client chooses from, and in which order. */
export function ChoicesOffered({ projectId }: { projectId: string }) {
  const choices = useChoices(projectId);
  const { data } = choices;
  if (choices.error && !data)
    return <Wrong error={choices.error} again={() => void choices.refetch()} className="mb-8" />;
  if (!data || data.versions.length + data.others.length === 0) return null;
  return (
    <Offered key={JSON.stringify([data.picked, ids(data)])} choices={data} {...{ projectId }} />
  );
}

const ids = ({ versions }: ClientChoices): readonly string[] => versions.map(({ id }) => id);

function Offered({ choices, projectId }: { choices: ClientChoices; projectId: string }) {
  const { versions, others, picked: pick } = choices;
  const [picked, setPicked] = useState(ids(choices));
  const [note, setNote] = useState(pick?.note ?? '');
  const actions = usePicking(projectId);
  const busy = actions.pick.isPending || actions.all.isPending;
  const same = picked.join() === ids(choices).join() && note.trim() === (pick?.note ?? '');
  return (
    <section aria-label="What the client chooses from" className="border-t-2 border-graphite pt-4">
      <h2>What the client chooses from</h2>
      <p className="mt-1 text-slate" role="status">
        {pick ? (
          <>
            {pickedSentence(versions.length)} Picked by {pick.by.name}, <Moment iso={pick.at} />.
          </>
        ) : (
          'Every shared version is a choice, the oldest first. Untick one to take it back, or put them in another order.'
        )}
      </p>
      <div className="mt-3 max-w-2xl">
        <ChoicePicker
          versions={[...versions, ...others].map(pickableOf)}
          picked={picked}
          onPick={setPicked}
        />
        <label className="mt-3 block">
          <span className="field-label">A word over the choices (optional)</span>
          <textarea
            className="field"
            rows={2}
            maxLength={4000}
            value={note}
            onChange={(event) => setNote(event.target.value)}
          />
        </label>
        {picked.length === 0 && (
          <p className="mt-2 text-brick" role="alert">
            Tick at least one: with none the client has nothing to accept.
          </p>
        )}
        <div className="mt-3 flex flex-wrap gap-2">
          <button
            type="button"
            className="button button-primary"
            disabled={busy || same || picked.length === 0}
            onClick={() => actions.pick.mutate({ versionIds: [...picked], note })}
          >
            {actions.pick.isPending ? 'Sending …' : 'Put these before the client'}
          </button>
          {pick && (
            <button
              type="button"
              className="button"
              disabled={busy}
              onClick={() => actions.all.mutate()}
            >
              Every shared one again
            </button>
          )}
        </div>
        <Wrong error={actions.pick.error ?? actions.all.error} className="mt-2" />
        <p className="mt-2 text-sm text-slate">
          A version that is taken back can still be looked at and commented on, but not accepted.
        </p>
      </div>
    </section>
  );
}
