import { documentGround, type Ground } from '../ground';
import type { LayoutDocument } from '../layout-document';
import { frameMost, frameStart } from './cell-fit';
import { cellPieces } from './cell-pieces';
import { fitFrame } from './fit-frame';
import { holdRefusal, type FitHold } from './hold';
import { heldChoices } from './line-fit';
import { choiceVerified } from './verified';

/** The most units at one turn, and the play that they can have, mm; null where nothing can be laid. */
export interface FitTurn {
  readonly turn: number;
  readonly wholeUnits: number;
  readonly play: number | null;
}

/** Turns to look at: from, from + step … up to `to`, degrees. */
export interface TurnRange {
  readonly from: number;
  readonly to: number;
  readonly step: number;
}

/** So many of the best turns are looked about in, ever nearer. */
const REFINED_TURNS = 3;
/** Looking about ends at steps below this, degrees: 1 mm in 3 m. */
const LEAST_STEP_DEG = 0.02;
const TURN_DIGITS = 6;

const roundTurn = (turn: number) => Number(turn.toFixed(TURN_DIGITS));

/** The turns of a range, each once; throws when it has none or no end. */
export function rangeTurns({ from, to, step }: TurnRange): number[] {
  const count = Math.floor((to - from) / step + 1e-9);
  if (!(step > 0) || !(count >= 0) || count > 100_000) {
    throw new Error(`turns from ${from} to ${to} by ${step} degrees are not a range`);
  }
  return Array.from({ length: count + 1 }, (_, n) => roundTurn(from + n * step));
}

/** The most units, and their play, at a turn; null where a hold cannot be kept at it. */
export function turnFit(
  document: LayoutDocument,
  turn: number,
  ground: Ground,
  hold: readonly FitHold[] = [],
): FitTurn | null {
  const frame = fitFrame(document, turn, ground);
  const none = { turn, wholeUnits: 0, play: null };
  if (hold.length > 0) {
    if (holdRefusal(frame, hold)) return null;
    const [choice] = heldChoices(frame, cellPieces(frame), hold, false);
    if (!choice) return none;
    const { wholeUnits, play } = choiceVerified(frame, choice, true);
    return { turn, wholeUnits, play };
  }
  const { pieces, most } = frameMost(frame);
  if (most.count === 0) return none;
  const { wholeUnits, play } = choiceVerified(frame, frameStart(frame, pieces, most));
  return { turn, wholeUnits, play };
}

const order = (one: FitTurn, other: FitTurn) =>
  other.wholeUnits - one.wholeUnits ||
  (other.play ?? -1) - (one.play ?? -1) ||
  one.turn - other.turn;

/**
 * The turns of the range one by one, then, about the best of them, turns between, by ever smaller
 * steps. Each turn's count is the true most at that turn; between the turns looked at there may be
 * better ones. Yields each turn as it is found; what was yielded, in any order, is the curve. Turns
 * at which a hold cannot be kept are passed over: null is yielded for them.
 */
export function* turnSweep(
  document: LayoutDocument,
  range: TurnRange,
  hold: readonly FitHold[] = [],
): Generator<FitTurn | null> {
  const ground = documentGround(document);
  const known = new Map<number, FitTurn>();
  const look = (turn: number) => {
    const found = turnFit(document, turn, ground, hold);
    if (found) known.set(turn, found);
    return found;
  };
  for (const turn of rangeTurns(range)) yield look(turn);
  const leaders = [...known.values()].sort(order).slice(0, REFINED_TURNS);
  for (let leader of leaders) {
    for (let step = range.step / 2; step >= LEAST_STEP_DEG; step /= 2) {
      const start = leader;
      for (const turn of [start.turn - step, start.turn + step].map(roundTurn)) {
        if (turn < range.from || turn > range.to) continue;
        let found = known.get(turn) ?? null;
        if (!found) {
          found = look(turn);
          yield found;
        }
        if (found && order(found, leader) < 0) leader = found;
      }
    }
  }
}

/** The best of some turns: most units, then most play, then the smallest turn. */
export function turnBest(turns: readonly FitTurn[]): FitTurn {
  return [...turns].sort(order)[0];
}
