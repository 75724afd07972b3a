import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Browser, Page } from 'playwright-core';
import {
  draftAnswered,
  drawn,
  goToStep,
  launch,
  openPage,
  saved,
  signIn,
  tableReady,
  wholeUnits,
} from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

/** A layout of its own in the demo court's project, so that tests do not meet: a copy of the court's draft. */
async function openCourt(page: Page, name: string) {
  await signIn(page, 'designer@larkmoss.example');
  await page.getByRole('link', { name: /court/i }).first().click();
  await page.waitForURL('**/projects/*');
  const project = new URL(page.url()).pathname.split('/').pop();
  const table = await page
    .getByRole('link', { name: 'Open the drafting table' })
    .first()
    .getAttribute('href');
  const layout = await page.evaluate(
    async ([projectId, source, title]) => {
      const draft = await (await fetch(`/api${source}/draft`)).json();
      const made = await fetch(`/api/projects/${projectId}/layouts`, {
        method: 'POST',
        headers: { 'content-type': 'application/json' },
        body: JSON.stringify({ name: title, document: draft.document }),
      });
      return (await made.json()).id as string;
    },
    [project!, table!, name] as const,
  );
  await page.goto(`/layouts/${layout}`);
  await tableReady(page);
  await goToStep(page, 'Fit');
}

const field = async (page: Page, label: string) =>
  Number((await page.getByLabel(label).inputValue()).replace('−', '-').replace(/[^\d.-]/g, ''));

it('slides the pattern by dragging, the figures following before the hand lets go', async () => {
  const { page, complaints, context } = await openPage(browser);
  await openCourt(page, 'Slide');
  const start = await field(page, 'Start across');
  const units = await wholeUnits(page);
  const box = (await page.getByTestId('floor').boundingBox())!;
  await page.mouse.move(box.x + box.width * 0.4, box.y + box.height * 0.7);
  await page.mouse.down();
  await page.mouse.move(box.x + box.width * 0.4 + 30, box.y + box.height * 0.7, { steps: 6 });
  await expect.poll(() => page.getByText('was ').count()).toBeGreaterThan(0);
  await page.mouse.up();
  await expect.poll(() => field(page, 'Start across')).toBeGreaterThan(start);
  await expect.poll(() => page.getByText('was ').count()).toBe(0);
  await page.keyboard.press('Control+z');
  await expect.poll(() => field(page, 'Start across')).toBe(start);
  expect(await wholeUnits(page)).toBe(units);
  expect(complaints).toEqual([]);
  await context.close();
});

it('nudges with arrows and turns with brackets, a run of presses being one undo step', async () => {
  const { page, context } = await openPage(browser);
  await openCourt(page, 'Nudge');
  await page.getByTestId('floor').focus();
  const start = await field(page, 'Start across');
  const slid = draftAnswered(page);
  for (let press = 0; press < 5; press++) await page.keyboard.press('ArrowRight');
  await page.keyboard.press('Shift+ArrowRight');
  await expect.poll(() => field(page, 'Start across')).toBeCloseTo(start + 15, 6);
  await slid;
  const turned = draftAnswered(page);
  await page.keyboard.press(']');
  await expect.poll(() => field(page, 'Turn, anticlockwise')).toBe(44);
  await turned;
  await page.keyboard.press('Control+z');
  await expect.poll(() => field(page, 'Turn, anticlockwise')).toBe(45);
  await page.keyboard.press('Control+z');
  await expect.poll(() => field(page, 'Start across')).toBe(start);
  await context.close();
});

