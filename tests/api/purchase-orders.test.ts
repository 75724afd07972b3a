import { sql } from 'drizzle-orm';
import Papa from 'papaparse';
import { describe, expect, test } from 'vitest';
import type { PurchaseOrder, VersionOrders } from '@/api-types/purchase-orders';
import { readLetter } from '@/server/mail/local-letters';
import { startLocalMailServer } from '@/server/mail/local-server';
import { letterSender } from '@/server/mail/sender';
import { smtpPost } from '@/server/mail/smtp-post';
import { SMTP_PATIENCE } from '@/server/mail/smtp-settings';
import { mkdtempSync, readdirSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { pdfTexts } from '../unit/pdf/pdf-reading';
import { newProject, newVersion } from './firm';
import { mailServer } from './mail-servers';
import { letters } from './office';
import { newPricedOffice, pricedCourt, type PricedOffice } from './priced-office';
import { db, useEmptyDatabase } from './site';

useEmptyDatabase();

const ordered = async (office: PricedOffice): Promise<VersionOrders & { version: string }> => {
  const { designer, layoutId } = office;
  const { id } = await newVersion(designer.visitor, layoutId);
  const answer = await designer.visitor.post(`/api/versions/${id}/orders`, {});
  expect(answer.status, JSON.stringify(answer.body)).toBe(201);
  return { ...answer.body, version: id };
};

const ofStone = ({ orders }: Pick<VersionOrders, 'orders'>): PurchaseOrder =>
  orders.find(({ supplier }) => supplier.name === 'Quennock Stone')!;

const send = ({ designer }: PricedOffice, { id, revision }: PurchaseOrder) =>
  designer.visitor.post(`/api/orders/${id}/send`, { revision });

describe('orders of a version', () => {
  test('are parted by supplier, with the take-off’s packs, and what nobody sells is named', async () => {
    const office = await newPricedOffice();
    const { orders, unsupplied, version } = await ordered(office);
    expect(orders.map(({ supplier }) => supplier.name).sort()).toEqual(['Over Pit', 'Quennock Stone']); // prettier-ignore
    const { takeOff } = (await office.owner.visitor.get(`/api/versions/${version}/pricing`)).body;
    const wanted = takeOff.orders.find(({ kind }: { kind: string }) => kind === 'unit');
    expect(ofStone({ orders })).toMatchObject({
      state: 'draft',
      number: null,
      letter: null,
      lines: [{ itemId: office.slab, code: '=QS450', amount: wanted.amount, costMinor: 41_400 }],
      costMinor: wanted.costMinor,
    });
    const lines = orders.flatMap((order) => order.lines).length;
    expect(lines + unsupplied.length).toBe(takeOff.orders.filter(({ amount }: { amount: number }) => amount > 0).length); // prettier-ignore
    // Asked again, nothing is made twice.
    const again = await office.designer.visitor.post(`/api/versions/${version}/orders`, {});
    expect(again.body.orders).toHaveLength(orders.length);
  });

  test('may be changed until they are sent, with their revision', async () => {
    const office = await newPricedOffice();
    const order = ofStone(await ordered(office));
    const at = `/api/orders/${order.id}`;
    const [line] = order.lines;
    const changed = await office.designer.visitor.patch(at, {
      revision: 1,
      lines: [{ ...line, amount: 5 }],
      deliveryDay: '2150-03-01',
      deliveryPlace: 'Court\nBell Row',
    });
    expect(changed.body).toMatchObject({ revision: 2, costMinor: 207_000 });
    const stale = await office.owner.visitor.patch(at, { revision: 1, note: 'Late' });
    expect(stale).toMatchObject({ status: 409, body: { current: { revision: 2 } } });
  });

  test.each([
    ['lines', (order: PurchaseOrder) => ({ lines: order.lines.map((line) => ({ ...line, amount: 1.5 })) }), /no whole number/], // prettier-ignore
    ['lines', () => ({ lines: [] }), /nothing in this order/],
    ['deliveryDay', () => ({ deliveryDay: '2020-01-01' }), /is past/],
  ] as const)('are not sent with wrong %s', async (field, change, words) => {
    const office = await newPricedOffice();
    const order = ofStone(await ordered(office));
    const changed = await office.designer.visitor.patch(`/api/orders/${order.id}`, {
      revision: 1,
      ...change(order),
    });
    const answer = await send(office, changed.body);
    expect(answer).toMatchObject({ status: 422, body: { detail: expect.stringMatching(words) } });
    expect(answer.body.errors[0].path[0]).toBe(field);
    expect(await letters(office.owner.actor.firmId, 'purchase-order')).toEqual([]);
  });

  test('are not sent to a supplier without an address', async () => {
    const office = await newPricedOffice();
    const { orders } = await ordered(office);
    const order = orders.find(({ supplier }) => supplier.name === 'Over Pit')!;
    const answer = await send(office, order);
    expect(answer).toMatchObject({ status: 422, body: { detail: expect.stringMatching(/no e-mail address/) } }); // prettier-ignore
  });

  test('are sent once, however often and at the same time it is asked', async () => {
    const office = await newPricedOffice();
    const order = ofStone(await ordered(office));
    const answers = await Promise.all([1, 2, 3].map(() => send(office, order)));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409, 409]);
    const posted = await letters(office.owner.actor.firmId, 'purchase-order');
    expect(posted).toHaveLength(1);
    const sent = answers.find(({ status }) => status === 200)!.body as PurchaseOrder;
    expect(sent).toMatchObject({ state: 'sent', number: 'PO-0001', letter: 'waiting' });
    expect((await send(office, sent)).status).toBe(409);
    expect((await office.designer.visitor.call('DELETE', `/api/orders/${sent.id}`)).status).toBe(409); // prettier-ignore
    const audit = await office.owner.visitor.get('/api/audit?what=order.sent');
    expect(audit.body.entries).toMatchObject([
      { detail: { number: 'PO-0001', supplier: 'Quennock Stone', to: 'orders@quennock.example' } },
    ]);
    await expect((await db()).execute(sql`update purchase_orders set note = 'x' where state = 'sent'`)).rejects.toMatchObject({ cause: { message: expect.stringMatching(/never altered/) } }); // prettier-ignore
  });

  test('may be made once more for a supplier, as an order of its own', async () => {
    const office = await newPricedOffice();
    const { version, ...first } = await ordered(office);
    await send(office, ofStone(first));
    const more = await office.designer.visitor.post(`/api/versions/${version}/orders`, {
      supplierId: office.stone,
    });
    expect(more.status).toBe(201);
    expect(more.body.orders).toHaveLength(3);
    const elsewhere = await office.designer.visitor.post(`/api/versions/${version}/orders`, {
      supplierId: 'nobody',
    });
    expect(elsewhere.status).toBe(422);
  });
});

