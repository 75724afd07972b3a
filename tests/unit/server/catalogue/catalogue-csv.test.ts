import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { ItemFields } from '@/api-types/catalogue';
import { catalogueCsv } from '@/server/catalogue/csv-export';
import type { CatalogueRow } from '@/server/catalogue/csv-columns';
import { catalogueFileRead } from '@/server/catalogue/csv-reading';
import { importPlan, type KnownCatalogue, type KnownItem } from '@/server/catalogue/import-plan';

const fields: ItemFields = {
  kind: 'unit',
  name: 'Slab 450',
  code: 'QS-450',
  supplierId: 's1',
  packName: 'pallet',
  packHolds: 36,
  packMeasure: 'each',
  packWhole: true,
  length: 450,
  width: 450,
  thickness: 50,
  tolerance: 2,
  massKg: 23.5,
  colour: '#cdc5b4',
  looseDensity: null,
  stoneLeast: null,
  stoneGreatest: null,
  note: '',
};

const item = (over: Partial<KnownItem> = {}): KnownItem => ({
  id: 'item1',
  fields,
  retired: false,
  revision: 3,
  prices: [{ costMinor: 41_400, from: '2026-01-01' }],
  ...over,
});

const known = (over: Partial<KnownCatalogue> = {}): KnownCatalogue => ({
  items: [item()],
  suppliers: [{ id: 's1', name: 'Quennock Stone' }],
  currency: 'GBP',
  from: '2026-03-01',
  ...over,
});

const planned = (csv: string, catalogue = known()) => {
  const file = catalogueFileRead(csv, catalogue.currency);
  const plan = importPlan(file.rows, catalogue);
  return { ...plan, problems: [...file.problems, ...plan.problems], file };
};

describe('a file that can be read', () => {
  test.each([
    ['2026-03-13', '2026-03-13'],
    ['13.3.2026', '2026-03-13'],
    ['13/03/2026', '2026-03-13'],
    ['3/13/2026', '2026-03-13'],
    ['04/04/2026', '2026-04-04'],
  ])('knows the day %s as a spreadsheet saves it anew', (cell, from) => {
    const { items, problems } = planned(
      `Kind,Name,Price,Price from,Length,Width,Thickness\nunit,Kerb,2,${cell},300,100,60\n`,
    );
    expect(problems).toEqual([]);
    expect(items[0].price).toEqual({ costMinor: 200, from });
  });

  test('asks for a day that could be two, and says of a number less than 0 that it is', () => {
    const { problems } = planned(
      'Kind,Name,Pack holds,Price,Price from\nsundry,Pegs,1,2,01/12/2026\nsundry,String,-3,2,\n',
    );
    expect(problems).toEqual([
      {
        line: 2,
        column: 'Price from',
        message: '“01/12/2026” could be 2026-12-01 or 2026-01-12. Write it like one of these.',
      },
      { line: 3, column: 'Pack holds', message: '“-3” is less than 0. Write one such as 12.5.' },
    ]);
  });

  test('adds what is new and changes what is there, known by its name and supplier', () => {
    const { items, problems, newSuppliers } = planned(
      [
        'Kind,Name,Supplier,Pack,Pack holds,Measure,Price,Length,Width,Thickness',
        'unit,slab 450,quennock stone,pallet,36,each,415.50,450,450,50',
        'aggregate,Gravel 10 mm,New Pit,bulk bag,0.8,t,62,,,',
      ].join('\n'),
    );
    expect(problems).toEqual([]);
    expect(newSuppliers).toEqual(['New Pit']);
    expect(items.map(({ row }) => row.what)).toEqual(['change', 'add']);
    expect(items[0]).toMatchObject({
      known: { id: 'item1' },
      price: { costMinor: 41_550, from: '2026-03-01' },
      row: { line: 2, changes: ['Name', 'Price £415.50 from 1 March 2026'] },
    });
    expect(items[1]).toMatchObject({
      known: null,
      supplier: 'New Pit',
      fields: { packHolds: 0.8, packMeasure: 't', length: null },
    });
  });

  test('columns that it lacks leave an item as it is, empty cells empty it', () => {
    const lacking = planned('Name,Supplier,Code\nSlab 450,Quennock Stone,X1').items[0];
    expect(lacking.fields).toEqual({ ...fields, code: 'X1' });
    const emptied = planned('Name,Supplier,Colour\nSlab 450,Quennock Stone,').items[0];
    expect(emptied.fields).toEqual({ ...fields, colour: null });
  });

  test.each([
    ['semicolons and decimal commas', 'Kind;Name;Price;Mass of one, kg\nsundry;Pegs;12,50;0,3'],
    [
      'tabs and a mark before the first heading',
      '\ufeffKind\tName\tPrice\tMass\nsundry\tPegs\t12.5\t.3',
    ],
    ['other names and cases of headings', 'TYPE,item,Cost,weight KG\nSundry,Pegs,£12.50,0.30'],
    [
      'lines of Windows and empty ones',
      'Kind,Name,Price,Mass\r\n\r\nsundry,Pegs,12.50,0.3\r\n,,,\r\n',
    ],
  ])('is read with %s', (_what, csv) => {
    const { items, problems } = planned(csv.replace('Mass of one, kg', '"Mass of one, kg"'));
    expect(problems).toEqual([]);
    expect(items).toHaveLength(1);
    expect(items[0]).toMatchObject({
      fields: { name: 'Pegs', massKg: 0.3 },
      price: { costMinor: 1250 },
    });
  });

  test('lengths may be typed as the trade types them', () => {
    const { items } = planned('Kind,Name,Length,Width,Thickness\nunit,Paver,8",4 in,"2 3/8"""');
    // The inch is 25.4 mm by definition (NIST SP 811, B.8).
    expect(items[0].fields).toMatchObject({ length: 203.2, width: 101.6 });
    expect(items[0].fields.thickness).toBeCloseTo(60.325, 9);
  });

  test('the same price is not entered again; a day of its own is', () => {
    const same = planned('Name,Supplier,Price\nSlab 450,Quennock Stone,414').items[0];
    expect(same).toMatchObject({ price: null, row: { what: 'same' } });
    const later = planned('Name,Supplier,Price,Price from\nSlab 450,Quennock Stone,420,2027-01-01');
    expect(later.items[0].price).toEqual({ costMinor: 42_000, from: '2027-01-01' });
  });

  test('a column that means nothing here is named and passed over', () => {
    expect(planned('Kind,Name,Shelf\nsundry,Pegs,4').file.unknownColumns).toEqual(['Shelf']);
  });
});

