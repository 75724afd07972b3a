import { eq } from 'drizzle-orm';
import { describe, expect, test } from 'vitest';
import type { Thread } from '@/api-types/comments';
import { comments, people } from '@/db/schema';
import { postDigests, QUIET_MINUTES } from '@/server/digests';
import { mentionedIn } from '@/server/mentions';
import type { Signed } from './firm';
import { letters, newOffice, versionThatIs, type Office } from './office';
import { db, useEmptyDatabase } from './site';

useEmptyDatabase();

const say = async (who: Signed, version: string, body: string, pin: unknown = null) => {
  const answer = await who.visitor.post(`/api/versions/${version}/comments`, { body, pin });
  expect(answer.status, JSON.stringify(answer.body)).toBe(201);
  return answer.body as Thread;
};

const answerTo = async (who: Signed, { id }: Thread, body: string) =>
  (await who.visitor.post(`/api/threads/${id}/replies`, { body })).body as Thread;

const threadsOf = async (who: Signed, version: string): Promise<Thread[]> =>
  (await who.visitor.get(`/api/versions/${version}/comments`)).body.threads;

const renamed = async ({ actor }: Signed, name: string) =>
  (await db()).update(people).set({ name }).where(eq(people.id, actor.personId));

const chosen = async ({ actor }: Signed, choice: Partial<typeof people.$inferInsert>) =>
  (await db()).update(people).set(choice).where(eq(people.id, actor.personId));

test('a pin stays at its spot of the ground, and an unpinned comment has none', async () => {
  const office = await newOffice();
  const id = await versionThatIs(office, 'shared');
  await say(office.client, id, 'Here', [1234.567, -0.25]);
  await say(office.client, id, 'All of it');
  const threads = await threadsOf(office.designer, id);
  expect(threads.map(({ pin }) => pin)).toEqual([[1234.567, -0.25], null]);
  const ofLayout = await office.designer.visitor.get(`/api/layouts/${office.layoutId}/comments`);
  expect(ofLayout.body.threads).toEqual(threads);
});

test('who replies has read what they reply to, and no more than was shown', async () => {
  const office = await newOffice();
  const id = await versionThatIs(office, 'shared');
  const thread = await say(office.client, id, 'Why here?');
  const [mine, theirs] = [office.designer, office.owner];
  await answerTo(mine, thread, 'For the drain');
  expect((await threadsOf(mine, id))[0].unread).toBe(0);
  expect((await mine.visitor.get('/api/unread')).body.threads).toEqual([]);
  // The owner's page shows the first comment alone, since the answer has come meanwhile.
  const late = await theirs.visitor.post(`/api/threads/${thread.id}/replies`, {
    body: 'Because of the drain',
    upTo: thread.id,
  });
  expect(late.body.unread).toBe(1);
  expect(late.body.comments.map(({ unread }: { unread: boolean }) => unread)).toEqual([
    false,
    true,
    false,
  ]);
});

test.each([
  ['nothing', { body: '  ' }],
  ['half a pin', { body: 'x', pin: [1] }],
  ['a pin beyond any ground', { body: 'x', pin: [1e12, 0] }],
])('%s is no comment', async (_name, body) => {
  const office = await newOffice();
  const id = await versionThatIs(office, 'shared');
  expect((await office.client.visitor.post(`/api/versions/${id}/comments`, body)).status).toBe(422);
});

test('answers follow in order, resolving marks who and when, and an answer opens a thread again', async () => {
  const office = await newOffice();
  const id = await versionThatIs(office, 'shared');
  const thread = await say(office.client, id, 'Why here?');
  await answerTo(office.designer, thread, 'For the drain');
  const url = `/api/threads/${thread.id}`;
  expect(
    (await office.client.visitor.get(`/api/versions/${id}/comments`)).body.threads[0],
  ).toMatchObject({
    mayResolve: true,
    comments: [{ body: 'Why here?' }, { body: 'For the drain' }],
  });
  const resolved = await office.client.visitor.patch(url, { resolved: true });
  expect(resolved.body.resolved).toMatchObject({ by: { id: office.client.actor.personId } });
  // Resolved by another meanwhile: who did it first stays.
  const again = await office.designer.visitor.patch(url, { resolved: true });
  expect(again.body.resolved).toEqual(resolved.body.resolved);
  expect((await answerTo(office.client, thread, 'One more')).resolved).toBeNull();
});

test('what others wrote is unread until it was shown, and what comes after is unread again', async () => {
  const office = await newOffice();
  const id = await versionThatIs(office, 'shared');
  const thread = await say(office.client, id, 'One');
  const second = await answerTo(office.client, thread, 'Two');
  const unread = async (who: Signed) => (await threadsOf(who, id))[0].unread;
  expect(await unread(office.designer)).toBe(2);
  expect(await unread(office.client)).toBe(0);
  const read = (upTo: string) =>
    office.designer.visitor.put(`/api/threads/${thread.id}/read`, { upTo });
  expect((await read(thread.id)).body.unread).toBe(1);
  expect((await read(second.comments[1].id)).body.unread).toBe(0);
  // An older mark that comes late takes nothing back.
  expect((await read(thread.id)).body.unread).toBe(0);
  await answerTo(office.client, thread, 'Three');
  expect(await unread(office.designer)).toBe(1);
  expect(await unread(office.owner)).toBe(3);
  const inbox = (await office.designer.visitor.get('/api/unread')).body.threads;
  expect(inbox).toMatchObject([{ threadId: thread.id, unread: 1, latest: { body: 'Three' } }]);
  expect((await office.installer.visitor.get('/api/unread')).body.threads).toEqual([]);
});

