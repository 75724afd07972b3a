import AxeBuilder from '@axe-core/playwright';
import type { Browser, Page } from 'playwright-core';
import sharp from 'sharp';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { SiteStanding } from '@/api-types/site';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { formatLength } from '@/paving/length';
import { setOut } from '@/paving/set-out/set-out';
import { ask, base, complaintsOf, launch, openPage, signIn } from './browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

interface Id {
  readonly id: string;
}

/** A yard of 2.4 × 1.8 m, laid square with 300 mm slabs. */
const YARD: LayoutDocument = {
  schema: 'evenlay/layout@1',
  display: 'metric',
  ground: {
    perimeter: [
      [0, 0],
      [2400, 0],
      [2400, 1800],
      [0, 1800],
    ],
    keepOuts: [],
  },
  units: [
    { id: 'a', name: 'Slab 300 × 300', length: 300, width: 300, thickness: 40, tolerance: 2 },
  ],
  bond: { kind: 'stack', unit: 'a', joint: 4 },
  placement: { origin: [136, 140], turn: 0 },
  clearance: 6,
  lifted: [],
  cutting: 'none',
};

/** Saves the draft as a version, has the client accept it and issues it. */
async function issued(owner: Page, client: Page, layoutId: string, document: LayoutDocument) {
  const path = `/api/layouts/${layoutId}`;
  const draft = await ask<{ revision: number }>(owner, 'GET', `${path}/draft`);
  const { revision } = await ask<{ revision: number }>(owner, 'PUT', `${path}/draft`, {
    baseRevision: draft.revision,
    document,
  });
  const { id } = await ask<Id>(owner, 'POST', `${path}/versions`, {
    baseRevision: revision,
    label: 'Square slabs',
  });
  await ask(owner, 'POST', `/api/versions/${id}/share`, {});
  const { fingerprint, terms } = await ask<{ fingerprint: string; terms: string }>(
    client,
    'GET',
    `/api/versions/${id}/agreement`,
  );
  await ask(client, 'POST', `/api/versions/${id}/accept`, {
    typedName: 'Nerys Quillamore',
    fingerprint,
    terms,
  });
  const done = await ask<{ state: string }>(owner, 'POST', `/api/versions/${id}/issue`, {});
  expect(done.state).toBe('issued');
  return id;
}

const sync = (page: Page, words: string | RegExp) =>
  page.getByTestId('site-sync').filter({ hasText: words }).waitFor();

/** Everything that the page's own store on the phone holds, as text. */
const keptOnPhone = (page: Page): Promise<string> =>
  page.evaluate(async () => {
    const request = indexedDB.open('evenlay-site');
    const db = await new Promise<IDBDatabase>((resolve, reject) => {
      request.onsuccess = () => resolve(request.result);
      request.onerror = () => reject(request.error);
    });
    const parts: string[] = [];
    for (const name of db.objectStoreNames) {
      const all = db.transaction(name).objectStore(name).getAll();
      await new Promise((resolve) => (all.onsuccess = resolve));
      parts.push(JSON.stringify(all.result));
    }
    db.close();
    return parts.join('\n');
  });

const hasNoFaults = async (page: Page) => {
  const { violations } = await new AxeBuilder({ page })
    .withTags(['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa'])
    .analyze();
  expect(violations.map(({ id, nodes }) => [id, nodes.map(({ html }) => html)])).toEqual([]);
};

it('the phone’s page is the same for everybody, and says to sign in', async () => {
  const { context, page, complaints } = await openPage(browser, { width: 390, height: 844 });
  const answer = await page.goto('/site');
  expect(new URL(page.url()).pathname).toBe('/site');
  expect(answer!.headers()['content-security-policy']).toContain("script-src 'self'");
  await page.getByRole('link', { name: 'Sign in' }).waitFor();
  await hasNoFaults(page);
  // Being told that nobody is signed in is the one refusal.
  expect(complaints.filter((words) => !words.includes('401'))).toEqual([]);
  // What the worker keeps is this page and not another in its place, and no answer about anybody.
  await page.evaluate(() => navigator.serviceWorker.ready);
  const kept = await page.evaluate(async () => {
    const requests = await Promise.all(
      (await caches.keys()).map(async (name) => (await caches.open(name)).keys()),
    );
    const page = await caches.match('/site', { ignoreSearch: true });
    return {
      paths: requests.flat().map(({ url }) => new URL(url).pathname),
      shell: (await page?.text()) ?? '',
    };
  });
  expect(kept.shell).toContain('SiteApp');
  expect(kept.shell).not.toContain('Password');
  expect(
    kept.paths.filter(
      (path) => !/^\/(_astro\/|site$|site\.webmanifest$)|\.(js|svg|png)$/.test(path),
    ),
  ).toEqual([]);
  await context.close();
});

