import {
  packMeasures,
  priceKinds,
  type CataloguePrice,
  type ItemFields,
} from '@/api-types/catalogue';
import { parseLength } from '@/paving/length';
import { parseMoney } from '@/takeoff/money';
import { moneyFigures } from '@/takeoff/money-figures';
import { textCellRead, textCellWritten } from '@/takeoff/text-cell';

/** One row of a catalogue's file, as far as it can be read. */
export interface CatalogueRow extends ItemFields {
  /** The catalogue's own id of it; empty for what is new. */
  readonly reference: string;
  readonly supplier: string;
  readonly price: CataloguePrice | null;
  readonly retired: boolean;
}

export type Field = Exclude<keyof CatalogueRow, 'supplierId' | 'price'> | 'cost' | 'from';

type Cell =
  { readonly ok: true; readonly value: unknown } | { readonly ok: false; readonly message: string };

/** A column of the catalogue’s file: how its cells are read and written. */
export interface Column {
  /** As the file's first line calls it. */
  readonly heading: string;
  readonly field: Field;
  /** What a heading may be called besides, in lower case. */
  readonly also: readonly string[];
  /** For a cell that is not empty. */
  readonly read: (cell: string, currency: string) => Cell;
  /** What an empty cell means. */
  readonly empty: unknown;
  readonly write: (row: CatalogueRow, currency: string) => string;
}

const value = (read: unknown): Cell => ({ ok: true, value: read });
const wrong = (message: string): Cell => ({ ok: false, message });

/** A number with a point or a comma; where a comma might part thousands it is asked for, not guessed. */
const numberRead = (cell: string): Cell => {
  const plain = cell.replace(/[\s\u00a0\u2009\u202f]/g, '');
  if (/^\d{1,3}(,\d{3})+$/.test(plain)) {
    return wrong(
      `“${cell}” could be ${plain.replace(/,/g, '')} or ${plain.replace(',', '.')}. Write it without a comma.`,
    );
  }
  if (/^[-−]\d/.test(plain)) return wrong(`“${cell}” is less than 0. Write one such as 12.5.`);
  const number = Number(plain.replace(/^(\d*),(\d+)$/, '$1.$2'));
  return /^\d*[.,]?\d+([eE][-+]?\d+)?$|^\d+[.,]$/.test(plain) && Number.isFinite(number)
    ? value(number)
    : wrong(`“${cell}” is not a number. Write one such as 12.5.`);
};

const lengthRead = (cell: string): Cell => {
  const parsed = parseLength(cell, 'metric');
  return parsed.ok ? value(parsed.mm) : wrong(`“${cell}” is not a length. ${parsed.message}`);
};

const isoDay = (year: string, month: string, day: string) =>
  `${year}-${month.padStart(2, '0')}-${day.padStart(2, '0')}`;

/**
 * A day as it is exported, or as a spreadsheet writes it anew on saving: with points the day comes first
 * everywhere; with slashes that hangs on the country, so where both could be meant it is asked for.
 */
const dayRead = (cell: string): Cell => {
  const pointed = /^(\d{1,2})\.(\d{1,2})\.(\d{4})$/.exec(cell);
  if (pointed) return value(isoDay(pointed[3], pointed[2], pointed[1]));
  const slashed = /^(\d{1,2})\/(\d{1,2})\/(\d{4})$/.exec(cell);
  if (!slashed) return value(cell);
  const [first, second, year] = slashed.slice(1);
  if (Number(second) > 12) return value(isoDay(year, first, second));
  if (Number(first) > 12 || first === second) return value(isoDay(year, second, first));
  return wrong(
    `“${cell}” could be ${isoDay(year, second, first)} or ${isoDay(year, first, second)}. Write it like one of these.`,
  );
};

const YES = ['yes', 'y', 'true', '1', 'whole', 'x'];
const NO = ['no', 'n', 'false', '0'];

const yesRead = (cell: string): Cell => {
  const said = cell.toLowerCase();
  if (YES.includes(said)) return value(true);
  return NO.includes(said) ? value(false) : wrong(`“${cell}” must be yes or no.`);
};

const oneOf =
  (all: readonly string[]) =>
  (cell: string): Cell => {
    const said = cell.toLowerCase().replace('²', '2').replace('³', '3');
    return all.includes(said) ? value(said) : wrong(`“${cell}” must be one of ${all.join(', ')}.`);
  };

