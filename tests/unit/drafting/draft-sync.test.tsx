import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import type { DraftSaved, DraftState, SaveDraft } from '@/api-types/layouts';
import { createDraftSync } from '@/components/drafting/draft-sync';
import { createTableStore } from '@/components/drafting/table-store';
import { ApiError } from '@/components/ui/api';
import { COURT_CHEQUER, COURT_SQUARE } from '@/server/demo-layouts';

const draft: DraftState = {
  layoutId: 'layout',
  layoutName: 'Court',
  projectId: 'project',
  projectName: 'Court',
  revision: 3,
  document: COURT_CHEQUER,
  savedAt: '2026-05-12T08:40:00.000Z',
  savedBy: { id: 'person', name: 'Odwin Tarrel' },
  basedOn: null,
};

type Answer = (body: SaveDraft) => Promise<DraftSaved>;

const takes: Answer = async (body) => ({
  revision: body.baseRevision + 1,
  savedAt: '2026-05-12T08:41:00.000Z',
});
const away: Answer = async () => {
  throw new ApiError(0, null, 'not reached');
};
const refuses: Answer = async () => {
  throw new ApiError(422, null, 'lies more than 100 km from the origin');
};
const stale: Answer = async () => {
  const sides = {
    current: { ...draft, revision: 9, document: COURT_SQUARE },
    setAside: {
      id: 's',
      layoutId: 'layout',
      person: draft.savedBy,
      baseRevision: 3,
      at: draft.savedAt,
    },
  };
  throw new ApiError(409, sides as never, 'somebody saved meanwhile');
};

/** A page with the table open: its own store and sync on the browser's one storage. */
function page(first: Answer) {
  const table = createTableStore(draft.document);
  const sent: SaveDraft[] = [];
  let answer = first;
  const sync = createDraftSync(table, draft, 'person', (body) => {
    sent.push(body);
    return answer(body);
  });
  return { table, sync, sent, answerWith: (next: Answer) => (answer = next) };
}

const withClearance = (clearance: number) => ({ ...COURT_CHEQUER, clearance });

// jsdom has no locks; a browser lets go of a page's locks when the page goes.
const held = new Set<string>();
Object.defineProperty(navigator, 'locks', {
  value: {
    request: async (name: string) => void held.add(name),
    query: async () => ({ held: [...held].map((name) => ({ name })) }),
  },
});

let stops: (() => void)[] = [];
beforeEach(() => {
  held.clear();
  localStorage.clear();
  vi.useFakeTimers({ toFake: ['setTimeout', 'clearTimeout'] });
});
afterEach(() => {
  stops.forEach((stop) => stop());
  stops = [];
  vi.useRealTimers();
});
const started = (open: ReturnType<typeof page>) => {
  stops.push(open.sync.start());
  return open;
};
/** The page is gone without a word: its timers stop, what it kept stays. */
const gone = () => {
  held.clear();
  stops.forEach((stop) => stop());
  stops = [];
};
const restored = async (open: ReturnType<typeof page>) => {
  const done = open.sync.restore();
  await vi.advanceTimersByTimeAsync(1000);
  await done;
  return open;
};

it('sends a change after a rest, with the revision that it started from', async () => {
  const { table, sent, sync } = started(page(takes));
  table.getState().edit(() => withClearance(17));
  expect(sent).toHaveLength(0);
  await vi.advanceTimersByTimeAsync(1000);
  expect(sent).toMatchObject([{ baseRevision: 3, document: { clearance: 17 } }]);
  expect(sync.state.getState()).toMatchObject({ status: 'saved', revision: 4 });
  expect(localStorage).toHaveLength(0);
});

it('keeps what the server cannot be reached for, and the next page takes it up and sends it', async () => {
  const { table } = started(page(away));
  table.getState().edit(() => withClearance(18));
  await vi.advanceTimersByTimeAsync(1000);
  gone();
  const next = await restored(page(takes));
  expect(next.table.getState().document.clearance).toBe(18);
  started(next);
  await vi.advanceTimersByTimeAsync(1000);
  expect(next.sent.at(-1)).toMatchObject({ baseRevision: 3, document: { clearance: 18 } });
});

it('keeps also what the server refuses, though the schema would too', async () => {
  const { table, sync } = started(page(refuses));
  table.getState().edit((now) => ({
    ...now,
    placement: { ...now.placement, origin: [99_999_999_999, 0] },
  }));
  await vi.advanceTimersByTimeAsync(1000);
  expect(sync.state.getState().status).toBe('refused');
  gone();
  const next = await restored(page(refuses));
  expect(next.table.getState().document.placement.origin[0]).toBe(99_999_999_999);
});

it('remembers over a lost connection, and over a reload, that the other side is to be set aside', async () => {
  const { table, sync, sent, answerWith } = started(page(stale));
  table.getState().edit(() => withClearance(19));
  await vi.advanceTimersByTimeAsync(1000);
  expect(sync.state.getState().status).toBe('stale');
  answerWith(away);
  const choice = sync.goOnWith('mine');
  await vi.advanceTimersByTimeAsync(10);
  await choice;
  await vi.advanceTimersByTimeAsync(5000);
  expect(sent.slice(1).every((body) => body.setCurrentAside === true)).toBe(true);
  expect(sent.length).toBeGreaterThan(2);
  gone();

  const next = await restored(page(takes));
  started(next);
  await vi.advanceTimersByTimeAsync(1000);
  expect(next.sent.at(-1)).toMatchObject({
    baseRevision: 9,
    setCurrentAside: true,
    document: { clearance: 19 },
  });
});

it('gives the other side as a change that undo takes back', async () => {
  const { table, sync } = started(page(stale));
  table.getState().edit(() => withClearance(20));
  await vi.advanceTimersByTimeAsync(1000);
  await sync.goOnWith('theirs');
  expect(sync.state.getState().revision).toBe(9);
  expect(table.getState().document.bond.kind).toBe('stack');
  table.temporal.getState().undo();
  expect(table.getState().document.clearance).toBe(20);
});

it('leaves the work of a page that is still open alone', async () => {
  const { table } = started(page(away));
  table.getState().edit(() => withClearance(21));
  await vi.advanceTimersByTimeAsync(1000);
  const other = await restored(page(takes));
  expect(other.table.getState().document.clearance).toBe(COURT_CHEQUER.clearance);
});
