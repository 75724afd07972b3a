import { sql } from 'drizzle-orm';
import { describe, expect, test } from 'vitest';
import type { CatalogueItem, CataloguePage, ImportOutlook } from '@/api-types/catalogue';
import { catalogueItems, cataloguePrices } from '@/db/schema';
import { importCatalogue } from '@/server/catalogue/csv-import';
import { newId } from '@/server/ids';
import { newFirm, newProject, newVersion, type Signed } from './firm';
import { newPricedOffice, pricedCourt } from './priced-office';
import { db, rowsOf, useEmptyDatabase, type Answer } from './site';

useEmptyDatabase();

const slab = {
  kind: 'unit',
  name: 'Slab 450',
  length: 450,
  width: 450,
  thickness: 50,
  price: { costMinor: 1150, from: '2026-01-01' },
};

const added = async ({ visitor }: Signed, item: object): Promise<CatalogueItem> => {
  const answer = await visitor.post('/api/catalogue', item);
  expect(answer.status, JSON.stringify(answer.body)).toBe(201);
  return answer.body;
};

const imported = (
  { visitor }: Signed,
  how: 'look' | 'take',
  csv: string,
): Promise<Answer & { body: ImportOutlook }> =>
  visitor.call('POST', `/api/catalogue/import?how=${how}`, csv, { 'content-type': 'text/csv' });

const everything = async ({ visitor }: Signed): Promise<CatalogueItem[]> => {
  const items: CatalogueItem[] = [];
  for (const retired of ['no', 'only']) {
    for (let after = ''; ;) {
      const page: CataloguePage = (
        await visitor.get(`/api/catalogue?size=200&retired=${retired}&after=${after}`)
      ).body;
      items.push(...page.items);
      if (page.next === null) break;
      after = page.next;
    }
  }
  return items;
};

describe('an item', () => {
  test('is added with its price, changed with its revision, and keeps every price that it had', async () => {
    const firm = await newFirm();
    const item = await added(firm, slab);
    expect(item).toMatchObject({ ...slab, revision: 1, price: slab.price, nextPrice: null });
    const path = `/api/catalogue/${item.id}`;
    const changed = await firm.visitor.patch(path, {
      revision: 1,
      note: 'Heavy',
      price: { costMinor: 1250, from: '2150-06-01' },
    });
    expect(changed.body).toMatchObject({
      revision: 2,
      note: 'Heavy',
      price: { costMinor: 1150 },
      nextPrice: { costMinor: 1250, from: '2150-06-01' },
    });
    await firm.visitor.patch(path, { revision: 2, price: { costMinor: 1145, from: '2026-01-01' } });
    const { prices } = (await firm.visitor.get(`${path}/prices`)).body;
    expect(prices).toMatchObject([
      { costMinor: 1250, from: '2150-06-01', corrected: false },
      { costMinor: 1145, from: '2026-01-01', corrected: false },
      { costMinor: 1150, from: '2026-01-01', corrected: true },
    ]);
  });

  test('changed by two, is refused to the second, who is shown both sides', async () => {
    const firm = await newFirm();
    const { id } = await added(firm, slab);
    const path = `/api/catalogue/${id}`;
    await firm.visitor.patch(path, { revision: 1, name: 'Slab, brushed' });
    const late = await firm.visitor.patch(path, { revision: 1, name: 'Slab, sawn' });
    expect(late.status).toBe(409);
    expect(late.body.current).toMatchObject({ revision: 2, name: 'Slab, brushed' });
    expect((await firm.visitor.get(path)).body.name).toBe('Slab, brushed');
  });

  test('of one name is there once a supplier, among those that are offered', async () => {
    const firm = await newFirm();
    const { id } = await added(firm, slab);
    const again = await firm.visitor.post('/api/catalogue', { ...slab, name: 'SLAB 450' });
    expect(again).toMatchObject({ status: 422, body: { errors: [{ path: ['name'] }] } });
    await firm.visitor.patch(`/api/catalogue/${id}`, { revision: 1, retired: true });
    const other = await added(firm, slab);
    const back = await firm.visitor.patch(`/api/catalogue/${id}`, { revision: 2, retired: false });
    expect(back.status).toBe(422);
    expect(other.retiredAt).toBeNull();
  });

  test.each([
    [{ ...slab, width: null }, 'width'],
    [{ ...slab, packMeasure: 'm3' }, 'packMeasure'],
    [{ ...slab, name: ' ' }, 'name'],
    [{ ...slab, supplierId: 'nobody' }, 'supplierId'],
    [{ ...slab, price: { costMinor: 1.5, from: '2026-01-01' } }, 'price'],
    [{ ...slab, price: { costMinor: 1, from: '2026-02-30' } }, 'price'],
    [{ ...slab, stoneLeast: 4 }, 'stoneGreatest'],
  ])('that cannot be is refused at its field: %#', async (item, field) => {
    const firm = await newFirm();
    const answer = await firm.visitor.post('/api/catalogue', item);
    expect(answer.status).toBe(422);
    expect(answer.body.errors[0].path[0]).toBe(field);
  });

  test('is taken out when nothing was made with it, else only retired', async () => {
    const office = await newPricedOffice();
    const spare = await added(office.owner, { kind: 'sundry', name: 'Pegs' });
    expect((await office.owner.visitor.call('DELETE', `/api/catalogue/${spare.id}`)).status).toBe(200); // prettier-ignore
    const used = await office.owner.visitor.call('DELETE', `/api/catalogue/${office.slab}`);
    expect(used.status).toBe(409);
    expect(used.body.detail).toMatch(/Retire it/);
    await office.owner.visitor.patch(`/api/catalogue/${office.slab}`, { revision: 1, retired: true }); // prettier-ignore
    const { id } = await newVersion(office.designer.visitor, office.layoutId);
    const { takeOff } = (await office.owner.visitor.get(`/api/versions/${id}/pricing`)).body;
    expect(takeOff.orders.find(({ kind }: { kind: string }) => kind === 'unit').item.id).toBe(office.slab); // prettier-ignore
  });
});

