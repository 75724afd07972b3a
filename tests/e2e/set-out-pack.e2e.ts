import { readFile } from 'node:fs/promises';
import AxeBuilder from '@axe-core/playwright';
import DxfParser from 'dxf-parser';
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { launch, openPage, signIn } from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

/** Address of the first version in that state that the person sees. */
const versionThatIs = (page: Page, state: string): Promise<string> =>
  page.evaluate(async (wanted) => {
    const read = async (url: string) => (await fetch(url)).json();
    for (const { id } of (await read('/api/projects')).projects)
      for (const layout of (await read(`/api/projects/${id}`)).layouts)
        for (const version of (await read(`/api/layouts/${layout.id}/versions`)).versions)
          if (version.state === wanted) return `/versions/${version.id}`;
    throw new Error(`no version is ${wanted}`);
  }, state);

async function taken(page: Page, button: string): Promise<{ name: string; file: Buffer }> {
  const [download] = await Promise.all([
    page.waitForEvent('download', { timeout: 90_000 }),
    page.getByRole('button', { name: button, exact: true }).click(),
  ]);
  return { name: download.suggestedFilename(), file: await readFile(await download.path()) };
}

it('an installer takes the issued pack: all of it, or the sheets they tick', async () => {
  const { context, page, complaints } = await openPage(browser);
  await signIn(page, 'installer@larkmoss.example');
  const address = await versionThatIs(page, 'issued');
  await page.goto(address);
  await page.getByRole('link', { name: 'Set-out pack' }).click();
  await page.waitForSelector('[data-sheet] svg');
  const sheets = await page.locator('[data-sheet]').count();
  expect(sheets).toBeGreaterThan(6);

  const whole = await taken(page, 'Download PDF');
  const pdf = await getDocument({ data: new Uint8Array(whole.file), verbosity: 0 }).promise;
  expect(pdf.numPages).toBe(sheets);

  // Checks alone: still numbered as in the whole pack.
  for (const kind of ['Plan', 'Control points', 'Courses', 'Section', 'Materials'])
    await page.getByRole('checkbox', { name: new RegExp(`^${kind}`) }).uncheck();
  const few = await getDocument({
    data: new Uint8Array((await taken(page, 'Download PDF')).file),
    verbosity: 0,
  }).promise;
  expect(few.numPages).toBeLessThan(sheets);
  const { items } = await (await few.getPage(few.numPages)).getTextContent();
  expect(items.some((item) => 'str' in item && item.str === `${sheets}/${sheets}`)).toBe(true);
  await page.getByRole('checkbox', { name: /^Checks/ }).uncheck();
  expect(await page.getByText('No sheet is chosen').isVisible()).toBe(true);

  const dxf = new DxfParser().parseSync((await taken(page, 'DXF')).file.toString('utf8'));
  expect(dxf!.entities.length).toBeGreaterThan(50);
  const points = (await taken(page, 'Points as CSV')).file.toString('utf8');
  expect(points.split('\r\n')[0]).toBe('name,x_mm,y_mm,level_mm,what');
  const layout = JSON.parse((await taken(page, 'Layout')).file.toString('utf8'));
  expect(layout.schema).toBe('evenlay/layout@1');

  const { violations } = await new AxeBuilder({ page }).analyze();
  expect(violations.map(({ id, nodes }) => [id, nodes[0].html])).toEqual([]);
  await page.setViewportSize({ width: 390, height: 844 });
  const over = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
  expect(over).toBeLessThanOrEqual(0);
  expect(complaints).toEqual([]);
  await context.close();
});

it('a client takes the plan of a shared version, and finds no more', async () => {
  const { context, page, complaints } = await openPage(browser);
  await signIn(page, 'client@larkmoss.example');
  await page.goto(`${await versionThatIs(page, 'shared')}/set-out`);
  await page.waitForSelector('[data-sheet] svg');
  expect(await page.getByRole('checkbox').count()).toBe(0);
  expect(await page.getByRole('button', { name: 'DXF' }).count()).toBe(0);
  expect(await page.getByText('Not for set-out').first().isVisible()).toBe(true);
  expect(complaints).toEqual([]);
  await context.close();
});

it('whoever scans a sheet is told whether its plan is current, without signing in', async () => {
  const owner = await openPage(browser);
  await signIn(owner.page, 'owner@larkmoss.example');
  const issued = (await versionThatIs(owner.page, 'issued')).split('/').pop()!;
  const { context, page, complaints } = await openPage(browser, { width: 390, touch: true });
  await page.goto(`/current/${issued}`);
  expect(await page.getByTestId('status').innerText()).toBe('Current');
  const { violations } = await new AxeBuilder({ page }).analyze();
  expect(violations.map(({ id, nodes }) => [id, nodes[0].html])).toEqual([]);
  await page.goto('/current/nobody');
  expect(await page.getByTestId('status').innerText()).toBe('Not issued for set-out');
  expect(complaints).toEqual([]);
  await Promise.all([context.close(), owner.context.close()]);
});
