import { expect, test } from 'vitest';
import { nodePdf } from '@/server/pdf/node-pdf';
import { PdfNotMade, pdfThreadBegun, threadPdf } from '@/server/pdf/pdf-thread';
import { planSheets } from '@/sheets/plan-sheet';
import { COURT, planInput } from '../sheets/sample-floors';
import { pdfTexts } from './pdf-reading';

const about = { title: 'Plan', author: 'Hollin & Sedge' };

/** A PDF is made in its own thread, and is the one that is made without it. */
test('the thread makes the PDF that is made without it', async () => {
  await pdfThreadBegun();
  const sheets = planSheets(planInput(COURT));
  const own = await pdfTexts(await threadPdf(sheets, about));
  expect(own.length).toBeGreaterThan(0);
  expect(own).toEqual(await pdfTexts(await nodePdf(sheets, about)));
});

test('other work goes on meanwhile, and tasks at once all get their own answer', async () => {
  const sheets = planSheets(planInput(COURT));
  let rounds = 0;
  const other = setInterval(() => (rounds += 1), 0);
  const files = await Promise.all([1, 2].map(() => threadPdf(sheets, about)));
  clearInterval(other);
  // In this thread nothing else would run while a page is drawn.
  expect(rounds).toBeGreaterThan(10);
  expect(files.every((file) => new TextDecoder('latin1').decode(file).startsWith('%PDF'))).toBe(
    true,
  );
});

test('one that takes too long is stopped with plain words, and the next is made all the same', async () => {
  const sheets = planSheets(planInput(COURT));
  const late = threadPdf(sheets, about, 1);
  const next = threadPdf(sheets, about);
  await expect(late).rejects.toThrow(PdfNotMade);
  await expect(late).rejects.toThrow('took too long');
  expect((await next).byteLength).toBeGreaterThan(1000);
});

test('sheets that cannot be drawn are said to be, and the next are drawn', async () => {
  const sheets = planSheets(planInput(COURT));
  const broken = [{ ...sheets[0], layers: null }] as unknown as typeof sheets;
  await expect(threadPdf(broken, about)).rejects.toThrow('could not be made');
  expect((await threadPdf(sheets, about)).byteLength).toBeGreaterThan(1000);
});
