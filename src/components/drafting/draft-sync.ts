import { createStore, type StoreApi } from 'zustand/vanilla';
import type { DraftSaved, DraftState, SaveDraft, StaleDraft } from '@/api-types/layouts';
import type { LayoutDocument } from '@/paving/layout-document';
import { ApiError } from '../ui/api';
import { abandonedWork, claimTab, forgetWork, keepWork } from './kept-work';
import type { TableStore } from './table-store';

/** Where the draft stands between the browser and the server. */
export type SyncStatus = 'saved' | 'saving' | 'offline' | 'signed-out' | 'stale' | 'refused';

export interface SyncState {
  readonly status: SyncStatus;
  readonly revision: number;
  readonly savedAt: string;
  /** The other side, when somebody else has saved meanwhile. */
  readonly stale: StaleDraft | null;
  readonly message: string | null;
  /** False when this browser keeps nothing: then only the server does. */
  readonly keeps: boolean;
}

export interface DraftSync {
  readonly state: StoreApi<SyncState>;
  /** Takes up work that an earlier page left unsent. Call once, before `start`. */
  restore(): Promise<void>;
  /** Sends what is unsent now; resolves to the revision that holds the document shown, or null when it could not be sent. */
  flush(): Promise<number | null>;
  /** Ends a conflict: the draft goes on with one's own side, or with the other's. Undo brings the other back. */
  goOnWith(side: 'mine' | 'theirs'): Promise<void>;
  /** The draft was replaced on the server (a version taken up); go on from there. */
  replaced(draft: DraftState): void;
  start(): () => void;
}

/** How long the hand rests before the draft is sent, ms. */
const REST_MS = 700;
/** Waits between tries while the server cannot be reached, ms. */
const RETRY_MS = [2_000, 4_000, 8_000, 15_000, 30_000];

const newTabId = (): string =>
  crypto.randomUUID?.() ?? `${Date.now()}-${Math.random().toString(36).slice(2)}`;