describe('an order for another version of the project', () => {
  test('is named before a second one goes, which then goes all the same', async () => {
    const office = await newPricedOffice();
    const first = await ordered(office);
    const went = (await send(office, ofStone(first))).body as PurchaseOrder;
    const second = await ordered(office);
    const at = `/api/versions/${second.version}/orders`;
    const { elsewhere } = (await office.designer.visitor.get(at)).body as VersionOrders;
    expect(elsewhere).toMatchObject([
      {
        id: went.id,
        number: 'PO-0001',
        supplier: 'Quennock Stone',
        email: 'orders@quennock.example',
        sentAt: went.sentAt,
        sentBy: went.sentBy!.name,
        versionId: first.version,
        versionNumber: 1,
      },
    ]);
    const refused = await send(office, ofStone(second));
    expect(refused).toMatchObject({
      status: 409,
      body: {
        detail: expect.stringMatching(/^Order PO-0001 went to Quennock Stone, orders@quennock.example, on .* for version 1 of /), // prettier-ignore
        elsewhere: [{ id: went.id }],
      },
    });
    // Nothing is numbered for what was not sent, and what is known is no hindrance.
    const sent = await office.designer.visitor.post(`/api/orders/${ofStone(second).id}/send`, {
      revision: 1,
      besides: [went.id],
    });
    expect(sent).toMatchObject({ status: 200, body: { number: 'PO-0002' } });
  });

  test('is told of when both are sent at the same time', async () => {
    const office = await newPricedOffice();
    const orders = [await ordered(office), await ordered(office)].map(ofStone);
    const answers = await Promise.all(orders.map((order) => send(office, order)));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  });

  test('of the same version, and of another project, are no matter', async () => {
    const office = await newPricedOffice();
    const { version, ...first } = await ordered(office);
    await send(office, ofStone(first));
    const more = await office.designer.visitor.post(`/api/versions/${version}/orders`, {
      supplierId: office.stone,
    });
    expect(more.body.elsewhere).toEqual([]);
    const draft = more.body.orders.find(({ state, supplier }: PurchaseOrder) => state === 'draft' && supplier.id === office.stone); // prettier-ignore
    expect((await send(office, draft)).status).toBe(200);
    const { layoutId } = await newProject(office.designer.visitor, pricedCourt(office.slab, office.gravel)); // prettier-ignore
    expect((await ordered({ ...office, layoutId })).elsewhere).toEqual([]);
  });
});

