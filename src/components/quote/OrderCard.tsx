import { useMutation } from '@tanstack/react-query';
import { TriangleAlert } from 'lucide-react';
import { useId, useState } from 'react';
import type {
  OrderChange,
  OrderElsewhere,
  PurchaseLine,
  PurchaseOrder,
} from '@/api-types/purchase-orders';
import { amountText } from '@/takeoff/amount-text';
import { boughtAs } from '@/takeoff/bought-as';
import { dayText } from '@/takeoff/day-text';
import { formatMoney } from '@/takeoff/money';
import { api, type ApiError } from '../ui/api';
import { Moment } from '../ui/Moment';
import { Peg } from '../ui/Peg';
import { Words } from './QuoteDraftForm';
import { SaveNote } from './SaveNote';
import { AmountField } from './typed-figures';
import { useSavedDraft } from './use-saved-draft';

const LETTER_WORDS = {
  waiting: 'its letter is on its way',
  sent: 'its letter is sent',
  refused: 'their mail server refused the letter: is the address right?',
} as const;

/** An order of one supplier: changed and sent while it is a draft, afterwards as it went. */
export function OrderCard({
  order,
  elsewhere,
  onChanged,
  onElsewhere,
}: {
  order: PurchaseOrder;
  /** What was sent for other versions of the project. */
  elsewhere: readonly OrderElsewhere[];
  /** With what to say. */
  onChanged: (said: string) => void;
  /** When another order went for the project meanwhile. */
  onElsewhere: () => void;
}) {
  return order.state === 'sent' ? (
    <SentOrderCard order={order} />
  ) : (
    <DraftOrderCard
      order={order}
      elsewhere={elsewhere}
      onChanged={onChanged}
      onElsewhere={onElsewhere}
    />
  );
}

/** What went for other versions of the project: number, to whom, when and for what. */
export function ElsewhereList({ orders }: { orders: readonly OrderElsewhere[] }) {
  return (
    <ul className="mt-1 list-disc pl-5">
      {orders.map((order) => (
        <li key={order.id}>
          <strong>{order.number}</strong> to {order.supplier}, {order.email}, sent by {order.sentBy}{' '}
          <Moment iso={order.sentAt} />, for{' '}
          <a className="link" href={`/versions/${order.versionId}/quote`}>
            version {order.versionNumber} of {order.layoutName}
          </a>
        </li>
      ))}
    </ul>
  );
}

function Files({ order }: { order: PurchaseOrder }) {
  const name = order.number ?? 'draft';
  return (
    <>
      <a className="button" href={`/api/orders/${order.id}/pdf`} target="_blank">
        PDF
      </a>
      <a className="button" href={`/api/orders/${order.id}/csv`} download={`order-${name}.csv`}>
        CSV
      </a>
    </>
  );
}

function SentOrderCard({ order }: { order: PurchaseOrder }) {
  return (
    <li className="py-4">
      <div className="flex flex-wrap items-center justify-between gap-x-6 gap-y-2">
        <p className="flex items-center gap-3">
          <Peg look="holds" />
          <span>
            <strong>{order.number}</strong> to {order.supplier.name}
          </span>
        </p>
        <p className="font-semibold">{formatMoney(order.costMinor, order.currency)}</p>
      </div>
      <p className={`mt-1 text-sm ${order.letter === 'refused' ? 'text-brick' : 'text-slate'}`}>
        Sent by {order.sentBy?.name}, {order.sentAt && <Moment iso={order.sentAt} />}, to{' '}
        {order.supplier.email}: {order.letter && LETTER_WORDS[order.letter]}.
      </p>
      <p className="mt-1 text-sm text-slate">
        {order.lines.map((line) => `${amountText(line.amount)} × ${line.name}`).join(', ')}
        {order.deliveryDay ? `, wanted on ${dayText(order.deliveryDay)}` : ''}
      </p>
      <div className="mt-2 flex flex-wrap gap-2">
        <Files order={order} />
      </div>
    </li>
  );
}