it('lifts a unit by a click and lays it back by another', async () => {
  const { page, context } = await openPage(browser);
  await openCourt(page, 'Lift');
  // Square and on the axes, so that a unit is under the middle of the floor's lower left.
  await page.getByLabel('Turn, anticlockwise').fill('0');
  await page.keyboard.press('Enter');
  const units = await wholeUnits(page);
  await page.getByTestId('floor').focus();
  await page.keyboard.press('l');
  const box = (await page.getByTestId('floor').boundingBox())!;
  // One of two neighbouring places of a chequer holds a unit.
  let at: [number, number] | null = null;
  for (let n = 0; n < 12 && !at; n++) {
    const place: [number, number] = [box.x + box.width * 0.35 + n * 17, box.y + box.height * 0.7];
    await page.mouse.click(...place);
    await drawn(page);
    if ((await wholeUnits(page)) === units - 1) at = place;
  }
  expect(at).not.toBeNull();
  await expect.poll(() => page.getByText('Lifted', { exact: true }).count()).toBe(1);
  await page.mouse.click(...at!);
  await expect.poll(() => wholeUnits(page)).toBe(units);
  await context.close();
});

it('starts a row along a chosen edge, exactly at the clearance', async () => {
  const { page, context } = await openPage(browser);
  await openCourt(page, 'Align');
  await page.getByRole('button', { name: 'Align' }).click();
  await page.getByRole('button', { name: 'BC', exact: true }).click();
  await expect.poll(() => field(page, 'Turn, anticlockwise').then((turn) => turn % 90)).toBe(0);
  const row = page.getByRole('row', { name: /^BC / });
  await expect.poll(async () => (await row.innerText()).split(/\s+/)[2]).toBe('6');
  await context.close();
});

it('lights the same spot on the ribbon and on the floor', async () => {
  const { page, context } = await openPage(browser);
  await openCourt(page, 'Ribbon');
  const ribbon = (await page.getByTestId('gap-ribbon').boundingBox())!;
  await page.mouse.move(ribbon.x + ribbon.width * 0.05, ribbon.y + 10);
  await expect.poll(() => page.getByTestId('gap-ribbon').innerText()).toMatch(/^AB /);
  const box = (await page.getByTestId('floor').boundingBox())!;
  // The left edge of the court, FA, seen from the floor.
  for (let x = 60; x < 220; x += 4) {
    await page.mouse.move(box.x + x, box.y + box.height * 0.6);
    if ((await page.getByTestId('gap-ribbon').innerText()).startsWith('FA')) break;
  }
  expect(await page.getByTestId('gap-ribbon').innerText()).toMatch(/^FA \d+/);
  await context.close();
});

it('works by touch at 390 px: slide with one finger, steps and figures within reach', async () => {
  const { page, complaints, context } = await openPage(browser, {
    width: 390,
    height: 844,
    touch: true,
  });
  await openCourt(page, 'Touch');
  const start = await field(page, 'Start across');
  const box = (await page.getByTestId('floor').boundingBox())!;
  const client = await context.newCDPSession(page);
  const touch = (type: 'touchStart' | 'touchMove' | 'touchEnd', points: [number, number][]) =>
    client.send('Input.dispatchTouchEvent', {
      type,
      touchPoints: points.map(([x, y], id) => ({ x, y, id })),
    });
  const at: [number, number] = [box.x + box.width * 0.45, box.y + box.height * 0.7];
  await touch('touchStart', [at]);
  for (let n = 1; n <= 6; n++) await touch('touchMove', [[at[0] + n * 5, at[1]]]);
  await touch('touchEnd', []);
  await expect.poll(() => field(page, 'Start across')).toBeGreaterThan(start + 100);

  // Two fingers apart: the drawing grows, the pattern stays.
  const slid = await field(page, 'Start across');
  await touch('touchStart', [at, [at[0] + 40, at[1]]]);
  for (let n = 1; n <= 6; n++) await touch('touchMove', [at, [at[0] + 40 + n * 10, at[1]]]);
  await touch('touchEnd', []);
  expect(await field(page, 'Start across')).toBe(slid);

  const pegs = await page.getByRole('navigation', { name: 'Steps' }).getByRole('button').all();
  for (const peg of pegs) expect((await peg.boundingBox())!.height).toBeGreaterThanOrEqual(44);
  const wide = await page.evaluate(() => document.documentElement.scrollWidth);
  expect(wide).toBeLessThanOrEqual(390);
  await saved(page);
  expect(complaints).toEqual([]);
  await context.close();
});
