import { sql } from 'drizzle-orm';
import { describe, expect, test } from 'vitest';
import type { QuoteDetail, VersionQuotes } from '@/api-types/quotes';
import { openQuotePdf } from '@/server/quotes/quote-paper';
import { pdfTexts } from '../unit/pdf/pdf-reading';
import { moved, newFirm, newProject, newVersion, type Signed } from './firm';
import { lettersTo } from './letters-to';
import { letters } from './office';
import { newPricedOffice, pricedCourt, sharedVersion, type PricedOffice } from './priced-office';
import { db, useEmptyDatabase } from './site';

useEmptyDatabase();

const begun = async ({ designer }: PricedOffice, version: string): Promise<QuoteDetail> => {
  const answer = await designer.visitor.post(`/api/versions/${version}/quotes`);
  expect(answer.status, JSON.stringify(answer.body)).toBe(201);
  return answer.body;
};

/** A quote whose every line has a cost: what nobody priced is given one. */
const completed = async ({ designer }: PricedOffice, quote: QuoteDetail): Promise<QuoteDetail> => {
  const lines = quote.draft.lines.map((line) => ({ ...line, costMinor: line.costMinor ?? 100 }));
  const answer = await designer.visitor.patch(`/api/quotes/${quote.id}`, {
    revision: quote.revision,
    lines,
  });
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  return answer.body;
};

const sent = async (office: PricedOffice, version: string): Promise<QuoteDetail> => {
  const { id, revision } = await completed(office, await begun(office, version));
  const answer = await office.designer.visitor.post(`/api/quotes/${id}/send`, { revision });
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  return answer.body;
};

const quotesFor = async ({ visitor }: Signed, version: string): Promise<VersionQuotes> =>
  (await visitor.get(`/api/versions/${version}/quotes`)).body;

describe('a price typed on the table', () => {
  const pack = { holds: 1, measure: 'm2' } as const;

  test('is kept beside the layout, goes into versions and quotes saved after it, and nobody without costs sees it', async () => {
    const office = await newPricedOffice();
    const { designer, owner, client, installer, layoutId } = office;
    const at = `/api/layouts/${layoutId}/price-list`;
    const before = (await designer.visitor.get(at)).body;
    expect(before).toMatchObject({ currency: 'GBP', typed: [] });
    const { takeOff } = (await owner.visitor.get(`/api/versions/${(await newVersion(designer.visitor, layoutId)).id}/pricing`)).body; // prettier-ignore
    const bare = takeOff.orders.find(({ packCostMinor }: { packCostMinor: number | null }) => packCostMinor === null); // prettier-ignore
    const price = { costMinor: 1234, pack: { holds: bare.pack.holds, measure: bare.pack.measure } };
    const set = await designer.visitor.call('PUT', at, { orderId: bare.id, price });
    expect(set).toMatchObject({ status: 200, body: { typed: [{ orderId: bare.id, ...price }] } });
    const version = await sharedVersion(office);
    const priced = (await owner.visitor.get(`/api/versions/${version}/pricing`)).body;
    expect(priced.takeOff.orders.find(({ id }: { id: string }) => id === bare.id)).toMatchObject({
      packCostMinor: 1234,
      priceTyped: true,
    });
    const quote = await begun(office, version);
    expect(quote.draft.lines.find(({ id }) => id === bare.id)).toMatchObject({ costMinor: 1234 });
    // Taken away it holds for what was saved with it, and for nothing after.
    await designer.visitor.call('PUT', at, { orderId: bare.id, price: null });
    expect((await designer.visitor.get(at)).body.typed).toEqual([]);
    expect((await owner.visitor.get(`/api/versions/${version}/pricing`)).body).toEqual(priced);
    for (const { visitor } of [client, installer]) {
      expect((await visitor.get(at)).status).toBeGreaterThanOrEqual(403);
      expect(JSON.stringify((await visitor.get(`/api/versions/${version}`)).body)).not.toContain('1234'); // prettier-ignore
    }
  });

  test('goes with a copy of the layout, and a retired item stays in the list of what was drawn with it', async () => {
    const office = await newPricedOffice();
    const { designer, owner, layoutId, slab } = office;
    const price = { costMinor: 90, pack };
    await designer.visitor.call('PUT', `/api/layouts/${layoutId}/price-list`, { orderId: 'geotextile', price }); // prettier-ignore
    const copy = await designer.visitor.post(`/api/layouts/${layoutId}/duplicate`, {});
    await owner.visitor.patch(`/api/catalogue/${slab}`, { revision: 1, retired: true });
    const list = (await designer.visitor.get(`/api/layouts/${copy.body.id}/price-list`)).body;
    expect(list.typed).toEqual([{ orderId: 'geotextile', ...price }]);
    expect(list.items.find(({ id }: { id: string }) => id === slab)).toMatchObject({
      retired: true,
    });
    const { layoutId: other } = await newProject(designer.visitor);
    const plain = (await designer.visitor.get(`/api/layouts/${other}/price-list`)).body;
    expect(plain.items.map(({ id }: { id: string }) => id)).not.toContain(slab);
  });

  test.each([
    [{ orderId: '', price: null }],
    [{ orderId: 'base', price: { costMinor: -1, pack } }],
    [{ orderId: 'base', price: { costMinor: 1.5, pack } }],
    [{ orderId: 'base', price: { costMinor: 1, pack: { holds: 0, measure: 'm2' } } }],
  ])('is refused where it is none: %j', async (body) => {
    const office = await newPricedOffice();
    const answer = await office.designer.visitor.call('PUT', `/api/layouts/${office.layoutId}/price-list`, body); // prettier-ignore
    expect(answer.status).toBe(422);
  });
});

