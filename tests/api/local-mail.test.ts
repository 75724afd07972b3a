import { rmSync } from 'node:fs';
import path from 'node:path';
import { afterAll, expect, test, vi } from 'vitest';
import { environment } from '@/server/environment';
import { showsLetters } from '@/server/mail/local-mail';
import { startPosting } from '@/server/mail/posting';
import { newFirm } from './firm';
import { tokenFor } from './letters-to';
import { db, useEmptyDatabase, Visitor } from './site';

const folder = vi.hoisted(() => {
  // Before anything reads the settings.
  process.env.DATA_DIR = `${process.env.TMPDIR ?? '/tmp'}/evenlay-mail-${process.pid}`;
  return process.env.DATA_DIR;
});

useEmptyDatabase();

afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** A browser on this machine. */
const near = new Visitor();
const asNear = (url: string) =>
  near.call('GET', url, undefined, { 'x-forwarded-for': '127.0.0.1' });

test('without a mail server letters go by SMTP to one in this process, and are shown to who is near', async () => {
  expect(path.resolve(environment().dataDir)).toBe(path.resolve(folder));
  const sender = await startPosting(await db(), environment());
  const again = await startPosting(await db(), environment());
  expect(again).toBe(sender);
  const owner = await newFirm();
  const email = 'ångström@elsewhere.example';
  const wrong = await owner.visitor.post('/api/invitations', { email, role: 'designer' });
  expect(wrong.status).toBe(422);
  await owner.visitor.post('/api/invitations', {
    email: 'wren@elsewhere.example',
    role: 'designer',
  });
  const token = await tokenFor('wren@elsewhere.example');
  const letters = async () => (await asNear('/api/dev/mail')).body.letters;
  await expect.poll(async () => (await letters()).length, { timeout: 20_000 }).toBe(1);
  const [listed] = await letters();
  expect(listed).toMatchObject({
    to: 'wren@elsewhere.example',
    subject: expect.stringContaining('invites you'),
  });
  const { body: letter } = await asNear(`/api/dev/mail/${listed.id}`);
  expect(letter.text).toContain(`/accept-invitation?token=${token}`);
  expect(letter.html).toContain(`/accept-invitation?token=${token}`);
  await sender.stop();
});

test('letters are shown to nobody far away, and no path leads out of their folder', async () => {
  const far = await new Visitor().get('/api/dev/mail');
  expect(far.status).toBe(404);
  for (const id of ['..%2Fpglite.lock', '1796110984017-%2e%2e', 'x', '1796110984017-none']) {
    expect((await asNear(`/api/dev/mail/${id}`)).status).toBe(404);
  }
});

test.each([
  ['127.0.0.1', true],
  ['::1', true],
  ['::ffff:127.0.0.1', true],
  // A container's host, as it sees it (RFC 1918).
  ['172.17.0.1', true],
  ['192.168.1.20', true],
  ['fe80::1%eth0', true],
  ['172.32.0.1', false],
  ['203.0.113.9', false],
  ['2001:db8::1', false],
  ['', false],
  ['unknown', false],
])('where none are sent, letters are shown to %s: %s', (address, shown) => {
  const none = { smtpUrl: undefined, publicOrigin: undefined };
  expect(showsLetters(address, none)).toBe(shown);
  expect(showsLetters(address, { ...none, smtpUrl: 'smtp://mail.firm.example' })).toBe(false);
  expect(showsLetters(address, { ...none, publicOrigin: 'https://floors.example' })).toBe(false);
});