test('an order goes by SMTP with its PDF and CSV as they were when it was sent, and is wiped from the outbox', async () => {
  const office = await newPricedOffice();
  const order = ofStone(await ordered(office));
  const changed = await office.designer.visitor.patch(`/api/orders/${order.id}`, {
    revision: 1,
    deliveryDay: '2150-03-01',
    deliveryPlace: '=Court\nBell Row',
  });
  const sent = (await send(office, changed.body)).body as PurchaseOrder;
  const server = await mailServer();
  const sender = letterSender(
    await db(),
    smtpPost({ url: server.url, from: 'Evenlay <evenlay@floors.example>', ...SMTP_PATIENCE }),
  );
  await sender.drain();
  const mail = server.taken.find(({ text }) => text?.includes('1 March 2150'))!;
  expect(mail.to).toMatchObject({ value: [{ address: 'orders@quennock.example' }] });
  expect(mail.replyTo).toMatchObject({ value: [{ address: 'desk@firm.example' }] });
  expect(mail.attachments.map(({ filename, contentType }) => [filename, contentType])).toEqual([
    ['order-PO-0001.pdf', 'application/pdf'],
    ['order-PO-0001.csv', 'text/csv'],
  ]);
  const [pdf, csv] = mail.attachments.map(({ content }) => new Uint8Array(content));
  const text = (await pdfTexts(pdf)).join('\n');
  for (const words of ['Order PO-0001', 'Quennock Stone', '1 March 2150', 'Unload with care.']) {
    expect(text).toContain(words);
  }
  const rows = Papa.parse<Record<string, string>>(
    new TextDecoder().decode(csv).replace(/^\ufeff/, ''),
    { header: true, skipEmptyLines: true },
  ).data;
  expect(rows).toMatchObject([
    {
      Order: 'PO-0001',
      'Wanted on': '2150-03-01',
      'Deliver to': "'=Court, Bell Row",
      'Your code': "'=QS450",
      Item: 'Slab 450 (Slab 450 × 450)',
      Packs: String(sent.lines[0].amount),
      'Price of a pack': '414.00',
      Currency: 'GBP',
    },
  ]);
  const [letter] = await letters(office.owner.actor.firmId, 'purchase-order');
  expect(letter).toMatchObject({ text: '', html: '', attachments: null });
  expect((await office.owner.visitor.get(`/api/orders/${sent.id}`)).body.letter).toBe('sent');
});

test('where no mail server is set, the letter lies on this machine with its files', async () => {
  const office = await newPricedOffice();
  await send(office, ofStone(await ordered(office)));
  const folder = mkdtempSync(path.join(tmpdir(), 'evenlay-mail-'));
  const server = await startLocalMailServer(folder);
  const sender = letterSender(
    await db(),
    smtpPost({ url: server.url, from: 'Evenlay <evenlay@localhost>', ...SMTP_PATIENCE }),
  );
  await sender.drain();
  await server.close();
  const read = await Promise.all(
    readdirSync(folder).map((name) => readLetter(folder, name.replace(/\.eml$/, ''))),
  );
  const letter = read.find((each) => each?.subject.includes('PO-0001'))!;
  expect(letter.attachments.map(({ name }) => name)).toEqual(['order-PO-0001.pdf', 'order-PO-0001.csv']); // prettier-ignore
  expect(Buffer.from(letter.attachments[0].content, 'base64').subarray(0, 5).toString()).toBe('%PDF-'); // prettier-ignore
});

test('another firm sees neither order nor PDF nor CSV of it', async () => {
  const office = await newPricedOffice();
  const order = ofStone(await ordered(office));
  const other = await newPricedOffice();
  for (const tail of ['', '/pdf', '/csv']) {
    expect((await other.owner.visitor.get(`/api/orders/${order.id}${tail}`)).status).toBe(404);
  }
});
