import { expose, transfer } from 'comlink';
import type { BestFace } from '@/paving/fit/best-face';
import {
  fit,
  fitBegun,
  type FitBegun,
  type FitHold,
  type FitResult,
  type FitTurn,
  type TurnRange,
} from '@/paving/fit/fit';
import { fitJoints, type JointFits, type JointRange } from '@/paving/fit/joint-range';
import { shiftMap, type ShiftMap } from '@/paving/fit/shift-map';
import type { LayoutDocument } from '@/paving/layout-document';

/** The floor fitted last: what is known of it is not worked out anew for the trade-off. */
let begun: FitBegun | null = null;

/** The fit beside the page: the very code that the server and the command line run. */
const fitWorker = {
  /** The most units, the best start, and the outline of the starts about it. */
  begin: (
    document: LayoutDocument,
    hold: readonly FitHold[],
  ): { result: FitResult; face: BestFace | null } => {
    begun = null;
    begun = fitBegun(document, { hold });
    return { result: begun.result, face: begun.face() };
  },

  /** The trade-off of the floor that was begun last, from the same pieces. */
  whole: (): FitResult | null => begun?.whole() ?? null,

  /** The best start alone. */
  start: (document: LayoutDocument, hold: readonly FitHold[]): FitResult =>
    fit(document, { hold, choices: false }),

  /** The shift map, about `across` counts wide. */
  map: (document: LayoutDocument, across: number): ShiftMap => {
    const map = shiftMap(document, across);
    return transfer(map, [map.counts.buffer]);
  },

  /** Sweeps the turns, telling each as it is found. */
  sweep: (
    document: LayoutDocument,
    turn: TurnRange,
    told: (turn: FitTurn, share: number) => void,
  ): FitResult => fit(document, { turn, choices: false, progress: (at, share) => told(at, share) }),

  /** Tries each joint of a range. */
  joints: (
    document: LayoutDocument,
    range: JointRange,
    hold: readonly FitHold[],
    told: (share: number) => void,
  ): JointFits => fitJoints(document, range, hold, told),
};

export type FitWorker = typeof fitWorker;
expose(fitWorker);
