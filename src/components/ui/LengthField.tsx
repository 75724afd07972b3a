import { formatLength, parseLength, type Display } from '@/paving/length';
import { TypedField, type FieldProps } from './TypedField';

interface Props extends FieldProps {
  readonly mm: number | null;
  readonly display: Display;
  readonly onLength: (mm: number) => void;
  readonly decimals?: number;
}

/** A field for a length typed the way the trade types it, echoed back in the display system. */
export function LengthField({ mm, display, onLength, decimals = 1, ...field }: Props) {
  return (
    <TypedField
      {...field}
      shown={mm === null ? '' : formatLength(mm, display, { decimals })}
      inputMode={display === 'metric' ? 'decimal' : 'text'}
      read={(text) => {
        const parsed = parseLength(text, display);
        return parsed.ok ? { ok: true, value: parsed.mm } : parsed;
      }}
      onValue={onLength}
    />
  );
}
