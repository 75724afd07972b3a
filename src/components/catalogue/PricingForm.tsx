import { useMutation } from '@tanstack/react-query';
import { useId, useState, type ReactNode } from 'react';
import type { FirmPricing, FirmPricingChange } from '@/api-types/pricing';
import { parseMoney } from '@/takeoff/money';
import { moneyFigures } from '@/takeoff/money-figures';
import { api, type ApiError } from '../ui/api';
import { FieldNote } from '../ui/FieldNote';
import { Queries } from '../ui/Queries';
import { SelectField } from '../ui/SelectField';

interface Props {
  readonly first: FirmPricing;
  readonly mayChange: boolean;
  /** ISO 4217, of those that this machine knows. */
  readonly currencies: readonly string[];
}

export default function PricingForm(props: Props) {
  return (
    <Queries>
      <Form {...props} />
    </Queries>
  );
}

type Entry = Readonly<Record<keyof Omit<FirmPricing, 'revision' | 'currencyOpen'>, string>>;

const entryOf = (firm: FirmPricing): Entry => ({
  currency: firm.currency,
  taxName: firm.taxName,
  taxBasisPoints: String(firm.taxBasisPoints / 100),
  taxOn: firm.taxOn,
  marginOf: firm.marginOf,
  marginBasisPoints: String(firm.marginBasisPoints / 100),
  labourHourMinor: moneyFigures(firm.labourHourMinor, firm.currency),
  labourAreaMinor: moneyFigures(firm.labourAreaMinor, firm.currency),
  validDays: String(firm.validDays),
  quoteTerms: firm.quoteTerms,
  orderTerms: firm.orderTerms,
  quotePrefix: firm.quotePrefix,
  orderPrefix: firm.orderPrefix,
  address: firm.address,
  phone: firm.phone,
  email: firm.email,
  registration: firm.registration,
  paper: firm.paper,
});

/** A share typed in per cent as whole hundredths of one; null for what is no such number. */
const basisPointsRead = (text: string): number | null => {
  const match = /^\s*(\d{1,4})(?:[.,](\d{1,2}))?\s*%?\s*$/.exec(text);
  return match ? Number(match[1]) * 100 + Number((match[2] ?? '').padEnd(2, '0')) : null;
};

type Read =
  | { readonly ok: true; readonly change: Omit<FirmPricingChange, 'revision'> }
  | { readonly ok: false; readonly problems: Partial<Record<string, string>> };

const entryRead = (entry: Entry): Read => {
  const problems: Record<string, string> = {};
  const share = (name: 'taxBasisPoints' | 'marginBasisPoints') => {
    const read = basisPointsRead(entry[name]);
    if (read === null) problems[name] = 'Type a share such as 20 or 17.5.';
    return read ?? 0;
  };
  const money = (name: 'labourHourMinor' | 'labourAreaMinor') => {
    const read = parseMoney(entry[name] || '0', entry.currency);
    if (!read.ok) problems[name] = read.message;
    return read.ok ? read.minor : 0;
  };
  const change = {
    ...entry,
    taxBasisPoints: share('taxBasisPoints'),
    marginBasisPoints: share('marginBasisPoints'),
    labourHourMinor: money('labourHourMinor'),
    labourAreaMinor: money('labourAreaMinor'),
    validDays: Number(entry.validDays || NaN),
    taxOn: entry.taxOn as FirmPricing['taxOn'],
    marginOf: entry.marginOf as FirmPricing['marginOf'],
    paper: entry.paper as FirmPricing['paper'],
  };
  if (!Number.isInteger(change.validDays)) problems.validDays = 'Type a number of days.';
  return Object.keys(problems).length > 0 ? { ok: false, problems } : { ok: true, change };
};

