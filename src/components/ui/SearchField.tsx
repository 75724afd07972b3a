import { useId } from 'react';

/** Words to look for; what they find is for the caller to show. */
export function SearchField({
  label,
  value,
  onValue,
  className = '',
}: {
  label: string;
  value: string;
  onValue: (text: string) => void;
  className?: string;
}) {
  const id = useId();
  return (
    <div className={className}>
      <label htmlFor={id} className="field-label">
        {label}
      </label>
      <input
        id={id}
        type="search"
        className="field"
        maxLength={120}
        value={value}
        onChange={(event) => onValue(event.target.value)}
      />
    </div>
  );
}
