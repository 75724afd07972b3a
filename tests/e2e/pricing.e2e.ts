import AxeBuilder from '@axe-core/playwright';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { pdfTexts } from '../unit/pdf/pdf-reading';
import { awake, goToStep, launch, openNewTable, openPage, saved, signIn, signUp } from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

const FILE = [
  'Kind,Name,Supplier,Code,Pack,Pack holds,Measure,Price,Length,Width,Thickness',
  'unit,Slab of the lower bed,Quennock Stone,=QS1,pallet,30,each,360.00,400,400,40',
  'aggregate,Pit gravel,Quennock Stone,PG,bulk bag,0.8,t,64.50,,,',
].join('\n');

const wellReadable = async (page: Page) => {
  const { violations } = await new AxeBuilder({ page }).analyze();
  expect(violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`)).toEqual([]);
};

const read = async (page: Page, name: string, text: string) => {
  await page
    .getByRole('dialog')
    .locator('input[type=file]')
    .setInputFiles({ name, mimeType: 'text/csv', buffer: Buffer.from(text) });
};

const pdfAt = async (page: Page, path: string): Promise<string> => {
  const bytes = await page.evaluate(async (where) => {
    const answer = await fetch(where);
    return [...new Uint8Array(await answer.arrayBuffer())];
  }, path);
  return (await pdfTexts(Uint8Array.from(bytes))).join('\n').replace(/[\u2009\u202f]/g, ' ');
};

it('takes a file of prices to a priced version, its quote as a PDF and an order by e-mail', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);

  // A file with a wrong row is listed and not taken; put right, it is.
  await page.goto('/catalogue');
  await page.getByText('Nothing here yet').waitFor();
  await page.getByRole('button', { name: 'Read in a file' }).click();
  await read(page, 'wrong.csv', `${FILE}\nbrick,Odd,,,,,,,,,`);
  await page.getByText('1 thing to put right. Nothing was read in.').waitFor();
  await page.getByRole('cell', { name: '4', exact: true }).waitFor();
  await read(page, 'prices.csv', FILE);
  await page.getByText('2 new items, 0 changed items, 0 as they are').waitFor();
  await page.getByRole('button', { name: 'Read it in' }).click();
  await page.getByRole('button', { name: 'Change Pit gravel' }).waitFor();
  await wellReadable(page);

  // A price by keyboard alone: Enter saves the row.
  await page.getByRole('button', { name: 'Change Pit gravel' }).press('Enter');
  await page.getByLabel('Price of one, EUR').fill('66');
  await page.getByLabel('Price of one, EUR').press('Enter');
  await page.getByText('Pit gravel is saved.').waitFor();
  await page.getByRole('button', { name: 'Prices of Pit gravel' }).getByText('€66.00').waitFor();

  // The supplier gets an address.
  await page.goto('/catalogue/suppliers');
  await awake(page);
  await page.getByRole('button', { name: 'Change Quennock Stone' }).click();
  await page.getByLabel('E-mail for orders').fill('orders@quennock.example');
  await page.getByRole('button', { name: 'Save', exact: true }).click();
  await page.getByText('Quennock Stone is saved.').waitFor();

  // A floor drawn with what the catalogue sells.
  await page.goto('/projects');
  await openNewTable(page);
  await goToStep(page, 'Unit');
  await page.getByRole('button', { name: /Slab of the lower bed/ }).click();
  await goToStep(page, 'Bond');
  await page.getByRole('button', { name: /Pit gravel/ }).click();
  await saved(page);
  await page.getByRole('button', { name: 'Save version 1' }).click();
  await page.getByRole('dialog').getByLabel('Label').fill('Priced');
  await page.getByRole('dialog').getByRole('button', { name: 'Save version 1' }).click();
  await page
    .getByText(/Version 1 saved/)
    .last()
    .waitFor();
  const layout = new URL(page.url()).pathname.split('/').pop();
  const version = await page.evaluate(
    async (id) => (await (await fetch(`/api/layouts/${id}/versions`)).json()).versions[0].id,
    layout,
  );
  await page.goto(`/versions/${version}`);
  await page.getByRole('button', { name: 'Share with the client' }).click();
  await page.getByRole('button', { name: 'Share it' }).click();
  await page.getByTestId('state').filter({ hasText: 'Shared' }).waitFor();

  // Its quote: what has no price is given one, margin and tax are set, and it is sent.
  await page.getByRole('link', { name: 'Quote and orders' }).click();
  await page.waitForURL(/\/quote$/);
  await awake(page);
  await page.getByRole('button', { name: 'Make a quote' }).click();
  const unpriced = page.getByText('no cost yet');
  await page.getByTestId('quote-sums').waitFor();
  for (let left = await unpriced.count(); left > 0; left -= 1) {
    const row = page.getByRole('listitem').filter({ hasText: 'no cost yet' }).first();
    await row.getByLabel('One costs').fill('10');
    await row.getByLabel('One costs').press('Enter');
    await expect.poll(() => unpriced.count()).toBe(left - 1);
  }
  await page.getByLabel('Margin on cost').fill('25');
  await page.getByLabel('Margin on cost').press('Enter');
  await wellReadable(page);
  await page.getByRole('button', { name: 'Send to the client' }).click();
  // Nobody is on this project as its client yet.
  await page.getByText(/Quote Q-0001 is numbered and kept, but no letter went out/).waitFor();
  const quote = await page.getByRole('link', { name: 'PDF' }).first().getAttribute('href');
  const quoteText = await pdfAt(page, quote!);
  expect(quoteText).toContain('Quote Q-0001');
  expect(quoteText).toContain('Stonecrop Yard');
  expect(quoteText).not.toMatch(/margin/i);

  // The order goes to the supplier by e-mail, once.
  await page.getByRole('button', { name: 'Make the orders ready, one a supplier' }).click();
  await page.getByRole('button', { name: 'Send the order' }).click();
  await page.getByRole('button', { name: 'Send it' }).click();
  await page.getByText(/its letter is sent/).waitFor();
  await wellReadable(page);
  await page.goto('/dev/mail');
  await page
    .getByRole('link', { name: /Order PO-0001 from Stonecrop Yard/ })
    .first()
    .click();
  await page.getByRole('link', { name: /order-PO-0001\.pdf/ }).waitFor();
  await page.getByRole('link', { name: /order-PO-0001\.csv/ }).waitFor();
  expect(complaints).toEqual([]);
  await context.close();
});

it('shows a client what the floor comes to, on a phone, and nothing of what it costs', async () => {
  const { page, complaints, context } = await openPage(browser, { width: 390, height: 844 });
  await signIn(page, 'client@larkmoss.example');
  await page.getByRole('link', { name: /Ashwick round terrace/ }).click();
  await page.getByTestId('version').first().getByRole('link').first().click();
  const total = page.getByTestId('quote-total');
  await total.waitFor();
  expect(await total.innerText()).toMatch(/Total\s+€\d/);
  expect(await page.locator('main').innerText()).not.toMatch(/margin €|Materials cost/);
  expect(await page.getByRole('link', { name: 'Quote and orders' }).count()).toBe(0);
  const link = page.getByRole('link', { name: 'Read the quote (PDF)' });
  expect(await pdfAt(page, (await link.getAttribute('href'))!)).toContain('Quote Q-0001');
  expect(complaints).toEqual([]);
  await context.close();
});
