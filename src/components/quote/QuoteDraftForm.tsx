import { useMutation } from '@tanstack/react-query';
import { Plus, X } from 'lucide-react';
import { useId, useState } from 'react';
import type {
  QuoteDetail,
  QuoteDraft,
  QuoteDraftLine,
  QuoteGroup,
  QuoteReader,
  QuoteSent,
} from '@/api-types/quotes';
import { dayText } from '@/takeoff/day-text';
import { formatMoney } from '@/takeoff/money';
import { api, type ApiError } from '../ui/api';
import { SelectField } from '../ui/SelectField';
import { ReadersNote } from './ReadersNote';
import { SaveNote } from './SaveNote';
import { AmountField, MoneyField, ShareField } from './typed-figures';
import { useSavedDraft } from './use-saved-draft';

const GROUP_WORDS: Readonly<Record<QuoteGroup, string>> = {
  materials: 'Materials',
  labour: 'Work',
  other: 'Other',
};

interface Props {
  readonly quote: QuoteDetail;
  /** Whether the project's clients see the version yet. */
  readonly shared: boolean;
  /** The clients on the project. */
  readonly clients: readonly QuoteReader[];
  readonly projectId: string;
  readonly onSent: (said: string) => void;
  readonly onDropped: () => void;
}

/** A quote while it is being made: each line, margin, tax and words; saved as it is changed. */
export function QuoteDraftForm({
  quote: first,
  shared,
  clients,
  projectId,
  onSent,
  onDropped,
}: Props) {
  const draft = useSavedDraft<QuoteDetail, QuoteDraft>(first, `/api/quotes/${first.id}`);
  const { saved } = draft;
  const now: QuoteDraft = { ...saved.draft, ...draft.pending };
  const { quote } = saved;
  const { currency } = quote;
  const money = (minor: number) => formatMoney(minor, currency);
  const lines = (next: readonly QuoteDraftLine[]) => draft.change({ lines: [...next] });
  const line = (id: string, part: Partial<QuoteDraftLine>) =>
    lines(now.lines.map((own) => (own.id === id ? { ...own, ...part } : own)));
  const send = useMutation<QuoteSent, ApiError>({
    networkMode: 'always',
    mutationFn: () => api('POST', `/api/quotes/${saved.id}/send`, { revision: saved.revision }),
    onSuccess: ({ number, written }) =>
      onSent(
        written > 0
          ? `Quote ${number} is sent. Its clients see the total, and have it by e-mail as a PDF.`
          : `Quote ${number} is numbered and kept, but no letter went out: no client on this project gets letters. Put the client on the project, or hand the PDF over yourself.`,
      ),
  });
  const drop = useMutation<unknown, ApiError>({
    networkMode: 'always',
    mutationFn: () => api('DELETE', `/api/quotes/${saved.id}`),
    onSuccess: onDropped,
  });
  const unpriced = now.lines.filter(({ costMinor, amount }) => costMinor === null && amount > 0);
  const why = !shared
    ? 'Share the version with the client first: they see its quote beside it.'
    : unpriced.length > 0
      ? `Say what it costs first: ${unpriced.map(({ name }) => name).join(', ')}.`
      : null;

  return (
    <section aria-label="Draft of a quote" className="mt-4">
      {(['materials', 'labour', 'other'] as const).map((group) => (
        <Group
          key={group}
          group={group}
          lines={now.lines.filter((own) => own.group === group)}
          costs={new Map(quote.lines.map(({ id, lineCostMinor }) => [id, lineCostMinor]))}
          currency={currency}
          onLine={line}
          onRemove={(id) => lines(now.lines.filter((own) => own.id !== id))}
          onAdd={(added) => lines([...now.lines, added])}
        />
      ))}

      <div className="mt-8 grid gap-x-10 gap-y-6 md:grid-cols-2">
        <div className="space-y-3">
          <div className="grid grid-cols-2 gap-3">
            <ShareField
              label={now.margin.of === 'cost' ? 'Margin on cost' : 'Margin of the price'}
              share={now.margin.share}
              onShare={(share) => draft.change({ margin: { ...now.margin, share } })}
            />
            <SelectField
              label="Share of"
              value={now.margin.of}
              options={[
                ['cost', 'the cost'],
                ['price', 'the price'],
              ]}
              onValue={(of) => draft.change({ margin: { ...now.margin, of } })}
            />
            <ShareField
              label={now.tax.name}
              share={now.tax.share}
              onShare={(share) => draft.change({ tax: { ...now.tax, share } })}
            />
            <SelectField
              label="Worked out"
              value={now.tax.on}
              options={[
                ['sum', 'on the sum'],
                ['lines', 'on each line'],
              ]}
              onValue={(on) => draft.change({ tax: { ...now.tax, on } })}
            />
            <AmountField
              label="Holds for, days"
              amount={now.validDays}
              whole
              refuse={(days) => (days < 1 || days > 365 ? 'From 1 to 365 days.' : null)}
              onAmount={(validDays) => draft.change({ validDays })}
            />
            <SelectField
              label="Total rounded to"
              value={String(now.roundTo)}
              options={[1, 5, 10, 100, 1000].map((step) => [String(step), money(step)] as const)}
              onValue={(step) => draft.change({ roundTo: Number(step) })}
            />
          </div>
          <Words
            label="To the client"
            value={now.note}
            limit={2000}
            onValue={(note) => draft.change({ note })}
          />
          <Words
            label="Terms"
            value={now.terms}
            limit={4000}
            onValue={(terms) => draft.change({ terms })}
          />
        </div>
        <div>
          <dl className="hairlines border-y border-graphite" data-testid="quote-sums">
            {(
              [
                ['Cost', money(quote.costMinor)],
                ['Margin', money(quote.marginMinor)],
                ['Without tax', money(quote.netMinor)],
                [now.tax.name, money(quote.taxMinor)],
                ...(quote.roundingMinor === 0
                  ? []
                  : [['Rounding', money(quote.roundingMinor)] as const]),
              ] as const
            ).map(([name, value]) => (
              <div key={name} className="flex justify-between gap-4 py-1.5">
                <dt>{name}</dt>
                <dd className="font-semibold">{value}</dd>
              </div>
            ))}
            <div className="flex justify-between gap-4 py-2 text-lg font-bold">
              <dt>Total</dt>
              <dd>{money(quote.totalMinor)}</dd>
            </div>
          </dl>
          <p className="mt-2 text-sm text-slate">
            Holds until {dayText(quote.validUntil)} if it is sent today. The client reads what is in
            it, what each part comes to and the total: neither cost nor margin.
          </p>
          <details className="mt-1 text-sm text-slate">
            <summary className="cursor-pointer py-1 pointer-coarse:py-3">
              How it is reckoned
            </summary>
            <ul className="list-disc pl-5">
              {quote.words.map((words) => (
                <li key={words}>{words}</li>
              ))}
            </ul>
          </details>
          <div className="mt-3">
            <SaveNote draft={draft} />
          </div>
          <div className="mt-4 flex flex-wrap gap-2">
            <button
              type="button"
              className="button button-primary"
              disabled={why !== null || draft.saving || send.isPending || draft.error !== null}
              onClick={() => send.mutate()}
            >
              {send.isPending ? 'Sending …' : 'Send to the client'}
            </button>
            <a className="button" href={`/api/quotes/${saved.id}/pdf`} target="_blank">
              See it as a PDF
            </a>
            <button
              type="button"
              className="button button-quiet"
              disabled={drop.isPending}
              onClick={() => drop.mutate()}
            >
              Throw this draft away
            </button>
          </div>
          {why && <p className="mt-2 text-sm text-slate">{why}</p>}
          <ReadersNote clients={clients} projectId={projectId} />
          {(send.error ?? drop.error) && (
            <p role="alert" className="mt-2 text-brick">
              {(send.error ?? drop.error)!.message}
            </p>
          )}
        </div>
      </div>
    </section>
  );
}

