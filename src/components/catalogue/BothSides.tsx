import { useEffect, useRef } from 'react';
import type { CatalogueItem, ItemFields } from '@/api-types/catalogue';
import type { Supplier } from '@/api-types/suppliers';
import { formatLength, type Display } from '@/paving/length';
import { dayText } from '@/takeoff/day-text';
import { formatMoney } from '@/takeoff/money';
import { FIELD_WORDS } from './catalogue-words';
import type { ItemSent } from './ItemForm';

const LENGTHS: ReadonlySet<keyof ItemFields> = new Set([
  'length',
  'width',
  'thickness',
  'tolerance',
  'stoneLeast',
  'stoneGreatest',
]);

/** A change that was refused because somebody else changed the item first: theirs and one's own, to choose from. */
export function BothSides({
  current,
  sent,
  suppliers,
  display,
  currency,
  onKeep,
  onTake,
}: {
  current: CatalogueItem;
  sent: ItemSent;
  suppliers: readonly Supplier[];
  display: Display;
  currency: string;
  onKeep: () => void;
  onTake: () => void;
}) {
  const box = useRef<HTMLDivElement>(null);
  useEffect(() => box.current?.scrollIntoView({ block: 'nearest' }), []);
  const shown = (name: keyof ItemFields, value: unknown): string => {
    if (value === null || value === '') return 'nothing';
    if (name === 'supplierId') return suppliers.find(({ id }) => id === value)?.name ?? 'another';
    if (typeof value === 'boolean') return value ? 'yes' : 'no';
    if (typeof value === 'number' && LENGTHS.has(name)) {
      return formatLength(value, display, { decimals: 3 });
    }
    return String(value);
  };
  const rows = (Object.keys(sent.fields) as (keyof ItemFields)[])
    .filter((name) => sent.fields[name] !== current[name])
    .map((name) => [FIELD_WORDS[name], shown(name, current[name]), shown(name, sent.fields[name])]);
  if (sent.price) {
    const { price } = current;
    rows.push([
      'Price',
      price ? `${formatMoney(price.costMinor, currency)} from ${dayText(price.from)}` : 'nothing',
      `${formatMoney(sent.price.costMinor, currency)} from ${dayText(sent.price.from)}`,
    ]);
  }
  return (
    <div ref={box} role="alert" className="mt-3 bg-amber-wash p-3">
      <p>
        <strong>Somebody changed this item after you opened it.</strong> Yours was not stored over
        theirs.
      </p>
      <table className="mt-2 w-full max-w-2xl">
        <thead>
          <tr className="border-b border-graphite text-left text-sm text-slate">
            <th scope="col" className="py-1 font-normal">
              <span className="sr-only">Field</span>
            </th>
            <th scope="col" className="py-1 font-normal">
              As it is now
            </th>
            <th scope="col" className="py-1 font-normal">
              Yours
            </th>
          </tr>
        </thead>
        <tbody className="hairlines">
          {rows.map(([name, theirs, own]) => (
            <tr key={name}>
              <th scope="row" className="py-1 pr-3 text-left font-normal">
                {name}
              </th>
              <td className="py-1 pr-3">{theirs}</td>
              <td className="py-1 font-semibold">{own}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <div className="mt-3 flex flex-wrap gap-2">
        <button type="button" className="button" onClick={onKeep}>
          Store mine all the same
        </button>
        <button type="button" className="button" onClick={onTake}>
          Keep it as it is now
        </button>
      </div>
    </div>
  );
}
