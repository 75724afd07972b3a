import { documentGround } from '../ground';
import type { LayoutDocument, Placement } from '../layout-document';
import type { BestFace } from './best-face';
import { frameChoices, frameMost, frameStart } from './cell-fit';
import { cellPieces } from './cell-pieces';
import { cellFace } from './face';
import { fitFrame, holdFrame, type FitFrame } from './fit-frame';
import { holdRefusal, type FitHold, type HoldRefusal } from './hold';
import { heldChoices } from './line-fit';
import { rangeTurns, turnBest, turnSweep, type FitTurn, type TurnRange } from './turn-sweep';
import type { CellChoice } from './known-choices';
import { choiceVerified, type FitChoice } from './verified';

export type { EdgeAddress, FitHold, HoldRefusal } from './hold';
export type { FitTurn, TurnRange } from './turn-sweep';
export type { FitChoice } from './verified';

export interface FitOptions {
  /** `fixed`, the document's own turn, unless a range of turns is given. */
  readonly turn?: 'fixed' | TurnRange;
  /** None, one or two. In a range of turns, only those at which they can be kept are looked at. */
  readonly hold?: readonly FitHold[];
  /** False to leave the trade-off out and give the most units alone. */
  readonly choices?: boolean;
  /** Called with each turn as it is found, and how much of the range is done, 0 to 1; turns about the best come after it. */
  readonly progress?: (turn: FitTurn, share: number) => void;
  /** Asked now and then, at least once a turn; when it answers true the fit ends. */
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
  /** Every turn that was looked at, in order, when a range was given. */
  readonly turns?: readonly FitTurn[];
}

/** Message of the error that `fit` throws when `shouldStop` has answered true. */
export const FIT_STOPPED = 'the fit was stopped';

/**
 * Why the holds cannot be kept, and the turns that would do; null when they can. At the document's
 * turn, or, for a range of turns, at every turn of it: then what stands in the way at the first.
 */
export function fitRefusal(
  document: LayoutDocument,
  { hold = [], turn = 'fixed' }: Pick<FitOptions, 'hold' | 'turn'>,
): HoldRefusal | null {
  if (hold.length === 0) return null;
  const ground = documentGround(document);
  const turns = turn === 'fixed' ? [document.placement.turn] : rangeTurns(turn);
  let first: HoldRefusal | null = null;
  for (const at of turns) {
    const refusal = holdRefusal(holdFrame(document, at, ground), hold);
    if (!refusal) return null;
    first ??= refusal;
  }
  return first;
}

function resultOf(frame: FitFrame, choices: readonly FitChoice[]): FitResult {
  if (choices.length === 0) {
    const { document, turn } = frame;
    const placement = { ...document.placement, turn };
    return { wholeUnits: 0, placement, leastGap: null, play: null, choices: [] };
  }
  const [{ wholeUnits, placement, leastGap, play }] = choices;
  return { wholeUnits, placement, leastGap, play, choices };
}

/** The fit at one turn, begun: the most units and the start that gives them are known, the rest can be asked for. */
export interface FitBegun {
  /** Without the trade-off: `choices` has the start alone. */
  readonly result: FitResult;
  /** The outline of the starts about it that have as many units; none with holds, or where nothing is laid. */
  readonly face: () => BestFace | null;
  /** With the trade-off, from what is known already. */
  readonly whole: () => FitResult;
}

/**
 * Begins the fit of a valid document at its own turn, or another. Throws as `fit` does, now and when the rest is asked for.
 */
export function fitBegun(
  document: LayoutDocument,
  { hold = [], shouldStop }: Pick<FitOptions, 'hold' | 'shouldStop'> = {},
  turn: number = document.placement.turn,
): FitBegun {
  const refusal = fitRefusal({ ...document, placement: { ...document.placement, turn } }, { hold });
  if (refusal) throw new Error(refusal.message);
  const frame = fitFrame(document, turn, documentGround(document));
  const check = <T>(found: T): T => {
    if (shouldStop?.()) throw new Error(FIT_STOPPED);
    return found;
  };
  const verified = (choices: readonly CellChoice[], held: boolean) =>
    resultOf(
      frame,
      choices.map((choice) => choiceVerified(frame, choice, held)),
    );
  if (hold.length > 0) {
    const pieces = cellPieces(frame);
    const held = (all: boolean) =>
      verified(check(heldChoices(frame, pieces, hold, all, shouldStop)), true);
    return { result: held(false), face: () => null, whole: () => held(true) };
  }
  const { pieces, most } = check(frameMost(frame, shouldStop));
  if (most.count === 0) {
    const none = resultOf(frame, []);
    return { result: none, face: () => null, whole: () => none };
  }
  const start = check(frameStart(frame, pieces, most, shouldStop));
  const result = verified([start], false);
  return {
    result,
    face: () => ({ most: most.count, outline: cellFace(pieces, frame, most.u, most.v) }),
    whole: () => {
      const [, ...fewer] = check(frameChoices(frame, pieces, start, shouldStop));
      const rest = fewer.map((choice) => choiceVerified(frame, choice));
      return { ...result, choices: [...result.choices, ...rest] };
    },
  };
}

function fixedFit(document: LayoutDocument, turn: number, options: FitOptions): FitResult {
  const begun = fitBegun(document, options, turn);
  return options.choices === false ? begun.result : begun.whole();
}

/**
 * The fit, turn by turn: yields each turn of a range as it is found (null where a hold cannot be
 * kept), so that a caller can draw it, wait, or leave off; returns the result. With a fixed turn it yields nothing.
 */
export function* fitSteps(
  document: LayoutDocument,
  options: FitOptions = {},
): Generator<FitTurn | null, FitResult> {
  const { turn = 'fixed', hold = [], shouldStop } = options;
  const refusal = fitRefusal(document, { hold, turn });
  if (refusal) throw new Error(refusal.message);
  if (turn === 'fixed') return fixedFit(document, document.placement.turn, options);
  const turns: FitTurn[] = [];
  for (const found of turnSweep(document, turn, hold)) {
    if (found) turns.push(found);
    yield found;
    if (shouldStop?.()) throw new Error(FIT_STOPPED);
  }
  const best = fixedFit(document, turnBest(turns).turn, options);
  return { ...best, turns: turns.sort((one, other) => one.turn - other.turn) };
}

/**
 * Where a valid document's pattern must start. Deterministic. Throws `FIT_STOPPED` when `shouldStop`
 * answered true, what `fitRefusal` says when a hold cannot be kept, and, with the place, when the
 * laying does not bear out what was found.
 */
export function fit(document: LayoutDocument, options: FitOptions = {}): FitResult {
  const { turn = 'fixed', progress } = options;
  const total = turn === 'fixed' ? 1 : rangeTurns(turn).length;
  const steps = fitSteps(document, options);
  for (let done = 1; ; done++) {
    const step = steps.next();
    if (step.done) return step.value;
    if (step.value) progress?.(step.value, Math.min(1, done / total));
  }
}
