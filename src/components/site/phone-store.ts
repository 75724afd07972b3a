import { openDB, type DBSchema, type IDBPDatabase } from 'idb';
import type { Account } from '@/api-types/people';
import type { SiteEntry, SitePack, SitePacks } from '@/api-types/site';
import type { SiteEntryContent } from '@/paving/site/site-entry';

/**
 * What a phone keeps so that a crew can work without signal. Everything is kept under the person who is signed in and the firm
 * they act in (`who`); see `phone-lock.ts` for what becomes of it when they sign out.
 */

/** The person that a phone is in use by, and the list they were last given. */
export interface PhonePerson {
  readonly who: string;
  readonly account: Account;
  readonly keep: SitePacks['keep'];
  readonly key: string;
  readonly summaries: SitePacks['packs'];
  /** When the server was last heard, ISO 8601. */
  readonly heardAt: string;
}

export interface KeptPack {
  readonly who: string;
  readonly versionId: string;
  readonly pack: SitePack;
  readonly keptAt: string;
}

/** An entry that the server has not answered for yet. */
export interface WaitingEntry {
  readonly id: string;
  readonly who: string;
  readonly device: string;
  readonly place: number;
  readonly versionId: string;
  readonly madeAt: string;
  readonly content: SiteEntryContent;
  /** Why the server did not take it: then it is not sent again. */
  readonly refused: string | null;
}

/** A photo made on this phone: its image while that waits to be sent, and a small one to look at. */
export interface KeptPicture {
  readonly id: string;
  readonly who: string;
  readonly versionId: string;
  readonly full: ArrayBuffer | null;
  readonly small: ArrayBuffer;
}

/** An entry locked away while its person is signed out. */
export interface LockedEntry {
  readonly id: string;
  readonly who: string;
  readonly iv: Uint8Array<ArrayBuffer>;
  readonly data: ArrayBuffer;
}

interface PhoneSchema extends DBSchema {
  person: { key: 'now'; value: PhonePerson };
  /** The phone's own mark under each person, and how many entries it has made under it. */
  devices: { key: string; value: { who: string; device: string; place: number; madeAt: number } };
  packs: { key: [string, string]; value: KeptPack };
  entries: { key: string; value: WaitingEntry; indexes: { who: [string, number] } };
  pictures: { key: string; value: KeptPicture; indexes: { who: string } };
  locked: { key: string; value: LockedEntry; indexes: { who: string } };
}

export type PhoneStore = IDBPDatabase<PhoneSchema>;

const PHONE_STORE = 'evenlay-site';

export const whoOf = ({ id, firm }: Pick<Account, 'id' | 'firm'>): string => `${firm.id}:${id}`;

/** @throws DOMException when the browser lets pages keep nothing */
export const openPhoneStore = (name = PHONE_STORE): Promise<PhoneStore> =>
  openDB<PhoneSchema>(name, 1, {
    upgrade: (db) => {
      db.createObjectStore('person');
      db.createObjectStore('devices', { keyPath: 'who' });
      db.createObjectStore('packs', { keyPath: ['who', 'versionId'] });
      const entries = db.createObjectStore('entries', { keyPath: 'id' });
      entries.createIndex('who', ['who', 'place']);
      db.createObjectStore('pictures', { keyPath: 'id' }).createIndex('who', 'who');
      db.createObjectStore('locked', { keyPath: 'id' }).createIndex('who', 'who');
    },
  });

/** What is answered for is on the phone's disk, not in some buffer that a flat battery empties. */
const STRICT = { durability: 'strict' } as const;

const ofWho = (who: string) => IDBKeyRange.bound([who, -Infinity], [who, Infinity]);
const packsOf = (who: string) => IDBKeyRange.bound([who, ''], [who, '\uffff']);

export const phonePerson = (db: PhoneStore): Promise<PhonePerson | undefined> =>
  db.get('person', 'now');

export const keptPacks = (db: PhoneStore, who: string): Promise<KeptPack[]> =>
  db.getAll('packs', packsOf(who));

/** Entries of a person in the order in which they were made, those refused included. */
export const waitingEntries = (db: PhoneStore, who: string): Promise<WaitingEntry[]> =>
  db.getAllFromIndex('entries', 'who', ofWho(who));

export const keptPicture = (db: PhoneStore, id: string): Promise<KeptPicture | undefined> =>
  db.get('pictures', id);

const DIGITS = 'abcdefghijkmnpqrstuvwxyz23456789';

/** As long and as random as the ids that the server makes. */
const newMark = (): string =>
  [...crypto.getRandomValues(new Uint8Array(24))].map((byte) => DIGITS[byte & 31]).join('');

export interface NewEntry {
  readonly content: SiteEntryContent;
  readonly picture?: Pick<KeptPicture, 'full' | 'small'>;
}

