import { expose, transfer } from 'comlink';
import { bestFace, type BestFace } from '@/paving/fit/best-face';
import {
  fit,
  type FitHold,
  type FitOptions,
  type FitResult,
  type FitTurn,
  type TurnRange,
} from '@/paving/fit/fit';
import { fitJoints, type JointFits, type JointRange } from '@/paving/fit/joint-range';
import { shiftMap, type ShiftMap } from '@/paving/fit/shift-map';
import type { LayoutDocument } from '@/paving/layout-document';

/** The fit beside the page: the very code that the server and the command line run. */
const fitWorker = {
  fit: (document: LayoutDocument, options: Pick<FitOptions, 'hold' | 'choices'>): FitResult =>
    fit(document, options),

  /** Outline of the starts with the most units, to its true edge. */
  face: (document: LayoutDocument): BestFace => bestFace(document),

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
