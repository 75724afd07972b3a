import { createHash } from 'node:crypto';
import AxeBuilder from '@axe-core/playwright';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { ask, goToStep, launch, openPage, signIn } from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

interface Id {
  readonly id: string;
}
interface Version extends Id {
  readonly document: Record<string, unknown>;
  readonly fingerprint: string;
}

/** A project of its own in the demo firm, its client put on it, with two saved versions. */
async function twoVersions(designer: Page, owner: Page, yard: string) {
  const project = await ask<Id>(designer, 'POST', '/api/projects', {
    name: yard,
    clientName: 'Nerys Quillamore',
  });
  const { people } = await ask<{ people: { id: string; role: string }[] }>(
    owner,
    'GET',
    '/api/people',
  );
  const client = people.find(({ role }) => role === 'client')!;
  await ask(owner, 'POST', `/api/projects/${project.id}/people`, { personId: client.id });
  const layout = await ask<Id>(designer, 'POST', `/api/projects/${project.id}/layouts`, {
    name: 'Plain slabs',
  });
  const path = `/api/layouts/${layout.id}`;
  const save = async (label: string, origin: readonly [number, number]) => {
    const draft = await ask<{ revision: number; document: Record<string, unknown> }>(
      designer,
      'GET',
      `${path}/draft`,
    );
    const { revision } = await ask<{ revision: number }>(designer, 'PUT', `${path}/draft`, {
      baseRevision: draft.revision,
      document: { ...draft.document, placement: { origin, turn: 0 } },
    });
    return ask<Version>(designer, 'POST', `${path}/versions`, { baseRevision: revision, label });
  };
  const first = await save('First thought', [0, 0]);
  const second = await save('Shifted along', [120, 45]);
  return { projectId: project.id, first, second };
}

/** RFC 8785 for what a layout document holds: members in order of their names, no white space. */
const canonical = (value: unknown): string =>
  Array.isArray(value)
    ? `[${value.map(canonical).join(',')}]`
    : value !== null && typeof value === 'object'
      ? `{${Object.entries(value)
          .sort(([p], [q]) => (p < q ? -1 : 1))
          .map(([name, member]) => `${JSON.stringify(name)}:${canonical(member)}`)
          .join(',')}}`
      : JSON.stringify(value);

const state = (page: Page, words: string) =>
  page.getByTestId('state').filter({ hasText: words }).waitFor();

/** The page's scripts have taken over: a press before that does nothing. */
const floorPainted = (page: Page) =>
  page.locator('[data-testid=version-floor] canvas[data-painted=true]').waitFor();

/** Presses the floor at a share of its width and height. */
async function pressFloor(page: Page, across: number, down: number) {
  const floor = page.getByTestId('version-floor');
  await floorPainted(page);
  const box = (await floor.boundingBox())!;
  await floor.click({ position: { x: box.width * across, y: box.height * down } });
}

