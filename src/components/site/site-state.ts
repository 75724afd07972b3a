import { create } from 'zustand';
import { lockedCount } from './phone-lock';
import {
  entryDropped,
  keepEntries,
  keptPacks,
  openPhoneStore,
  phonePerson,
  waitingEntries,
  type KeptPack,
  type NewEntry,
  type PhonePerson,
  type PhoneStore,
  type WaitingEntry,
} from './phone-store';
import { packFetched, packsRefreshed, sentByOne, waitingSent, type Heard } from './phone-sync';

export interface SiteState {
  /** `blocked`: the browser lets pages keep nothing. */
  readonly phase: 'opening' | 'ready' | 'blocked';
  readonly person: PhonePerson | null;
  readonly packs: readonly KeptPack[];
  /** In the order in which they were made, those that were refused included. */
  readonly waiting: readonly WaitingEntry[];
  /** Entries that wait locked for people who are signed out. */
  readonly locked: number;
  /** How the server was last reached; null before the first try. */
  readonly heard: Heard | null;
  readonly busy: boolean;
  /** What could not be kept on the phone, and why. */
  readonly trouble: string | null;
}

export const useSite = create<SiteState>(() => ({
  phase: 'opening',
  person: null,
  packs: [],
  waiting: [],
  locked: 0,
  heard: null,
  busy: false,
  trouble: null,
}));

/** While something waits and the server is not reached, how often it is tried, ms. */
const AGAIN_MS = 20_000;
/** While the page is open, how often what may be built from is asked for anew, ms. */
const REFRESH_MS = 5 * 60_000;

const CHANGED = 'evenlay:site';

let store: PhoneStore | null = null;
let channel: BroadcastChannel | null = null;
let refreshedAt = 0;
let round: Promise<void> | null = null;
let wanted: 'nothing' | 'send' | 'refresh' = 'nothing';

/** Shows what is kept, as it is kept: the screen says nothing that is not on the phone. */
const reread = async (): Promise<void> => {
  if (!store) return;
  const person = (await phonePerson(store)) ?? null;
  const [packs, waiting, locked] = await Promise.all([
    person ? keptPacks(store, person.who) : [],
    person ? waitingEntries(store, person.who) : [],
    lockedCount(store),
  ]);
  useSite.setState({ person, packs, waiting, locked });
};

const tellTabs = () => channel?.postMessage('changed');

const oneRound = async (): Promise<void> => {
  while (wanted !== 'nothing' && store) {
    const refresh = wanted === 'refresh';
    wanted = 'nothing';
    useSite.setState({ busy: true });
    let heard: Heard | 'elsewhere' = 'heard';
    if (refresh) {
      heard = await packsRefreshed(store);
      if (heard === 'heard') refreshedAt = Date.now();
      useSite.setState({ heard });
      await reread();
    }
    if (heard === 'heard') {
      const kept = store;
      heard = await sentByOne(() => waitingSent(kept));
    }
    if (heard !== 'elsewhere') useSite.setState({ heard });
    await reread();
    tellTabs();
  }
  useSite.setState({ busy: false });
};

/** Asks for a round of sending, and of asking anew what may be built from. Rounds never run side by side. */
const ask = (what: 'send' | 'refresh'): Promise<void> => {
  if (wanted !== 'refresh') wanted = what;
  round ??= oneRound()
    .catch((error: unknown) => {
      useSite.setState({ busy: false, heard: 'failed', trouble: troubleWords(error) });
    })
    .finally(() => {
      round = null;
    });
  return round;
};

const troubleWords = (error: unknown): string =>
  error instanceof DOMException && error.name === 'QuotaExceededError'
    ? 'This phone is full, so that could not be kept. Make room, by sending what waits or by deleting something else, and enter it again.'
    : 'That could not be kept on this phone. Close the page, open it again, and enter it once more.';

export const refreshNow = (): Promise<void> => ask('refresh');

/**
 * Writes entries down on the phone, then sends them if there is signal. False when they could not be kept; the screen
 * says so then.
 */
export const enter = async (versionId: string, news: readonly NewEntry[]): Promise<boolean> => {
  const { person } = useSite.getState();
  if (!store || !person) return false;
  try {
    await keepEntries(store, person.who, versionId, news);
    useSite.setState({ trouble: null });
  } catch (error) {
    useSite.setState({ trouble: troubleWords(error) });
    return false;
  }
  await reread();
  tellTabs();
  // Browsers throw away what pages keep when they need room, unless they were asked not to.
  void navigator.storage?.persist?.();
  void ask('send');
  return true;
};

export const dropRefused = async (id: string): Promise<void> => {
  if (!store) return;
  await entryDropped(store, id);
  await reread();
  tellTabs();
};

/** Keeps a version on this phone for those who see every project and keep what they open. */
export const keepPack = async (versionId: string): Promise<void> => {
  const { person } = useSite.getState();
  if (!store || !person) return;
  try {
    await packFetched(store, person.who, versionId);
  } finally {
    await reread();
    tellTabs();
  }
};

export const phoneStore = (): PhoneStore | null => store;

/** Opens what the phone keeps and keeps it in step with the server while the page is open; ends with what it returns. */
export const startSite = (): (() => void) => {
  let ended = false;
  const again = () => {
    if (document.visibilityState === 'hidden' || !navigator.onLine) return;
    const { waiting, heard } = useSite.getState();
    if (Date.now() - refreshedAt > REFRESH_MS || heard !== 'heard') void ask('refresh');
    else if (waiting.some(({ refused }) => refused === null)) void ask('send');
  };
  const onOnline = () => void ask('refresh');
  const onOffline = () => useSite.setState({ heard: 'no-signal' });
  const timer = setInterval(again, AGAIN_MS);
  window.addEventListener('online', onOnline);
  window.addEventListener('offline', onOffline);
  document.addEventListener('visibilitychange', again);
  if (typeof BroadcastChannel !== 'undefined') {
    channel = new BroadcastChannel(CHANGED);
    channel.onmessage = () => void reread();
  }
  const open = async () => {
    try {
      store = await openPhoneStore();
      await reread();
    } catch {
      useSite.setState({ phase: 'blocked' });
      return;
    }
    if (ended) return;
    useSite.setState({ phase: 'ready' });
    void ask('refresh');
  };
  void open();
  return () => {
    ended = true;
    clearInterval(timer);
    window.removeEventListener('online', onOnline);
    window.removeEventListener('offline', onOffline);
    document.removeEventListener('visibilitychange', again);
    channel?.close();
    channel = null;
  };
};
