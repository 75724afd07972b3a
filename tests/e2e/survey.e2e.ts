import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Browser, Page } from 'playwright-core';
import { launch, openNewTable, openPage, saved, signUp } from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

const state = (page: Page) => page.getByTestId('survey-state').getAttribute('data-state');
const area = (page: Page) =>
  page.getByRole('region', { name: 'Perimeter' }).getByText(/m²$/).innerText();

it('takes a ground from tapes: a wrong reading stands out, the rest is kept, and undo brings the old ground back', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  const before = await area(page);
  await page.getByRole('button', { name: 'Enter a tape survey' }).click();
  await page.getByLabel('Corners').fill('4');
  await page.getByRole('button', { name: 'Begin with these' }).click();
  expect(await state(page)).toBe('short');

  // A 3 m × 4 m ground by its sides and both diagonals of 5 m (3, 4, 5), typed one after another with Enter.
  await page.getByLabel('Tape A – B').focus();
  for (const length of ['4000', '3m', '4.0 m', '3000', '5000', '5310']) {
    await page.keyboard.type(length);
    await page.keyboard.press('Enter');
  }
  expect(await state(page)).toBe('doubt');
  await page
    .getByTestId('survey-state')
    .getByText(/nobody can tell which/)
    .waitFor();
  await page.getByLabel('Tape B – D').fill('5001');
  await page.keyboard.press('Enter');
  expect(await state(page)).toBe('agrees');
  expect(await page.getByTestId('off-5').innerText()).toMatch(/^off by [+]0[.]/);

  // Kept while it is not done: closed, and gone on with after a reload.
  await page.getByRole('button', { name: 'Go on later' }).click();
  await saved(page);
  await page.reload();
  await page.locator('[data-ready=true]').waitFor();
  expect(await area(page)).toBe(before);
  await page.getByRole('button', { name: 'Go on with the tape survey' }).click();
  expect(await page.getByLabel('Tape A – B').inputValue()).toMatch(/^4.000.mm$/);
  await page.getByRole('button', { name: 'Use this ground' }).click();
  expect(await area(page)).toMatch(/^12(?:[.]00)?.m²$/);
  await page.getByTestId('floor').focus();
  await page.keyboard.press('Control+z');
  expect(await area(page)).toBe(before);
  expect(complaints).toEqual([]);
  await context.close();
});
