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
  await page.getByRole('textbox', { name: 'Corners' }).fill('4');
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
  expect(await page.getByTestId('off-5').innerText()).toMatch(/^off by\s[+]0[.]/);

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

it('takes the edge from a drawing, with the keep-out that is chosen, and says what cannot be read', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await page.getByRole('button', { name: 'Open the edge from a file' }).click();
  await page.getByLabel('Or paste a list of corners').fill('0,0\n7.2,oops\n7.2,3.1');
  await page.getByRole('button', { name: 'Read the list' }).click();
  await page.getByText('Line 2: up “oops” is not a length.').waitFor();

  // A square of 5 m with a round pit of 1 m across in it, in metres ($INSUNITS 6 of the DXF reference).
  const side = (x0: number, y0: number, x1: number, y1: number) =>
    [0, 'LINE', 8, 'EDGE', 10, x0, 20, y0, 11, x1, 21, y1] as const;
  const drawing = [
    ...[0, 'SECTION', 2, 'HEADER', 9, '$INSUNITS', 70, 6, 0, 'ENDSEC', 0, 'SECTION', 2, 'ENTITIES'],
    ...[...side(0, 0, 5, 0), ...side(5, 0, 5, 5), ...side(5, 5, 0, 5), ...side(0, 5, 0, 0)],
    ...[0, 'CIRCLE', 8, 'PIT', 10, 2, 20, 2, 40, 0.5, 0, 'ENDSEC', 0, 'EOF'],
  ].join('\n');
  await page
    .locator('input[type=file]')
    .setInputFiles({ name: 'edge.dxf', mimeType: 'image/vnd.dxf', buffer: Buffer.from(drawing) });
  expect(await page.getByTestId('outline-size').innerText()).toMatch(/^5.000.mm × 5.000.mm$/);
  await page.getByRole('button', { name: 'Use this ground' }).click();
  // 25 − π · 0.5² = 24.21 m².
  expect(await area(page)).toMatch(/^24[.]21.m²$/);
  expect(await page.getByLabel('Name of the keep-out').inputValue()).toBe('PIT');
  expect(complaints).toEqual([]);
  await context.close();
});