test('the list of a day takes the newest price not after it', async () => {
  const firm = await newFirm();
  const { id } = await added(firm, slab);
  for (const [n, [costMinor, from]] of (
    [
      [1300, '2026-06-01'],
      [1200, '2026-03-01'],
    ] as const
  ).entries()) {
    // prettier-ignore
    await firm.visitor.patch(`/api/catalogue/${id}`, { revision: n + 1, price: { costMinor, from } }); // prettier-ignore
  }
  const on = async (day: string) =>
    (await firm.visitor.get(`/api/catalogue/price-list?on=${day}`)).body.items.map(
      ({ costMinor, from }: { costMinor: number; from: string }) => [costMinor, from],
    );
  expect(await on('2025-12-31')).toEqual([]);
  expect(await on('2026-01-01')).toEqual([[1150, '2026-01-01']]);
  expect(await on('2026-02-28')).toEqual([[1150, '2026-01-01']]);
  expect(await on('2026-03-01')).toEqual([[1200, '2026-03-01']]);
  expect(await on('2026-05-31')).toEqual([[1200, '2026-03-01']]);
  expect(await on('2150-01-01')).toEqual([[1300, '2026-06-01']]);
});

test('the currency stays once there are prices in it', async () => {
  const firm = await newFirm();
  const first = await firm.visitor.patch('/api/firm/pricing', { revision: 0, currency: 'JPY' });
  expect(first).toMatchObject({ status: 200, body: { currency: 'JPY', currencyOpen: true } });
  await added(firm, slab);
  const later = await firm.visitor.patch('/api/firm/pricing', { revision: 1, currency: 'EUR' });
  expect(later).toMatchObject({ status: 422, body: { errors: [{ path: ['currency'] }] } });
  const stale = await firm.visitor.patch('/api/firm/pricing', { revision: 0, taxName: 'GST' });
  expect(stale).toMatchObject({ status: 409, body: { current: { revision: 1 } } });
  const same = await firm.visitor.patch('/api/firm/pricing', {
    revision: 1,
    currency: 'JPY',
    taxName: 'GST',
  });
  expect(same.status).toBe(200);
});

