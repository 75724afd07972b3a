import { cellPieces, type CellPieces } from './cell-pieces';
import { unitCount } from './count';
import { cellPoint, type FitFrame } from './fit-frame';
import { greatestReach, REACH_SHARE, type CellChoice } from './known-choices';
import { cellMost, type CellMost } from './most';
import { mostPlay } from './most-play';
import { nearPieces } from './near-pieces';
import { MANY_FAMILIES } from './strip-bound';
import { cellTradeOff } from './trade-off';

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

/** First reach, in widths that the cell's area would have spread along all its pieces; more where they are of many directions. */
const FIRST_REACH = 8;
const FIRST_REACH_MANY = 16;
/** A face of the best starts is no longer than a way round the cell; pieces are known this many cells off at most. */
const GREATEST_CELLS = 3;
/** A reach that is too short is drawn out to so many times as much. */
const REACH_GROWTH = 2;
/** Sides of the squares that the cell is looked over in, in the same. */
const SQUARE_SIDE = 1.75;
/** Squares of a cell are no more than these. */
const MOST_SQUARES = 1 << 18;

/** The width that the cell's area would have, spread along all its pieces, mm. */
function spreadWidth({ pitch, rise }: FitFrame, pieces: CellPieces): number {
  let length = 0;
  for (let n = 0; n < pieces.count; n++) {
    length += Math.hypot(pieces.x1[n] - pieces.x0[n], pieces.y1[n] - pieces.y0[n]);
  }
  return (pitch * rise) / length;
}

/**
 * Asks for origins with the most slack, of pieces with their repeats as far off as the slack may reach. How
 * far that is, is known only when the answer is: a short reach is tried first, and drawn out while
 * some origin needs all of it.
 */
function withinReach<T>(
  { pitch, rise }: FitFrame,
  first: number,
  found: (reach: number) => T,
  needed: (answer: T) => number,
): T {
  const greatest = greatestReach(pitch);
  const farthest = GREATEST_CELLS * (pitch + rise);
  let reach = Math.min(first, greatest);
  for (;;) {
    const answer = found(reach);
    const need = needed(answer);
    if (need < REACH_SHARE * reach || reach >= farthest) return answer;
    reach = Math.min(Math.max(Math.min(REACH_GROWTH * reach, greatest), 1.01 * need), farthest);
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
    FIRST_REACH * spreadWidth(frame, pieces),
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
): readonly CellChoice[] {
  const { pitch, rise, shift } = frame;
  const least = Math.max(1, Math.ceil(CHOICES_SHARE * most.count));
  // The same floor from within the cell, about which all pieces are listed.
  const [u, v] = cellPoint(frame, [most.u, most.v]);
  const start = { ...most, u, v };
  const width = spreadWidth(frame, pieces);
  const many = pieces.families.nx.length >= MANY_FAMILIES;
  const squares = many ? Math.min(MOST_SQUARES, (pitch * rise) / (SQUARE_SIDE * width) ** 2) : 0;
  return withinReach(
    frame,
    Math.max(2 * most.slack, (many ? FIRST_REACH_MANY : FIRST_REACH) * width),
    (reach) => {
      const near = nearPieces(pieces, pitch, rise, shift, reach);
      return cellTradeOff(near, pitch, rise, reach, { least, most: start, squares, stop });
    },
    ({ slack }) => (stop?.() ? 0 : slack),
  ).choices;
}
