import type { LayoutDocument } from '@/paving/layout-document';
import type { Drawing } from './table-store';

/**
 * Work kept in the browser until the server has it: one entry for each person, layout and tab, so that
 * neither a reload nor a lost connection nor a sign-out in another tab loses anything.
 */
export interface KeptWork {
  readonly document: LayoutDocument;
  readonly baseRevision: number;
  readonly tab: { readonly id: string; readonly save: number };
  readonly at: string;
  /** True while the document holds something that the server has not answered for. */
  readonly unsent: boolean;
  /** One's own side of a conflict was chosen: what the draft holds is to be set aside when this is sent. */
  readonly setCurrentAside?: boolean;
  /** A ring half drawn. */
  readonly drawing: Drawing | null;
}

const prefix = (personId: string, layoutId: string) => `evenlay:work:${personId}:${layoutId}:`;
const lockName = (tabId: string) => `evenlay:tab:${tabId}`;

export function keepWork(personId: string, layoutId: string, work: KeptWork): boolean {
  try {
    localStorage.setItem(prefix(personId, layoutId) + work.tab.id, JSON.stringify(work));
    return true;
  } catch {
    return false;
  }
}

export function forgetWork(personId: string, layoutId: string, tabId: string): void {
  try {
    localStorage.removeItem(prefix(personId, layoutId) + tabId);
  } catch {
    // Nothing was kept where nothing can be.
  }
}

function readWork(key: string): KeptWork | null {
  try {
    const kept = JSON.parse(localStorage.getItem(key) ?? 'null');
    // What the server would refuse is kept all the same: it is the work that has nowhere else to be.
    return kept?.document?.schema === 'evenlay/layout@1' && kept.tab?.id ? kept : null;
  } catch {
    return null;
  }
}

/** Where tabs answer for themselves when the browser has no locks (a page served without TLS). */
const ROLL_CALL = 'evenlay:tabs';
/** How long tabs are given to answer, ms. */
const ROLL_CALL_MS = 250;

/** For as long as this page lives, other tabs are told that its work is in hand. */
export function claimTab(tabId: string): void {
  if (navigator.locks) {
    void navigator.locks.request(lockName(tabId), () => new Promise<never>(() => {}));
    return;
  }
  const channel = new BroadcastChannel(ROLL_CALL);
  channel.onmessage = (event) => event.data === 'who is here?' && channel.postMessage(tabId);
}

/** Locks, or answers to a roll call, of the tabs that live. */
async function livingTabs(): Promise<ReadonlySet<string>> {
  if (navigator.locks) {
    const { held } = await navigator.locks.query();
    return new Set(held?.flatMap((lock) => lock.name ?? []));
  }
  const channel = new BroadcastChannel(ROLL_CALL);
  const names = new Set<string>();
  channel.onmessage = (event) => names.add(lockName(String(event.data)));
  channel.postMessage('who is here?');
  await new Promise((resolve) => setTimeout(resolve, ROLL_CALL_MS));
  channel.close();
  return names;
}

/** Work kept by tabs that are gone, oldest first. */
export async function abandonedWork(personId: string, layoutId: string): Promise<KeptWork[]> {
  const start = prefix(personId, layoutId);
  const alive = await livingTabs();
  const found: KeptWork[] = [];
  try {
    for (const key of Object.keys(localStorage)) {
      if (!key.startsWith(start) || alive.has(lockName(key.slice(start.length)))) continue;
      const work = readWork(key);
      if (work) found.push(work);
    }
  } catch {
    return [];
  }
  return found.sort((a, b) => a.at.localeCompare(b.at));
}
