import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Browser, Page } from 'playwright-core';
import { base, launch, openPage, PASSWORD, signIn } from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

/** Opens a page whose scripts do not come until they are let. */
async function openAsleep(page: Page, path: string) {
  let letScripts = () => {};
  const let_ = new Promise<void>((resolve) => (letScripts = resolve));
  await page.route(/\/_astro\/.*\.js/, async (route) => {
    await let_;
    await route.continue();
  });
  await page.goto(path, { waitUntil: 'commit' });
  return { wake: letScripts };
}

it('sends a form that was sent before its script came, and puts nothing typed into the address', async () => {
  const { page, context, complaints } = await openPage(browser);
  const { wake } = await openAsleep(page, '/sign-in');
  await page.getByLabel('E-mail').fill('owner@larkmoss.example');
  await page.getByLabel('Password').fill(PASSWORD);
  await page.getByLabel('Password').press('Enter');
  await page.locator('[data-held]').waitFor();
  expect(page.url()).toBe(`${base()}/sign-in`);
  // Who waits for long is told.
  await page.locator('[data-held-note]').waitFor();
  wake();
  await page.waitForURL('**/projects');
  expect(complaints).toEqual([]);
  await context.close();
});

it('does in an island what was pressed and typed before it woke, in its order', async () => {
  const { page, context, complaints } = await openPage(browser);
  await signIn(page, 'owner@larkmoss.example');
  const { wake } = await openAsleep(page, '/projects');
  const search = page.getByLabel('Find by project or client');
  await search.fill('terrace');
  await page.getByText('List', { exact: true }).click();
  const archived = page.getByLabel('Archived ones');
  await archived.click();
  expect(await page.locator('[data-held]').count()).toBe(2);
  wake();
  await page.waitForFunction(() => !document.querySelector('[data-held], [aria-busy=true]'));
  await page.waitForURL('**/projects?search=terrace&archived=only&view=table');
  expect(await search.inputValue()).toBe('terrace');
  expect(await archived.isChecked()).toBe(true);
  expect(complaints).toEqual([]);
  await context.close();
});

it('keeps a select’s choice made before its island woke', async () => {
  const { page, context } = await openPage(browser);
  await signIn(page, 'owner@larkmoss.example');
  const { wake } = await openAsleep(page, '/projects');
  await page.getByLabel('In order of').selectOption('name');
  wake();
  await page.waitForURL((url) => url.searchParams.get('sort') === 'name');
  expect(await page.getByLabel('In order of').inputValue()).toBe('name');
  await context.close();
});

it('switches to dusk by a tick that came before its script', async () => {
  const { page, context } = await openPage(browser);
  await signIn(page, 'owner@larkmoss.example');
  const { wake } = await openAsleep(page, '/account');
  await page.getByLabel('Dusk theme').click();
  expect(await page.evaluate(() => document.documentElement.dataset.theme)).toBeUndefined();
  wake();
  await page.locator('html[data-theme=dusk]').waitFor();
  await context.close();
});
