import 'fake-indexeddb/auto';
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { lockedCount, lockPhone } from '@/components/site/phone-lock';
import {
  entryDropped,
  keepEntries,
  keptPacks,
  keptPicture,
  openPhoneStore,
  phonePerson,
  waitingEntries,
  whoOf,
  type PhoneStore,
} from '@/components/site/phone-store';
import { packsRefreshed, waitingSent } from '@/components/site/phone-sync';
import type { SiteEntryContent } from '@/paving/site/site-entry';
import { account, FakeServer, pack } from './phone';

const JOSS = whoOf(account('joss'));
let stores = 0;
let name: string;
let store: PhoneStore;
let server: FakeServer;

beforeEach(async () => {
  name = `phone-${(stores += 1)}`;
  store = await openPhoneStore(name);
  server = new FakeServer();
  vi.stubGlobal('fetch', server.fetch);
  await packsRefreshed(store);
});
afterEach(() => {
  store.close();
  vi.unstubAllGlobals();
});

const course = (number: number): { content: SiteEntryContent } => ({
  content: { kind: 'course', course: number, laid: true },
});
const photo = (bytes: number) => ({
  content: { kind: 'photo', caption: 'Corner' } as const,
  picture: { full: new ArrayBuffer(bytes), small: new ArrayBuffer(5) },
});
const places = async () => (await waitingEntries(store, JOSS)).map(({ place }) => place);

