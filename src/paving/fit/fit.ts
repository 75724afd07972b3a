import { documentGround } from '../ground';
import type { LayoutDocument, Placement } from '../layout-document';
import { frameChoices, frameMost } from './cell-fit';
import { fitFrame } from './fit-frame';
import { choiceVerified, type FitChoice } from './verified';

export type { FitChoice } from './verified';

export interface FitOptions {
  /** False to leave the trade-off out and give the most units alone. */
  readonly choices?: boolean;
  /** Asked now and then; when it answers true the fit ends with `null`. */
  readonly shouldStop?: () => boolean;
}

/** Where the pattern must start. Lengths in mm. */
export interface FitResult {
  /** The most whole units that any origin gives; `lifted` is left out of account. */
  readonly wholeUnits: number;
  /** Of the origins that give them, the one with the most play; the document's own where none lays any. */
  readonly placement: Placement;
  /** At that placement; null where nothing can be laid. */
  readonly leastGap: number | null;
  readonly play: number | null;
  /** Most units first; every entry has more play, by more than 0.01 mm, than all before it. */
  readonly choices: readonly FitChoice[];
}

/** Finds where a valid document's pattern must start; null when it was stopped. */
export function fit(document: LayoutDocument, options: FitOptions = {}): FitResult | null {
  const { shouldStop } = options;
  const frame = fitFrame(document, document.placement.turn, documentGround(document));
  const { pieces, most } = frameMost(frame, shouldStop);
  if (shouldStop?.()) return null;
  if (most.count === 0) {
    return {
      wholeUnits: 0,
      placement: document.placement,
      leastGap: null,
      play: null,
      choices: [],
    };
  }
  const found = frameChoices(frame, pieces, most, options.choices ?? true, shouldStop);
  if (shouldStop?.()) return null;
  const choices = found.map((choice) => choiceVerified(frame, choice));
  const [best] = choices;
  return {
    wholeUnits: best.wholeUnits,
    placement: best.placement,
    leastGap: best.leastGap,
    play: best.play,
    choices,
  };
}
