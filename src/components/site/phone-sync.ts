import type {
  EntriesKept,
  PhotoQuery,
  SendSiteEntries,
  SitePack,
  SitePacks,
  SitePhoto,
  SiteStanding,
} from '@/api-types/site';
import { ENTRIES_AT_ONCE } from '@/api-types/site-limits';
import { ApiError, api } from '../ui/api';
import { lockPhone, phoneTakenBy } from './phone-lock';
import {
  entriesRefused,
  entriesSent,
  keptPacks,
  keptPicture,
  packKept,
  packsDropped,
  phonePerson,
  waitingEntries,
  whoOf,
  type PhonePerson,
  type PhoneStore,
  type WaitingEntry,
} from './phone-store';

/** How a round of asking and sending ended. */
export type Heard = 'heard' | 'no-signal' | 'signed-out' | 'not-yours' | 'failed';

const heardOf = (error: unknown): Heard => {
  if (!(error instanceof ApiError)) throw error;
  if (error.offline) return 'no-signal';
  if (error.status === 401) return 'signed-out';
  return error.status === 403 ? 'not-yours' : 'failed';
};

/**
 * Asks the server for what this person may build from, and keeps it: all issued versions of the projects they are put on, or
 * those opened here. What is no longer theirs goes.
 */
export const packsRefreshed = async (db: PhoneStore): Promise<Heard> => {
  try {
    const { account, keep, key, packs: summaries } = await api<SitePacks>('GET', '/api/site');
    const who = whoOf(account);
    const heardAt = new Date().toISOString();
    await phoneTakenBy(db, { who, account, keep, key, summaries, heardAt });
    const kept = await keptPacks(db, who);
    const listed = new Set(summaries.map(({ versionId }) => versionId));
    const gone = kept.filter(({ versionId }) => !listed.has(versionId));
    await packsDropped(
      db,
      who,
      gone.map(({ versionId }) => versionId),
    );
    for (const summary of summaries) {
      const { versionId, state } = summary;
      const known = kept.find((each) => each.versionId === versionId);
      if (known) await packFreshened(db, who, { ...known.pack, ...summary });
      else if (keep === 'all' && state === 'issued') await packFetched(db, who, versionId);
    }
    return 'heard';
  } catch (error) {
    const heard = heardOf(error);
    // Also when the role is one that builds nothing: what was kept for another is not theirs.
    if (heard === 'signed-out' || heard === 'not-yours') await lockPhone(db);
    return heard;
  }
};

/** Fetches a version's pack and keeps it. */
export const packFetched = async (
  db: PhoneStore,
  who: string,
  versionId: string,
): Promise<SitePack> => {
  const pack = await api<SitePack>('GET', `/api/versions/${versionId}/site-pack`);
  await packKept(db, who, pack);
  return pack;
};

/** A version itself never changes: of one that is kept only what was written down since is asked for. */
const packFreshened = async (db: PhoneStore, who: string, pack: SitePack): Promise<void> => {
  const standing = await api<SiteStanding>('GET', `/api/versions/${pack.versionId}/site-entries`);
  await packKept(db, who, { ...pack, standing });
};

const NO_LONGER_YOURS =
  'This project is no longer yours to enter on. What you wrote down is still here to read.';

/** The next entries that go over together: of one version and one phone, in their order; a photo goes by itself. */
const nextToSend = (waiting: readonly WaitingEntry[]): readonly WaitingEntry[] => {
  const toSend = waiting.filter(({ refused }) => refused === null);
  const [first] = toSend;
  if (!first || first.content.kind === 'photo') return toSend.slice(0, 1);
  const stop = toSend.findIndex(
    ({ versionId, device, content }) =>
      versionId !== first.versionId || device !== first.device || content.kind === 'photo',
  );
  return stop < 0 ? toSend : toSend.slice(0, stop);
};

const sendPhoto = async (
  db: PhoneStore,
  person: PhonePerson,
  { id, place, madeAt, device, versionId, content }: WaitingEntry,
): Promise<EntriesKept> => {
  const image = (await keptPicture(db, id))?.full;
  if (!image) return { kept: [], refused: [{ id, reason: 'The image is not on this phone.' }] };
  const caption = content.kind === 'photo' ? content.caption : '';
  const query: Record<keyof PhotoQuery, string> = {
    id,
    place: String(place),
    madeAt,
    device,
    by: person.account.id,
    caption,
  };
  await api<SitePhoto>(
    'POST',
    `/api/versions/${versionId}/site-photos?${new URLSearchParams(query)}`,
    undefined,
    { body: image, headers: { 'content-type': 'image/jpeg' } },
  );
  return { kept: [id], refused: [] };
};

const sendEntries = (
  person: PhonePerson,
  versionId: string,
  entries: readonly WaitingEntry[],
): Promise<EntriesKept> => {
  const body: SendSiteEntries = {
    device: entries[0].device,
    by: person.account.id,
    entries: entries.map(({ id, place, madeAt, content }) => ({ id, place, madeAt, content })),
  };
  return api<EntriesKept>('POST', `/api/versions/${versionId}/site-entries`, body);
};

/**
 * Sends what waits, in the order in which it was made, until nothing waits or something stands in the way. An entry goes
 * from the phone only once the server has answered for it; sent again after a lost answer it is kept once all the same.
 */
export const waitingSent = async (db: PhoneStore): Promise<Heard> => {
  // Once a batch was found to be too much or not right, entries go one by one, so that the one at fault is found.
  let atOnce: number = ENTRIES_AT_ONCE;
  for (;;) {
    const person = await phonePerson(db);
    if (!person) return 'signed-out';
    const next = nextToSend(await waitingEntries(db, person.who)).slice(0, atOnce);
    if (next.length === 0) return 'heard';
    const [{ versionId, content }] = next;
    try {
      const { kept, refused } =
        content.kind === 'photo'
          ? await sendPhoto(db, person, next[0])
          : await sendEntries(person, versionId, next);
      await entriesSent(db, person, kept);
      await entriesRefused(db, refused);
      // A server that answers for none of them is not asked again and again.
      if (kept.length + refused.length === 0) return 'failed';
    } catch (error) {
      if (error instanceof ApiError && error.status === 404) {
        await entriesRefused(
          db,
          next.map(({ id }) => ({ id, reason: NO_LONGER_YOURS })),
        );
        continue;
      }
      if (error instanceof ApiError && (error.status === 413 || error.status === 422)) {
        if (next.length === 1)
          await entriesRefused(db, [{ id: next[0].id, reason: error.message }]);
        atOnce = 1;
        continue;
      }
      const heard = heardOf(error);
      if (heard === 'signed-out') await lockPhone(db);
      return heard;
    }
  }
};

const SENDING = 'evenlay:site-sending';

/** One tab sends for all. Without locks each may: what is sent twice is kept once. */
export const sentByOne = async (send: () => Promise<Heard>): Promise<Heard | 'elsewhere'> => {
  if (typeof navigator === 'undefined' || !navigator.locks) return send();
  return await navigator.locks.request(SENDING, { ifAvailable: true }, async (lock) =>
    lock ? send() : ('elsewhere' as const),
  );
};