function Form({ first, mayChange, currencies }: Props) {
  const [firm, setFirm] = useState(first);
  const [entry, setEntry] = useState(() => entryOf(first));
  const [own, setOwn] = useState<Partial<Record<string, string>>>({});
  const save = useMutation<FirmPricing, ApiError, FirmPricingChange>({
    networkMode: 'always',
    mutationFn: (change) => api('PATCH', '/api/firm/pricing', change),
    onSuccess: (saved) => {
      setFirm(saved);
      setEntry(entryOf(saved));
    },
  });
  const problems: Partial<Record<string, string>> = {
    ...Object.fromEntries(
      (save.error?.problem?.errors ?? []).map(({ path, message }) => [String(path[0]), message]),
    ),
    ...own,
  };
  const current =
    save.error?.status === 409
      ? (save.error.problem?.current as FirmPricing | undefined)
      : undefined;
  const put = (name: keyof Entry) => (value: string) => {
    setEntry((now) => ({ ...now, [name]: value }));
    setOwn({});
    if (save.isSuccess) save.reset();
  };
  const shared = (name: keyof Entry) => ({
    value: entry[name],
    problem: problems[name],
    disabled: !mayChange,
    onValue: put(name),
  });
  return (
    <form
      noValidate
      aria-label="Prices and papers"
      className="mt-4 max-w-4xl space-y-8"
      onSubmit={(event) => {
        event.preventDefault();
        const read = entryRead(entry);
        if (!read.ok) return setOwn(read.problems);
        save.mutate({ ...read.change, revision: firm.revision });
      }}
    >
      {!mayChange && (
        <p className="bg-stone-100 p-3">
          These are the owner’s to change. New quotes and orders begin with them.
        </p>
      )}
      <Group title="Money">
        <SelectField
          label="Currency of all prices"
          options={currencies.map((code) => [code, code] as const)}
          {...shared('currency')}
          disabled={!mayChange || !firm.currencyOpen}
          hint={
            firm.currencyOpen
              ? 'It stays once there are prices.'
              : `The catalogue holds prices in ${firm.currency}, so it stays.`
          }
        />
        <Line label="Tax is called" {...shared('taxName')} />
        <Line
          label="Tax, per cent"
          right
          {...shared('taxBasisPoints')}
          hint="Your tax office says which rate is yours."
        />
        <SelectField
          label="Tax is worked out"
          options={[
            ['sum', 'once, on the sum'],
            ['lines', 'on each line'],
          ]}
          {...shared('taxOn')}
        />
        <Line label="Margin, per cent" right {...shared('marginBasisPoints')} />
        <SelectField
          label="Margin is a share"
          options={[
            ['cost', 'of the cost: 25 % on 100 is 125'],
            ['price', 'of the price: 25 % of 133.33 leaves 100'],
          ]}
          {...shared('marginOf')}
        />
        <Line
          label="An hour of work costs you"
          right
          {...shared('labourHourMinor')}
          hint="0 leaves it out of new quotes."
        />
        <Line label="A square metre laid costs you" right {...shared('labourAreaMinor')} />
      </Group>
      <Group title="Quotes and orders">
        <Line label="A quote holds for, days" right {...shared('validDays')} />
        <Line label="Quote numbers begin with" {...shared('quotePrefix')} />
        <Line label="Order numbers begin with" {...shared('orderPrefix')} />
        <SelectField
          label="Paper"
          options={[
            ['A4', 'A4'],
            ['Letter', 'Letter'],
          ]}
          {...shared('paper')}
        />
        <Text label="Terms of a quote" {...shared('quoteTerms')} />
        <Text label="Terms of an order" {...shared('orderTerms')} />
      </Group>
      <Group title="The firm on its papers">
        <Text label="Address" {...shared('address')} />
        <Line label="Telephone" {...shared('phone')} />
        <Line label="E-mail" {...shared('email')} hint="Answers to quotes and orders go there." />
        <Line
          label="Tax or company number"
          {...shared('registration')}
          hint="At the foot of each page."
        />
      </Group>
      {save.error && !save.error.problem?.errors && (
        <p role="alert" className="text-brick">
          {save.error.message}{' '}
          {current && (
            <>
              <button
                type="button"
                className="link"
                onClick={() => {
                  setFirm(current);
                  save.reset();
                }}
              >
                Go on with mine
              </button>{' '}
              or{' '}
              <button
                type="button"
                className="link"
                onClick={() => {
                  setFirm(current);
                  setEntry(entryOf(current));
                  save.reset();
                }}
              >
                see theirs
              </button>
              .
            </>
          )}
        </p>
      )}
      {mayChange && (
        <div className="flex items-center gap-4">
          <button className="button button-primary" disabled={save.isPending}>
            {save.isPending ? 'Saving …' : 'Save'}
          </button>
          <p role="status" className="font-semibold">
            {save.isSuccess && 'Saved. What was quoted and ordered before stays as it was.'}
          </p>
        </div>
      )}
    </form>
  );
}

function Group({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section>
      <h2 className="border-b border-graphite pb-1">{title}</h2>
      <div className="mt-3 grid gap-x-6 gap-y-4 sm:grid-cols-2 lg:grid-cols-3">{children}</div>
    </section>
  );
}

interface FieldProps {
  readonly label: string;
  readonly value: string;
  readonly problem: string | undefined;
  readonly disabled: boolean;
  readonly onValue: (value: string) => void;
  readonly hint?: string;
}

function Line({
  label,
  value,
  problem,
  disabled,
  onValue,
  hint,
  right = false,
}: FieldProps & { readonly right?: boolean }) {
  const id = useId();
  return (
    <div>
      <label htmlFor={id} className="field-label">
        {label}
      </label>
      <input
        id={id}
        className={`field ${right ? 'text-right' : ''}`}
        inputMode={right ? 'decimal' : undefined}
        autoComplete="off"
        value={value}
        disabled={disabled}
        aria-invalid={problem !== undefined}
        aria-describedby={`${id}-note`}
        onChange={(event) => onValue(event.target.value)}
      />
      <FieldNote id={`${id}-note`} problem={problem} hint={hint} />
    </div>
  );
}

function Text({ label, value, problem, disabled, onValue, hint }: FieldProps) {
  const id = useId();
  return (
    <div className="sm:col-span-2 lg:col-span-3">
      <label htmlFor={id} className="field-label">
        {label}
      </label>
      <textarea
        id={id}
        className="field"
        rows={3}
        value={value}
        disabled={disabled}
        aria-invalid={problem !== undefined}
        aria-describedby={`${id}-note`}
        onChange={(event) => onValue(event.target.value)}
      />
      <FieldNote id={`${id}-note`} problem={problem} hint={hint} />
    </div>
  );
}
