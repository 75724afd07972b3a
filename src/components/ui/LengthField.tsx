import { useId, useState, type Ref } from 'react';
import { formatLength, parseLength, type Display } from '@/paving/length';

interface Props {
  readonly label: string;
  readonly mm: number | null;
  readonly display: Display;
  /** Called with the length typed once it is finished (Enter, or leaving the field). */
  readonly onLength: (mm: number) => void;
  /** Says what is wrong with a length that can be read but not used. */
  readonly refuse?: (mm: number) => string | null;
  readonly decimals?: number;
  readonly hideLabel?: boolean;
  readonly disabled?: boolean;
  readonly inputRef?: Ref<HTMLInputElement>;
}

/** A field for a length typed the way the trade types it, echoed back in the display system. */
export function LengthField(props: Props) {
  const {
    label,
    mm,
    display,
    onLength,
    refuse,
    decimals = 1,
    hideLabel,
    disabled,
    inputRef,
  } = props;
  const id = useId();
  const [typed, setTyped] = useState<string | null>(null);
  const [wrong, setWrong] = useState<string | null>(null);
  const shown = mm === null ? '' : formatLength(mm, display, { decimals });

  const finish = () => {
    if (typed === null) return;
    if (typed.trim() === '' || typed === shown) {
      setTyped(null);
      setWrong(null);
      return;
    }
    const parsed = parseLength(typed, display);
    const message = parsed.ok ? (refuse?.(parsed.mm) ?? null) : parsed.message;
    setWrong(message);
    if (message || !parsed.ok) return;
    setTyped(null);
    onLength(parsed.mm);
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
        inputMode={display === 'metric' ? 'decimal' : 'text'}
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
