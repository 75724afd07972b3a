interface Props<T extends string> {
  readonly label: string;
  readonly value: T;
  readonly options: readonly (readonly [value: T, label: string])[];
  readonly onChange: (value: T) => void;
  readonly hideLabel?: boolean;
}

/** One of a few, side by side: radio buttons drawn as a row. */
export function Segmented<T extends string>({
  label,
  value,
  options,
  onChange,
  hideLabel,
}: Props<T>) {
  return (
    <fieldset>
      <legend className={hideLabel ? 'sr-only' : 'field-label'}>{label}</legend>
      <div className="flex">
        {options.map(([option, text]) => (
          <label
            key={option}
            className="relative -ml-px flex min-h-[2.4rem] flex-1 cursor-pointer items-center justify-center border border-slate px-2 text-center first:ml-0 has-checked:z-10 has-checked:border-line has-checked:font-semibold has-checked:text-line has-focus-visible:outline-2 has-focus-visible:outline-offset-2 has-focus-visible:outline-line pointer-coarse:min-h-11"
          >
            <input
              type="radio"
              className="sr-only"
              checked={option === value}
              onChange={() => onChange(option)}
            />
            {text}
          </label>
        ))}
      </div>
    </fieldset>
  );
}
