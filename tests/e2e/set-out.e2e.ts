import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Browser } from 'playwright-core';
import { goToStep, launch, openNewTable, openPage, signUp } from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

it('sets a court out: points by the keys, corners chosen by letter and taken back', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await goToStep(page, 'Set-out');
  const datums = page.getByTestId('datums');
  const picked = await datums.textContent();

  // Through the points with the keys: the third is corner C.
  await page.getByTestId('floor').focus();
  for (let n = 0; n < 3; n++) await page.keyboard.press('ArrowRight');
  await expect.poll(() => page.getByTestId('point').textContent()).toContain('Corner C');
  await page.keyboard.press('Escape');
  await expect.poll(() => page.getByTestId('point').count()).toBe(0);

  await page.getByRole('button', { name: 'Choose two corners' }).click();
  const corners = page.getByRole('region', { name: 'Corners to tape from' });
  await corners.getByRole('button', { name: 'C', exact: true }).click();
  await corners.getByRole('button', { name: 'D', exact: true }).click();
  await expect.poll(() => datums.textContent()).toBe('C and D');
  await page.keyboard.press('Control+z');
  await expect.poll(() => datums.textContent()).toBe(picked);
  await page.keyboard.press('Control+Shift+z');
  await expect.poll(() => datums.textContent()).toBe('C and D');
  await page.getByRole('button', { name: 'Pick them for me' }).click();
  await expect.poll(() => datums.textContent()).toBe(picked);

  // By the keys alone: the focus goes on from the button pressed, first to the letters and then back.
  await page.getByRole('button', { name: 'Choose two corners' }).press('Enter');
  const focused = () => page.evaluate(() => document.activeElement?.textContent);
  await expect.poll(focused).toBe('A');
  await page.keyboard.press('Enter');
  await page.keyboard.press('Tab');
  await page.keyboard.press('Enter');
  await expect.poll(focused).toBe('Choose two corners');
  await page.getByRole('button', { name: 'Pick them for me' }).click();

  // The table of points and the courses follow.
  await page.getByLabel('Which points').selectOption('string');
  await page.getByRole('button', { name: '2a', exact: true }).click();
  await expect.poll(() => page.getByTestId('course').textContent()).toMatch(/^2 of/);
  expect(complaints).toEqual([]);
  await context.close();
});