describe('a version', () => {
  test('keeps the prices that it was saved with, whatever the catalogue says later', async () => {
    const office = await newPricedOffice();
    const { owner, designer, layoutId, slab } = office;
    const first = await newVersion(designer.visitor, layoutId);
    const before = (await owner.visitor.get(`/api/versions/${first.id}/pricing`)).body;
    const slabs = before.takeOff.orders.find(({ kind }: { kind: string }) => kind === 'unit');
    expect(slabs).toMatchObject({ packCostMinor: 41_400, item: { id: slab } });
    expect(slabs.costMinor).toBe(slabs.amount * 41_400);
    // Of the catalogue only what the floor takes is kept.
    expect(before.priceList).toMatchObject({ currency: 'GBP' });
    expect(before.priceList.items.map(({ id }: { id: string }) => id)).toContain(slab);
    await owner.visitor.patch(`/api/catalogue/${slab}`, {
      revision: 1,
      price: { costMinor: 50_000, from: '2026-01-02' },
    });
    expect((await owner.visitor.get(`/api/versions/${first.id}/pricing`)).body).toEqual(before);
    const second = await newVersion(designer.visitor, layoutId, 'Two');
    const after = (await owner.visitor.get(`/api/versions/${second.id}/pricing`)).body;
    expect(after.takeOff.orders.find(({ kind }: { kind: string }) => kind === 'unit').packCostMinor).toBe(50_000); // prettier-ignore
    await expect((await db()).execute(sql`update version_pricings set at = now()`)).rejects.toMatchObject({ cause: { message: expect.stringMatching(/never altered/) } }); // prettier-ignore
  });

  test('tells those who may not see costs nothing of them, in any answer about it', async () => {
    const office = await newPricedOffice();
    const { installer, client, designer, owner, layoutId, projectId } = office;
    const version = await sharedVersion(office);
    await sent(office, version);
    const { fingerprint, terms } = (await client.visitor.get(`/api/versions/${version}/agreement`)).body; // prettier-ignore
    await client.visitor.post(`/api/versions/${version}/accept`, { typedName: 'C', fingerprint, terms }); // prettier-ignore
    await owner.visitor.post(`/api/versions/${version}/issue`);
    await designer.visitor.put(`/api/layouts/${layoutId}/draft`, {
      baseRevision: 1,
      document: moved(pricedCourt(office.slab, office.gravel), 3),
    });
    for (const who of [installer, client]) {
      for (const path of [
        `/api/versions/${version}`,
        `/api/versions/${version}/agreement`,
        `/api/versions/${version}/quotes`,
        `/api/versions/${version}/cost`,
        `/api/versions/${version}/site-pack`,
        `/api/layouts/${layoutId}/versions`,
        `/api/layouts/${layoutId}`,
        `/api/projects/${projectId}`,
        `/api/projects`,
        `/api/comparison?a=${version}&b=${version}`,
      ]) {
        const { body } = await who.visitor.get(path);
        const text = JSON.stringify(body);
        expect(text, path).not.toMatch(/cost|margin|priceList|takeOff/i);
        // The price of a pallet and of a bulk bag, in minor units and as they are printed.
        expect(text, path).not.toMatch(/41400|414\.00|6250|62\.50/);
      }
    }
  });
});