describe('rows that are wrong are listed with line, column and reason', () => {
  const head = 'Kind,Name,Pack holds,Price,Price from,Length,Width,Thickness,Colour,Smallest stone,Largest stone'; // prettier-ignore
  test.each([
    ['brick,Pegs,,,,,,,,,', 'Kind', /must be one of unit, aggregate, sundry/],
    [',Pegs,,,,,,,,,', 'Kind', /Choose unit, aggregate or sundry/],
    ['sundry,,,,,,,,,,', 'Name', /Give it a name/],
    ['sundry,Pegs,lots,,,,,,,,', 'Pack holds', /“lots” is not a number/],
    ['sundry,Pegs,"1,500",,,,,,,,', 'Pack holds', /could be 1500 or 1.500/],
    ['sundry,Pegs,0,,,,,,,,', 'Pack holds', /more than 0/],
    ['sundry,Pegs,,12.345,,,,,,,', 'Price', /“12.345” is not a price/],
    ['sundry,Pegs,,-3,,,,,,,', 'Price', /less than 0|not a price/],
    ['sundry,Pegs,,3,2026-02-30,,,,,,', 'Price from', /not a day/],
    ['sundry,Pegs,,,2026-02-01,,,,,,', 'Price from', /has no price/],
    ['unit,Slab,,,,450,,50,,,', 'Width', /A unit needs its width/],
    ['unit,Slab,,,,450,wide,50,,,', 'Width', /“wide” is not a length/],
    ['sundry,Pegs,,,,,,,grey,,', 'Colour', /must be a colour/],
    ['aggregate,Grit,,,,,,,,4,', 'Largest stone', /both the smallest and the largest/],
    ['aggregate,Grit,,,,,,,,8,4', 'Largest stone', /cannot be smaller/],
    ['sundry,Pegs,,,,,,,,,, with comma', null, /more cells than there are columns/],
  ])('%s', (row, column, message) => {
    const { problems, items } = planned(`${head}\nsundry,Fine,,,,,,,,,\n${row}`);
    expect(problems.length).toBeGreaterThan(0);
    expect(problems).toContainEqual({ line: 3, column, message: expect.stringMatching(message) });
    expect(items.map(({ row: own }) => own.line)).toEqual([2]);
  });

  test('the line is that of the file, also after a cell of several lines', () => {
    const { problems } = planned('Kind,Name,Note\nsundry,Pegs,"two\nlines\n"\nsundry,,');
    expect(problems.map(({ line }) => line)).toEqual([5]);
  });

  test('an item twice in one file names the line of the first', () => {
    const { problems } = planned('Kind,Name\nsundry,Pegs\nsundry,PEGS');
    expect(problems).toEqual([{ line: 3, column: 'Name', message: 'is the same item as line 2' }]);
  });

  test('a reference of nothing here, and a name that another item has', () => {
    const catalogue = known({
      items: [item(), item({ id: 'item2', fields: { ...fields, name: 'Slab 600' } })],
    });
    const unknown = planned('Name,Reference\nSlab 450,elsewhere', catalogue);
    expect(unknown.problems[0]).toMatchObject({ line: 2, column: 'Reference' });
    const taken = planned('Name,Supplier,Reference\nSlab 600,Quennock Stone,item1', catalogue);
    expect(taken.problems[0]).toMatchObject({ line: 2, column: 'Name' });
  });

  test.each([
    ['', 1, /empty/],
    ['\n\n', 1, /empty/],
    ['Shelf,Row\n1,2', 1, /“Name” among them/],
    ['Name,Name\na,b', 1, /two columns for “Name”/],
    ['Kind,Name\nsundry,"Pegs\nsundry,Nails', 2, /quotation mark/],
  ])('a file that cannot be read at all: %j', (csv, line, message) => {
    const { problems, items } = planned(csv);
    expect(problems).toEqual([{ line, column: null, message: expect.stringMatching(message) }]);
    expect(items).toEqual([]);
  });
});

