import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Browser, Page } from 'playwright-core';
import {
  drawSides,
  goToStep,
  launch,
  openNewTable,
  openPage,
  PASSWORD,
  signUp,
  tableReady,
  wholeUnits,
} from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

const best = (page: Page) => page.getByTestId('best-start');

/** A 3 m square of ground with 300 mm slabs and no joint: ten by ten close exactly, from one start only. */
async function exactFloor(page: Page) {
  await signUp(page);
  await openNewTable(page, 'Exact');
  await page.getByRole('button', { name: 'Draw anew' }).click();
  await page.getByTestId('floor').focus();
  await page.keyboard.press('Enter');
  await drawSides(page, [
    ['ArrowRight', '3000'],
    ['ArrowUp', '3000'],
    ['ArrowLeft', '3000'],
  ]);
  await page.keyboard.press('Escape');
  await page.getByTestId('floor').focus();
  await page.keyboard.press('c');
  await page.getByLabel(/^Clearance/).fill('0');
  await page.keyboard.press('Enter');
  await goToStep(page, 'Unit');
  await page.getByRole('button', { name: /Slab 300 × 300/ }).click();
  await goToStep(page, 'Bond');
  await page.getByRole('radio', { name: 'Stack' }).click();
  await page.getByLabel('Joint', { exact: true }).fill('0');
  await page.keyboard.press('Enter');
  await goToStep(page, 'Fit');
  await page.getByLabel('Turn, anticlockwise').fill('0');
  await page.keyboard.press('Enter');
}

it('finds the one start that closes a floor exactly, takes it as one undo step, and seeks joints', async () => {
  const { page, complaints, context } = await openPage(browser);
  await exactFloor(page);
  // Ten 300 mm units in 3,000 mm: the layout document’s own example of an exact fit.
  await expect
    .poll(() => best(page).innerText(), { timeout: 20_000 })
    .toContain('No start lays more than 100');
  const before = await wholeUnits(page);
  const take = page.getByRole('button', { name: 'Take the best start' });
  if (before < 100) {
    await take.click();
    await expect.poll(() => wholeUnits(page)).toBe(100);
    await page.getByTestId('floor').focus();
    await page.keyboard.press('Control+z');
    await expect.poll(() => wholeUnits(page)).toBe(before);
  }
  // With a joint of 3 mm ten units take 3,027 mm: nine by nine are left. Arithmetic.
  await page.getByRole('button', { name: 'Try these joints' }).click();
  await expect
    .poll(() => page.getByRole('region', { name: 'Joint range' }).innerText(), { timeout: 30_000 })
    .toMatch(/3\s?mm\s+81 whole/);
  expect(complaints).toEqual([]);
  await context.close();
});

it('drags the dot of the shift map with the floor following, takes choices, holds to edges', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await goToStep(page, 'Fit');
  await page.getByTestId('shift-map').waitFor({ timeout: 20_000 });
  const start = await page.getByLabel('Start across').inputValue();
  const box = (await page.getByTestId('shift-map').boundingBox())!;
  await page.mouse.move(box.x + box.width * 0.3, box.y + box.height * 0.4);
  await page.mouse.down();
  await page.mouse.move(box.x + box.width * 0.6, box.y + box.height * 0.7, { steps: 5 });
  await page.mouse.up();
  await expect.poll(() => page.getByLabel('Start across').inputValue()).not.toBe(start);

  // The first choice lays what is said to be the most, to the unit.
  const most = Number(/more than (\d+)/.exec(await best(page).innerText())![1]);
  await page.getByRole('region', { name: 'Choices' }).getByRole('button').first().click();
  await expect.poll(() => wholeUnits(page)).toBe(most);

  await page.getByRole('button', { name: 'Row along an edge' }).click();
  await page.getByRole('button', { name: 'AB', exact: true }).click();
  await expect
    .poll(() => best(page).innerText(), { timeout: 20_000 })
    .toContain('with a row along AB');
  // A start that keeps to no hold is not called the best that does.
  await expect.poll(() => best(page).innerText()).toContain('does not stand there yet');
  await page.getByRole('button', { name: 'Take the best start' }).click();
  await expect.poll(() => best(page).innerText()).toContain('This is it');
  const clearance = page.getByRole('row', { name: /^AB / });
  await expect.poll(async () => Number((await clearance.innerText()).split(/\s+/)[2])).toBe(6);
  await page.getByRole('button', { name: /^Let go/ }).click();
  await expect.poll(() => best(page).innerText(), { timeout: 20_000 }).not.toContain('with a row');
  expect(complaints).toEqual([]);
  await context.close();
});

it('sweeps the turns in the background and takes one from the curve', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await goToStep(page, 'Fit');
  await page.getByTestId('turn-curve').waitFor({ timeout: 30_000 });
  await page.getByTestId('turn-curve').focus();
  const turn = await page.getByLabel('Turn, anticlockwise').inputValue();
  await page.keyboard.press('ArrowRight');
  await expect
    .poll(() => page.getByLabel('Turn, anticlockwise').inputValue(), { timeout: 15_000 })
    .not.toBe(turn);
  expect(complaints).toEqual([]);
  await context.close();
});

it('lets a stranger try the table on the front page, and keeps the floor for the account made then', async () => {
  const { page, complaints, context } = await openPage(browser);
  await page.goto('/');
  await best(page).waitFor({ timeout: 20_000 });
  await page.getByRole('button', { name: 'Take the best start' }).click();
  await expect.poll(() => best(page).innerText()).toContain('This is it');
  const units = await wholeUnits(page);
  await page.getByRole('button', { name: 'Keep this floor' }).click();
  await page.waitForURL(/sign-up/);
  await page.getByLabel('Firm').fill('Stonecrop Yard');
  await page.getByLabel('Your name').fill('Odwin Tarrel');
  await page.getByLabel('E-mail').fill(`keep.${Date.now()}@stonecrop.example`);
  await page.getByLabel('Password').fill(PASSWORD);
  await page.getByRole('button', { name: 'Make the account' }).click();
  await page.waitForURL('**/layouts/*');
  await tableReady(page);
  await goToStep(page, 'Fit');
  expect(await wholeUnits(page)).toBe(units);
  expect(complaints).toEqual([]);
  await context.close();
});
