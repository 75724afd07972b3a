import { useId, useState } from 'react';

interface Props {
  readonly label: string;
  readonly value: number;
  readonly suffix?: string;
  readonly onNumber: (value: number) => void;
  readonly refuse?: (value: number) => string | null;
  readonly hideLabel?: boolean;
}

/** A field for a plain number (an angle, a share), taken once it is finished. */
export function NumberField({ label, value, suffix = '', onNumber, refuse, hideLabel }: Props) {
  const id = useId();
  const [typed, setTyped] = useState<string | null>(null);
  const [wrong, setWrong] = useState<string | null>(null);
  const shown = `${Number(value.toFixed(3))}${suffix}`;

  const finish = () => {
    if (typed === null) return;
    const text = typed.replace(suffix, '').replace(',', '.').replace('−', '-').trim();
    if (text === '' || typed === shown) {
      setTyped(null);
      setWrong(null);
      return;
    }
    const number = Number(text);
    const message = Number.isFinite(number) ? (refuse?.(number) ?? null) : 'Type a number.';
    setWrong(message);
    if (message) return;
    setTyped(null);
    onNumber(number);
  };

  return (
    <div>
      <label htmlFor={id} className={hideLabel ? 'sr-only' : 'field-label'}>
        {label}
      </label>
      <input
        id={id}
        className="field text-right"
        inputMode="decimal"
        autoComplete="off"
        value={typed ?? shown}
        aria-invalid={wrong !== null}
        aria-describedby={wrong ? `${id}-wrong` : undefined}
        onFocus={(event) => event.target.select()}
        onChange={(event) => setTyped(event.target.value)}
        onBlur={finish}
        onKeyDown={(event) => {
          if (event.key === 'Enter') finish();
          if (event.key === 'Escape') {
            setTyped(null);
            setWrong(null);
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
