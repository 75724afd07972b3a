import { describe, expect, test } from 'vitest';
import { drawingCommands } from '@/sheets/drawing';
import { orderSheets, type OrderPaper } from '@/sheets/order-sheet';
import { quoteSheets, type QuotePaper } from '@/sheets/quote-sheet';
import { nodePdf } from '@/server/pdf/node-pdf';
import { pdfTexts } from '../pdf/pdf-reading';
import { letteringFaults, sheetTexts } from './sheet-invariants';

const firm = {
  name: 'Stonecrop Yard',
  lines: ['4 Withy Lane', 'Nether Tarrow', '01632 960 123', 'desk@stonecrop.example'],
  registration: 'Tax number ST 000 001',
};

const quote = (over: Partial<QuotePaper> = {}): QuotePaper => ({
  size: 'A4',
  firm,
  clientName: 'Odwin Tarrel',
  number: 'Q-0007',
  on: '2026-03-01',
  validUntil: '2026-03-31',
  preparedBy: 'Tamsin Okelby',
  project: 'Inner court',
  floor: 'Chequer court, version 3 (Well started)',
  fingerprint: '0123456789',
  groups: [
    {
      name: 'Materials',
      lines: [
        { name: 'Slab 450 × 450', amount: 66, measure: 'each' },
        { name: 'River gravel 10 mm', amount: 2.125, measure: 'bulk bag' },
      ],
      netMinor: 1_234_567,
    },
    {
      name: 'Work',
      lines: [{ name: 'Labour', amount: 31.21, measure: 'm²' }],
      netMinor: 187_260,
    },
  ],
  currency: 'GBP',
  netMinor: 1_421_827,
  tax: { name: 'VAT', words: '20 %', minor: 284_365 },
  roundingMinor: 0,
  totalMinor: 1_706_192,
  note: 'Thank you for asking us.\nWe could begin in April.',
  terms: 'Half when the work begins, half when it is done.',
  ...over,
});

const order = (over: Partial<OrderPaper> = {}): OrderPaper => ({
  size: 'A4',
  firm,
  supplier: { name: 'Quennock Stone Works', address: 'Quarry Road\nOver Quennock' },
  number: 'PO-0012',
  on: '2026-03-01',
  orderedBy: 'Tamsin Okelby',
  project: 'Inner court',
  deliveryDay: '2026-03-20',
  deliveryPlace: 'Inner court\n2 Bell Row',
  lines: [
    {
      name: 'Slab 450 × 450',
      code: 'QS-450',
      pack: { name: 'pallet', holds: 36, measure: 'each', whole: true },
      amount: 2,
      costMinor: 41_400,
    },
    {
      name: 'River gravel 10 mm',
      code: '',
      pack: { name: 'bulk bag', holds: 0.8, measure: 't', whole: true },
      amount: 3,
      costMinor: null,
    },
  ],
  currency: 'GBP',
  note: '',
  terms: 'Unload with care; edges are seen.',
  ...over,
});

const long = 'Sawn and brushed limestone of the upper bed '.repeat(4).trim();

const papers = {
  'a quote': quoteSheets(quote()),
  'a draft quote on Letter': quoteSheets(quote({ number: null, size: 'Letter' })),
  'a quote of nothing but work, to nobody by name': quoteSheets(
    quote({ clientName: '', groups: [], note: '', terms: '' }),
  ),
  'a quote of 150 lines with long names': quoteSheets(
    quote({
      clientName: long,
      firm: { ...firm, name: long, lines: [long, ...firm.lines] },
      groups: [
        {
          name: 'Materials',
          lines: Array.from({ length: 150 }, (_, n) => ({
            name: `${n + 1}. ${n % 3 === 0 ? long : 'Slab'}`,
            amount: n * 1000.125,
            measure: n % 7 === 0 ? long.slice(0, 60) : 'each',
          })),
          netMinor: 123_456_789_012,
        },
      ],
      totalMinor: 98_765_432_109_876,
      terms: `${long}\n\n${long} ${long}`.repeat(30),
    }),
  ),
  'an order': orderSheets(order()),
  'an order without prices and codes': orderSheets(
    order({ lines: order().lines.map((line) => ({ ...line, code: '', costMinor: null })) }),
  ),
  'an order of 90 long lines': orderSheets(
    order({
      size: 'Letter',
      number: null,
      deliveryDay: null,
      lines: Array.from({ length: 90 }, (_, n) => ({
        ...order().lines[0],
        name: `${n + 1}. ${long}`,
        code: `CODE-${'0'.repeat(40)}${n}`,
        costMinor: 1_234_567_890,
      })),
    }),
  ),
};

describe.each(Object.entries(papers))('%s', (_name, sheets) => {
  test('every text is legible, within its frame and clear of the others', () => {
    for (const sheet of sheets) expect(letteringFaults(sheet)).toEqual([]);
  });
  test('no rule leaves the paper’s frames', () => {
    for (const sheet of sheets) {
      const { page, foot } = sheet.frames;
      for (const command of drawingCommands(sheet)) {
        if (command.kind !== 'line') continue;
        for (const [x, y] of [command.from, command.to]) {
          expect(x).toBeGreaterThanOrEqual(page.left - 0.01);
          expect(x).toBeLessThanOrEqual(page.right + 0.01);
          expect(y).toBeLessThanOrEqual(foot.bottom);
        }
      }
    }
  });
  test('pages are numbered through', () => {
    sheets.forEach((sheet, n) => {
      const texts = sheetTexts(sheet).map(({ text }) => text);
      expect(texts).toContain(`Page ${n + 1} of ${sheets.length}`);
    });
  });
});

test('no line of a long quote or order is lost between its pages', () => {
  for (const name of [
    'a quote of 150 lines with long names',
    'an order of 90 long lines',
  ] as const) {
    const texts = papers[name].flatMap(sheetTexts).map(({ text }) => text);
    const numbers = texts.flatMap((text) => /^(\d+)\. /.exec(text)?.[1] ?? []).map(Number);
    expect(numbers).toEqual(Array.from({ length: numbers.length }, (_, n) => n + 1));
    expect(numbers.length).toBe(name.includes('150') ? 150 : 90);
    expect(papers[name].length).toBeGreaterThan(2);
  }
});

test('a table that goes over says its headings again', () => {
  for (const sheet of papers['an order of 90 long lines'].slice(0, -1)) {
    expect(sheetTexts(sheet).map(({ text }) => text)).toContain('Item');
  }
});

test('as a PDF a quote says its sums, and nothing of cost or margin', async () => {
  const pdf = await nodePdf(quoteSheets(quote()), { title: 'Quote Q-0007', author: firm.name });
  const said = (await pdfTexts(pdf)).join('\n');
  for (const words of ['Quote Q-0007', '£12 345.67', '£17 061.92', '31 March 2026', 'VAT 20 %']) {
    expect(said.replace(/[\u2009\u202f]/g, ' ')).toContain(words);
  }
  expect(said).not.toMatch(/margin|cost/i);
});
