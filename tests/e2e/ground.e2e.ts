import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Browser, Page } from 'playwright-core';
import { launch, openNewTable, openPage, signUp, tableReady, saved } from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

const lengthOf = async (page: Page, side: string) =>
  Number((await page.getByLabel(`Length of ${side}`).inputValue()).replace(/[^\d.]/g, ''));

/** Screen place of a spot of the floor's window, as shares of its width and height. */
async function spot(page: Page, across: number, down: number) {
  const box = (await page.getByTestId('floor').boundingBox())!;
  return [box.x + box.width * across, box.y + box.height * down] as const;
}

async function drawRectangle(page: Page) {
  await page.getByRole('button', { name: 'Draw anew' }).click();
  for (const [x, y] of [
    [0.3, 0.7],
    [0.7, 0.7],
    [0.7, 0.3],
    [0.3, 0.3],
    [0.3, 0.7],
  ]) {
    const [sx, sy] = await spot(page, x, y);
    await page.mouse.move(sx - 3, sy + 2);
    await page.mouse.move(sx, sy);
    await page.mouse.down();
    await page.mouse.up();
  }
}

it('draws by clicking, snapping square and to the grid, and closes on the first corner', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await drawRectangle(page);
  const [ab, bc, cd, da] = [
    await lengthOf(page, 'AB'),
    await lengthOf(page, 'BC'),
    await lengthOf(page, 'CD'),
    await lengthOf(page, 'DA'),
  ];
  expect(ab).toBe(cd);
  expect(bc).toBe(da);
  // Square means whole grid steps on both sides, and no fraction of a millimetre anywhere.
  expect(ab % 10).toBe(0);
  expect(bc % 10).toBe(0);
  expect(complaints).toEqual([]);
  await context.close();
});

it('drags a corner, a whole side and an arc, each as one undo step', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await drawRectangle(page);
  const before = await lengthOf(page, 'AB');
  const drag = async (from: readonly [number, number], by: readonly [number, number]) => {
    const [x, y] = await spot(page, ...from);
    await page.mouse.move(x, y);
    await page.mouse.down();
    await page.mouse.move(x + by[0] / 2, y + by[1] / 2, { steps: 3 });
    await page.mouse.move(x + by[0], y + by[1], { steps: 3 });
    await page.mouse.up();
  };

  // The side BC, by its middle, 60 px to the right: AB grows and the corners stay square.
  await drag([0.7, 0.5], [60, 0]);
  const wider = await lengthOf(page, 'AB');
  expect(wider).toBeGreaterThan(before);
  expect(await lengthOf(page, 'CD')).toBe(wider);
  await page.getByTestId('floor').focus();
  await page.keyboard.press('Control+z');
  await expect.poll(() => lengthOf(page, 'AB')).toBe(before);
  await page.keyboard.press('Control+Shift+z');
  await expect.poll(() => lengthOf(page, 'AB')).toBe(wider);
  await page.keyboard.press('Control+z');

  // The corner C away from the court: two sides change, one undo step.
  await drag([0.7, 0.3], [70, -50]);
  await expect.poll(() => lengthOf(page, 'BC')).toBeGreaterThan(0);
  expect(await lengthOf(page, 'CD')).not.toBe(before);
  await page.keyboard.press('Control+z');
  await expect.poll(() => lengthOf(page, 'CD')).toBe(before);

  // AB turned into an arc and back.
  await page.getByRole('button', { name: /^AB/ }).click();
  await page.getByRole('radio', { name: 'Arc' }).click({ force: true });
  await expect.poll(() => page.getByText('Along the arc').count()).toBe(1);
  await page.getByLabel(/^Rise over/).fill(String(before / 2));
  await page.keyboard.press('Enter');
  // A semicircle: its length is π/2 of its chord (elementary geometry).
  const along = await page.getByText('Along the arc').innerText();
  expect(Number(along.replace(/[^\d]/g, ''))).toBe(Math.round((before * Math.PI) / 2));
  await page.getByRole('radio', { name: 'Straight' }).click({ force: true });
  await expect.poll(() => page.getByText('Along the arc').count()).toBe(0);
  expect(complaints).toEqual([]);
  await context.close();
});

it('adds a corner by a double click and takes it away with Delete', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await drawRectangle(page);
  const [x, y] = await spot(page, 0.5, 0.7);
  await page.mouse.dblclick(x, y);
  await expect.poll(() => page.getByLabel('Length of EA').count()).toBe(1);
  await page.getByTestId('floor').focus();
  await page.keyboard.press('Delete');
  await expect.poll(() => page.getByLabel('Length of EA').count()).toBe(0);
  expect(complaints).toEqual([]);
  await context.close();
});

it('types a side’s length afterwards and keeps square corners square', async () => {
  const { page, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await drawRectangle(page);
  const bc = await lengthOf(page, 'BC');
  await page.getByLabel('Length of AB').fill('3.25 m');
  await page.keyboard.press('Enter');
  expect(await lengthOf(page, 'AB')).toBe(3250);
  expect(await lengthOf(page, 'CD')).toBe(3250);
  expect(await lengthOf(page, 'BC')).toBe(bc);
  await page.getByLabel('Length of AB').fill('wide');
  await page.keyboard.press('Enter');
  await expect.poll(() => page.getByText('Type a length such as').count()).toBe(1);
  await context.close();
});

it('shows feet, inches and sixteenths when asked, and reads them back', async () => {
  const { page, context } = await openPage(browser);
  await signUp(page, 'imperial');
  await openNewTable(page);
  await page.getByLabel('Length of AB').fill(`10' 6 1/2"`);
  await page.keyboard.press('Enter');
  expect(await page.getByLabel('Length of AB').inputValue()).toBe(`10' 6 1/2"`);
  await page.getByRole('radio', { name: 'mm' }).click({ force: true });
  // 10 ft 6 1/2 in = 126.5 × 25.4 mm (NIST SP 811 B.8).
  await expect.poll(() => lengthOf(page, 'AB')).toBe(3213.1);
  await context.close();
});

it('keeps a ring half drawn over a reload', async () => {
  const { page, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await page.getByRole('button', { name: 'Draw anew' }).click();
  for (const [x, y] of [
    [0.3, 0.7],
    [0.6, 0.7],
  ]) {
    const [sx, sy] = await spot(page, x, y);
    await page.mouse.click(sx, sy);
  }
  await expect.poll(() => page.getByText('2 corners down').count()).toBe(1);
  await page.reload();
  await tableReady(page);
  await expect.poll(() => page.getByText('2 corners down').count()).toBe(1);
  await page.getByRole('button', { name: 'Leave drawing' }).click();
  await saved(page);
  await context.close();
});
