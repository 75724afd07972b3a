import { useId, useState, type Ref } from 'react';

/** What a typed text means, or what is wrong with it. */
export type Typed =
  { readonly ok: true; readonly value: number } | { readonly ok: false; readonly message: string };

export interface FieldProps {
  readonly label: string;
  readonly hideLabel?: boolean;
  readonly disabled?: boolean;
  readonly inputRef?: Ref<HTMLInputElement>;
  /** Says what is wrong with a value that can be read but not used. */
  readonly refuse?: (value: number) => string | null;
}

interface Props extends FieldProps {
  readonly shown: string;
  readonly inputMode: 'decimal' | 'text';
  readonly read: (text: string) => Typed;
  readonly onValue: (value: number) => void;
}

/** A field whose value is taken once it is finished: Enter, or leaving it. Escape puts back what was there. */
export function TypedField({
  label,
  hideLabel,
  disabled,
  inputRef,
  refuse,
  shown,
  inputMode,
  read,
  onValue,
}: Props) {
  const id = useId();
  const [typed, setTyped] = useState<string | null>(null);
  const [wrong, setWrong] = useState<string | null>(null);
  const leave = () => {
    setTyped(null);
    setWrong(null);
  };
  const finish = () => {
    if (typed === null) return;
    if (typed.trim() === '' || typed === shown) return leave();
    const answer = read(typed);
    const message = answer.ok ? (refuse?.(answer.value) ?? null) : answer.message;
    setWrong(message);
    if (message || !answer.ok) return;
    setTyped(null);
    onValue(answer.value);
  };
  return (
    <div>
      <label htmlFor={id} className={hideLabel ? 'sr-only' : 'field-label'}>
        {label}
      </label>
      <input
        id={id}
        ref={inputRef}
        className="field text-right"
        inputMode={inputMode}
        autoComplete="off"
        value={typed ?? shown}
        disabled={disabled}
        aria-invalid={wrong !== null}
        aria-describedby={wrong ? `${id}-wrong` : undefined}
        onFocus={(event) => event.target.select()}
        onChange={(event) => setTyped(event.target.value)}
        onBlur={finish}
        onKeyDown={(event) => {
          if (event.key === 'Enter') finish();
          if (event.key === 'Escape') {
            leave();
            event.stopPropagation();
          }
        }}
      />
      {wrong && (
        <p id={`${id}-wrong`} className="mt-1 text-sm text-brick">
          {wrong}
        </p>
      )}
    </div>
  );
}