function Group({
  group,
  lines,
  costs,
  currency,
  onLine,
  onRemove,
  onAdd,
}: {
  group: QuoteGroup;
  lines: readonly QuoteDraftLine[];
  costs: ReadonlyMap<string, number>;
  currency: string;
  onLine: (id: string, part: Partial<QuoteDraftLine>) => void;
  onRemove: (id: string) => void;
  onAdd: (line: QuoteDraftLine) => void;
}) {
  const add = () =>
    onAdd({
      id: `own:${crypto.randomUUID()}`,
      group,
      name: group === 'labour' ? 'Labour' : 'Something else',
      amount: 1,
      measure: group === 'labour' ? 'hours' : 'each',
      costMinor: null,
    });
  return (
    <section aria-label={GROUP_WORDS[group]} className="mt-6">
      <div className="flex items-end justify-between border-b border-graphite pb-1">
        <h3>{GROUP_WORDS[group]}</h3>
        <button type="button" className="button button-quiet" onClick={add}>
          <Plus size={16} aria-hidden /> Add a line
        </button>
      </div>
      {lines.length === 0 && <p className="mt-2 text-slate">None.</p>}
      <ul className="hairlines">
        {lines.map((line, n) => (
          <li
            key={line.id}
            className="grid grid-cols-[1fr_1fr_auto] items-end gap-x-3 gap-y-2 py-2 md:grid-cols-[minmax(12rem,1fr)_7rem_9rem_8rem_7rem_auto]"
          >
            <div className="col-span-3 md:col-span-1">
              <Words
                label="What"
                hideLabel={n > 0}
                short
                value={line.name}
                limit={160}
                onValue={(name) => name && onLine(line.id, { name })}
              />
            </div>
            <AmountField
              label="Amount"
              hideLabel={n > 0}
              amount={line.amount}
              onAmount={(amount) => onLine(line.id, { amount })}
            />
            <div className="max-md:col-span-2">
              <Words
                label="Measure"
                hideLabel={n > 0}
                short
                value={line.measure}
                limit={60}
                onValue={(measure) => onLine(line.id, { measure })}
              />
            </div>
            <MoneyField
              label="One costs"
              hideLabel={n > 0}
              minor={line.costMinor}
              currency={currency}
              onMinor={(costMinor) => onLine(line.id, { costMinor })}
            />
            <p className="pb-2 text-right font-semibold whitespace-nowrap">
              {line.costMinor === null ? (
                <span className={line.amount > 0 ? 'text-amber' : 'text-slate'}>no cost yet</span>
              ) : (
                formatMoney(costs.get(line.id) ?? 0, currency)
              )}
            </p>
            <button
              type="button"
              className="button button-quiet"
              aria-label={`Take out ${line.name}`}
              onClick={() => onRemove(line.id)}
            >
              <X size={16} aria-hidden />
            </button>
          </li>
        ))}
      </ul>
    </section>
  );
}