describe('a quote', () => {
  test('begins with the take-off, labour, margin and tax of the firm, and its sums add up', async () => {
    const office = await newPricedOffice();
    const version = await sharedVersion(office);
    const quote = await begun(office, version);
    const { takeOff } = (await office.owner.visitor.get(`/api/versions/${version}/pricing`)).body;
    expect(quote.draft.lines.map(({ id }) => id)).toEqual([
      ...takeOff.orders.map(({ id }: { id: string }) => id),
      'labour:area',
      'labour:hour',
    ]);
    expect(quote.unpriced.length).toBe(
      takeOff.orders.filter(({ packCostMinor }: { packCostMinor: number | null }) => packCostMinor === null).length, // prettier-ignore
    );
    const { costMinor, marginMinor, netMinor, taxMinor, totalMinor, lines } = quote.quote;
    const area = quote.draft.lines.find(({ id }) => id === 'labour:area')!;
    // 32.22 m² less the tree pit of 1 m²: 7.2 × 3.1 + 4.3 × 2.3 − 1.
    expect(area.amount).toBe(31.21);
    expect(lines.find(({ id }) => id === 'labour:area')!.lineCostMinor).toBe(140_445);
    expect(costMinor).toBe(lines.reduce((sum, line) => sum + line.lineCostMinor, 0));
    expect(marginMinor).toBe(Math.round(costMinor / 4));
    expect(netMinor).toBe(costMinor + marginMinor);
    expect(taxMinor).toBe(Math.round(netMinor / 5));
    expect(totalMinor).toBe(netMinor + taxMinor);
    expect(await begun(office, version)).toMatchObject({ id: quote.id });
  });

  test('is refused when it is stale, with both sides; when a line has no cost; when nobody sees the version', async () => {
    const office = await newPricedOffice();
    const { designer, owner } = office;
    const { id: version } = await newVersion(designer.visitor, office.layoutId);
    const quote = await begun(office, version);
    const path = `/api/quotes/${quote.id}`;
    await owner.visitor.patch(path, { revision: 1, note: 'Soon' });
    const stale = await designer.visitor.patch(path, { revision: 1, note: 'Later' });
    expect(stale).toMatchObject({ status: 409, body: { current: { draft: { note: 'Soon' } } } });
    const unseen = await designer.visitor.post(`${path}/send`, { revision: 2 });
    expect(unseen.status).toBe(409);
    expect(unseen.body.detail).toMatch(/Share it/);
    await designer.visitor.post(`/api/versions/${version}/share`);
    const unpriced = await designer.visitor.post(`${path}/send`, { revision: 2 });
    expect(unpriced.status).toBe(422);
    expect(unpriced.body.detail).toMatch(/Say first what it costs/);
    const whole = await designer.visitor.patch(path, {
      revision: 2,
      margin: { of: 'price', share: 10_000 },
    });
    expect(whole).toMatchObject({ status: 422, body: { errors: [{ path: ['margin', 'share'] }] } });
    expect((await letters(owner.actor.firmId, 'quote-sent')).length).toBe(0);
  });

  test('that is sent is numbered, frozen, and its client sees totals, a letter with the PDF and no cost', async () => {
    const office = await newPricedOffice();
    const { designer, owner, client } = office;
    const version = await sharedVersion(office);
    const first = await sent(office, version);
    expect(first).toMatchObject({ state: 'sent', number: 'Q-0001', written: 1 });
    const again = await designer.visitor.post(`/api/quotes/${first.id}/send`, { revision: first.revision }); // prettier-ignore
    expect(again.status).toBe(409);
    for (const [method, path, body] of [
      ['PATCH', `/api/quotes/${first.id}`, { revision: first.revision, note: 'No' }],
      ['DELETE', `/api/quotes/${first.id}`, undefined],
    ] as const) {
      expect((await designer.visitor.call(method, path, body)).status).toBe(409);
    }
    // What the firm is called and asks later changes nothing in it.
    await owner.visitor.patch('/api/firm/pricing', { revision: 1, taxBasisPoints: 0 });
    const shown = await quotesFor(client, version);
    expect(shown.quotes).toEqual([]);
    expect(shown.totals).toMatchObject([
      {
        number: 'Q-0001',
        replaced: false,
        netMinor: first.quote.netMinor,
        taxMinor: first.quote.taxMinor,
        totalMinor: first.quote.totalMinor,
      },
    ]);
    const [letter] = (await lettersTo(client.email)).filter(({ kind }) => kind === 'quote-sent');
    expect(letter.subject).toContain('Q-0001');
    expect(letter.attachments).toMatchObject([
      { name: 'quote-Q-0001.pdf', type: 'application/pdf' },
    ]);
    const pdf = await openQuotePdf(await db(), client.actor, first.id);
    if (!pdf.ok) throw new Error('no PDF');
    const text = (await pdfTexts(pdf.value)).join('\n');
    expect(text).toContain('Quote Q-0001');
    expect(text).not.toMatch(/margin|cost/i);
    expect(Buffer.from(pdf.value).subarray(0, 5).toString()).toBe('%PDF-');
    expect(letter.text).not.toMatch(/margin|cost/i);
    const second = await sent(office, version);
    expect(second.number).toBe('Q-0002');
    expect((await quotesFor(client, version)).totals.map(({ replaced }) => replaced)).toEqual([
      false,
      true,
    ]);
    await expect((await db()).execute(sql`delete from quotes where state = 'sent'`)).rejects.toMatchObject({ cause: { message: expect.stringMatching(/never altered/) } }); // prettier-ignore
  });

  test('that nobody is written to says so', async () => {
    const office = await newPricedOffice();
    const { id } = await newVersion(office.designer.visitor, office.layoutId);
    await office.designer.visitor.post(`/api/versions/${id}/share`);
    expect((await quotesFor(office.designer, id)).clients).toEqual([{ name: expect.stringMatching(/^client/), byLetter: true }]); // prettier-ignore
    expect((await quotesFor(office.client, id)).clients).toEqual([]);
    await office.owner.visitor.post(`/api/projects/${office.projectId}/people/remove`, {
      personId: office.client.actor.personId,
    });
    expect((await quotesFor(office.designer, id)).clients).toEqual([]);
    expect(await sent(office, id)).toMatchObject({ state: 'sent', written: 0 });
    expect((await letters(office.owner.actor.firmId, 'quote-sent')).length).toBe(0);
  });

  test('that is being written holds the currency', async () => {
    const firm = await newFirm();
    const { layoutId } = await newProject(firm.visitor);
    const version = await newVersion(firm.visitor, layoutId);
    const quote = (await firm.visitor.post(`/api/versions/${version.id}/quotes`)).body;
    const change = { revision: 0, currency: 'JPY' };
    const held = await firm.visitor.patch('/api/firm/pricing', change);
    expect(held).toMatchObject({ status: 422, body: { errors: [{ path: ['currency'] }] } });
    await firm.visitor.call('DELETE', `/api/quotes/${quote.id}`);
    const free = await firm.visitor.patch('/api/firm/pricing', change);
    expect(free).toMatchObject({ status: 200, body: { currency: 'JPY' } });
  });

  test('numbers have no gaps and are given once, however many are sent at a time', async () => {
    const office = await newPricedOffice();
    const versions: string[] = [];
    for (let n = 0; n < 4; n += 1) versions.push(await sharedVersion(office));
    const drafts: QuoteDetail[] = [];
    for (const version of versions) drafts.push(await completed(office, await begun(office, version))); // prettier-ignore
    const answers = await Promise.all(
      drafts.map(({ id, revision }) =>
        office.designer.visitor.post(`/api/quotes/${id}/send`, { revision }),
      ),
    );
    expect(answers.map(({ body }) => body.number).sort()).toEqual(['Q-0001', 'Q-0002', 'Q-0003', 'Q-0004']); // prettier-ignore
  });

  test('of hostile numbers still adds up to whole coins', async () => {
    const office = await newPricedOffice();
    const quote = await begun(office, await sharedVersion(office));
    const line = (n: number, amount: number, costMinor: number) => ({
      id: `own:${n}`,
      group: 'other',
      name: `Line ${n}`,
      amount,
      measure: '',
      costMinor,
    });
    const over = await office.designer.visitor.patch(`/api/quotes/${quote.id}`, {
      revision: 1,
      lines: [line(1, 10_000_000, 10_000_000_000)],
    });
    expect(over.status).toBe(422);
    const most = Array.from({ length: 300 }, (_, n) => line(n, 1000, 1_000_000_000));
    const answer = await office.designer.visitor.patch(`/api/quotes/${quote.id}`, {
      revision: 1,
      lines: most,
      margin: { of: 'cost', share: 100_000 },
      tax: { name: 'Tax', share: 10_000, on: 'lines' },
    });
    expect(answer.status, JSON.stringify(answer.body)).toBe(200);
    // 300 × 10¹² with ten times as much on it, and as much again: 6.6 × 10¹⁵ is still a whole number in a double.
    expect(answer.body.quote.totalMinor).toBe(6_600_000_000_000_000);
    expect(Number.isSafeInteger(answer.body.quote.totalMinor)).toBe(true);
  });
});
