import { cellPieces, type CellPieces } from './cell-pieces';
import { unitCount } from './count';
import type { FitFrame } from './fit-frame';
import { cellMost, type CellMost } from './most';
import { mostPlay } from './most-play';
import { nearPieces } from './near-pieces';
import { cellTradeOff, type CellChoice } from './trade-off';

/** Choices go down to this share of the most units. */
export const CHOICES_SHARE = 0.85;
/** Where the count is taken first, as shares of the cell: anywhere on no line of symmetry. */
const FIRST_LOOK = [0.41421, 0.27183] as const;

/** The most units at a frame's turn, and an origin in its cell that gives them. */
export function frameMost(frame: FitFrame, stop?: () => boolean) {
  const pieces = cellPieces(frame);
  const u = FIRST_LOOK[0] * frame.pitch;
  const v = FIRST_LOOK[1] * frame.rise;
  const most = cellMost(
    pieces,
    frame.pitch,
    frame.rise,
    { count: unitCount(frame, u, v), u, v },
    stop,
  );
  return { pieces, most };
}

/** First reach, in widths that the cell's area would have spread along all its pieces. */
const FIRST_REACH = 8;
/** A face of the best starts is no longer than a way round the cell; pieces are known this many cells off at most. */
const GREATEST_CELLS = 3;

/**
 * Asks for origins with the most slack, of pieces with their repeats as far off as the slack may reach. How
 * far that is, is known only when the answer is: a short reach is tried first, and drawn out while
 * some origin needs all of it.
 */
function withinReach<T>(
  { pitch, rise }: FitFrame,
  pieces: CellPieces,
  first: number,
  found: (reach: number) => T,
  needed: (answer: T) => number,
): T {
  let length = 0;
  for (let n = 0; n < pieces.count; n++) {
    length += Math.hypot(pieces.x1[n] - pieces.x0[n], pieces.y1[n] - pieces.y0[n]);
  }
  // No origin with a unit has more slack: the unit's neighbour along the row that is not whole bounds it.
  const greatest = pitch * 1.001;
  const farthest = GREATEST_CELLS * (pitch + rise);
  let reach = Math.min(Math.max(first, (FIRST_REACH * pitch * rise) / length), greatest);
  for (;;) {
    const answer = found(reach);
    const need = needed(answer);
    if (need < reach * 0.999 || reach >= farthest) return answer;
    reach = Math.min(Math.max(Math.min(4 * reach, greatest), 1.01 * need), farthest);
  }
}

/** Of the origins with the most units, that with the most slack. */
export function frameStart(
  frame: FitFrame,
  pieces: CellPieces,
  most: CellMost,
  stop?: () => boolean,
): CellChoice {
  const { pitch, rise, shift } = frame;
  return withinReach(
    frame,
    pieces,
    0,
    (reach) => mostPlay(nearPieces(pieces, pitch, rise, shift, reach, true), reach, most, stop),
    // A face may run out of the cell, and the start with it: about that, too, all pieces must be known.
    ({ slack, u, v }) =>
      stop?.() ? 0 : slack + Math.hypot(Math.max(0, -u, u - pitch), Math.max(0, -v, v - rise)),
  );
}

/** The whole trade-off, from the start with the most units on. */
export function frameChoices(
  frame: FitFrame,
  pieces: CellPieces,
  most: CellChoice,
  stop?: () => boolean,
): CellChoice[] {
  const { pitch, rise, shift } = frame;
  const least = Math.max(1, Math.ceil(CHOICES_SHARE * most.count));
  return withinReach(
    frame,
    pieces,
    2 * most.slack,
    (reach) => {
      const near = nearPieces(pieces, pitch, rise, shift, reach);
      return cellTradeOff(near, pitch, rise, reach, { least, most, stop });
    },
    (choices) => (stop?.() ? 0 : Math.max(...choices.map(({ slack }) => slack))),
  );
}