describe('what is entered on a phone', () => {
  test('is kept before it is sent, and is there when the page is opened again', async () => {
    server.meddle = () => 'no-signal';
    await keepEntries(store, JOSS, 'v1', [course(1), course(2)]);
    expect(await waitingSent(store)).toBe('no-signal');
    // The page is closed and opened again.
    store.close();
    store = await openPhoneStore(name);
    const waiting = await waitingEntries(store, JOSS);
    expect(waiting.map(({ content }) => content)).toEqual([course(1).content, course(2).content]);
    expect((await phonePerson(store))?.who).toBe(JOSS);
    expect(await keptPacks(store, JOSS)).toHaveLength(1);
  });

  test('is sent in its order and leaves the phone once the server has it', async () => {
    await keepEntries(store, JOSS, 'v1', [course(1), photo(9)]);
    await keepEntries(store, JOSS, 'v1', [course(2), course(3)]);
    expect(await waitingSent(store)).toBe('heard');
    expect(server.kept.map(({ place, kind }) => [place, kind])).toEqual([
      [1, 'course'],
      [2, 'photo'],
      [3, 'course'],
      [4, 'course'],
    ]);
    expect(await places()).toEqual([]);
    // And is still seen, as something that the server has.
    const [{ pack: known }] = await keptPacks(store, JOSS);
    expect(known.standing.entries.map(({ place }) => place)).toEqual([1, 2, 3, 4]);
    expect(known.standing.entries[0].by.name).toBe('Person joss');
  });

  test('is kept once by the server when its answer is lost on the way', async () => {
    await keepEntries(store, JOSS, 'v1', [course(1), course(2)]);
    server.meddle = (method) => (method === 'POST' ? 'lost' : undefined);
    expect(await waitingSent(store)).toBe('no-signal');
    expect(await places()).toEqual([1, 2]);
    server.meddle = () => undefined;
    expect(await waitingSent(store)).toBe('heard');
    expect(server.kept.map(({ place }) => place)).toEqual([1, 2]);
    expect(await places()).toEqual([]);
  });

  test('goes over in pieces when there is much of it, none before its turn', async () => {
    await keepEntries(
      store,
      JOSS,
      'v1',
      Array.from({ length: 120 }, (_, n) => course(n + 1)),
    );
    let posts = 0;
    server.meddle = (method) => (method === 'POST' && (posts += 1) === 2 ? 'no-signal' : undefined);
    expect(await waitingSent(store)).toBe('no-signal');
    expect(server.kept).toHaveLength(50);
    await keepEntries(store, JOSS, 'v1', [course(121)]);
    expect(await waitingSent(store)).toBe('heard');
    expect(server.kept.map(({ place }) => place)).toEqual(
      Array.from({ length: 121 }, (_, n) => n + 1),
    );
  });

  test('has its place from one count, whichever tab it is entered in', async () => {
    const other = await openPhoneStore(name);
    server.meddle = () => 'no-signal';
    await Promise.all(
      Array.from({ length: 10 }, (_, n) =>
        keepEntries(n % 2 ? store : other, JOSS, 'v1', [course(n + 1)]),
      ),
    );
    expect(await places()).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10]);
    other.close();
  });

  test('keeps its order in time when the phone’s clock is put back', async () => {
    server.meddle = () => 'no-signal';
    await keepEntries(store, JOSS, 'v1', [course(1)], Date.UTC(2026, 4, 4, 9));
    await keepEntries(store, JOSS, 'v1', [course(2)], Date.UTC(2026, 4, 4, 8));
    const [first, second] = await waitingEntries(store, JOSS);
    expect(second.madeAt > first.madeAt).toBe(true);
  });

  test('that the server refuses stays to be read with the reason, and holds up nothing', async () => {
    const [bad] = await keepEntries(store, JOSS, 'v1', [photo(3)]);
    await keepEntries(store, JOSS, 'v1', [course(1)]);
    server.meddle = (_method, path) =>
      path.includes('site-photos') ? { status: 422, body: { detail: 'Not a photo.' } } : undefined;
    expect(await waitingSent(store)).toBe('heard');
    expect(server.kept.map(({ place }) => place)).toEqual([2]);
    expect(await waitingEntries(store, JOSS)).toMatchObject([
      { id: bad.id, refused: 'Not a photo.' },
    ]);
    await entryDropped(store, bad.id);
    expect(await places()).toEqual([]);
    expect(await keptPicture(store, bad.id)).toBeUndefined();
  });

  test('for a project that is no longer theirs is kept with the reason, and the rest goes on', async () => {
    server.packs = [pack('v1'), pack('v2')];
    await packsRefreshed(store);
    await keepEntries(store, JOSS, 'v1', [course(1)]);
    await keepEntries(store, JOSS, 'v2', [course(2)]);
    server.packs = [pack('v2')];
    expect(await waitingSent(store)).toBe('heard');
    expect(server.kept.map(({ place }) => place)).toEqual([2]);
    const [left] = await waitingEntries(store, JOSS);
    expect(left.refused).toContain('no longer yours');
    await packsRefreshed(store);
    expect((await keptPacks(store, JOSS)).map(({ versionId }) => versionId)).toEqual(['v2']);
  });

  test('of which one alone is not right to the server is found, and the rest goes over', async () => {
    await keepEntries(store, JOSS, 'v1', [course(1), course(2), course(3)]);
    const [, bad] = await waitingEntries(store, JOSS);
    server.meddle = (_method, _path, body) =>
      body.includes(bad.id) ? { status: 422, body: { detail: 'Not right yet.' } } : undefined;
    expect(await waitingSent(store)).toBe('heard');
    expect(server.kept.map(({ place }) => place)).toEqual([1, 3]);
    expect(await waitingEntries(store, JOSS)).toMatchObject([
      { id: bad.id, refused: 'Not right yet.' },
    ]);
  });

  test('that is too much at once goes over one by one', async () => {
    await keepEntries(store, JOSS, 'v1', [course(1), course(2), course(3)]);
    server.meddle = (_method, _path, body) =>
      body.split('"kind"').length > 2 ? { status: 413, body: { detail: 'Over 1 MB.' } } : undefined;
    expect(await waitingSent(store)).toBe('heard');
    expect(server.kept.map(({ place }) => place)).toEqual([1, 2, 3]);
  });

  test('an error of the server’s leaves everything waiting', async () => {
    await keepEntries(store, JOSS, 'v1', [course(1)]);
    server.meddle = () => ({ status: 500, body: { detail: 'Broken' } });
    expect(await waitingSent(store)).toBe('failed');
    expect(await places()).toEqual([1]);
  });

  test('of a photo the image goes once it is sent, and the small one stays to look at', async () => {
    const [{ id }] = await keepEntries(store, JOSS, 'v1', [photo(77)]);
    await waitingSent(store);
    expect(server.photos.get(id)).toBe(77);
    const picture = await keptPicture(store, id);
    expect(picture?.full).toBeNull();
    expect(picture?.small.byteLength).toBe(5);
  });

  test('when the phone is full is not kept in part, and says so', async () => {
    const full = new DOMException('full', 'QuotaExceededError');
    const add = vi.spyOn(IDBObjectStore.prototype, 'add').mockImplementation(() => {
      throw full;
    });
    await expect(keepEntries(store, JOSS, 'v1', [course(1)])).rejects.toBe(full);
    add.mockRestore();
    expect(await places()).toEqual([]);
    // The count has not moved either.
    server.meddle = () => 'no-signal';
    await keepEntries(store, JOSS, 'v1', [course(1)]);
    expect(await places()).toEqual([1]);
  });
});

