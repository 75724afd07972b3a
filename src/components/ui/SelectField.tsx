import { useId } from 'react';
import { FieldNote } from './FieldNote';

/** One of several, taken as it is chosen. */
export function SelectField<T extends string>({
  label,
  value,
  options,
  onValue,
  problem,
  hint,
  disabled,
  className = 'min-w-0',
}: {
  label: string;
  value: T;
  options: readonly (readonly [value: T, label: string])[];
  onValue: (value: T) => void;
  problem?: string;
  hint?: string;
  disabled?: boolean;
  className?: string;
}) {
  const id = useId();
  return (
    <div className={className}>
      <label htmlFor={id} className="field-label">
        {label}
      </label>
      <select
        id={id}
        className="field"
        value={value}
        disabled={disabled}
        aria-invalid={problem !== undefined}
        aria-describedby={`${id}-note`}
        onChange={(event) => onValue(event.target.value as T)}
      >
        {options.map(([option, text]) => (
          <option key={option} value={option}>
            {text}
          </option>
        ))}
      </select>
      <FieldNote id={`${id}-note`} problem={problem} hint={hint} />
    </div>
  );
}
