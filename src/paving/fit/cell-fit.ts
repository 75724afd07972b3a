import { cellPieces, type CellPieces } from './cell-pieces';
import { unitCount } from './count';
import type { FitFrame } from './fit-frame';
import { cellMost, type CellMost } from './most';
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

/**
 * Origins of the cell with the most slack: that of the most units alone, or the whole trade-off.
 * Pieces are looked at as far off as the slack may reach; how far that is, is known only when the
 * answer is, so a short reach is tried first and drawn out while some origin has all of it.
 */
export function frameChoices(
  frame: FitFrame,
  pieces: CellPieces,
  most: CellMost,
  all: boolean,
  stop?: () => boolean,
): CellChoice[] {
  const { pitch, rise, shift } = frame;
  let length = 0;
  for (let n = 0; n < pieces.count; n++) {
    length += Math.hypot(pieces.x1[n] - pieces.x0[n], pieces.y1[n] - pieces.y0[n]);
  }
  // No origin with a unit has more: the unit's neighbour along the row that is not whole bounds it.
  const greatest = pitch * 1.001;
  const least = all ? Math.max(1, Math.ceil(CHOICES_SHARE * most.count)) : most.count;
  for (let reach = Math.min(greatest, (FIRST_REACH * pitch * rise) / length); ; reach *= 4) {
    reach = Math.min(reach, greatest);
    const near = nearPieces(pieces, pitch, rise, shift, reach);
    const choices = cellTradeOff(near, pitch, rise, reach, { least, most, stop });
    const cut = choices.some(({ slack }) => slack >= reach * 0.999);
    if (!cut || reach >= greatest || stop?.()) return choices;
  }
}

/** First reach, in widths that the cell's area would have spread along all its pieces. */
const FIRST_REACH = 8;