/**
 * Writes entries down, in order, all or none. When it resolves they are kept whatever becomes of the page.
 *
 * @throws DOMException `QuotaExceededError` when the phone is full
 */
export const keepEntries = async (
  db: PhoneStore,
  who: string,
  versionId: string,
  news: readonly NewEntry[],
  now: number = Date.now(),
): Promise<WaitingEntry[]> => {
  const tx = db.transaction(['devices', 'entries', 'pictures'], 'readwrite', STRICT);
  const devices = tx.objectStore('devices');
  const known = await devices.get(who);
  const device = known?.device ?? newMark();
  let place = known?.place ?? 0;
  // A clock that was put back must not put what is made now before what was made already.
  let madeAt = Math.max(now, (known?.madeAt ?? 0) + 1);
  const made: WaitingEntry[] = [];
  for (const { content, picture } of news) {
    place += 1;
    const entry: WaitingEntry = {
      id: newMark(),
      who,
      device,
      place,
      versionId,
      madeAt: new Date(madeAt).toISOString(),
      content,
      refused: null,
    };
    madeAt += 1;
    made.push(entry);
    void tx.objectStore('entries').add(entry);
    if (picture) void tx.objectStore('pictures').add({ id: entry.id, who, versionId, ...picture });
  }
  void devices.put({ who, device, place, madeAt: madeAt - 1 });
  await tx.done;
  return made;
};

/** The server has these now: they go over to what is known of the version, in one step, so that none is missing between. */
export const entriesSent = async (
  db: PhoneStore,
  { who, account }: Pick<PhonePerson, 'who' | 'account'>,
  ids: readonly string[],
): Promise<void> => {
  const tx = db.transaction(['entries', 'packs', 'pictures'], 'readwrite', STRICT);
  const [entries, packs, pictures] = ['entries', 'packs', 'pictures'].map((name) =>
    tx.objectStore(name as 'entries'),
  ) as unknown as [
    ReturnType<typeof tx.objectStore<'entries'>>,
    ReturnType<typeof tx.objectStore<'packs'>>,
    ReturnType<typeof tx.objectStore<'pictures'>>,
  ];
  for (const id of ids) {
    const entry = await entries.get(id);
    if (!entry || entry.who !== who) continue;
    await entries.delete(id);
    const kept = await packs.get([who, entry.versionId]);
    if (kept && !kept.pack.standing.entries.some((known) => known.id === id)) {
      await packs.put(withEntry(kept, sentEntry(entry, account)));
    }
    const picture = await pictures.get(id);
    if (picture) await pictures.put({ ...picture, full: null });
  }
  await tx.done;
};

const sentEntry = (
  { id, device, place, madeAt, content }: WaitingEntry,
  { id: personId, name }: Account,
): SiteEntry => ({
  id,
  device,
  place,
  madeAt,
  receivedAt: new Date().toISOString(),
  by: { id: personId, name },
  content,
});

const withEntry = (kept: KeptPack, entry: SiteEntry): KeptPack => ({
  ...kept,
  pack: {
    ...kept.pack,
    standing: { ...kept.pack.standing, entries: [...kept.pack.standing.entries, entry] },
  },
});

/** The server does not take these, and says why: they stay on the phone to be read, and are not sent again. */
export const entriesRefused = async (
  db: PhoneStore,
  refusals: readonly { readonly id: string; readonly reason: string }[],
): Promise<void> => {
  const tx = db.transaction('entries', 'readwrite', STRICT);
  for (const { id, reason } of refusals) {
    const entry = await tx.store.get(id);
    if (entry) await tx.store.put({ ...entry, refused: reason });
  }
  await tx.done;
};

/** Throws away an entry that was refused, with its photo. */
export const entryDropped = async (db: PhoneStore, id: string): Promise<void> => {
  const tx = db.transaction(['entries', 'pictures'], 'readwrite', STRICT);
  const entry = await tx.objectStore('entries').get(id);
  if (entry?.refused) {
    await tx.objectStore('entries').delete(id);
    await tx.objectStore('pictures').delete(id);
  }
  await tx.done;
};

export const packKept = async (db: PhoneStore, who: string, pack: SitePack): Promise<void> => {
  const keptAt = new Date().toISOString();
  await db.put('packs', { who, versionId: pack.versionId, pack, keptAt });
};

/** Packs that are no longer this person's to see go, with the photos looked at; entries that wait stay. */
export const packsDropped = async (
  db: PhoneStore,
  who: string,
  versionIds: readonly string[],
): Promise<void> => {
  const tx = db.transaction(['packs', 'pictures'], 'readwrite');
  for (const versionId of versionIds) await tx.objectStore('packs').delete([who, versionId]);
  for (const picture of await tx.objectStore('pictures').index('who').getAll(who)) {
    if (versionIds.includes(picture.versionId) && picture.full === null) {
      await tx.objectStore('pictures').delete(picture.id);
    }
  }
  await tx.done;
};
