import {
  phonePerson,
  waitingEntries,
  type KeptPicture,
  type LockedEntry,
  type PhonePerson,
  type PhoneStore,
  type WaitingEntry,
} from './phone-store';

/**
 * A phone is passed on. When its person is signed out, all that is theirs goes from it, but for entries that wait to be
 * sent: those are locked with a key that the server hands to that person alone, and are sent once they sign in again.
 */

/** What one locked entry holds. Images are bytes, so they follow the JSON. */
const packed = (entry: WaitingEntry, picture: KeptPicture | undefined): Uint8Array<ArrayBuffer> => {
  const head = new TextEncoder().encode(
    JSON.stringify({
      entry,
      full: picture?.full?.byteLength ?? null,
      small: picture?.small.byteLength ?? null,
    }),
  );
  const parts = [
    new Uint8Array(new Uint32Array([head.byteLength]).buffer),
    head,
    ...(picture?.full ? [new Uint8Array(picture.full)] : []),
    ...(picture ? [new Uint8Array(picture.small)] : []),
  ];
  const all = new Uint8Array(parts.reduce((sum, part) => sum + part.byteLength, 0));
  let at = 0;
  for (const part of parts) {
    all.set(part, at);
    at += part.byteLength;
  }
  return all;
};

const unpacked = (bytes: ArrayBuffer): { entry: WaitingEntry; picture: KeptPicture | null } => {
  const [length] = new Uint32Array(bytes.slice(0, 4));
  let at = 4 + length;
  const { entry, full, small } = JSON.parse(
    new TextDecoder().decode(new Uint8Array(bytes, 4, length)),
  ) as { entry: WaitingEntry; full: number | null; small: number | null };
  const taken = (size: number): ArrayBuffer => bytes.slice(at, (at += size));
  if (small === null) return { entry, picture: null };
  const image = full === null ? null : taken(full);
  const { id, who, versionId } = entry;
  return { entry, picture: { id, who, versionId, full: image, small: taken(small) } };
};

const keyOf = (base64: string): Promise<CryptoKey> =>
  crypto.subtle.importKey(
    'raw',
    Uint8Array.from(atob(base64), (letter) => letter.charCodeAt(0)),
    'AES-GCM',
    false,
    ['encrypt', 'decrypt'],
  );

const locked = async (key: CryptoKey, id: string, who: string, bytes: Uint8Array<ArrayBuffer>) => {
  const iv = crypto.getRandomValues(new Uint8Array(12));
  const data = await crypto.subtle.encrypt({ name: 'AES-GCM', iv }, key, bytes);
  return { id, who, iv, data } satisfies LockedEntry;
};

/** Nobody is signed in any more: everything of the phone's person goes, and what waits is locked. */
export const lockPhone = async (db: PhoneStore): Promise<void> => {
  const person = await phonePerson(db);
  if (!person) return;
  const { who } = person;
  const key = await keyOf(person.key);
  const waiting = await waitingEntries(db, who);
  const away: LockedEntry[] = [];
  for (const entry of waiting) {
    away.push(await locked(key, entry.id, who, packed(entry, await db.get('pictures', entry.id))));
  }
  const tx = db.transaction(['person', 'packs', 'entries', 'pictures', 'locked'], 'readwrite', {
    durability: 'strict',
  });
  for (const entry of away) void tx.objectStore('locked').put(entry);
  for (const { id } of waiting) void tx.objectStore('entries').delete(id);
  for (const id of await tx.objectStore('pictures').index('who').getAllKeys(who)) {
    void tx.objectStore('pictures').delete(id);
  }
  void tx.objectStore('packs').delete(IDBKeyRange.bound([who, ''], [who, '\uffff']));
  void tx.objectStore('person').delete('now');
  await tx.done;
};

/** Somebody is signed in: the phone is theirs now, and what they left waiting on it is unlocked. */
export const phoneTakenBy = async (db: PhoneStore, person: PhonePerson): Promise<void> => {
  const before = await phonePerson(db);
  if (before && before.who !== person.who) await lockPhone(db);
  const away = await db.getAllFromIndex('locked', 'who', person.who);
  const key = away.length > 0 ? await keyOf(person.key) : null;
  const back: ReturnType<typeof unpacked>[] = [];
  const opened: string[] = [];
  for (const { id, iv, data } of away) {
    const bytes = await crypto.subtle
      .decrypt({ name: 'AES-GCM', iv }, key!, data)
      .catch(() => null);
    // Locked with a key that the server no longer has: it stays locked.
    if (!bytes) continue;
    back.push(unpacked(bytes));
    opened.push(id);
  }
  const tx = db.transaction(['person', 'entries', 'pictures', 'locked'], 'readwrite', {
    durability: 'strict',
  });
  for (const { entry, picture } of back) {
    void tx.objectStore('entries').put(entry);
    if (picture) void tx.objectStore('pictures').put(picture);
  }
  for (const id of opened) void tx.objectStore('locked').delete(id);
  void tx.objectStore('person').put(person, 'now');
  await tx.done;
};

/** How many entries wait locked on this phone, whosever they are. */
export const lockedCount = (db: PhoneStore): Promise<number> => db.count('locked');