describe('a file', () => {
  const file = 'Kind,Name,Supplier,Price\nsundry,Pegs,Yard,12.50\nsundry,String,Yard,3\n';

  test('is looked over without being taken, then taken whole', async () => {
    const firm = await newFirm();
    const look = await imported(firm, 'look', file);
    expect(look.body).toMatchObject({ taken: false, added: 2, problemCount: 0, newSuppliers: ['Yard'] }); // prettier-ignore
    expect(await everything(firm)).toEqual([]);
    const take = await imported(firm, 'take', file);
    expect(take.body).toMatchObject({ taken: true, added: 2, changed: 0 });
    expect((await everything(firm)).map(({ name, price }) => [name, price?.costMinor])).toEqual([
      ['Pegs', 1250],
      ['String', 300],
    ]);
    const again = await imported(firm, 'take', file);
    expect(again.body).toMatchObject({ taken: true, added: 0, changed: 0, same: 2 });
  });

  test('with one bad row among a thousand good ones is not taken at all', async () => {
    const firm = await newFirm();
    await added(firm, { kind: 'sundry', name: 'Pegs' });
    const before = await everything(firm);
    const rows = Array.from({ length: 1000 }, (_, n) => `sundry,Thing ${n},New ${n % 7},1`);
    rows.splice(600, 0, 'brick,Bad,New,1');
    const take = await imported(firm, 'take', `Kind,Name,Supplier,Price\n${rows.join('\n')}`);
    expect(take.body).toMatchObject({ taken: false, problemCount: 1 });
    expect(take.body.problems).toEqual([
      { line: 602, column: 'Kind', message: expect.stringMatching(/brick/) },
    ]);
    expect(await everything(firm)).toEqual(before);
    expect((await firm.visitor.get('/api/suppliers')).body.suppliers).toEqual([]);
  });

  test('that swaps two names is refused in words, and nothing of it is taken', async () => {
    const firm = await newFirm();
    const a = await added(firm, { kind: 'sundry', name: 'A' });
    const b = await added(firm, { kind: 'sundry', name: 'B' });
    const take = await imported(firm, 'take', `Name,Reference\nB,${a.id}\nA,${b.id}`);
    expect(take.body.taken).toBe(false);
    expect(take.body.problemCount).toBeGreaterThan(0);
    expect((await everything(firm)).map(({ name }) => name)).toEqual(['A', 'B']);
  });

  test('saved from one firm and read into another holds the same, byte for byte but for references', async () => {
    const office = await newPricedOffice();
    const { owner } = office;
    await added(owner, { kind: 'sundry', name: '@Geotextile', note: '-light, "grey"\nroll', code: '+1' }); // prettier-ignore
    const gone = await added(owner, { kind: 'sundry', name: 'Old pegs' });
    await owner.visitor.patch(`/api/catalogue/${gone.id}`, { revision: 1, retired: true });
    const exported = (await owner.visitor.get('/api/catalogue/export')).body as string;
    expect(exported).toContain("'=QS450");
    expect(exported).toContain("'@Geotextile");
    expect(exported).toContain("'+1");
    const unnamed = (csv: string) => csv.replace(/,[a-z0-9]{24}\r\n/g, ',\r\n');
    const other = await newFirm();
    await other.visitor.patch('/api/firm/pricing', { revision: 0, currency: 'GBP' });
    const take = await imported(other, 'take', unnamed(exported));
    expect(take.body).toMatchObject({ taken: true, added: 4, problemCount: 0 });
    const back = (await other.visitor.get('/api/catalogue/export')).body as string;
    expect(unnamed(back)).toBe(unnamed(exported));
    const same = await imported(owner, 'take', exported);
    expect(same.body).toMatchObject({ taken: true, added: 0, changed: 0, same: 4 });
  });

  test('that spreadsheets wrote in Windows’ own letters is read', async () => {
    const firm = await newFirm();
    const windows = Buffer.from('Kind;Name;Price\nsundry;Drän;12,50', 'latin1');
    const outcome = await importCatalogue(await db(), firm.actor, { how: 'take' }, windows);
    expect(outcome).toMatchObject({ ok: true, value: { taken: true } });
    expect((await everything(firm)).map(({ name }) => name)).toEqual(['Drän']);
  });

  test('over 4 MB is refused', async () => {
    const firm = await newFirm();
    const answer = await imported(firm, 'look', `Kind,Name\n${'x'.repeat(4_000_000)}`);
    expect(answer.status).toBe(413);
  });
});

