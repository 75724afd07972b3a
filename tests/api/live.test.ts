import { and, eq } from 'drizzle-orm';
import { afterEach, expect, test } from 'vitest';
import type { LiveState } from '@/api-types/live';
import { draftPresence, memberships, projectPeople } from '@/db/schema';
import { projectPulse } from '@/server/project-pulse';
import { court, moved, newVersion, type Signed } from './firm';
import { newOffice, versionThatIs, type Office } from './office';
import { db, serve, useEmptyDatabase } from './site';

useEmptyDatabase();

const live = async (who: Signed, { projectId }: Office): Promise<LiveState> =>
  (await who.visitor.get(`/api/projects/${projectId}/live`)).body;

const streams: Stream[] = [];
afterEach(async () => {
  for (const stream of streams.splice(0)) await stream.close();
});

/** A browser that listens: the events of a stream, one after the other. */
class Stream {
  private text = '';
  private constructor(private readonly reader: ReadableStreamDefaultReader<Uint8Array>) {}

  static async open(who: Signed, projectId: string): Promise<Stream> {
    const response = await serve(
      who.visitor.request('GET', `/api/projects/${projectId}/live/stream`),
    );
    expect(response.status).toBe(200);
    expect(response.headers.get('content-type')).toBe('text/event-stream');
    const stream = new Stream(response.body!.getReader());
    streams.push(stream);
    return stream;
  }

  async next(): Promise<{ event: string; data: unknown } | null> {
    for (;;) {
      const end = this.text.indexOf('\n\n');
      if (end >= 0) {
        const block = this.text.slice(0, end);
        this.text = this.text.slice(end + 2);
        const fields = new Map(
          block.split('\n').map((line) => {
            const colon = line.indexOf(':');
            return [line.slice(0, colon), line.slice(colon + 1).trimStart()] as const;
          }),
        );
        const event = fields.get('event');
        if (event) return { event, data: JSON.parse(fields.get('data') ?? 'null') };
        continue;
      }
      const { done, value } = await this.reader.read();
      if (done) return null;
      this.text += new TextDecoder().decode(value);
    }
  }

  /** The next state for which this holds; the test's own time is how long it may take. */
  async until(holds: (state: LiveState) => boolean): Promise<LiveState> {
    for (;;) {
      const next = await this.next();
      if (!next) throw new Error('the stream ended');
      if (next.event === 'state' && holds(next.data as LiveState)) return next.data as LiveState;
    }
  }

  close = () => this.reader.cancel();
}

test('each change that others should see moves the stamp, and nothing else does', async () => {
  const office = await newOffice();
  const { designer, owner, client, layoutId } = office;
  const version = await versionThatIs(office, 'shared');
  const thread = (await client.visitor.post(`/api/versions/${version}/comments`, { body: 'So' }))
    .body;
  const pulse = async () => projectPulse(await db(), owner.actor.firmId, office.projectId);
  const changes: [string, () => Promise<unknown>][] = [
    [
      'a draft saved',
      async () =>
        designer.visitor.put(`/api/layouts/${layoutId}/draft`, {
          baseRevision: 1,
          document: moved(court(), 5),
        }),
    ],
    ['a version saved', () => newVersion(designer.visitor, layoutId)],
    ['a comment', () => client.visitor.post(`/api/versions/${version}/comments`, { body: 'And' })],
    [
      'an answer',
      () => designer.visitor.post(`/api/threads/${thread.id}/replies`, { body: 'Yes' }),
    ],
    [
      'a thread resolved',
      () => designer.visitor.patch(`/api/threads/${thread.id}`, { resolved: true }),
    ],
    [
      'a thread opened again',
      () => designer.visitor.patch(`/api/threads/${thread.id}`, { resolved: false }),
    ],
    [
      'comments read',
      () => owner.visitor.put(`/api/threads/${thread.id}/read`, { upTo: thread.id }),
    ],
    [
      'a step',
      () => client.visitor.post(`/api/versions/${version}/ask-change`, { note: 'Turn it' }),
    ],
    ['a name', () => designer.visitor.patch(`/api/layouts/${layoutId}`, { name: 'Other' })],
    [
      'somebody comes',
      () => designer.visitor.put(`/api/layouts/${layoutId}/presence`, { state: 'looking' }),
    ],
    [
      'somebody edits',
      () => designer.visitor.put(`/api/layouts/${layoutId}/presence`, { state: 'editing' }),
    ],
    [
      'somebody goes',
      () => designer.visitor.put(`/api/layouts/${layoutId}/presence`, { state: 'gone' }),
    ],
  ];
  for (const [name, change] of changes) {
    const before = await live(owner, office);
    const beat = await pulse();
    expect((await live(owner, office)).stamp, name).toBe(before.stamp);
    expect(await pulse(), name).toBe(beat);
    await change();
    expect((await live(owner, office)).stamp, name).not.toBe(before.stamp);
    expect(await pulse(), name).not.toBe(beat);
  }
});