export function createDraftSync(
  table: TableStore,
  draft: DraftState,
  personId: string,
  send: (body: SaveDraft) => Promise<DraftSaved>,
): DraftSync {
  const state = createStore<SyncState>(() => ({
    status: 'saved',
    revision: draft.revision,
    savedAt: draft.savedAt,
    stale: null,
    message: null,
    keeps: true,
  }));
  const { layoutId } = draft;
  let tab = { id: newTabId(), save: 0 };
  let sentDocument: LayoutDocument = draft.document;
  let inFlight: Promise<number | null> | null = null;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let tries = 0;
  // Stays until the server has answered: a choice made while it was away holds when it is back.
  let setCurrentAside = false;

  const unsent = () => table.getState().document !== sentDocument;

  const keep = () => {
    const { document, drawing } = table.getState();
    if (!unsent() && !drawing) return forgetWork(personId, layoutId, tab.id);
    const keeps = keepWork(personId, layoutId, {
      document,
      baseRevision: state.getState().revision,
      tab,
      at: new Date().toISOString(),
      unsent: unsent(),
      setCurrentAside,
      drawing,
    });
    if (keeps !== state.getState().keeps) state.setState({ keeps });
  };

  const later = (wait: number) => {
    clearTimeout(timer);
    timer = setTimeout(() => void flush(), wait);
  };

  const failed = (error: unknown): null => {
    const problem = error instanceof ApiError ? error : null;
    const { status } = problem ?? { status: -1 };
    if (status === 409) {
      state.setState({
        status: 'stale',
        stale: problem!.problem as unknown as StaleDraft,
        message: problem!.message,
      });
      return null;
    }
    if (status === 401) state.setState({ status: 'signed-out', message: null });
    else if (status === 0 || status >= 500 || status === 429)
      state.setState({ status: 'offline', message: null });
    else {
      state.setState({ status: 'refused', message: problem?.message ?? String(error) });
      return null;
    }
    later(RETRY_MS[Math.min(tries++, RETRY_MS.length - 1)]);
    return null;
  };

  const sendOnce = async (): Promise<number | null> => {
    const { document } = table.getState();
    tab = { ...tab, save: tab.save + 1 };
    keep();
    state.setState({ status: 'saving', message: null });
    try {
      const saved = await send({
        baseRevision: state.getState().revision,
        document,
        tab,
        ...(setCurrentAside ? { setCurrentAside } : {}),
      });
      tries = 0;
      setCurrentAside = false;
      sentDocument = document;
      state.setState({
        status: 'saved',
        revision: saved.revision,
        savedAt: saved.savedAt,
        stale: null,
      });
      keep();
      return saved.revision;
    } catch (error) {
      return failed(error);
    }
  };

  /** Sends what is settled; a gesture in hand is not: it goes on, and is sent when it is let go. */
  const flush = async (): Promise<number | null> => {
    clearTimeout(timer);
    if (inFlight) await inFlight;
    if (state.getState().stale) return null;
    if (!unsent()) {
      if (state.getState().status !== 'saved') state.setState({ status: 'saved', message: null });
      return state.getState().revision;
    }
    inFlight = sendOnce();
    const revision = await inFlight;
    inFlight = null;
    return revision !== null && unsent() ? flush() : revision;
  };

  const adopt = (revision: number, savedAt: string, document: LayoutDocument) => {
    sentDocument = document;
    state.setState({ status: 'saved', revision, savedAt, stale: null, message: null });
  };

  return {
    state,
    flush() {
      table.getState().settleShown();
      return flush();
    },

    async restore() {
      const works = await abandonedWork(personId, layoutId);
      const last = works.at(-1);
      for (const work of works.slice(0, -1)) {
        // Older work that was never sent goes to the server too, which sets it aside or takes it.
        try {
          if (work.unsent) {
            const { baseRevision, document, tab: itsTab } = work;
            const saved = await send({
              baseRevision,
              document,
              tab: { ...itsTab, save: itsTab.save + 1 },
            });
            if (work.baseRevision === state.getState().revision)
              adopt(saved.revision, saved.savedAt, document);
          }
          forgetWork(personId, layoutId, work.tab.id);
        } catch (error) {
          if (error instanceof ApiError && error.status === 409)
            forgetWork(personId, layoutId, work.tab.id);
        }
      }
      if (last) {
        tab = { ...last.tab };
        setCurrentAside = last.setCurrentAside ?? false;
        if (last.unsent && JSON.stringify(last.document) !== JSON.stringify(draft.document)) {
          table.setState({ document: last.document });
          state.setState({ revision: last.baseRevision, status: 'saving' });
        }
        if (last.drawing)
          table.setState({
            drawing: { ...last.drawing, next: null },
            step: 'ground',
            tool: 'draw',
          });
      }
      table.temporal.getState().clear();
    },

    async goOnWith(side) {
      const { stale } = state.getState();
      if (!stale) return;
      const { current } = stale;
      if (side === 'theirs') {
        // Set as a change, so that undo brings one's own side back.
        table.getState().edit(() => current.document);
        adopt(current.revision, current.savedAt, table.getState().document);
        keep();
        return;
      }
      setCurrentAside = true;
      state.setState({ revision: current.revision, stale: null });
      inFlight = sendOnce();
      await inFlight;
      inFlight = null;
    },

    replaced(next) {
      table.getState().edit(() => next.document);
      adopt(next.revision, next.savedAt, table.getState().document);
      keep();
    },

    start() {
      claimTab(tab.id);
      const unsubscribe = table.subscribe((now, before) => {
        if (now.document !== before.document || now.drawing?.corners !== before.drawing?.corners)
          keep();
        if (now.document !== before.document && !state.getState().stale) {
          if (state.getState().status === 'saved' || state.getState().status === 'refused')
            state.setState({ status: 'saving', message: null });
          later(REST_MS);
        }
      });
      const again = () => {
        if (unsent() && !state.getState().stale) void flush();
      };
      const leaving = () => {
        table.getState().settleShown();
        keep();
        const { status, revision } = state.getState();
        // The page is going: the request outlives it where the browser allows; the kept work is there anyway.
        if (unsent() && status !== 'stale' && status !== 'offline' && !inFlight) {
          const { document } = table.getState();
          const body = JSON.stringify({
            baseRevision: revision,
            document,
            tab: { ...tab, save: tab.save + 1 },
            ...(setCurrentAside ? { setCurrentAside } : {}),
          });
          if (body.length < 60_000)
            void fetch(`/api/layouts/${layoutId}/draft`, {
              method: 'PUT',
              headers: { 'content-type': 'application/json' },
              body,
              keepalive: true,
            }).catch(() => {});
        }
      };
      const seen = () => document.visibilityState === 'visible' && again();
      window.addEventListener('online', again);
      window.addEventListener('focus', again);
      document.addEventListener('visibilitychange', seen);
      window.addEventListener('pagehide', leaving);
      if (unsent()) void flush();
      return () => {
        clearTimeout(timer);
        unsubscribe();
        window.removeEventListener('online', again);
        window.removeEventListener('focus', again);
        document.removeEventListener('visibilitychange', seen);
        window.removeEventListener('pagehide', leaving);
      };
    },
  };
}
