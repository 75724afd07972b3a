import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Browser, Page } from 'playwright-core';
import {
  complaintsOf,
  goToStep,
  launch,
  openNewTable,
  openPage,
  PASSWORD,
  saved,
  signUp,
  tableReady,
} from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

const clearance = (page: Page) => page.getByLabel(/^Clearance/);
const setClearance = async (page: Page, mm: string) => {
  await clearance(page).fill(mm);
  await page.keyboard.press('Enter');
};
const status = (page: Page, name: string) =>
  page.locator(`[data-testid=sync][data-status=${name}]`).waitFor();
const value = async (page: Page) => (await clearance(page).inputValue()).replace(/\s/g, ' ');

it('saves as one works, and finds the work again after a reload in the same moment', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await setClearance(page, '17');
  await page.reload();
  await tableReady(page);
  expect(await value(page)).toBe('17 mm');
  await saved(page);
  expect(complaints).toEqual([]);
  await context.close();
});

it('keeps work through a lost connection and sends it when it is back', async () => {
  const { page, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await context.setOffline(true);
  await setClearance(page, '23');
  await status(page, 'offline');
  await expect.poll(() => page.getByText('everything is kept on this device').count()).toBe(1);
  await setClearance(page, '24');
  await context.setOffline(false);
  await saved(page);
  await page.evaluate(() => localStorage.clear());
  await page.reload();
  await tableReady(page);
  expect(await value(page)).toBe('24 mm');
  await context.close();
});

it('keeps work through a sign-out in another tab, and takes it up after signing in', async () => {
  const { page, context } = await openPage(browser);
  const email = await signUp(page);
  await openNewTable(page);
  const table = page.url();
  const other = await context.newPage();
  await other.goto('/account');
  await other.getByRole('button', { name: 'Sign out on this device' }).click();
  await other.waitForURL('**/sign-in');
  await other.close();
  await setClearance(page, '31');
  await status(page, 'signed-out');
  await page.getByRole('link', { name: 'sign in' }).click();
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(PASSWORD);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL(table);
  await tableReady(page);
  expect(await value(page)).toBe('31 mm');
  await saved(page);
  await context.close();
});

it('refuses a stale save, keeps both sides, and lets the person choose', async () => {
  const { page, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  const second = await context.newPage();
  const complaints = complaintsOf(second);
  await second.goto(page.url());
  await tableReady(second);

  await setClearance(page, '41');
  await saved(page);
  await setClearance(second, '42');
  await status(second, 'stale');
  await expect.poll(() => second.getByText('Nothing is lost').count()).toBe(1);
  expect(await value(second)).toBe('42 mm');

  await second.getByRole('button', { name: 'Go on with the other' }).click();
  await expect.poll(() => value(second)).toBe('41 mm');
  await second.getByTestId('floor').focus();
  await second.keyboard.press('Control+z');
  await expect.poll(() => value(second)).toBe('42 mm');
  await saved(second);
  await goToStep(second, 'Versions');
  await expect
    .poll(() => second.getByRole('button', { name: 'Take up again' }).count())
    .toBeGreaterThan(0);

  // The first page has now gone stale itself; it goes on with its own, and the other is set aside.
  await setClearance(page, '43');
  await status(page, 'stale');
  await page.getByRole('button', { name: 'Go on with this one' }).click();
  await saved(page);
  await page.reload();
  await tableReady(page);
  expect(await value(page)).toBe('43 mm');
  // The refused save is answered with 409, which the browser logs by itself.
  expect(complaints.filter((text) => !text.includes('409'))).toEqual([]);
  await context.close();
});
