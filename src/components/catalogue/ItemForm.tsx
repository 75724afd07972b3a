import { useId, useRef, useState, type InputHTMLAttributes, type ReactNode } from 'react';
import type { CatalogueItem, CataloguePrice, ItemFields } from '@/api-types/catalogue';
import type { Supplier } from '@/api-types/suppliers';
import type { Display } from '@/paving/length';
import type { ApiError } from '../ui/api';
import { Segmented } from '../ui/Segmented';
import { SelectField } from '../ui/SelectField';
import { KIND_WORDS, MEASURE_WORDS } from './catalogue-words';
import { entryOf, entryRead, type Entry, type EntryProblems } from './item-entry';

export interface ItemSent {
  readonly fields: Partial<ItemFields>;
  readonly price: CataloguePrice | null;
}

interface Props {
  /** Null for a new one. */
  readonly item: CatalogueItem | null;
  readonly suppliers: readonly Supplier[];
  readonly display: Display;
  readonly currency: string;
  readonly busy: boolean;
  readonly error: ApiError | null;
  readonly onSend: (sent: ItemSent) => void;
  readonly onLeave: () => void;
  readonly children?: ReactNode;
}

/** Fields by the server's own names, for what it says is wrong with them. */
const fromServer = (error: ApiError | null): EntryProblems =>
  Object.fromEntries(
    (error?.problem?.errors ?? []).map(({ path, message }) => [
      path[0] === 'price' ? (path[1] === 'from' ? 'from' : 'cost') : String(path[0]),
      message,
    ]),
  );

