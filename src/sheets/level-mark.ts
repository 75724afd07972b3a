import type { DrawCommand, PaperPoint } from './drawing';
import { PENS } from './drawing';
import { INK } from './inks';

/** The triangle that stands on a level, its point down on the line; side of it, mm. */
export const LEVEL_MARK = 2.2;

/** A level mark whose point is at `at`; filled for the datum, open for any other level. */
export function levelMark([x, y]: PaperPoint, filled: boolean): DrawCommand {
  const half = LEVEL_MARK / 2;
  return {
    kind: 'path',
    rings: [
      {
        points: [
          [x, y],
          [x + half, y - LEVEL_MARK * 0.87],
          [x - half, y - LEVEL_MARK * 0.87],
        ],
        closed: true,
      },
    ],
    fill: filled ? INK : undefined,
    stroke: { width: PENS.fine, colour: INK },
  };
}