describe('mentions', () => {
  const names = (body: string, ...all: string[]) =>
    mentionedIn(
      body,
      all.map((name) => ({ name })),
    ).map(({ name }) => name);

  test.each([
    ['@Ann Marsh please', ['Ann', 'Ann Marsh'], ['Ann Marsh']],
    ['@Ann, and @ann marsh', ['Ann', 'Ann Marsh'], ['Ann', 'Ann Marsh']],
    ['@Annabel', ['Ann'], []],
    ['ann@firm.example', ['firm'], []],
    ['(@Zoë Ó Briain)', ['Zoë Ó Briain'], ['Zoë Ó Briain']],
    ['@Zoe\u0308', ['Zo\u00eb'], ['Zo\u00eb']],
    ['Ann', ['Ann'], []],
    ['@', ['Ann', ''], []],
  ])('in “%s”', (body, all, mentioned) => {
    expect(names(body, ...all)).toEqual(mentioned);
  });

  test('two people of one name are both meant', () => {
    expect(names('@Ann', 'Ann', 'Ann')).toHaveLength(2);
  });

  test('who sees the version is told at once, unless they do not want it; who does not see it never', async () => {
    const office = await newOffice();
    const id = await versionThatIs(office, 'shared');
    await renamed(office.designer, 'Dell Finch');
    await renamed(office.owner, 'Oona Reed');
    await renamed(office.installer, 'Ives Moor');
    await chosen(office.owner, { mailMentions: false });
    const thread = await say(office.client, id, '@Dell Finch, @Oona Reed and @Ives Moor: look');
    expect(thread.comments[0].mentions.map(({ name }) => name)).toEqual([
      'Dell Finch',
      'Oona Reed',
    ]);
    const written = await letters(office.owner.actor.firmId, 'mention');
    expect(written.map(({ to }) => to)).toEqual([office.designer.email]);
    expect(written[0].text).toContain('look');
    const offered = (await office.client.visitor.get(`/api/versions/${id}/mentionable`)).body
      .people;
    // Everybody else who sees the version: nobody calls themselves.
    expect(offered.map(({ role }: { role: string }) => role).sort()).toEqual(['designer', 'owner']);
  });
});

describe('digests', () => {
  const inMinutes = (minutes: number) => new Date(Date.now() + minutes * 60_000);
  const digests = async ({ owner }: Office) => letters(owner.actor.firmId, 'comment-digest');
  const gather = async (minutes: number) => postDigests(await db(), inMinutes(minutes));

  /** Of all but the designer, so that a count is theirs. */
  const quietOffice = async (digest: 'hourly' | 'daily' | 'never' = 'hourly') => {
    const office = await newOffice();
    for (const who of [office.owner, office.installer, office.client]) {
      await chosen(who, { mailDigest: 'never' });
    }
    await chosen(office.designer, { mailDigest: digest });
    return { ...office, version: await versionThatIs(office, 'shared') };
  };

  test('a talk comes as one letter, once it has rested, and each comment once', async () => {
    const office = await quietOffice();
    const thread = await say(office.client, office.version, 'One');
    await answerTo(office.client, thread, 'Two');
    await gather(QUIET_MINUTES - 1);
    expect(await digests(office)).toEqual([]);
    await gather(QUIET_MINUTES + 1);
    const [letter, ...others] = await digests(office);
    expect(others).toEqual([]);
    expect(letter.to).toBe(office.designer.email);
    for (const part of [letter.text, letter.html]) {
      expect(part).toContain('One');
      expect(part).toContain('Two');
      expect(part).toContain(`/versions/${office.version}`);
    }
    await gather(3 * 24 * 60);
    expect(await digests(office)).toHaveLength(1);
  });

  test('what was read meanwhile, what one wrote oneself and what was told at once is not in it', async () => {
    const office = await quietOffice();
    await renamed(office.designer, 'Dell Finch');
    const read = await say(office.client, office.version, 'Read already');
    await office.designer.visitor.put(`/api/threads/${read.id}/read`, { upTo: read.id });
    await say(office.designer, office.version, 'My own');
    await say(office.client, office.version, '@Dell Finch told at once');
    await gather(30);
    expect(await digests(office)).toEqual([]);
  });

  test('whoever chose never gets none', async () => {
    const office = await quietOffice('never');
    await say(office.client, office.version, 'One');
    await gather(30);
    expect(await digests(office)).toEqual([]);
  });

  test('nobody is told of comments on a version that they do not see', async () => {
    const office = await quietOffice('never');
    await chosen(office.installer, { mailDigest: 'hourly' });
    await chosen(office.clientElsewhere, { mailDigest: 'hourly' });
    await say(office.client, office.version, 'One');
    await gather(30);
    expect(await digests(office)).toEqual([]);
  });

  test('gathered by five at once, a digest is written once', async () => {
    const office = await quietOffice();
    await say(office.client, office.version, 'One');
    await Promise.all(Array.from({ length: 5 }, () => gather(30)));
    expect(await digests(office)).toHaveLength(1);
  });

  test('an hour or a day passes between two letters', async () => {
    for (const [digest, minutes] of [
      ['hourly', 60],
      ['daily', 24 * 60],
    ] as const) {
      const office = await quietOffice(digest);
      await say(office.client, office.version, 'One');
      await gather(QUIET_MINUTES + 1);
      expect(await digests(office)).toHaveLength(1);
      // Written after the first letter, as that letter has it.
      const database = await db();
      const later = await say(office.client, office.version, 'Two');

      await database
        .update(comments)
        .set({ at: inMinutes(QUIET_MINUTES + 2) })
        .where(eq(comments.id, later.id));
      await gather(QUIET_MINUTES + minutes - 1);
      expect(await digests(office)).toHaveLength(1);
      await gather(QUIET_MINUTES + minutes + 3);
      expect(await digests(office)).toHaveLength(2);
    }
  });
});
