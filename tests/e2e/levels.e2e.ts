import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Browser, Page } from 'playwright-core';
import {
  goToStep,
  launch,
  openNewTable,
  openPage,
  saved,
  signIn,
  signUp,
  tableReady,
} from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

const figure = (page: Page, id: string) => page.getByTestId(`earth-${id}`).innerText();
const spots = (page: Page) => page.getByTestId('spot-count').innerText();
const middle = async (page: Page): Promise<[number, number]> => {
  const box = (await page.getByTestId('floor').boundingBox())!;
  return [box.x + box.width / 2, box.y + box.height / 2];
};

it('measures spots by pointing, dragging and pasting, and keeps them', async () => {
  const { page, complaints, context } = await openPage(browser);
  await signUp(page);
  await openNewTable(page);
  await goToStep(page, 'Levels');
  await page.getByText(/as if the ground were level with the edge/).waitFor();
  const assumed = await figure(page, 'cut');

  // Pointed at: the field for its level has the cursor.
  await page.getByRole('button', { name: 'Point at spots on the plan' }).click();
  const [x, y] = await middle(page);
  await page.mouse.click(x, y);
  await page.keyboard.type('-60');
  await page.keyboard.press('Enter');
  expect(await spots(page)).toBe('1 spot');
  const pointed = await figure(page, 'cut');
  expect(pointed).not.toBe(assumed);
  await page.mouse.click(x - 120, y + 40);
  await page.keyboard.type('-200');
  await page.keyboard.press('Enter');
  await page.getByRole('button', { name: 'Done pointing' }).click();

  // Dragged: the figures say what they were, and the whole drag is one undo step.
  const before = await figure(page, 'cut');
  await page.mouse.move(x, y);
  await page.mouse.down();
  await page.mouse.move(x + 60, y, { steps: 4 });
  await page.getByText(`was ${before}`).first().waitFor();
  await page.mouse.up();
  expect(await figure(page, 'cut')).not.toBe(before);
  await page.getByTestId('floor').focus();
  await page.keyboard.press('Control+z');
  expect(await figure(page, 'cut')).toBe(before);

  // Pasted: a bad line takes nothing.
  await page.getByRole('button', { name: 'Paste a list' }).click();
  const list = page.getByLabel('The list', { exact: true });
  await list.fill('x;y;level\n0;0;-0,3\nwet;1;2');
  await page.getByRole('button', { name: 'Take the spots' }).click();
  await page.getByRole('alert').getByText('Line 3').waitFor();
  await list.fill('x;y;level\n0;0;-0,3\n9;0;-0,1\n0;9;-0,2\n9;9;0');
  await page.getByText('metres', { exact: true }).click();
  await page.getByRole('button', { name: 'Take the spots' }).click();
  await expect.poll(() => spots(page)).toBe('4 spots');

  await saved(page);
  const kept = await figure(page, 'base');
  await page.reload();
  await tableReady(page);
  await goToStep(page, 'Levels');
  expect(await spots(page)).toBe('4 spots');
  expect(await figure(page, 'base')).toBe(kept);
  expect(complaints).toEqual([]);
  await context.close();
});

it('works at 390 px with thumbs, every target 44 px, nothing wider than the page', async () => {
  const { page, complaints, context } = await openPage(browser, {
    width: 390,
    height: 844,
    touch: true,
  });
  await signIn(page, 'designer@larkmoss.example');
  await page
    .getByRole('link', { name: /Fernhollow/ })
    .first()
    .click();
  await page.getByRole('link', { name: 'Open the drafting table' }).first().click();
  await tableReady(page);
  await goToStep(page, 'Levels');
  await page.getByTestId('earth-cut').waitFor();
  const small = await page
    .locator('aside')
    .evaluate((panel) =>
      [...panel.querySelectorAll('button, select, input:not([type=checkbox]):not([type=radio])')]
        .filter((each) => each.getBoundingClientRect().height < 43.5)
        .map((each) => each.outerHTML.slice(0, 90)),
    );
  expect(small).toEqual([]);
  const wide = await page.evaluate(() => document.documentElement.scrollWidth);
  expect(wide).toBeLessThanOrEqual(390);
  await page.getByRole('button', { name: 'Point at spots on the plan' }).tap();
  const [x, y] = await middle(page);
  await page.touchscreen.tap(x, y - 30);
  await expect.poll(() => spots(page)).toBe('11 spots');
  await page.getByRole('button', { name: 'Undo' }).tap();
  await expect.poll(() => spots(page)).toBe('10 spots');
  expect(complaints).toEqual([]);
  await context.close();
});