/** Texts as the catalogue keeps them: trimmed, with what spreadsheets trip over among them. */
const text = (most: number) =>
  fc
    .array(
      fc.constantFrom(
        "'",
        '=',
        '+',
        '-',
        '@',
        '"',
        ',',
        ';',
        '\n',
        '\t',
        ' ',
        'a',
        'Ö',
        '×',
        '9',
        '中',
      ),
      { maxLength: most },
    )
    .map((signs) => signs.join('').trim());
const side = fc.integer({ min: 1, max: 10_000_000 }).map((n) => n / 1000);
const orNull = <T>(arbitrary: fc.Arbitrary<T>) => fc.option(arbitrary, { nil: null });

const row: fc.Arbitrary<CatalogueRow> = fc
  .record({
    name: text(20).filter((name) => name !== ''),
    code: text(10),
    supplier: text(10),
    packName: text(10).filter((name) => name !== ''),
    packHolds: side,
    packWhole: fc.boolean(),
    length: side,
    width: side,
    thickness: side,
    tolerance: orNull(fc.integer({ min: 0, max: 100_000 }).map((n) => n / 1000)),
    massKg: orNull(side),
    colour: orNull(fc.constantFrom('#a1b2c3', '#000000')),
    looseDensity: orNull(side),
    note: text(30),
    cost: orNull(fc.integer({ min: 0, max: 10_000_000_000 })),
    retired: fc.boolean(),
  })
  .map(({ cost, ...made }) => ({
    ...made,
    kind: 'unit' as const,
    supplierId: null,
    packMeasure: 'each' as const,
    stoneLeast: null,
    stoneGreatest: null,
    reference: '',
    price: cost === null ? null : { costMinor: cost, from: '2026-02-03' },
  }));

test('whatever a catalogue holds, its file read back says the same, in every currency', () => {
  fc.assert(
    fc.property(
      fc.uniqueArray(row, { selector: (own) => own.name.toLowerCase(), maxLength: 5 }),
      fc.constantFrom('GBP', 'JPY', 'KWD'),
      (rows, currency) => {
        const empty = known({ items: [], suppliers: [], currency });
        const { items, problems } = planned(catalogueCsv(rows, currency), empty);
        expect(problems).toEqual([]);
        expect(
          items.map(({ fields: read, supplier, retired, price }) => ({
            ...read,
            supplier,
            retired,
            price,
            reference: '',
          })),
        ).toEqual(rows);
      },
    ),
    { seed: 20_260_301, numRuns: 200 },
  );
});
