import { layoutDocumentSchema, type LayoutDocument } from '@/paving/layout-document';
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
    const document = layoutDocumentSchema.safeParse(kept?.document);
    return document.success ? { ...kept, document: document.data } : null;
  } catch {
    return null;
  }
}

/** Holds a lock for as long as this page lives, so that other tabs know that its work is in hand. */
export function claimTab(tabId: string): void {
  void navigator.locks?.request(lockName(tabId), () => new Promise<never>(() => {}));
}

/** Work kept by tabs that are gone, oldest first. */
export async function abandonedWork(personId: string, layoutId: string): Promise<KeptWork[]> {
  const start = prefix(personId, layoutId);
  const held = await navigator.locks?.query();
  const alive = new Set(held?.held?.map((lock) => lock.name));
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
