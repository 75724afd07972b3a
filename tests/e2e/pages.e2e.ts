import AxeBuilder from '@axe-core/playwright';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Browser, Page } from 'playwright-core';
import { awake, launch, openPage, signIn, tableReady, goToStep } from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

async function seriousFaults(page: Page) {
  const { violations } = await new AxeBuilder({ page }).setLegacyMode(true).analyze();
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
  '/guide/on-site',
  '/guide/keys',
];

/** The court's own page, not one of the comments on it that the list of projects tells of. */
const courtHref = async (page: Page) =>
  (await page
    .locator('a[href^="/projects/"]')
    .filter({ hasText: /court/i })
    .first()
    .getAttribute('href'))!;

/** Looks a page over by day and at dusk; what is wrong is added to `found`. */
async function lookedOver(page: Page, name: string, found: string[]) {
  for (const theme of ['day', 'dusk']) {
    await page.evaluate(
      (to) => (window as never as { evenlayTheme: { set(t: string): void } }).evenlayTheme.set(to),
      theme,
    );
    for (const fault of await seriousFaults(page)) found.push(`${name}, ${theme}: ${fault}`);
  }
}

it(
  'has no serious accessibility fault on any page that is open to all',
  { timeout: 240_000 },
  async () => {
    const { page, complaints, context } = await openPage(browser);
    const found: string[] = [];
    for (const path of OPEN) {
      await page.goto(path);
      await lookedOver(page, path, found);
    }
    expect(found).toEqual([]);
    expect(complaints).toEqual([]);
    await context.close();
  },
);

it('has no serious accessibility fault on any page of a firm', { timeout: 240_000 }, async () => {
  const { page, complaints, context } = await openPage(browser);
  const found: string[] = [];
  await signIn(page, 'owner@larkmoss.example');
  await lookedOver(page, '/projects', found);
  const project = await courtHref(page);
  await page.goto(project!);
  await lookedOver(page, '/projects/[id]', found);
  const version = (await firstOf(page, '/versions/')).replace(/\?.*|\/plan$/, '');
  for (const path of ['/people', '/audit', '/dev/mail', '/account', version, `${version}/plan`]) {
    await page.goto(path);
    await awake(page);
    await lookedOver(page, path, found);
  }
  expect(found).toEqual([]);
  expect(complaints).toEqual([]);

  await page.goto('/projects/nothing-here');
  expect(await page.getByRole('heading', { level: 1 }).innerText()).toBe('There is nothing here');
  await context.close();
});

it(
  'has no serious accessibility fault at any step of the table',
  { timeout: 240_000 },
  async () => {
    const { page, complaints, context } = await openPage(browser);
    const found: string[] = [];
    await signIn(page, 'owner@larkmoss.example');
    const project = await courtHref(page);
    await page.goto(project!);
    await page.goto(await firstOf(page, '/layouts/'));
    await tableReady(page);
    for (const step of ['Ground', 'Unit', 'Bond', 'Fit', 'Versions']) {
      await goToStep(page, step);
      await lookedOver(page, `table, ${step}`, found);
    }
    await page.keyboard.press('?');
    await page.getByRole('dialog').waitFor();
    await lookedOver(page, 'keys', found);
    expect(found).toEqual([]);
    expect(complaints).toEqual([]);
    await context.close();
  },
);

it('shows a client and an installer only what is theirs', async () => {
  const { page, context } = await openPage(browser);
  await signIn(page, 'client@larkmoss.example');
  expect(await page.getByRole('button', { name: 'Make the project' }).count()).toBe(0);
  await page.goto(await courtHref(page));
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
    await awake(page);
    if (path === table) await tableReady(page);
    await check(path);
  }
  expect(over).toEqual([]);
  await context.close();
});