it('takes designer and client from sharing to acceptance and issue, each seeing the other without reload', async () => {
  const designer = await openPage(browser);
  const client = await openPage(browser, { width: 390, height: 844 });
  const owner = await openPage(browser);
  await signIn(designer.page, 'designer@larkmoss.example');
  await signIn(client.page, 'client@larkmoss.example');
  await signIn(owner.page, 'owner@larkmoss.example');
  const { projectId, first, second } = await twoVersions(
    designer.page,
    owner.page,
    'Gatehouse yard',
  );
  await owner.context.close();

  // Nothing is the client's to see before it is shared.
  const refused = await ask<{ status: number }>(client.page, 'GET', `/api/versions/${first.id}`);
  expect(refused.status).toBe(404);
  await client.page.goto(`/projects/${projectId}`);
  await client.page.getByText('Nothing to see here yet').waitFor();

  // Shared; the client's page shows it by itself.
  await designer.page.goto(`/versions/${first.id}`);
  await designer.page.getByRole('button', { name: 'Share with the client' }).click();
  await designer.page.getByRole('button', { name: 'Share it' }).click();
  await state(designer.page, 'Shared');
  await client.page.getByTestId('version').first().waitFor();
  expect(await client.page.getByTestId('version').count()).toBe(1);
  expect(await client.page.getByRole('link', { name: 'Open the drafting table' }).count()).toBe(0);
  await client.page.getByRole('link', { name: '1. First thought' }).click();
  await client.page.waitForURL(`**/versions/${first.id}`);

  // A comment pinned to a spot, with a mention taken from the list.
  await floorPainted(client.page);
  await client.page.getByRole('button', { name: 'Pin a comment to a spot' }).click();
  await pressFloor(client.page, 0.4, 0.45);
  const writing = client.page.getByRole('combobox', { name: 'Comment' });
  await writing.pressSequentially('Could this be lighter? @Bra');
  await client.page.getByRole('option', { name: /Bram Festerley/ }).waitFor();
  await writing.press('Enter');
  expect(await writing.inputValue()).toBe('Could this be lighter? @Bram Festerley ');
  await client.page.getByRole('button', { name: 'Send the comment' }).click();
  await client.page.getByRole('button', { name: /^Comment 1 by Nerys/ }).waitFor();

  // The designer's page shows it, unread, and answers.
  const thread = designer.page.getByTestId('thread').filter({ hasText: 'Could this be lighter?' });
  await thread.waitFor();
  await thread.getByRole('button', { name: 'Reply' }).click();
  await designer.page.getByRole('combobox', { name: 'Reply' }).fill('It can.');
  await designer.page.getByRole('button', { name: 'Send the reply' }).click();
  await client.page.getByText('It can.').waitFor();

  // The pin stands at its spot of the ground, whoever looks and however near.
  const [{ pin }] = (
    await ask<{ threads: { pin: [number, number] }[] }>(
      designer.page,
      'GET',
      `/api/versions/${first.id}/comments`,
    )
  ).threads;
  const ring = (first.document.ground as { perimeter: [number, number][] }).perimeter;
  for (const axis of [0, 1]) {
    expect(pin[axis]).toBeGreaterThan(Math.min(...ring.map((vertex) => vertex[axis])));
    expect(pin[axis]).toBeLessThan(Math.max(...ring.map((vertex) => vertex[axis])));
  }

  // A change is asked for, with a pin.
  await client.page.getByRole('button', { name: 'Ask for a change' }).click();
  await client.page.getByLabel('What should be different?').fill('Please start it further along.');
  await client.page.getByRole('button', { name: 'Mark a spot on the floor' }).click();
  await pressFloor(client.page, 0.6, 0.5);
  await client.page.getByLabel('At pin 1').fill('This row looks thin.');
  await client.page.getByRole('button', { name: 'Ask for this change' }).click();
  await state(client.page, 'Change asked');
  await state(designer.page, 'Change asked');
  await designer.page.getByText('This row looks thin.').waitFor();

  // What may not be done yet is said with its reason, and refused by the server too.
  const issue = designer.page.getByRole('button', { name: 'Issue for set-out' });
  expect(await issue.isDisabled()).toBe(true);
  const early = await ask<{ status: number; detail: string }>(
    designer.page,
    'POST',
    `/api/versions/${first.id}/issue`,
    {},
  );
  expect(early.status).toBe(409);
  await designer.page.getByText(early.detail).first().waitFor();

  // The second version is shared; the client is told, and compares.
  await designer.page.goto(`/versions/${second.id}`);
  await designer.page.getByRole('button', { name: 'Share with the client' }).click();
  await designer.page.getByRole('button', { name: 'Share it' }).click();
  await state(designer.page, 'Shared');
  await client.page.getByText('Version 2 was just shared.').waitFor();
  await client.page.getByRole('link', { name: 'compare', exact: true }).click();
  await client.page.waitForURL('**/compare?*');
  await client.page.locator('[data-testid=overlaid] canvas[data-painted=true]').waitFor();
  const counts = await Promise.all(
    ['kept', 'moved', 'gone', 'new'].map(async (fate) =>
      Number((await client.page.getByTestId(`units-${fate}`).innerText()).replace(/\s/g, '')),
    ),
  );
  const figures = client.page.getByTestId('figures').getByRole('row', { name: /Whole units/ });
  const [before, after] = (await figures.getByRole('cell').allInnerTexts()).map(Number);
  expect([counts[0] + counts[1] + counts[2], counts[0] + counts[1] + counts[3]]).toEqual([
    before,
    after,
  ]);
  const { violations } = await new AxeBuilder({ page: client.page }).analyze();
  expect(violations.filter(({ impact }) => impact === 'serious' || impact === 'critical')).toEqual(
    [],
  );

  // Accepted under the typed name.
  await client.page.getByRole('link', { name: 'Accept version 2' }).click();
  await client.page.getByRole('dialog').waitFor();
  await client.page.getByRole('button', { name: 'I accept this floor' }).click();
  await client.page.getByText('Type your name: it stands on the record.').waitFor();
  await client.page.getByLabel('Type your full name').fill('Nerys A. Quillamore');
  await client.page.getByRole('button', { name: 'I accept this floor' }).click();
  await state(client.page, 'Accepted');
  await client.page.getByRole('link', { name: 'Record of acceptance' }).click();
  await client.page.waitForURL('**/acceptance');
  expect(await client.page.locator('main').innerText()).toContain('Nerys A. Quillamore');
  // SHA-256 by Node's own crypto of the canonical JSON (RFC 8785) of the document that was saved.
  expect(await client.page.getByTestId('fingerprint').innerText()).toBe(
    createHash('sha256').update(canonical(second.document)).digest('hex'),
  );
  await client.page.goBack();

  // Issued; the client's open page says so.
  await state(designer.page, 'Accepted');
  await issue.click();
  await designer.page.getByRole('button', { name: 'Issue it' }).click();
  await state(designer.page, 'Issued for set-out');
  await state(client.page, 'Issued for set-out');
  await client.page.goto(`/projects/${projectId}`);
  const happened = await client.page.getByTestId('happened').allInnerTexts();
  for (const deed of ['issued', 'accepted', 'asked for a change to', 'commented on', 'shared'])
    expect(happened.some((text) => text.includes(deed))).toBe(true);

  expect(designer.complaints.filter((text) => !text.includes('409'))).toEqual([]);
  expect(client.complaints.filter((text) => !text.includes('404'))).toEqual([]);
  await designer.context.close();
  await client.context.close();
});

