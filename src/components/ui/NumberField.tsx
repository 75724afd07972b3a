import { TypedField, type FieldProps } from './TypedField';

interface Props extends FieldProps {
  readonly value: number;
  readonly suffix?: string;
  readonly onNumber: (value: number) => void;
}

/** A field for a plain number: an angle, a share. */
export function NumberField({ value, suffix = '', onNumber, ...field }: Props) {
  return (
    <TypedField
      {...field}
      shown={`${Number(value.toFixed(3))}${suffix}`}
      inputMode="decimal"
      read={(text) => {
        const bare = text
          .replace(suffix.trim(), '')
          .replace(/[\s\u2009\u202f]/g, '')
          .replace(',', '.')
          .replace('−', '-');
        const number = bare === '' ? NaN : Number(bare);
        return Number.isFinite(number)
          ? { ok: true, value: number }
          : { ok: false, message: 'Type a number.' };
      }}
      onValue={onNumber}
    />
  );
}
