import AxeBuilder from '@axe-core/playwright';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Browser, Page } from 'playwright-core';
import { launch, openPage, signIn, tableReady, goToStep } from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

async function seriousFaults(page: Page) {
  const { violations } = await new AxeBuilder({ page }).analyze();
  return violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.target.join(' ')).join(', ')}`);
}

const firstOf = async (page: Page, start: string) =>
  (await page.locator(`a[href^="${start}"]`).first().getAttribute('href'))!;

/** Pages that anybody may open. */
const OPEN = [
  '/',
  '/sign-in',
  '/sign-up',
  '/forgotten-password',
  '/guide',
  '/guide/best-start',
  '/guide/keys',
];

it('has no serious accessibility fault and no console error on any page, day and dusk', async () => {
  const { page, complaints, context } = await openPage(browser);
  const found: Record<string, string[]> = {};
  const check = async (name: string) => {
    found[name] = await seriousFaults(page);
    await page.evaluate(() =>
      (window as never as { evenlayTheme: { set(t: string): void } }).evenlayTheme.set('dusk'),
    );
    found[`${name}, dusk`] = await seriousFaults(page);
    await page.evaluate(() =>
      (window as never as { evenlayTheme: { set(t: string): void } }).evenlayTheme.set('day'),
    );
  };
  for (const path of OPEN) {
    await page.goto(path);
    await check(path);
  }
  await signIn(page, 'owner@larkmoss.example');
  await check('/projects');
  const project = await page.getByRole('link', { name: /court/i }).first().getAttribute('href');
  for (const path of ['/people', '/audit', '/dev/mail']) {
    await page.goto(path);
    await check(path);
  }
  await page.goto(project!);
  await check('/projects/[id]');
  const [table, version] = [await firstOf(page, '/layouts/'), await firstOf(page, '/versions/')];
  await page.goto('/account');
  await check('/account');
  await page.goto(version);
  await check('/versions/[id]');
  await page.goto(`${version.replace(/\/plan$/, '')}/plan`);
  await page.waitForTimeout(700);
  await check('/versions/[id]/plan');
  await page.goto(table);
  await tableReady(page);
  for (const step of ['Ground', 'Unit', 'Bond', 'Fit', 'Versions']) {
    await goToStep(page, step);
    await check(`table, ${step}`);
  }
  await page.keyboard.press('?');
  await page.getByRole('dialog').waitFor();
  await check('keys');
  expect(
    Object.fromEntries(Object.entries(found).filter(([, faults]) => faults.length > 0)),
  ).toEqual({});
  expect(complaints).toEqual([]);

  await page.goto('/projects/nothing-here');
  expect(await page.getByRole('heading', { level: 1 }).innerText()).toBe('There is nothing here');
  await context.close();
});

it('shows a client and an installer only what is theirs', async () => {
  const { page, context } = await openPage(browser);
  await signIn(page, 'client@larkmoss.example');
  expect(await page.getByRole('button', { name: 'Make the project' }).count()).toBe(0);
  await page.getByRole('link', { name: /court/i }).first().click();
  await page.waitForURL('**/projects/*');
  expect(await page.getByRole('link', { name: 'Open the drafting table' }).count()).toBe(0);
  // The court has three versions; one is shared.
  expect(await page.getByTestId('version').count()).toBe(1);
  await context.close();

  const crew = await openPage(browser);
  await signIn(crew.page, 'installer@larkmoss.example');
  expect(await crew.page.getByRole('link', { name: /court/i }).count()).toBe(0);
  expect(await crew.page.getByRole('link', { name: /terrace/i }).count()).toBe(1);
  await crew.context.close();
});

it.each([
  [1440, 900],
  [1024, 768],
  [390, 844],
])('shows no page wider than its window at %i px', async (width, height) => {
  const { page, context } = await openPage(browser, { width, height });
  const over: string[] = [];
  const check = async (name: string) => {
    const wide = await page.evaluate(() => document.documentElement.scrollWidth);
    if (wide > width) over.push(`${name}: ${wide}`);
  };
  for (const path of OPEN) {
    await page.goto(path);
    await check(path);
  }
  await signIn(page, 'owner@larkmoss.example');
  await check('/projects');
  const project = await page
    .getByRole('link', { name: /terrace/i })
    .first()
    .getAttribute('href');
  await page.goto(project!);
  await check('/projects/[id]');
  const [table, version] = [await firstOf(page, '/layouts/'), await firstOf(page, '/versions/')];
  for (const path of [version, `${version.replace(/\/plan$/, '')}/plan`, '/account', table]) {
    await page.goto(path);
    await page.waitForTimeout(700);
    await check(path);
  }
  expect(over).toEqual([]);
  await context.close();
});