it('shows at the table who else is changing the draft', async () => {
  const designer = await openPage(browser);
  const owner = await openPage(browser);
  await signIn(designer.page, 'designer@larkmoss.example');
  await signIn(owner.page, 'owner@larkmoss.example');
  const project = await ask<Id>(designer.page, 'POST', '/api/projects', { name: 'Mill lane' });
  const layout = await ask<Id>(designer.page, 'POST', `/api/projects/${project.id}/layouts`, {
    name: 'Two hands',
  });
  for (const { page } of [designer, owner]) {
    await page.goto(`/layouts/${layout.id}`);
    await page.locator('[data-testid=table][data-ready=true]').waitFor();
  }
  await designer.page.getByTestId('presence').filter({ hasText: 'Tamsin Okelby' }).waitFor();
  await owner.page.getByTestId('presence').filter({ hasText: 'has this draft open' }).waitFor();
  await goToStep(designer.page, 'Fit');
  await designer.page.getByTestId('floor').focus();
  await designer.page.keyboard.press('ArrowRight');
  await owner.page
    .getByTestId('presence')
    .filter({ hasText: 'Bram Festerley is changing this draft now' })
    .waitFor();
  await owner.page.goto('/projects');
  await designer.page.getByTestId('presence').waitFor({ state: 'detached' });
  await designer.context.close();
  await owner.context.close();
});
