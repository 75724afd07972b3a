import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core';
import { inject } from 'vitest';
import { chromium as chromiumPath } from '../../scripts/chromium';

export const base = () => inject('base');
export const PASSWORD = 'laid-whole';

export const launch = (): Promise<Browser> =>
  chromium.launch({
    executablePath: chromiumPath(),
    args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--disable-background-networking'],
  });

/** What the page logged as an error or threw; a test that ends with any has failed. */
export type Complaints = string[];

export async function openPage(
  browser: Browser,
  { width = 1440, height = 900, touch = false } = {},
): Promise<{ context: BrowserContext; page: Page; complaints: Complaints }> {
  const context = await browser.newContext({
    viewport: { width, height },
    hasTouch: touch,
    isMobile: touch,
    baseURL: base(),
    acceptDownloads: true,
  });
  const page = await context.newPage();
  return { context, page, complaints: complaintsOf(page) };
}

export function complaintsOf(page: Page): Complaints {
  const complaints: Complaints = [];
  page.on('console', (message) => {
    if (message.type() === 'error') complaints.push(message.text());
  });
  page.on('pageerror', (error) => complaints.push(String(error)));
  return complaints;
}

export async function signIn(page: Page, email: string, password = PASSWORD) {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL('**/projects');
}

let people = 0;

/** Makes a firm of its own, so that tests do not meet in the demo firm. */
export async function signUp(page: Page, display: 'metric' | 'imperial' = 'metric') {
  people += 1;
  const email = `owner${people}.${Date.now()}@stonecrop.example`;
  await page.goto('/sign-up');
  await page.getByLabel('Firm').fill('Stonecrop Yard');
  await page.getByLabel('Your name').fill('Odwin Tarrel');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(PASSWORD);
  if (display === 'imperial') await page.getByLabel('feet and inches').check();
  await page.getByRole('button', { name: 'Make the account' }).click();
  await page.waitForURL('**/projects');
  return email;
}

/** A new project with one new layout, its drafting table open. */
export async function openNewTable(page: Page, layout = 'Court, diamond chequer') {
  await page.getByLabel('Site or project').fill('Inner court');
  await page.getByRole('button', { name: 'Make the project' }).click();
  await page.waitForURL('**/projects/*');
  await page.getByLabel('Name', { exact: true }).fill(layout);
  await page.getByRole('button', { name: 'Start drawing' }).click();
  await page.waitForURL('**/layouts/*');
  await tableReady(page);
}

export async function tableReady(page: Page) {
  await page.locator('[data-testid=table][data-ready=true]').waitFor();
  await page.locator('[data-testid=floor] canvas').first().waitFor();
}

export const goToStep = (page: Page, step: string) =>
  page.getByRole('navigation', { name: 'Steps' }).getByRole('button', { name: step }).click();

export const wholeUnits = async (page: Page) =>
  Number((await page.getByTestId('whole-units').innerText()).replace(/\s/g, ''));

export const saved = (page: Page) =>
  page.locator('[data-testid=sync][data-status=saved]').waitFor();

/** The next answer to a save of the draft: what was done since is settled by then, as one undo step or several. */
export const draftAnswered = (page: Page) =>
  page.waitForResponse(
    (answer) => answer.url().endsWith('/draft') && answer.request().method() === 'PUT',
  );

/** What was just done is drawn: pointers are taken in once a frame. */
export const drawn = (page: Page): Promise<void> =>
  page.evaluate(
    () => new Promise((done) => requestAnimationFrame(() => requestAnimationFrame(() => done()))),
  );

/** Asks the server as the page's own scripts do; the answer's status stands beside its fields. */
export const ask = <T>(page: Page, method: string, path: string, body?: unknown): Promise<T> =>
  page.evaluate(
    async ([how, where, what]) => {
      const answer = await fetch(where, {
        method: how,
        headers: what ? { 'content-type': 'application/json' } : {},
        body: what ?? undefined,
      });
      return { status: answer.status, ...(await answer.json()) };
    },
    [method, path, body === undefined ? null : JSON.stringify(body)] as const,
  ) as Promise<T>;

/** The page's islands hear clicks: before, a button is only drawn. */
export const awake = async (page: Page): Promise<void> => {
  await page.waitForFunction(() => !document.querySelector('astro-island[ssr]'));
};

/** Draws on by keyboard alone from a ring's first corner: a direction and a length for each side. */
export async function drawSides(
  page: Page,
  sides: readonly (readonly [arrow: string, length: string])[],
) {
  for (const [arrow, length] of sides) {
    await page.getByTestId('floor').focus();
    await page.keyboard.press(arrow);
    await page.keyboard.type(length);
    await page.keyboard.press('Enter');
  }
}