it('an installer builds without signal: what is entered is kept, sent once and in order, and put away at sign-out', async () => {
  const owner = await openPage(browser);
  const client = await openPage(browser);
  await signIn(owner.page, 'owner@larkmoss.example');
  await signIn(client.page, 'client@larkmoss.example');
  const project = await ask<Id>(owner.page, 'POST', '/api/projects', {
    name: 'Nettlefold yard',
    clientName: 'Nerys Quillamore',
  });
  const { people } = await ask<{ people: (Id & { role: string })[] }>(
    owner.page,
    'GET',
    '/api/people',
  );
  for (const { id } of people.filter(({ role }) => role === 'client' || role === 'installer')) {
    await ask(owner.page, 'POST', `/api/projects/${project.id}/people`, { personId: id });
  }
  const layout = await ask<Id>(owner.page, 'POST', `/api/projects/${project.id}/layouts`, {
    name: 'Yard',
    document: YARD,
  });
  const version = await issued(owner.page, client.page, layout.id, YARD);
  const { courses, checks } = setOut(layFloor(YARD));

  // Where there is signal: the plan comes onto the phone, and so does the program.
  const {
    context,
    page: first,
    complaints,
  } = await openPage(browser, {
    width: 390,
    height: 844,
    touch: true,
  });
  await signIn(first, 'installer@larkmoss.example');
  await first.getByRole('link', { name: 'On site' }).click();
  const plan = first.getByTestId('site-plan').filter({ hasText: 'Nettlefold yard' });
  await plan.waitFor();
  await first.getByText('This page opens without signal.').waitFor();
  await hasNoFaults(first);
  await plan.getByRole('link').click();
  await first.getByRole('heading', { name: `0 of ${courses.length} courses laid` }).waitFor();
  await hasNoFaults(first);
  await first.getByRole('button', { name: 'Dusk colours' }).click();
  for (const tab of ['Set out', 'Sizes', 'Courses']) {
    await first.getByRole('link', { name: tab, exact: true }).click();
    await hasNoFaults(first);
  }
  await first.getByRole('button', { name: 'Day colours' }).click();

  // Out of signal. The page is loaded anew from the phone alone.
  await context.setOffline(true);
  await first.reload();
  await first.getByRole('heading', { name: `0 of ${courses.length} courses laid` }).waitFor();
  await sync(first, 'No signal');
  await first.getByRole('button', { name: 'Course 1 is laid', exact: true }).click();
  await first.getByRole('button', { name: 'Course 2 is laid', exact: true }).click();
  await first.getByRole('heading', { name: `2 of ${courses.length} courses laid` }).waitFor();
  await sync(first, 'Kept on this phone, 2 entries to send. No signal.');

  // A reading that will do and one that will not, each judged at once; the second taken in feet and inches.
  await first.getByRole('link', { name: 'Checks' }).click();
  const card = (id: string) => first.locator(`[data-check="${id}"]`);
  const [one, two] = checks.filter(({ kind }) => kind === 'edge' || kind === 'diagonal');
  const field = (id: string) => card(id).getByRole('textbox');
  await field(one.id).fill(String(Math.round(one.expected)));
  await card(one.id).getByRole('button', { name: 'Keep' }).click();
  await card(one.id).locator('[data-testid=verdict][data-within=true]').waitFor();
  await first.getByRole('button', { name: 'Show feet and inches' }).click();
  const far = two.greatest! + 25.4;
  await field(two.id).fill(formatLength(far, 'imperial'));
  await field(two.id).press('Enter');
  await card(two.id).locator('[data-testid=verdict][data-within=false]').waitFor();
  await card(two.id).getByText('Not within').waitFor();
  await hasNoFaults(first);

  // A photo, and the page is closed.
  await first.getByRole('link', { name: 'Notes' }).click();
  await first.getByLabel('What is worth knowing').fill('Corner at the gate');
  const picture = await sharp({
    create: { width: 900, height: 600, channels: 3, background: '#886644' },
  })
    .jpeg()
    .toBuffer();
  await first
    .getByLabel('A photo from the camera')
    .setInputFiles({ name: 'gate.jpg', mimeType: 'image/jpeg', buffer: picture });
  await first.getByText('The photo is kept.').waitFor();
  await first.getByRole('img', { name: 'Corner at the gate' }).waitFor();
  await hasNoFaults(first);
  await first.close();

  // Meanwhile the designer issues another version.
  const second = await issued(owner.page, client.page, layout.id, {
    ...YARD,
    placement: { origin: [140, 140], turn: 0 },
  });

  // Opened again, still without signal: all is there, and another course is ticked in a second tab.
  const again = await context.newPage();
  const complaintsAgain = complaintsOf(again);
  await again.goto(`/site/${version}`);
  await again.getByRole('heading', { name: `2 of ${courses.length} courses laid` }).waitFor();
  await sync(again, 'Kept on this phone, 5 entries to send');
  const tab = await context.newPage();
  await tab.goto(`/site/${version}`);
  await tab.getByRole('button', { name: 'Course 3 is laid', exact: true }).click();
  await sync(again, '6 entries to send');

  // Back in signal.
  await context.setOffline(false);
  await sync(again, 'All sent.');
  await sync(tab, 'All sent.');
  const standing = await ask<SiteStanding>(
    owner.page,
    'GET',
    `/api/versions/${version}/site-entries`,
  );
  expect(standing.entries.map(({ place, content }) => [place, content])).toEqual([
    [1, { kind: 'course', course: 1, laid: true }],
    [2, { kind: 'course', course: 2, laid: true }],
    [3, { kind: 'check', check: one.id, measured: Math.round(one.expected) }],
    [4, { kind: 'check', check: two.id, measured: expect.closeTo(far, 0) }],
    [5, { kind: 'photo', caption: 'Corner at the gate' }],
    [6, { kind: 'course', course: 3, laid: true }],
  ]);
  expect(new Set(standing.entries.map(({ device }) => device)).size).toBe(1);
  const photo = standing.entries[4].id;
  const image = await owner.context.request.get(`${base()}/api/site-photos/${photo}`);
  expect(image.headers()['content-type']).toBe('image/jpeg');
  expect((await sharp(await image.body()).metadata()).width).toBe(900);

  // The phone has learnt that it must not be built from, and by what.
  await again.getByText('Superseded. Do not build from this plan.').waitFor();
  // In sight also from far down the page.
  await again.evaluate(() => scrollTo(0, document.body.scrollHeight));
  const told = again.getByText('Superseded. Do not build from this plan.');
  await expect.poll(async () => (await told.boundingBox())!.y).toBe(0);
  await again.getByRole('link', { name: 'Open version 2' }).click();
  await again.waitForURL(`**/site/${second}`);
  await again.getByRole('heading', { name: `0 of ${courses.length} courses laid` }).waitFor();

  // The firm and the client see how it goes.
  await owner.page.goto(`/versions/${version}`);
  await owner.page.getByTestId('courses-laid').filter({ hasText: '3 of' }).waitFor();
  await owner.page.getByRole('img', { name: 'Corner at the gate' }).waitFor();
  await client.page.goto(`/versions/${version}#on-site`);
  await client.page.getByTestId('courses-laid').filter({ hasText: '3 of' }).waitFor();
  expect(await client.page.getByTestId('site-note').count()).toBe(0);

  // Signed out while something waits: the phone shows nothing of it, and it is sent after signing in again.
  await tab.close();
  await again.route('**/site-entries', (route) => route.abort());
  await again.getByRole('button', { name: 'Course 1 is laid', exact: true }).click();
  await sync(again, '1 entry to send');
  await again.goto('/account');
  await again.getByRole('button', { name: 'Sign out on this device' }).click();
  await again.waitForURL('**/sign-in');
  await expect.poll(() => keptOnPhone(again)).not.toContain('Nettlefold');
  expect(await keptOnPhone(again)).not.toContain('Winterpell');
  await context.setOffline(true);
  await again.goto('/site');
  await again.getByText('Nobody is signed in on this phone').waitFor();
  await again.getByText('One entry waits on this phone, locked.').waitFor();
  await owner.page.goto(`/versions/${second}`);
  await owner.page.getByTestId('courses-laid').filter({ hasText: '0 of' }).waitFor();
  await context.setOffline(false);
  await again.unroute('**/site-entries');
  await signIn(again, 'installer@larkmoss.example');
  await again.goto(`/site/${second}`);
  await sync(again, 'All sent.');
  const after = await ask<SiteStanding>(owner.page, 'GET', `/api/versions/${second}/site-entries`);
  expect(after.entries.map(({ place, content }) => [place, content])).toEqual([
    [7, { kind: 'course', course: 1, laid: true }],
  ]);

  // The office sees it come in, without loading the page anew.
  await owner.page.getByTestId('courses-laid').filter({ hasText: '1 of' }).waitFor();

  // A lost connection, and being told that nobody is signed in, are the browser's own complaints; there is none of ours.
  const ours = [...complaints, ...complaintsAgain].filter(
    (words) => !/net::ERR_(INTERNET_DISCONNECTED|FAILED)|status of 401/.test(words),
  );
  expect(ours).toEqual([]);
  await context.close();
  await owner.context.close();
  await client.context.close();
});
