import { MM_PER_FOOT } from '@/paving/length';
import type { Display } from '@/paving/length';
import type { DrawCommand } from './drawing';
import { PENS } from './drawing';
import { INK, PAPER } from './inks';
import type { PanelRow } from './panel';
import { panelText } from './panel';
import { LETTERING, textWidth } from './text-measure';

const BAR_HEIGHT = 1.6;
const PARTS = 4;
/** Whole steps of a bar's part: 1, 2 and 5 of each power of ten, in millimetres or feet. */
const STEPS = [-3, -2, -1, 0, 1, 2, 3, 4].flatMap((power) =>
  [1, 2, 5].map((step) => step * 10 ** power),
);

/** A bar of four parts, each a whole number of metres (or feet), as long as fits. */
export function scaleBarRow(scale: number, display: Display, width: number): PanelRow {
  const unit = display === 'metric' ? 1000 : MM_PER_FOOT;
  const name = display === 'metric' ? 'm' : 'ft';
  const room = width - 12;
  const step =
    [...STEPS].reverse().find((size) => (PARTS * size * unit) / scale <= room) ?? STEPS[0];
  const part = (step * unit) / scale;
  const ends = Array.from({ length: PARTS + 1 }, (_, n) => n);
  const label = (n: number) => String(Number((n * step).toFixed(3)));
  // Only the ends are figured when the parts are too short for their figures.
  const all = part > textWidth(label(PARTS - 1), LETTERING.small) + 1.5;
  return {
    height: 10,
    draw: ([x, y], _width, frame) => {
      const left = x + 1.5;
      const top = y + 2.4 + LETTERING.small + 1;
      return [
        ...ends.slice(1).map((n): DrawCommand => ({
          kind: 'path',
          rings: [
            {
              points: [
                [left + (n - 1) * part, top],
                [left + n * part, top],
                [left + n * part, top + BAR_HEIGHT],
                [left + (n - 1) * part, top + BAR_HEIGHT],
              ],
              closed: true,
            },
          ],
          fill: n % 2 === 1 ? INK : PAPER,
          stroke: { width: PENS.fine, colour: INK },
        })),
        ...ends
          .filter((n) => all || n === 0 || n === PARTS)
          .map((n) =>
            n === PARTS
              ? panelText(
                  [left + n * part - textWidth(label(n), LETTERING.small) / 2, top - 1],
                  `${label(n)}\u2009${name}`,
                  frame,
                )
              : panelText([left + n * part, top - 1], label(n), frame, { anchor: 'middle' }),
          ),
      ];
    },
  };
}
