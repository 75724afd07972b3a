import { setTimeout } from 'node:timers/promises';
import { asc, eq, sql } from 'drizzle-orm';
import { beforeEach, describe, expect, test } from 'vitest';
import { outbox } from '@/db/schema';
import { backOffSeconds } from '@/server/mail/back-off';
import type { Letter } from '@/server/mail/letter';
import { postLetter } from '@/server/mail/outbox';
import type { Post } from '@/server/mail/post';
import { letterSender, SENDER_SETTINGS, type SenderSettings } from '@/server/mail/sender';
import { smtpPost } from '@/server/mail/smtp-post';
import { SMTP_PATIENCE } from '@/server/mail/smtp-settings';
import { deadAddress, faultyServer, mailServer, type Fault } from './mail-servers';
import { db, useEmptyDatabase } from './site';

useEmptyDatabase();

beforeEach(async () => {
  await (await db()).delete(outbox);
});

const letter = (subject: string): Letter => ({
  kind: 'test',
  subject,
  name: 'Wren',
  blocks: [{ kind: 'paragraph', text: 'The kerb is set.' }],
  why: 'A letter of a test.',
});

const post = async (subject: string, to = 'wren@firm.example') =>
  postLetter(await db(), { to, firmId: null }, letter(subject));

const rows = async () => (await db()).select().from(outbox).orderBy(asc(outbox.createdAt));

const rowOf = async (id: string) =>
  (await (await db()).select().from(outbox).where(eq(outbox.id, id)))[0];

const postTo = (url: string, patience = SMTP_PATIENCE): Post =>
  smtpPost({ url, from: 'Evenlay <floors@firm.example>', ...patience });

const senderTo = async (url: string, settings: SenderSettings = SENDER_SETTINGS) =>
  letterSender(await db(), postTo(url), settings);

/** With a server that never answers every try takes as long as this. */
const IMPATIENT = { patienceMs: 400, deadlineMs: 2000 };

/** What is waiting for its next try becomes due now, as time would make it. */
const letTimePass = async () => {
  await (await db()).update(outbox).set({ dueAt: sql`now()`, claimedUntil: null });
};

test('a letter arrives with both its parts, its own Message-ID and whom it is from', async () => {
  const server = await mailServer();
  const id = await post('About the court');
  expect(await (await senderTo(server.url)).drain()).toBe(1);
  const [mail] = server.taken;
  expect(mail).toMatchObject({ subject: 'About the court' });
  expect(mail.from?.value).toEqual([{ name: 'Evenlay', address: 'floors@firm.example' }]);
  expect(mail.text).toContain('The kerb is set.');
  expect(mail.html).toContain('The kerb is set.');
  expect(mail.headers.get('auto-submitted')).toBe('auto-generated');
  expect(mail.messageId).toBe((await rowOf(id)).messageId);
});

test('a letter that is sent is not sent again, and not kept word for word', async () => {
  const server = await mailServer();
  const id = await post('Once');
  const sender = await senderTo(server.url);
  await sender.drain();
  await letTimePass();
  expect(await sender.drain()).toBe(0);
  expect(server.taken).toHaveLength(1);
  const row = await rowOf(id);
  expect(row).toMatchObject({ tries: 1, lastError: null, claimedBy: null, text: '', html: '' });
  expect(row.sentAt).toBeInstanceOf(Date);
});

test('letters go in order, several over one conversation', async () => {
  const server = await mailServer();
  for (const subject of ['One', 'Two', 'Three']) {
    await post(subject);
    // Letters that are due in the same millisecond have no order.
    await setTimeout(5);
  }
  await (await senderTo(server.url)).drain();
  expect(server.taken.map((mail) => mail.subject)).toEqual(['One', 'Two', 'Three']);
  expect(server.conversations()).toBe(1);
});

test('a letter is kept only if what it tells of is', async () => {
  const broken = (await db()).transaction(async (tx) => {
    await postLetter(tx, { to: 'wren@firm.example', firmId: null }, letter('Never'));
    throw new Error('what it tells of failed');
  });
  await expect(broken).rejects.toThrow('what it tells of failed');
  expect(await rows()).toEqual([]);
});

const FAULTS: readonly Fault[] = [
  'no greeting',
  'turned away',
  'no answer to the recipient',
  'dead in the letter',
  'dead after the letter',
  'no answer after the letter',
];

describe.each(FAULTS)('a server with the fault "%s"', (fault) => {
  test('loses no letter: each waits, and goes once to the server that works again', async () => {
    const faulty = await faultyServer(fault);
    const ids = [await post('First'), await post('Second')];
    expect(await letterSender(await db(), postTo(faulty.url, IMPATIENT)).drain()).toBe(2);
    expect(faulty.conversations()).toBe(2);
    for (const id of ids) {
      const row = await rowOf(id);
      expect(row).toMatchObject({ sentAt: null, refusedAt: null, tries: 1, claimedBy: null });
      expect(row.lastError).toBeTruthy();
      expect(row.dueAt.getTime()).toBeGreaterThan(row.createdAt.getTime());
    }
    const working = await mailServer();
    const sender = await senderTo(working.url);
    expect(await sender.drain()).toBe(0);
    await letTimePass();
    await sender.drain();
    await letTimePass();
    await sender.drain();
    expect(working.taken.map((mail) => mail.subject).sort()).toEqual(['First', 'Second']);
  });
});

test('where nothing listens no letter is lost', async () => {
  const id = await post('Kept');
  await (await senderTo(await deadAddress())).drain();
  expect(await rowOf(id)).toMatchObject({ sentAt: null, refusedAt: null, tries: 1 });
});

