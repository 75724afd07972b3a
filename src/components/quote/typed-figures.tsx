import { amountText } from '@/takeoff/amount-text';
import { formatMoney, parseMoney } from '@/takeoff/money';
import { TypedField, type FieldProps } from '../ui/TypedField';

/** A field for money in a currency, minor units; empty while nobody has said. */
export function MoneyField({
  minor,
  currency,
  onMinor,
  ...field
}: FieldProps & {
  readonly minor: number | null;
  readonly currency: string;
  readonly onMinor: (minor: number) => void;
}) {
  return (
    <TypedField
      {...field}
      shown={minor === null ? '' : formatMoney(minor, currency)}
      inputMode="decimal"
      read={(text) => {
        const parsed = parseMoney(text, currency);
        if (!parsed.ok) return parsed;
        return parsed.minor < 0
          ? { ok: false, message: 'An amount cannot be less than 0.' }
          : { ok: true, value: parsed.minor };
      }}
      onValue={onMinor}
    />
  );
}

const plain = (text: string) =>
  text.replace(/[\s\u00a0\u2009\u202f]/g, '').replace(/^(\d*),(\d+)$/, '$1.$2');

/** A field for so many of something; `whole` where parts are not sold. */
export function AmountField({
  amount,
  whole = false,
  onAmount,
  ...field
}: FieldProps & {
  readonly amount: number;
  readonly whole?: boolean;
  readonly onAmount: (amount: number) => void;
}) {
  return (
    <TypedField
      {...field}
      shown={amountText(amount)}
      inputMode="decimal"
      read={(text) => {
        const value = Number(plain(text));
        if (!Number.isFinite(value) || value < 0) {
          return { ok: false, message: 'Type a number such as 2.5.' };
        }
        return whole && !Number.isInteger(value)
          ? { ok: false, message: 'These are sold whole only.' }
          : { ok: true, value };
      }}
      onValue={onAmount}
    />
  );
}

/** A field for a share, in hundredths of a per cent. */
export function ShareField({
  share,
  onShare,
  ...field
}: FieldProps & { readonly share: number; readonly onShare: (share: number) => void }) {
  return (
    <TypedField
      {...field}
      shown={`${share / 100}\u202f%`}
      inputMode="decimal"
      read={(text) => {
        const match = /^(\d{1,4})(?:\.(\d{1,2}))?%?$/.exec(plain(text));
        return match
          ? { ok: true, value: Number(match[1]) * 100 + Number((match[2] ?? '').padEnd(2, '0')) }
          : { ok: false, message: 'Type a share such as 20 or 17.5.' };
      }}
      onValue={onShare}
    />
  );
}