/** Words that are taken when their field is left; Enter leaves a short one, Escape puts back what was there. */
export function Words({
  label,
  value,
  limit,
  onValue,
  short = false,
  hideLabel = false,
}: {
  label: string;
  value: string;
  limit: number;
  onValue: (value: string) => void;
  short?: boolean;
  hideLabel?: boolean;
}) {
  const id = useId();
  const [typed, setTyped] = useState<string | null>(null);
  const finish = () => {
    if (typed !== null && typed.trim() !== value) onValue(typed.trim());
    setTyped(null);
  };
  const shared = {
    id,
    className: 'field',
    maxLength: limit,
    value: typed ?? value,
    onBlur: finish,
  };
  return (
    <div>
      <label htmlFor={id} className={hideLabel ? 'sr-only' : 'field-label'}>
        {label}
      </label>
      {short ? (
        <input
          {...shared}
          autoComplete="off"
          onChange={(event) => setTyped(event.target.value)}
          onKeyDown={(event) => {
            if (event.key === 'Enter') event.currentTarget.blur();
            if (event.key === 'Escape') setTyped(null);
          }}
        />
      ) : (
        <textarea
          {...shared}
          rows={2}
          onChange={(event) => setTyped(event.target.value)}
          onKeyDown={(event) => event.key === 'Escape' && setTyped(null)}
        />
      )}
    </div>
  );
}
