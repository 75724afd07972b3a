import { useMutation } from '@tanstack/react-query';
import { useState } from 'react';
import type { CatalogueItem, ItemChange } from '@/api-types/catalogue';
import type { Supplier } from '@/api-types/suppliers';
import type { Display } from '@/paving/length';
import { api, type ApiError } from '../ui/api';
import { BothSides } from './BothSides';
import { ItemForm, type ItemSent } from './ItemForm';

/** One item being changed: saved with its revision, and both sides shown when somebody else was quicker. */
export function ItemEditing({
  item: opened,
  suppliers,
  display,
  currency,
  onLeave,
}: {
  item: CatalogueItem | undefined;
  suppliers: readonly Supplier[];
  display: Display;
  currency: string;
  /** With what to say, when something was done. */
  onLeave: (said?: string) => void;
}) {
  // As it was when it was opened: a list read again meanwhile changes neither the form nor the revision.
  const [item] = useState(opened);
  const [sent, setSent] = useState<ItemSent | null>(null);
  const save = useMutation<CatalogueItem, ApiError, ItemChange>({
    networkMode: 'always',
    mutationFn: (body) => api('PATCH', `/api/catalogue/${item!.id}`, body),
    onSuccess: ({ name, retiredAt }) =>
      onLeave(retiredAt ? `${name} is retired.` : `${name} is saved.`),
  });
  const remove = useMutation<unknown, ApiError>({
    networkMode: 'always',
    mutationFn: () => api('DELETE', `/api/catalogue/${item!.id}`),
    onSuccess: () => onLeave(`${item!.name} is taken out.`),
  });
  if (!item) return null;
  const send = (from: number, what: ItemSent) =>
    save.mutate({
      ...what.fields,
      ...(what.price ? { price: what.price } : {}),
      revision: from,
    });
  const current =
    save.error?.status === 409
      ? (save.error.problem?.current as CatalogueItem | null | undefined)
      : null;
  return (
    <ItemForm
      item={item}
      suppliers={suppliers}
      display={display}
      currency={currency}
      busy={save.isPending || remove.isPending}
      error={save.error}
      onSend={(what) => {
        if (Object.keys(what.fields).length === 0 && !what.price) return onLeave();
        setSent(what);
        send(item.revision, what);
      }}
      onLeave={() => onLeave()}
    >
      {current && sent && (
        <BothSides
          current={current}
          sent={sent}
          suppliers={suppliers}
          display={display}
          currency={currency}
          onKeep={() => send(current.revision, sent)}
          onTake={() => onLeave('It stays as it is.')}
        />
      )}
      {remove.error && (
        <p role="alert" className="mt-3 text-brick">
          {remove.error.message}
        </p>
      )}
      <p className="mt-3 flex flex-wrap gap-x-5 text-sm text-slate">
        <button
          type="button"
          className="link min-h-8 pointer-coarse:min-h-11"
          disabled={save.isPending}
          onClick={() => save.mutate({ revision: item.revision, retired: item.retiredAt === null })}
        >
          {item.retiredAt
            ? 'Offer it again'
            : 'Retire it: no longer offered, kept where it is used'}
        </button>
        <button
          type="button"
          className="link min-h-8 pointer-coarse:min-h-11"
          disabled={remove.isPending}
          onClick={() => remove.mutate()}
        >
          Take it out, if nothing was made with it
        </button>
      </p>
    </ItemForm>
  );
}
