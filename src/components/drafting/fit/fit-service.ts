import { proxy } from 'comlink';
import { createStore, type StoreApi } from 'zustand/vanilla';
import { fitRefusal, type FitHold, type FitResult, type FitTurn } from '@/paving/fit/fit';
import type { BestFace } from '@/paving/fit/best-face';
import type { ShiftMap } from '@/paving/fit/shift-map';
import type { LayoutDocument } from '@/paving/layout-document';
import { groundMiddle, placementTurned } from '@/paving/placement-edits';
import { floorOf } from '../floor';
import { shownDocument, type TableStore } from '../table-store';
import { dismissed, newHand, type Hand } from './fit-hand';

/** What the fit has found for the floor shown, and how far it is. */
export interface FitState {
  /** The floor that `result` and `map` are for; another key means they are behind. */
  readonly key: string | null;
  readonly result: FitResult | null;
  readonly map: ShiftMap | null;
  /** The best face of the map; with holds the best start lies elsewhere, and there is none to outline. */
  readonly face: BestFace | null;
  readonly working: boolean;
  readonly failure: string | null;
  /** The turn curve: the turns found so far for `turnsKey`. */
  readonly turns: readonly FitTurn[];
  readonly turnsKey: string | null;
  readonly sweeping: boolean;
  /** Why the sweep ended before its end. */
  readonly sweepFailure: string | null;
  /** How much of the sweep is done, 0 to 1. */
  readonly swept: number;
}

export interface FitService {
  readonly state: StoreApi<FitState>;
  /** Watches the table and keeps the fit up with it until the returned function is called. */
  start(): () => void;
  sweep(): void;
  stopSweep(): void;
  /** Turns the pattern, and puts it at the best start of that turn, as held where that can be kept: one undo step. */
  takeTurn(turn: number): Promise<void>;
}

/** The turns that a curve shows, degrees. */
export const SWEEP = { from: 0, to: 90, step: 0.5 } as const;
/** Counts across the shift map. */
const MAP_ACROSS = 144;
/** How long the floor rests before the turns are swept in the background, ms. */
const SWEEP_REST_MS = 900;

/** Everything that the fit depends on, but not where the pattern stands or what is lifted. */
const floorKey = ({ ground, units, bond, clearance }: LayoutDocument): string =>
  JSON.stringify([
    ground,
    units.map(({ length, width, id }) => [id, length, width]),
    bond,
    clearance,
  ]);

export const fitKey = (document: LayoutDocument, hold: readonly FitHold[]): string =>
  JSON.stringify([floorKey(document), document.placement.turn, hold]);

const sweepKey = (document: LayoutDocument): string => floorKey(document);

export function createFitService(
  table: TableStore,
  { sweeps = true }: { readonly sweeps?: boolean } = {},
): FitService {
  const state = createStore<FitState>(() => ({
    key: null,
    result: null,
    map: null,
    face: null,
    working: false,
    failure: null,
    turns: [],
    turnsKey: null,
    sweeping: false,
    sweepFailure: null,
    swept: 0,
  }));
  let hand: Hand | null = null;
  let sweeper: Hand | null = null;
  let rest: ReturnType<typeof setTimeout> | undefined;
  let busy = false;
  let due = false;

  /** Fits the floor shown; a floor that changes meanwhile is fitted next, the ones between are passed over. */
  const refit = async () => {
    if (busy) {
      due = true;
      return;
    }
    const now = table.getState();
    const document = shownDocument(now);
    const key = fitKey(document, now.hold);
    if (state.getState().key === key) return;
    if (floorOf(document).problems.length > 0) {
      state.setState({ key, result: null, map: null, face: null, failure: null, working: false });
      return;
    }
    busy = true;
    state.setState({ working: true });
    try {
      hand ??= newHand();
      const [begun, mapped] = await Promise.allSettled([
        hand.remote.begin(document, now.hold),
        hand.remote.map(document, MAP_ACROSS),
      ]);
      if (mapped.status === 'rejected') throw mapped.reason;
      const map = mapped.value;
      if (begun.status === 'rejected') {
        // The map is the floor's own, also where a hold cannot be kept.
        state.setState({ map, face: null });
        throw begun.reason;
      }
      const { result, face } = begun.value;
      state.setState({ key, result, map, face, failure: null });
      // The most and the start that gives it come first; the trade-off takes longer and follows.
      if (!due) state.setState({ result: (await hand.remote.whole()) ?? result });
    } catch (error) {
      state.setState({
        key,
        result: null,
        failure: error instanceof Error ? error.message : String(error),
      });
    }
    busy = false;
    state.setState({ working: false });
    if (due) {
      due = false;
      void refit();
    }
  };

  const stopSweep = () => {
    clearTimeout(rest);
    sweeper = dismissed(sweeper);
    state.setState({ sweeping: false });
  };

  const sweep = () => {
    stopSweep();
    const { document } = table.getState();
    if (floorOf(document).problems.length > 0) return;
    const key = sweepKey(document);
    sweeper = newHand();
    const mine = sweeper;
    const found: FitTurn[] = [];
    state.setState({ sweeping: true, sweepFailure: null, swept: 0, turns: [], turnsKey: key });
    const told = proxy((turn: FitTurn, share: number) => {
      found.push(turn);
      if (sweeper === mine)
        state.setState({ turns: [...found].sort((a, b) => a.turn - b.turn), swept: share });
    });
    mine.remote.sweep(document, SWEEP, told).then(
      (result) => {
        if (sweeper !== mine) return;
        if (result?.turns) state.setState({ turns: result.turns });
        stopSweep();
      },
      (error: unknown) => {
        if (sweeper !== mine) return;
        stopSweep();
        state.setState({ sweepFailure: error instanceof Error ? error.message : String(error) });
      },
    );
  };

  const sweepSoon = () => {
    clearTimeout(rest);
    if (!sweeps) return;
    const { document } = table.getState();
    if (state.getState().turnsKey === sweepKey(document)) return;
    if (sweeper) stopSweep();
    rest = setTimeout(sweep, SWEEP_REST_MS);
  };

  return {
    state,
    sweep,
    stopSweep,

    async takeTurn(turn) {
      table.getState().settleShown();
      const { document, show } = table.getState();
      const turned = {
        ...document,
        placement: placementTurned(document.placement, turn, groundMiddle(document)),
      };
      show(turned);
      hand ??= newHand();
      const { hold } = table.getState();
      const kept = fitRefusal(turned, { hold }) ? [] : hold;
      const found = await hand.remote.start(turned, kept).catch(() => null);
      // Somebody else's hand may be on the floor by now.
      if (table.getState().preview !== turned) return;
      if (found && found.wholeUnits > 0) show({ ...turned, placement: found.placement });
      table.getState().settleShown();
    },

    start() {
      void refit();
      sweepSoon();
      const unsubscribe = table.subscribe((now, before) => {
        if (shownDocument(now) !== shownDocument(before) || now.hold !== before.hold) void refit();
        if (now.document !== before.document) sweepSoon();
      });
      return () => {
        unsubscribe();
        stopSweep();
        hand = dismissed(hand);
        busy = false;
      };
    },
  };
}