/** An item of the catalogue, field by field. Enter saves, Escape leaves; what was typed stays while it is wrong. */
export function ItemForm({
  item,
  suppliers,
  display,
  currency,
  busy,
  error,
  onSend,
  onLeave,
  children,
}: Props) {
  const [before] = useState(() => entryOf(item, display, currency));
  const [entry, setEntry] = useState(before);
  const [own, setOwn] = useState<EntryProblems>({});
  const form = useRef<HTMLFormElement>(null);
  const problems = { ...fromServer(error), ...own };
  const put = (name: keyof Entry) => (value: string) => {
    setEntry((now) => ({ ...now, [name]: value }));
    setOwn(({ [name]: _, ...rest }) => rest);
  };
  const send = () => {
    const read = entryRead(entry, item ? before : null, display, currency);
    if (!read.ok) {
      setOwn(read.problems);
      requestAnimationFrame(() =>
        form.current?.querySelector<HTMLElement>('[aria-invalid=true]')?.focus(),
      );
      return;
    }
    setOwn({});
    onSend(read);
  };
  const field = (name: keyof Entry, label: string, more: FieldMore = {}) => (
    <Field
      label={label}
      value={entry[name]}
      problem={problems[name]}
      onValue={put(name)}
      {...more}
    />
  );
  const number = { inputMode: 'decimal', className: 'text-right' } as const;
  const length = { inputMode: 'text', className: 'text-right' } as const;
  const offered = suppliers.filter(({ retiredAt, id }) => !retiredAt || id === item?.supplierId);

  return (
    <form
      ref={form}
      noValidate
      aria-label={item ? `Change ${item.name}` : 'New item'}
      className="border-l-2 border-line py-2 pl-3"
      onSubmit={(event) => {
        event.preventDefault();
        if (!busy) send();
      }}
      onKeyDown={(event) => {
        if (event.key !== 'Escape') return;
        event.stopPropagation();
        onLeave();
      }}
    >
      <div className="grid grid-cols-2 gap-3 sm:grid-cols-4 lg:grid-cols-6">
        <div className="col-span-2">
          <Segmented
            label="Kind"
            value={entry.kind as ItemFields['kind']}
            options={(['unit', 'aggregate', 'sundry'] as const).map((kind) => [
              kind,
              KIND_WORDS[kind],
            ])}
            onChange={put('kind')}
          />
        </div>
        <div className="col-span-2">{field('name', 'Name', { maxLength: 80, first: true })}</div>
        <SelectField
          label="Supplier"
          value={entry.supplierId}
          problem={problems.supplierId}
          onValue={put('supplierId')}
          options={[['', 'Not said yet'], ...offered.map(({ id, name }) => [id, name] as const)]}
        />
        {field('code', 'Their code', { maxLength: 60 })}

        {entry.kind === 'unit' && (
          <>
            {field('length', 'Length', length)}
            {field('width', 'Width', length)}
            {field('thickness', 'Thickness', length)}
            {field('tolerance', 'Tolerance, ±', length)}
            {field('massKg', 'Mass of one, kg', number)}
            <Field
              label="Colour"
              type="color"
              value={entry.colour || '#d8d2c4'}
              problem={problems.colour}
              onValue={put('colour')}
            />
          </>
        )}
        {entry.kind === 'aggregate' && (
          <>
            {field('stoneLeast', 'Smallest stone', length)}
            {field('stoneGreatest', 'Largest stone', length)}
            {field('looseDensity', 'Loose, kg/m³', number)}
            <Field
              label="Colour"
              type="color"
              value={entry.colour || '#d9c8a2'}
              problem={problems.colour}
              onValue={put('colour')}
            />
          </>
        )}

        {field('packName', 'Bought as', { maxLength: 60, placeholder: 'pallet' })}
        {field('packHolds', 'which holds', number)}
        <SelectField
          label="Measure"
          value={entry.packMeasure}
          problem={problems.packMeasure}
          onValue={put('packMeasure')}
          options={MEASURE_WORDS}
        />
        {field('cost', `Price of one, ${currency}`, number)}
        {field('from', 'Price holds from', { type: 'date' })}
        <label className="flex min-h-[2.4rem] items-end gap-2 pb-2">
          <input
            type="checkbox"
            className="size-5 accent-line"
            checked={entry.packWhole === 'yes'}
            onChange={(event) => put('packWhole')(event.target.checked ? 'yes' : 'no')}
          />
          Whole ones only
        </label>
        <div className="col-span-2 sm:col-span-4 lg:col-span-6">
          {field('note', 'Note', { maxLength: 1000 })}
        </div>
      </div>
      {error && Object.keys(fromServer(error)).length === 0 && error.status !== 409 && (
        <p role="alert" className="mt-3 text-brick">
          {error.message} What you typed is still here.
        </p>
      )}
      {children}
      <div className="mt-3 flex flex-wrap items-center gap-2">
        <button className="button button-primary" disabled={busy}>
          {busy ? 'Saving …' : item ? 'Save' : 'Add it'}
        </button>
        <button type="button" className="button button-quiet" onClick={onLeave}>
          Leave it
        </button>
        <p className="text-sm text-slate max-sm:hidden">Enter saves, Escape leaves.</p>
      </div>
    </form>
  );
}

type FieldMore = Pick<
  InputHTMLAttributes<HTMLInputElement>,
  'inputMode' | 'className' | 'maxLength' | 'placeholder' | 'type'
> & { readonly first?: boolean };

function Field({
  label,
  value,
  problem,
  onValue,
  className = '',
  first = false,
  ...rest
}: {
  label: string;
  value: string;
  problem: string | undefined;
  onValue: (value: string) => void;
} & FieldMore) {
  const id = useId();
  return (
    <div className="min-w-0">
      <label htmlFor={id} className="field-label truncate">
        {label}
      </label>
      <input
        id={id}
        className={`field ${className}`}
        autoComplete="off"
        autoFocus={first}
        value={value}
        aria-invalid={problem !== undefined}
        aria-describedby={problem ? `${id}-wrong` : undefined}
        onChange={(event) => onValue(event.target.value)}
        {...rest}
      />
      {problem && (
        <p id={`${id}-wrong`} className="mt-1 text-sm text-brick">
          {problem}
        </p>
      )}
    </div>
  );
}
