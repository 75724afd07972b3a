import { useId, useState } from 'react';
import type { Point } from '@/geometry/point';
import { Wrong } from '../ui/Wrong';
import type { useSteps } from './agreement';

export interface ChangePin {
  readonly at: Point;
  readonly body: string;
}

interface Props {
  readonly pins: readonly ChangePin[];
  readonly onPins: (pins: readonly ChangePin[]) => void;
  readonly onPickSpot: () => void;
  readonly picking: boolean;
  readonly onLeave: () => void;
  readonly askChange: ReturnType<typeof useSteps>['askChange'];
}

/** A client asks for a change: in words, with pins where it is meant. */
export function AskChangeForm(props: Props) {
  const { pins, onPins, onPickSpot, picking, onLeave, askChange } = props;
  const [note, setNote] = useState('');
  const [asked, setAsked] = useState(false);
  const id = useId();
  const noNote = asked && note.trim() === '';
  const send = () => {
    setAsked(true);
    if (note.trim() === '' || pins.some((pin) => pin.body.trim() === '')) return;
    askChange.mutate(
      {
        note: note.trim(),
        pins: pins.map(({ at, body }) => ({ at: [at[0], at[1]], body: body.trim() })),
      },
      {
        onSuccess: () => {
          onPins([]);
          onLeave();
        },
      },
    );
  };
  return (
    <form
      id="ask"
      noValidate
      className="mt-3 scroll-mt-4 border-l-2 border-line pl-3"
      onSubmit={(event) => {
        event.preventDefault();
        send();
      }}
    >
      <h3>Ask for a change</h3>
      <label htmlFor={id} className="field-label mt-2">
        What should be different?
      </label>
      <textarea
        id={id}
        className="field"
        rows={3}
        maxLength={4000}
        value={note}
        aria-invalid={noNote}
        aria-describedby={`${id}-wrong`}
        onChange={(event) => setNote(event.target.value)}
      />
      <p id={`${id}-wrong`} className="text-sm text-brick">
        {noNote && 'Say what should change.'}
      </p>
      {pins.map((pin, n) => (
        <div key={n} className="mt-2">
          <label htmlFor={`${id}-${n}`} className="field-label">
            At pin {n + 1}
          </label>
          <div className="flex gap-1">
            <input
              id={`${id}-${n}`}
              className="field"
              maxLength={4000}
              autoFocus
              value={pin.body}
              aria-invalid={asked && pin.body.trim() === ''}
              placeholder="What should change here?"
              onChange={(event) =>
                onPins(
                  pins.map((each, m) => (m === n ? { ...each, body: event.target.value } : each)),
                )
              }
            />
            <button
              type="button"
              className="button button-quiet shrink-0"
              onClick={() => onPins(pins.filter((_, m) => m !== n))}
            >
              Take out
            </button>
          </div>
          {asked && pin.body.trim() === '' && (
            <p className="text-sm text-brick">Say what should change here, or take the pin out.</p>
          )}
        </div>
      ))}
      <button
        type="button"
        className="button mt-3 w-full"
        aria-pressed={picking}
        disabled={pins.length >= 50}
        onClick={onPickSpot}
      >
        {pins.length === 0 ? 'Mark a spot on the floor' : 'Mark another spot'}
      </button>
      <Wrong error={askChange.error} className="mt-2" />
      <div className="mt-3 flex flex-wrap gap-2">
        <button className="button button-primary" disabled={askChange.isPending}>
          {askChange.isPending ? 'Sending …' : 'Ask for this change'}
        </button>
        <button type="button" className="button button-quiet" onClick={onLeave}>
          Leave it
        </button>
      </div>
    </form>
  );
}