test('it tells each what they may see: no draft and no presence to the client, only shared versions', async () => {
  const office = await newOffice();
  const shared = await versionThatIs(office, 'shared');
  await versionThatIs(office, 'saved');
  await office.client.visitor.post(`/api/versions/${shared}/comments`, { body: 'So' });
  await office.designer.visitor.put(`/api/layouts/${office.layoutId}/presence`, {
    state: 'editing',
  });
  const [own] = (await live(office.client, office)).layouts;
  expect(own).toMatchObject({ draft: null, present: [] });
  expect(own.versions).toMatchObject([{ id: shared, state: 'shared', comments: 1, unread: 0 }]);
  const [theirs] = (await live(office.owner, office)).layouts;
  expect(theirs.versions.map(({ state, unread }) => [state, unread])).toEqual([
    ['saved', 0],
    ['shared', 1],
  ]);
  expect(theirs.draft).toMatchObject({ revision: 1 });
  expect(theirs.present).toMatchObject([
    { person: { id: office.designer.actor.personId }, editing: true },
  ]);
});

test('somebody not heard of for a while is gone, and one is never shown to oneself', async () => {
  const office = await newOffice();
  const url = `/api/layouts/${office.layoutId}/presence`;
  const beat = async (who: Signed) =>
    (await who.visitor.put(url, { state: 'looking' })).body.present;
  expect(await beat(office.designer)).toEqual([]);
  expect(await beat(office.owner)).toMatchObject([
    { person: { id: office.designer.actor.personId }, editing: false },
  ]);
  await (
    await db()
  )
    .update(draftPresence)
    .set({ seenAt: new Date(Date.now() - 60_000) })
    .where(eq(draftPresence.personId, office.designer.actor.personId));
  expect(await beat(office.owner)).toEqual([]);
});

test('a page that listens hears of a version shared, a comment and an acceptance without asking', async () => {
  const office = await newOffice();
  const version = await versionThatIs(office, 'saved');
  const stream = await Stream.open(office.client, office.projectId);
  const first = await stream.until(() => true);
  expect(first.layouts).toEqual([]);
  const state = ({ layouts }: LiveState) => layouts[0]?.versions[0];
  await office.designer.visitor.post(`/api/versions/${version}/share`);
  await stream.until((now) => state(now)?.state === 'shared');
  await office.owner.visitor.post(`/api/versions/${version}/comments`, { body: 'So' });
  const told = await stream.until((now) => state(now)?.unread === 1);
  expect(told).toEqual(await live(office.client, office));
});

test('whoever is taken off the project, or out of the firm, is told to go and hears nothing more', async () => {
  const office = await newOffice();
  await versionThatIs(office, 'shared');
  const database = await db();
  const removals: [Signed, () => Promise<unknown>][] = [
    [
      office.client,
      () =>
        database
          .delete(projectPeople)
          .where(
            and(
              eq(projectPeople.projectId, office.projectId),
              eq(projectPeople.personId, office.client.actor.personId),
            ),
          ),
    ],
    [
      office.designer,
      () =>
        database
          .delete(memberships)
          .where(eq(memberships.personId, office.designer.actor.personId)),
    ],
  ];
  for (const [who, remove] of removals) {
    const stream = await Stream.open(who, office.projectId);
    await stream.until(() => true);
    await remove();
    let next = await stream.next();
    while (next?.event === 'state') next = await stream.next();
    expect(next?.event).toBe('gone');
    expect(await stream.next()).toBeNull();
  }
});