const text = (field: 'name' | 'code' | 'supplier' | 'packName' | 'note' | 'reference') => ({
  field,
  read: (cell: string) => value(cell),
  write: (row: CatalogueRow) => textCellWritten(row[field]),
});

type Numbers = { [K in keyof CatalogueRow]: CatalogueRow[K] extends number | null ? K : never }[keyof CatalogueRow]; // prettier-ignore

const number = (field: Numbers, read: (cell: string) => Cell = numberRead) => ({
  field,
  read,
  empty: null,
  write: (row: CatalogueRow) => (row[field] === null ? '' : String(row[field])),
});

/** Every column, in the order in which they are written. */
export const COLUMNS: readonly Column[] = [
  {
    heading: 'Kind',
    also: ['type'],
    field: 'kind',
    empty: undefined,
    read: oneOf(priceKinds),
    write: (row) => row.kind,
  },
  { heading: 'Name', also: ['item', 'product', 'description'], empty: undefined, ...text('name') },
  { heading: 'Supplier', also: ['sold by'], empty: '', ...text('supplier') },
  { heading: 'Code', also: ['supplier code', 'article', 'sku'], empty: '', ...text('code') },
  { heading: 'Pack', also: ['sold as'], empty: 'each', ...text('packName') },
  { heading: 'Pack holds', also: ['holds', 'pack size'], ...number('packHolds'), empty: 1 },
  {
    heading: 'Measure',
    also: ['unit of measure'],
    field: 'packMeasure',
    empty: 'each',
    read: oneOf(packMeasures),
    write: (row) => row.packMeasure,
  },
  {
    heading: 'Whole packs only',
    also: ['whole packs'],
    field: 'packWhole',
    empty: true,
    read: yesRead,
    write: (row) => (row.packWhole ? 'yes' : 'no'),
  },
  {
    heading: 'Price',
    also: ['cost', 'price per pack'],
    field: 'cost',
    empty: null,
    read: (cell, currency) => {
      const parsed = parseMoney(cell, currency);
      return parsed.ok ? value(parsed.minor) : wrong(`“${cell}” is not a price. ${parsed.message}`);
    },
    write: (row, currency) => (row.price ? moneyFigures(row.price.costMinor, currency) : ''),
  },
  {
    heading: 'Price from',
    also: ['from', 'valid from'],
    field: 'from',
    empty: null,
    read: dayRead,
    write: (row) => row.price?.from ?? '',
  },
  { heading: 'Length', also: ['length mm'], ...number('length', lengthRead) },
  { heading: 'Width', also: ['width mm'], ...number('width', lengthRead) },
  { heading: 'Thickness', also: ['thickness mm', 'depth'], ...number('thickness', lengthRead) },
  { heading: 'Tolerance', also: ['tolerance mm'], ...number('tolerance', lengthRead) },
  { heading: 'Mass of one, kg', also: ['mass', 'mass kg', 'weight', 'weight kg'], ...number('massKg') }, // prettier-ignore
  {
    heading: 'Loose density, kg/m3',
    also: ['loose density', 'density'],
    ...number('looseDensity'),
  },
  { heading: 'Smallest stone', also: ['stone from'], ...number('stoneLeast', lengthRead) },
  { heading: 'Largest stone', also: ['stone to'], ...number('stoneGreatest', lengthRead) },
  {
    heading: 'Colour',
    also: ['color'],
    field: 'colour',
    empty: null,
    read: (cell) => value(cell.toLowerCase()),
    write: (row) => row.colour ?? '',
  },
  { heading: 'Note', also: ['remark'], empty: '', ...text('note') },
  {
    heading: 'Retired',
    also: [],
    field: 'retired',
    empty: false,
    read: yesRead,
    write: (row) => (row.retired ? 'yes' : 'no'),
  },
  { heading: 'Reference', also: ['id'], empty: '', ...text('reference') },
];

const plainHeading = (heading: string): string =>
  heading.replace(/^\ufeff/, '').trim().toLowerCase().replace(/³/g, '3').replace(/\s+/g, ' '); // prettier-ignore

/** The column that a heading means; undefined for one that means nothing here. */
export const columnNamed = (heading: string): Column | undefined => {
  const plain = plainHeading(heading);
  return COLUMNS.find(
    (column) => column.heading.toLowerCase() === plain || column.also.includes(plain),
  );
};

/** A cell’s words, without what was put before them for spreadsheets. */
export const cellText = (cell: string): string => textCellRead(cell.trim());
