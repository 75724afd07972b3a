import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useId, useState } from 'react';
import type { NewSupplier, Supplier, SupplierChange } from '@/api-types/suppliers';
import { api, type ApiError } from '../ui/api';
import { Queries } from '../ui/Queries';
import { Wrong } from '../ui/Wrong';

export default function SupplierList({ first }: { first: readonly Supplier[] }) {
  return (
    <Queries>
      <List first={first} />
    </Queries>
  );
}

function List({ first }: { first: readonly Supplier[] }) {
  const queries = useQueryClient();
  const [editing, setEditing] = useState<string | null>(null);
  const [said, setSaid] = useState('');
  const list = useQuery({
    queryKey: ['suppliers'],
    queryFn: () => api<{ suppliers: readonly Supplier[] }>('GET', '/api/suppliers'),
    initialData: { suppliers: first },
  });
  const { suppliers } = list.data;
  const left = (words?: string) => {
    setEditing(null);
    if (words) {
      setSaid(words);
      void queries.invalidateQueries({ queryKey: ['suppliers'] });
    }
  };
  return (
    <>
      <div className="mt-4">
        <button type="button" className="button button-primary" onClick={() => setEditing('new')}>
          Add a supplier
        </button>
      </div>
      <p role="status" className={said ? 'mt-4 font-semibold' : 'sr-only'}>
        {said}
      </p>
      <Wrong error={list.error} again={() => void list.refetch()} className="mt-4" />
      {editing === 'new' && <SupplierForm supplier={null} onLeave={left} />}
      {suppliers.length === 0 && editing !== 'new' ? (
        <p className="mt-8 max-w-xl text-lg text-slate">
          No suppliers yet. They have no account here: what you order of them goes to their e-mail
          address, as a PDF and a CSV file.
        </p>
      ) : (
        <ul className="mt-4 hairlines border-y border-stone-300">
          {suppliers.map((supplier) =>
            editing === supplier.id ? (
              <li key={supplier.id} className="py-2">
                <SupplierForm supplier={supplier} onLeave={left} />
              </li>
            ) : (
              <li
                key={supplier.id}
                className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1 py-3"
              >
                <div className="min-w-0">
                  <button
                    type="button"
                    className="min-h-8 text-left font-semibold hover:text-line pointer-coarse:min-h-11"
                    aria-label={`Change ${supplier.name}`}
                    onClick={() => {
                      setSaid('');
                      setEditing(supplier.id);
                    }}
                  >
                    {supplier.name}
                  </button>
                  {supplier.retiredAt && <span className="text-slate"> · retired</span>}
                  <p className="text-sm wrap-anywhere text-slate">
                    {[supplier.email || 'no e-mail address yet', supplier.phone]
                      .filter(Boolean)
                      .join(' · ')}
                  </p>
                  {supplier.address && (
                    <p className="text-sm text-slate">
                      {supplier.address.split('\n').filter(Boolean).join(', ')}
                    </p>
                  )}
                </div>
                <p className="text-sm text-slate">
                  {supplier.items} {supplier.items === 1 ? 'item' : 'items'}
                </p>
              </li>
            ),
          )}
        </ul>
      )}
    </>
  );
}

type Fields = Pick<Supplier, 'name' | 'email' | 'phone' | 'address' | 'note'>;
const EMPTY: Fields = { name: '', email: '', phone: '', address: '', note: '' };
const NAMES = [
  ['name', 'Name'],
  ['email', 'E-mail for orders'],
  ['phone', 'Telephone'],
] as const;

function SupplierForm({
  supplier,
  onLeave,
}: {
  supplier: Supplier | null;
  onLeave: (said?: string) => void;
}) {
  const id = useId();
  const [fields, setFields] = useState<Fields>(supplier ?? EMPTY);
  const [revision, setRevision] = useState(supplier?.revision ?? 0);
  const save = useMutation<Supplier, ApiError, Partial<SupplierChange>>({
    networkMode: 'always',
    mutationFn: (more) => {
      const { name, email, phone, address, note } = fields;
      const sent = { name, email, phone, address, note };
      return supplier
        ? api('PATCH', `/api/suppliers/${supplier.id}`, { ...sent, ...more, revision })
        : api('POST', '/api/suppliers', sent satisfies NewSupplier);
    },
    onSuccess: ({ name }) => onLeave(`${name} is saved.`),
  });
  const problems = Object.fromEntries(
    (save.error?.problem?.errors ?? []).map(({ path, message }) => [String(path[0]), message]),
  );
  const current =
    save.error?.status === 409 ? (save.error.problem?.current as Supplier | undefined) : undefined;
  const put = (name: keyof Fields, value: string) =>
    setFields((now) => ({ ...now, [name]: value }));
  return (
    <form
      noValidate
      aria-label={supplier ? `Change ${supplier.name}` : 'New supplier'}
      className="mt-3 max-w-3xl border-l-2 border-line py-1 pl-3"
      onSubmit={(event) => {
        event.preventDefault();
        if (!save.isPending) save.mutate({});
      }}
      onKeyDown={(event) => event.key === 'Escape' && onLeave()}
    >
      <div className="grid gap-3 sm:grid-cols-3">
        {NAMES.map(([name, label], n) => (
          <div key={name}>
            <label htmlFor={`${id}-${name}`} className="field-label">
              {label}
            </label>
            <input
              id={`${id}-${name}`}
              className="field"
              type={name === 'email' ? 'email' : 'text'}
              autoComplete="off"
              autoFocus={n === 0}
              value={fields[name]}
              aria-invalid={name in problems}
              onChange={(event) => put(name, event.target.value)}
            />
            {problems[name] && <p className="mt-1 text-sm text-brick">{problems[name]}</p>}
          </div>
        ))}
        {(['address', 'note'] as const).map((name) => (
          <div key={name} className={name === 'note' ? 'sm:col-span-2' : ''}>
            <label htmlFor={`${id}-${name}`} className="field-label">
              {name === 'address' ? 'Address' : 'Note'}
            </label>
            <textarea
              id={`${id}-${name}`}
              className="field"
              rows={3}
              value={fields[name]}
              onChange={(event) => put(name, event.target.value)}
            />
            {problems[name] && <p className="mt-1 text-sm text-brick">{problems[name]}</p>}
          </div>
        ))}
      </div>
      {save.error && Object.keys(problems).length === 0 && (
        <div role="alert" className="mt-3 text-brick">
          <p>{save.error.message}</p>
          {current && (
            <p className="mt-1 text-graphite">
              It is now: {[current.name, current.email, current.phone].filter(Boolean).join(', ')}.{' '}
              <button
                type="button"
                className="link"
                onClick={() => {
                  setRevision(current.revision);
                  save.reset();
                }}
              >
                Go on with mine
              </button>{' '}
              or{' '}
              <button type="button" className="link" onClick={() => onLeave('It stays as it is.')}>
                keep it as it is
              </button>
              .
            </p>
          )}
        </div>
      )}
      <div className="mt-3 flex flex-wrap items-center gap-2">
        <button className="button button-primary" disabled={save.isPending}>
          {save.isPending ? 'Saving …' : 'Save'}
        </button>
        <button type="button" className="button button-quiet" onClick={() => onLeave()}>
          Leave it
        </button>
        {supplier && (
          <button
            type="button"
            className="button button-quiet"
            disabled={save.isPending}
            onClick={() => save.mutate({ retired: supplier.retiredAt === null })}
          >
            {supplier.retiredAt ? 'Buy from them again' : 'No longer buy from them'}
          </button>
        )}
      </div>
    </form>
  );
}