describe('ten thousand items', () => {
  let firm: Signed;
  const COUNT = 10_000;

  test('are read in from one file, and again with every price changed', async () => {
    firm = await newFirm();
    const csv = (cents: number) =>
      `Kind,Name,Supplier,Code,Price\n${Array.from(
        { length: COUNT },
        (_, n) => `sundry,Thing ${n} ${n % 2 ? 'odd' : 'even'},Yard ${n % 40},C${n},${n}.${cents}`,
      ).join('\n')}`;
    expect((await imported(firm, 'take', csv(10))).body).toMatchObject({ taken: true, added: COUNT }); // prettier-ignore
    expect((await imported(firm, 'take', csv(25))).body).toMatchObject({ taken: true, changed: COUNT }); // prettier-ignore
  }, 120_000);

  test('are planned anew when the catalogue was changed meanwhile: two at a time add each once', async () => {
    const other = await newFirm();
    const file = `Kind,Name\n${Array.from({ length: 3000 }, (_, n) => `sundry,Thing ${n}`).join('\n')}`;
    const both = await Promise.all([imported(other, 'take', file), imported(other, 'take', file)]);
    expect(both.map(({ body }) => [body.taken, body.added, body.same]).sort()).toEqual([
      [true, 0, 3000],
      [true, 3000, 0],
    ]);
  }, 120_000);

  test('are paged by key, none twice and none left out, and found by beginnings of words', async () => {
    const names = (await everything(firm)).map(({ name }) => name);
    expect(names).toHaveLength(COUNT);
    expect(new Set(names).size).toBe(COUNT);
    const found = await firm.visitor.get(`/api/catalogue?search=${encodeURIComponent('thi 42 ev')}`); // prettier-ignore
    expect(found.body.items.length).toBeGreaterThan(0);
    for (const { name } of found.body.items) expect(name).toMatch(/^Thing 42\d* even$/);
    const coded = await firm.visitor.get('/api/catalogue?search=c9999');
    expect(coded.body.items).toMatchObject([{ name: 'Thing 9999 odd', price: { costMinor: 999_925 } }]); // prettier-ignore
  });

  test('are listed without reading or sorting them all', async () => {
    const database = await db();
    await database.execute(sql`analyze ${catalogueItems}`);
    await database.execute(sql`analyze ${cataloguePrices}`);
    const plan = async (where: ReturnType<typeof sql>, order: ReturnType<typeof sql>) =>
      rowsOf<Record<string, string>>(
        await database.execute(
          sql`explain select id from ${catalogueItems} where firm_id = ${firm.actor.firmId} and ${where} order by ${order} limit 51`,
        ),
      )
        .map((row) => Object.values(row)[0])
        .join('\n');
    const current = sql`retired_at is null`;
    for (const [where, order] of [
      [current, sql`lower(name), id`],
      [sql`${current} and (lower(name), id) > ('thing 5', 'a')`, sql`lower(name), id`],
      [current, sql`updated_at desc, id desc`],
    ] as const) {
      const words = await plan(where, order);
      expect(words).toMatch(/Index (Only )?Scan/);
      expect(words).not.toMatch(/Seq Scan|^\s*(->\s*)?Sort/m);
    }
    const searched = await plan(
      sql`${current} and words @@ to_tsquery('simple', '''9999'':*')`,
      sql`lower(name), id`,
    );
    expect(searched).toContain('catalogue_items_words');
  });
});

test('another firm’s items are not there: not in lists, nor as a supplier, nor in a file', async () => {
  const office = await newPricedOffice();
  const stranger = await newFirm();
  expect((await stranger.visitor.get('/api/catalogue')).body.items).toEqual([]);
  expect((await stranger.visitor.get('/api/catalogue/price-list')).body.items).toEqual([]);
  const borrowed = await stranger.visitor.post('/api/catalogue', {
    kind: 'sundry',
    name: 'Pegs',
    supplierId: office.stone,
  });
  expect(borrowed.status).toBe(422);
  const file = await imported(stranger, 'take', `Name,Reference\nMine,${office.slab}`);
  expect(file.body.problems[0].column).toBe('Reference');
  // A floor drawn with another firm's item has no price here.
  const { layoutId } = await newProject(stranger.visitor, pricedCourt(office.slab, office.gravel));
  const { id } = await newVersion(stranger.visitor, layoutId);
  const { takeOff, priceList } = (await stranger.visitor.get(`/api/versions/${id}/pricing`)).body;
  expect(priceList.items).toEqual([]);
  expect(takeOff.costMinor).toBe(0);
});

test('the database itself keeps prices as they were entered', async () => {
  const firm = await newFirm();
  await added(firm, { ...slab, name: newId() });
  await expect((await db()).execute(sql`update catalogue_prices set cost_minor = 1`)).rejects.toMatchObject({ cause: { message: expect.stringMatching(/never altered/) } }); // prettier-ignore
});