/** RFC 5321, 4.2.1: 4yz is for now, 5yz for good; RFC 3463: x.7.z is policy. */
test.each([
  [451, '4.3.0 Try later', 'RCPT', false],
  [550, '5.1.1 No such person', 'RCPT', true],
  [550, '5.7.1 Relaying denied', 'RCPT', false],
  [530, '5.7.0 Sign in first', 'MAIL', false],
  [552, '5.3.4 Too large', 'DATA', true],
  [452, '4.2.2 Mailbox full', 'DATA', false],
] as const)('the answer %i %s to %s ends the letter: %s', async (code, text, at, forGood) => {
  const refuse = Object.assign(new Error(text), { responseCode: code });
  const server = await mailServer({
    ...(at === 'MAIL' ? { onMailFrom: (_a, _s, answer) => answer(refuse) } : {}),
    ...(at === 'RCPT' ? { onRcptTo: (_a, _s, answer) => answer(refuse) } : {}),
    ...(at === 'DATA'
      ? {
          onData: (stream, _s, answer) => {
            stream.resume();
            stream.once('end', () => answer(refuse));
          },
        }
      : {}),
  });
  const id = await post('Refused');
  const sender = await senderTo(server.url);
  await sender.drain();
  const row = await rowOf(id);
  expect(row.lastError).toContain(text);
  expect(row.refusedAt !== null).toBe(forGood);
  expect(row.sentAt).toBeNull();
  await letTimePass();
  expect(await sender.drain()).toBe(forGood ? 0 : 1);
});

test('one address that is refused holds up no other letter', async () => {
  const server = await mailServer({
    onRcptTo: ({ address }, _session, answer) =>
      answer(
        address.startsWith('gone')
          ? Object.assign(new Error('5.1.1 No such person'), { responseCode: 550 })
          : undefined,
      ),
  });
  await post('To nobody', 'gone@firm.example');
  await post('To somebody');
  await (await senderTo(server.url)).drain();
  expect(server.taken.map((mail) => mail.subject)).toEqual(['To somebody']);
});

test('a server that asks for a name and a password gets those of its address', async () => {
  const names: unknown[] = [];
  const server = await mailServer({
    disabledCommands: ['STARTTLS'],
    allowInsecureAuth: true,
    onAuth: ({ username, password }, _session, answer) => {
      names.push([username, password]);
      answer(null, { user: username });
    },
  });
  await post('Signed in');
  const url = server.url.replace('smtp://', 'smtp://floors%40firm:p%3Ass%2Fword@');
  await (await senderTo(url)).drain();
  expect(names).toEqual([['floors@firm', 'p:ss/word']]);
  expect(server.taken).toHaveLength(1);
});

test('several senders at once send each letter once', async () => {
  const server = await mailServer();
  const subjects = Array.from({ length: 25 }, (_, n) => `Letter ${n}`);
  for (const subject of subjects) await post(subject);
  const senders = await Promise.all([1, 2, 3, 4].map(() => senderTo(server.url)));
  await Promise.all(senders.map((sender) => sender.drain()));
  expect(server.taken.map((mail) => mail.subject).sort()).toEqual([...subjects].sort());
  expect(new Set(server.taken.map((mail) => mail.messageId)).size).toBe(subjects.length);
});

test('a letter that a killed sender had in hand goes when its lease is over', async () => {
  const id = await post('Left behind');
  await (
    await db()
  )
    .update(outbox)
    .set({ claimedBy: 'killed', claimedUntil: sql`now() + interval '1 hour'`, tries: 1 });
  const server = await mailServer();
  const sender = await senderTo(server.url);
  expect(await sender.drain()).toBe(0);
  await (await db()).update(outbox).set({ claimedUntil: sql`now() - interval '1 second'` });
  expect(await sender.drain()).toBe(1);
  expect((await rowOf(id)).sentAt).not.toBeNull();
});

test('a sender held up past its lease finds out before it says anything of the letter', async () => {
  const server = await mailServer();
  const id = await post('Held up');
  const real = postTo(server.url);
  /** Another sender takes the letter over and sends it while this one is connecting. */
  const overtaken: Post = {
    ...real,
    deliver: (posted, stillOurs) =>
      real.deliver(posted, async () => {
        await (await db()).update(outbox).set({ claimedUntil: sql`now() - interval '1 second'` });
        await (await senderTo(server.url)).drain();
        return stillOurs();
      }),
  };
  await letterSender(await db(), overtaken).drain();
  expect(server.taken.map((mail) => mail.subject)).toEqual(['Held up']);
  expect((await rowOf(id)).sentAt).not.toBeNull();
});

test('a letter may take less long than its lease, so that two never have it in hand', () => {
  expect(SMTP_PATIENCE.deadlineMs * 2).toBeLessThan(SENDER_SETTINGS.leaseSeconds * 1000);
});

test('the wait between tries doubles, up to an hour', () => {
  expect([1, 2, 3, 4].map(backOffSeconds)).toEqual([15, 30, 60, 120]);
  expect(backOffSeconds(9)).toBe(3600);
  expect(backOffSeconds(100_000)).toBe(3600);
});

test('a sender that runs takes letters as they come, and stops when told', async () => {
  const server = await mailServer();
  const sender = await senderTo(server.url, { ...SENDER_SETTINGS, restMs: 10 });
  sender.start();
  await post('Picked up');
  await expect.poll(() => server.taken.length, { timeout: 10_000 }).toBe(1);
  await sender.stop();
  const id = await post('Too late');
  expect(await sender.drain()).toBe(0);
  expect((await rowOf(id)).sentAt).toBeNull();
});