function DraftOrderCard({
  order: first,
  elsewhere,
  onChanged,
  onElsewhere,
}: Parameters<typeof OrderCard>[0]) {
  const id = useId();
  const draft = useSavedDraft<PurchaseOrder, Omit<OrderChange, 'revision'>>(
    first,
    `/api/orders/${first.id}`,
  );
  const { saved } = draft;
  const now = { ...saved, ...draft.pending };
  const [asking, setAsking] = useState(false);
  const send = useMutation<PurchaseOrder, ApiError>({
    networkMode: 'always',
    mutationFn: () =>
      api('POST', `/api/orders/${saved.id}/send`, {
        revision: saved.revision,
        besides: elsewhere.map((other) => other.id),
      }),
    onError: ({ problem }) => {
      if (problem?.elsewhere) onElsewhere();
    },
    onSuccess: ({ number, supplier }) =>
      onChanged(`Order ${number} is on its way to ${supplier.name}, ${supplier.email}.`),
  });
  const drop = useMutation<unknown, ApiError>({
    networkMode: 'always',
    mutationFn: () => api('DELETE', `/api/orders/${saved.id}`),
    onSuccess: () => onChanged(`The draft for ${saved.supplier.name} is thrown away.`),
  });
  const line = (own: PurchaseLine, amount: number) =>
    draft.change({
      lines: now.lines.map((other) => (other.id === own.id ? { ...other, amount } : other)),
    });
  const noAddress = saved.supplier.email === '';
  return (
    <li className="py-4">
      <div className="flex flex-wrap items-center justify-between gap-x-6 gap-y-2">
        <p className="flex items-center gap-3">
          <Peg look="empty" />
          <span>
            <strong>{saved.supplier.name}</strong>
            <span className="text-slate"> · {saved.supplier.email || 'no e-mail address yet'}</span>
          </span>
        </p>
        <p className="font-semibold">{formatMoney(saved.costMinor, saved.currency)}</p>
      </div>
      <ul className="mt-2 hairlines border-y border-stone-300">
        {now.lines.map((own) => (
          <li
            key={own.id}
            className="grid grid-cols-[1fr_7rem] items-center gap-x-4 py-2 sm:grid-cols-[1fr_7rem_10rem_7rem]"
          >
            <p className="min-w-0 wrap-anywhere">
              {own.name}
              {own.code && <span className="block text-sm text-slate">their code {own.code}</span>}
            </p>
            <AmountField
              label={`Packs of ${own.name}`}
              hideLabel
              amount={own.amount}
              whole={own.pack.whole}
              onAmount={(amount) => line(own, amount)}
            />
            <p className="text-slate max-sm:col-span-2">{boughtAs(own.pack)}</p>
            <p className="text-right text-slate max-sm:hidden">
              {own.costMinor === null ? 'no price' : formatMoney(own.costMinor, saved.currency)}
            </p>
          </li>
        ))}
      </ul>
      <div className="mt-3 grid gap-3 sm:grid-cols-3">
        <div>
          <label htmlFor={id} className="field-label">
            Wanted on
          </label>
          <input
            id={id}
            type="date"
            className="field"
            value={now.deliveryDay ?? ''}
            onChange={(event) => draft.change({ deliveryDay: event.target.value || null })}
          />
        </div>
        <Words
          label="To be delivered to"
          value={now.deliveryPlace}
          limit={500}
          onValue={(deliveryPlace) => draft.change({ deliveryPlace })}
        />
        <Words
          label="A word to the supplier"
          value={now.note}
          limit={2000}
          onValue={(note) => draft.change({ note })}
        />
      </div>
      <div className="mt-3">
        <SaveNote draft={draft} />
      </div>
      <div className="mt-2 flex flex-wrap gap-2">
        <button
          type="button"
          className="button button-primary"
          aria-expanded={asking}
          disabled={noAddress || draft.saving || draft.error !== null}
          onClick={() => setAsking(!asking)}
        >
          Send the order
        </button>
        <Files order={saved} />
        <button
          type="button"
          className="button button-quiet"
          disabled={drop.isPending}
          onClick={() => drop.mutate()}
        >
          Throw this draft away
        </button>
      </div>
      {noAddress && (
        <p className="mt-2 text-sm text-slate">
          {saved.supplier.name} has no e-mail address.{' '}
          <a className="link" href="/catalogue/suppliers">
            Give it one
          </a>
          , or hand the PDF over yourself.
        </p>
      )}
      {asking && (
        <div className="mt-3 border-l-2 border-line pl-3">
          {elsewhere.length > 0 && (
            <div role="alert" className="mb-3 bg-amber-wash p-3">
              <p className="flex items-center gap-1.5 font-bold text-amber">
                <TriangleAlert size={16} aria-hidden /> Already ordered for this project
              </p>
              <ElsewhereList orders={elsewhere} />
              <p className="mt-1">
                Sending this one orders on top of that. To change what went, ask the supplier.
              </p>
            </div>
          )}
          <p>
            {saved.supplier.name} gets this order at {saved.supplier.email}, as a PDF and a CSV
            file. It is numbered and can then not be changed or sent again.
          </p>
          <div className="mt-2 flex gap-2">
            <button
              type="button"
              className="button button-primary"
              disabled={send.isPending}
              onClick={() => send.mutate()}
            >
              {send.isPending
                ? 'Sending …'
                : elsewhere.length > 0
                  ? 'Send it all the same'
                  : 'Send it'}
            </button>
            <button type="button" className="button button-quiet" onClick={() => setAsking(false)}>
              Not now
            </button>
          </div>
        </div>
      )}
      {(send.error ?? drop.error) && (
        <p role="alert" className="mt-2 text-brick">
          {(send.error ?? drop.error)!.message}
        </p>
      )}
    </li>
  );
}
