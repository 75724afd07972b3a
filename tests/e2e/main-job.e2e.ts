import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Browser } from 'playwright-core';
import {
  drawSides,
  goToStep,
  launch,
  openNewTable,
  openPage,
  saved,
  signUp,
  tableReady,
  wholeUnits,
} from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

/** The L-shaped court of the layout document's example: 7200 × 5400 less 2900 × 2300. */
const COURT = [
  ['ArrowRight', '7200'],
  ['ArrowUp', '3.1m'],
  ['ArrowLeft', '2900'],
  ['ArrowUp', '230 cm'],
  ['ArrowLeft', '4,300'],
] as const;

it('takes a newcomer from an empty firm to a saved version and its plan', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);

  // Ground: drawn with typed lengths.
  await page.getByRole('button', { name: 'Draw anew' }).click();
  await page.getByTestId('floor').focus();
  await page.keyboard.press('Enter');
  await drawSides(page, COURT);
  await page.keyboard.press('Escape');
  await page.getByTestId('floor').focus();
  await page.keyboard.press('c');
  for (const [side, length] of [
    ['AB', '7 200 mm'],
    ['BC', '3 100 mm'],
    ['CD', '2 900 mm'],
    ['DE', '2 300 mm'],
    ['EF', '4 300 mm'],
    ['FA', '5 400 mm'],
  ])
    expect((await page.getByLabel(`Length of ${side}`).inputValue()).replace(/\s/g, ' ')).toBe(
      length,
    );

  // A tree pit, by pointing: the floor is put so that 1 px is a known length.
  await page.getByRole('button', { name: 'Add keep-out' }).click();
  await page.getByTestId('floor').focus();
  await page.keyboard.press('Enter');
  await drawSides(page, [
    ['ArrowRight', '1000'],
    ['ArrowUp', '1000'],
    ['ArrowLeft', '1000'],
  ]);
  await page.keyboard.press('Escape');
  await page.getByTestId('floor').focus();
  await page.keyboard.press('c');
  await page.getByLabel('Name of the keep-out').fill('Tree pit');
  await page.keyboard.press('Enter');
  // Its first corner came to (0, 0), the court's own corner: picked with the keys and moved by typing.
  for (const [n, [x, y]] of [
    [1500, 3600],
    [2500, 3600],
    [2500, 4600],
    [1500, 4600],
  ].entries()) {
    await page.getByTestId('floor').focus();
    for (let press = 0; press < (n === 0 ? 13 : 2); press++) await page.keyboard.press('.');
    await page.getByLabel('Across').fill(String(x));
    await page.keyboard.press('Enter');
    await page.getByLabel('Up', { exact: true }).fill(String(y));
    await page.keyboard.press('Enter');
  }

  await goToStep(page, 'Unit');
  await page.getByRole('button', { name: /Slab 450 × 450/ }).click();
  await goToStep(page, 'Bond');
  await page.getByRole('radio', { name: 'Chequer' }).click();
  await page.getByLabel('Joint', { exact: true }).fill('3');
  await page.keyboard.press('Enter');
  await goToStep(page, 'Fit');
  await page.getByLabel('Turn, anticlockwise').fill('45');
  await page.keyboard.press('Enter');

  // 31.21 m² was worked by hand: 7.2 × 3.1 + 4.3 × 2.3 = 32.21, less the pit's 1.
  await expect.poll(() => page.getByText('31.21', { exact: false }).count()).toBeGreaterThan(0);
  const units = await wholeUnits(page);
  expect(units).toBeGreaterThan(40);
  const fill = Number((await page.getByTestId('fill-area').innerText()).replace(/[^\d.]/g, ''));
  expect(fill).toBeCloseTo(31.21 - units * 0.2025, 2);

  await saved(page);
  await page.getByRole('button', { name: 'Save version 1' }).first().click();
  await page.getByLabel('Label').fill('Diamond chequer');
  await page.getByRole('dialog').getByRole('button', { name: 'Save version 1' }).click();
  await expect
    .poll(() => page.getByText(`Version 1 saved. ${units} whole units`, { exact: false }).count())
    .toBeGreaterThan(0);

  await page.getByRole('link', { name: 'Plan' }).click();
  await page.waitForURL('**/versions/*/plan');
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('button', { name: /PDF/ }).click(),
  ]);
  expect(download.suggestedFilename()).toMatch(/\.pdf$/);
  expect(complaints).toEqual([]);
  await context.close();
});

it('keeps a ring that crosses itself as drawn, shows where, and lays again after undo', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await page.getByRole('button', { name: /^AB/ }).click();
  await page.getByLabel('Direction').first().fill('60');
  await page.keyboard.press('Enter');
  await page.getByLabel('Length of AB').fill('20 m');
  await page.keyboard.press('Enter');
  await expect.poll(() => page.getByText('cannot be laid yet').count()).toBe(1);
  await expect
    .poll(() => page.getByText(/crosses itself at .* edge BC meets edge DA/).count())
    .toBe(1);
  await page.getByTestId('floor').focus();
  await page.keyboard.press('Control+z');
  await page.keyboard.press('Control+z');
  await expect.poll(() => page.getByText('cannot be laid yet').count()).toBe(0);
  await page.keyboard.press('Control+Shift+z');
  await page.keyboard.press('Control+Shift+z');
  await saved(page);
  await page.reload();
  await tableReady(page);
  await expect.poll(() => page.getByText('cannot be laid yet').count()).toBe(1);
  expect(complaints).toEqual([]);
  await context.close();
});
