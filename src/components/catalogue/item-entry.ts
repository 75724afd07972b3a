import type { CatalogueItem, CataloguePrice, ItemFields } from '@/api-types/catalogue';
import { formatLength, parseLength, type Display } from '@/paving/length';
import { parseMoney } from '@/takeoff/money';
import { moneyFigures } from '@/takeoff/money-figures';
import { todayHere } from './catalogue-words';

/** An item as it is being typed: every field as text. */
export type Entry = Readonly<Record<keyof ItemFields | 'cost' | 'from', string>>;

type LengthName = 'length' | 'width' | 'thickness' | 'tolerance' | 'stoneLeast' | 'stoneGreatest';
const LENGTHS: readonly LengthName[] = [
  'length',
  'width',
  'thickness',
  'tolerance',
  'stoneLeast',
  'stoneGreatest',
];
const NUMBERS = ['packHolds', 'massKg', 'looseDensity'] as const;

const lengthShown = (mm: number | null, display: Display) =>
  mm === null ? '' : formatLength(mm, display, { decimals: 3, unit: false });

const numberShown = (value: number | null) => (value === null ? '' : String(value));

export const entryOf = (item: CatalogueItem | null, display: Display, currency: string): Entry => ({
  kind: item?.kind ?? 'unit',
  name: item?.name ?? '',
  code: item?.code ?? '',
  supplierId: item?.supplierId ?? '',
  packName: item?.packName ?? 'each',
  packHolds: numberShown(item?.packHolds ?? 1),
  packMeasure: item?.packMeasure ?? 'each',
  packWhole: (item?.packWhole ?? true) ? 'yes' : 'no',
  length: lengthShown(item?.length ?? null, display),
  width: lengthShown(item?.width ?? null, display),
  thickness: lengthShown(item?.thickness ?? null, display),
  tolerance: lengthShown(item?.tolerance ?? null, display),
  massKg: numberShown(item?.massKg ?? null),
  colour: item?.colour ?? '',
  looseDensity: numberShown(item?.looseDensity ?? null),
  stoneLeast: lengthShown(item?.stoneLeast ?? null, display),
  stoneGreatest: lengthShown(item?.stoneGreatest ?? null, display),
  note: item?.note ?? '',
  cost: item?.price ? moneyFigures(item.price.costMinor, currency) : '',
  from: todayHere(),
});

export type EntryProblems = Readonly<Partial<Record<keyof Entry, string>>>;

export type EntryRead =
  | {
      readonly ok: true;
      readonly fields: Partial<ItemFields>;
      readonly price: CataloguePrice | null;
    }
  | { readonly ok: false; readonly problems: EntryProblems };

/**
 * What was typed, as far as it differs from what was there: what is left alone is not sent, so that a length shown rounded is
 * not stored rounded. A price is added when it, or its day, was typed.
 */
export function entryRead(
  entry: Entry,
  before: Entry | null,
  display: Display,
  currency: string,
): EntryRead {
  const fields: Record<string, unknown> = {};
  const problems: Partial<Record<keyof Entry, string>> = {};
  const touched = (name: keyof Entry) => before === null || entry[name] !== before[name];
  for (const name of ['kind', 'name', 'code', 'packName', 'packMeasure', 'note'] as const) {
    if (touched(name)) fields[name] = entry[name];
  }
  if (touched('supplierId')) fields.supplierId = entry.supplierId || null;
  if (touched('colour')) fields.colour = entry.colour || null;
  if (touched('packWhole')) fields.packWhole = entry.packWhole === 'yes';
  for (const name of LENGTHS) {
    if (!touched(name)) continue;
    const text = entry[name].trim();
    const parsed = text === '' ? null : parseLength(text, display);
    if (parsed && !parsed.ok) problems[name] = parsed.message;
    else fields[name] = parsed ? parsed.mm : null;
  }
  for (const name of NUMBERS) {
    if (!touched(name)) continue;
    const text = entry[name].trim().replace(/[\s\u202f]/g, '').replace(/^(\d*),(\d+)$/, '$1.$2'); // prettier-ignore
    const value = text === '' ? null : Number(text);
    if (value !== null && !Number.isFinite(value)) problems[name] = 'Type a number such as 12.5.';
    else fields[name] = value;
  }
  let price: CataloguePrice | null = null;
  const priced =
    entry.cost.trim() !== '' && (touched('cost') || (before !== null && touched('from')));
  if (priced) {
    const parsed = parseMoney(entry.cost, currency);
    if (parsed.ok) price = { costMinor: parsed.minor, from: entry.from };
    else problems.cost = parsed.message;
  }
  return Object.keys(problems).length > 0
    ? { ok: false, problems }
    : { ok: true, fields: fields as Partial<ItemFields>, price };
}