describe('what may be built from', () => {
  test('is kept whole once, and then only what was written down is asked for', async () => {
    expect(server.asked).toEqual(['GET /api/site', 'GET /api/versions/v1/site-pack']);
    server.asked.length = 0;
    await packsRefreshed(store);
    expect(server.asked).toEqual(['GET /api/site', 'GET /api/versions/v1/site-entries']);
  });

  test('learns that it is superseded, and a plan no longer theirs goes', async () => {
    const by = { id: 'v2', number: 2, at: '2026-05-05T06:00:00.000Z' };
    server.packs = [{ ...pack('v1'), state: 'superseded', supersededBy: by }, pack('v2')];
    await packsRefreshed(store);
    const kept = await keptPacks(store, JOSS);
    expect(kept.map(({ versionId, pack: { state } }) => [versionId, state])).toEqual([
      ['v1', 'superseded'],
      ['v2', 'issued'],
    ]);
    expect(kept[0].pack.supersededBy).toEqual(by);
    server.packs = [pack('v2')];
    await packsRefreshed(store);
    expect((await keptPacks(store, JOSS)).map(({ versionId }) => versionId)).toEqual(['v2']);
  });

  test('stays as it is without signal', async () => {
    server.meddle = () => 'no-signal';
    expect(await packsRefreshed(store)).toBe('no-signal');
    expect(await keptPacks(store, JOSS)).toHaveLength(1);
  });
});

/** Everything that the phone's stores hold, as text. */
const everything = async (db: PhoneStore): Promise<string> => {
  const parts: string[] = [];
  for (const one of db.objectStoreNames) {
    for (const value of await db.getAll(one)) {
      parts.push(
        JSON.stringify(value, (_key, part: unknown) =>
          part instanceof ArrayBuffer
            ? Buffer.from(part).toString('latin1')
            : ArrayBuffer.isView(part)
              ? Buffer.from(part.buffer, part.byteOffset, part.byteLength).toString('latin1')
              : part,
        ),
      );
    }
  }
  return parts.join('\n');
};

describe('a phone that is passed on', () => {
  const secret: { content: SiteEntryContent } = {
    content: { kind: 'note', text: 'The key is under the third pot' },
  };

  test('shows nothing of whoever signed out; what waited is locked, and sent when they are back', async () => {
    server.meddle = (method) => (method === 'POST' ? 'no-signal' : undefined);
    await keepEntries(store, JOSS, 'v1', [secret, photo(40)]);
    await waitingSent(store);
    expect(await everything(store)).toContain('third pot');
    await lockPhone(store);
    const left = await everything(store);
    expect(left).not.toContain('third pot');
    expect(left).not.toContain('Person joss');
    expect(left).not.toContain('Court');
    expect(left).not.toContain(server.key('joss'));
    expect(await phonePerson(store)).toBeUndefined();
    expect(await lockedCount(store)).toBe(2);

    // Somebody else uses the phone: they get theirs, and what is locked stays locked and unsent.
    server.meddle = () => undefined;
    server.person = account('mira');
    await packsRefreshed(store);
    expect(await waitingSent(store)).toBe('heard');
    expect((await phonePerson(store))?.account.id).toBe('mira');
    expect(await lockedCount(store)).toBe(2);
    expect(server.kept).toEqual([]);

    // And the first is back.
    server.person = account('joss');
    await packsRefreshed(store);
    expect(await keptPacks(store, whoOf(account('mira')))).toEqual([]);
    expect(await waitingSent(store)).toBe('heard');
    expect(server.kept.map(({ place, kind }) => [place, kind])).toEqual([
      [1, 'note'],
      [2, 'photo'],
    ]);
    expect([...server.photos.values()]).toEqual([40]);
    expect(await lockedCount(store)).toBe(0);
  });

  test('is locked when the server says that nobody is signed in', async () => {
    await keepEntries(store, JOSS, 'v1', [secret]);
    server.person = null;
    expect(await waitingSent(store)).toBe('signed-out');
    expect(await phonePerson(store)).toBeUndefined();
    expect(await everything(store)).not.toContain('third pot');
    server.person = account('joss');
    await packsRefreshed(store);
    await waitingSent(store);
    expect(server.kept).toHaveLength(1);
  });

  test('sends nothing under the name of somebody else who has signed in meanwhile', async () => {
    await keepEntries(store, JOSS, 'v1', [secret]);
    server.person = account('mira');
    expect(await waitingSent(store)).toBe('not-yours');
    expect(server.kept).toEqual([]);
    expect(await places()).toEqual([1]);
  });

  test('counts on where a person left off, so that the order holds over signing out', async () => {
    await keepEntries(store, JOSS, 'v1', [course(1)]);
    await lockPhone(store);
    await packsRefreshed(store);
    await keepEntries(store, JOSS, 'v1', [course(2)]);
    expect(await places()).toEqual([1, 2]);
  });
});
