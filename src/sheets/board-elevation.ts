import type { ScreedBoard } from '@/takeoff/screed-board';
import type { Display } from '@/paving/length';
import type { DrawCommand, PaperBox, PaperPoint } from './drawing';
import { PENS, boxRing, boxWidth } from './drawing';
import { tick } from './edge-dimensions';
import { figureText } from './figures';
import { INK, PAPER, inkMix } from './inks';
import { panelText } from './panel';
import { LETTERING, textWidth } from './text-measure';

const FRAME = 'section';

/** The screed board as one looks along its pull: ears on edge or rails, its lower edge on the bedding. Not to scale. */
export function screedDrawing(
  board: ScreedBoard,
  display: Display,
  box: PaperBox,
): readonly DrawCommand[] {
  const stroke = { width: PENS.medium, colour: INK };
  const carrier = 9;
  const [left, right] = [box.left + 12, box.right - 12];
  const top = box.top + 22;
  const [depth, plank] = [9, 7];
  const [inLeft, inRight] = [left + carrier, right - carrier];
  const slack = 5;
  const boxes: readonly (readonly [PaperBox, string])[] = [
    [{ left, top, right: inLeft, bottom: top + depth + 8 }, inkMix(PAPER, INK, 0.12)],
    [{ left: inRight, top, right, bottom: top + depth + 8 }, inkMix(PAPER, INK, 0.12)],
    [{ left: left + 2, top: top - plank, right: right - 2, bottom: top }, PAPER],
    [{ left: inLeft + slack, top, right: inRight - slack, bottom: top + depth }, PAPER],
  ];
  const middle = (left + right) / 2;
  return [
    ...boxes.map(([ring, fill]): DrawCommand => ({
      kind: 'path',
      rings: [boxRing(ring)],
      fill,
      stroke,
    })),
    {
      kind: 'line',
      from: [inLeft, top + depth],
      to: [inRight, top + depth],
      stroke: { width: PENS.thin, colour: INK, dash: [2, 1] },
    },
    ...across(
      left + 2,
      right - 2,
      top - plank - 5,
      `ears ${figureText(board.earsLength, display)}`,
    ),
    ...across(
      inLeft + slack,
      inRight - slack,
      top + depth + 5,
      `board ${figureText(board.boardLength, display)}`,
    ),
    ...across(inLeft, inRight, top + depth + 12, `clear ${figureText(board.bayWidth, display)}`),
    panelText(
      [middle, top + depth / 2 + LETTERING.small / 2],
      `lower edge ${figureText(board.depth, display, 1)} below the ears`,
      FRAME,
      { anchor: 'middle', weight: 600 },
    ),
    panelText(
      [box.left + boxWidth(box) / 2, box.top + 4],
      'Screed board, as you look along its pull; not to scale',
      FRAME,
      { anchor: 'middle', weight: 700 },
    ),
    panelText(
      [left + carrier / 2, top + depth + 12 + LETTERING.small / 2],
      board.rides === 'edge' ? 'edge' : 'rail',
      FRAME,
      { anchor: 'middle' },
    ),
    panelText(
      [right - carrier / 2, top + depth + 12 + LETTERING.small / 2],
      board.rides === 'edge' ? 'edge' : 'rail',
      FRAME,
      { anchor: 'middle' },
    ),
  ];
}

/** A dimension broken for its figure. */
function across(left: number, right: number, y: number, text: string): readonly DrawCommand[] {
  const stroke = { width: PENS.fine, colour: INK };
  const half = textWidth(text, LETTERING.small, 600) / 2 + 1.2;
  const middle = (left + right) / 2;
  const [u, normal]: readonly [PaperPoint, PaperPoint] = [
    [1, 0],
    [0, 1],
  ];
  return [
    { kind: 'line', from: [left, y], to: [middle - half, y], stroke },
    { kind: 'line', from: [middle + half, y], to: [right, y], stroke },
    tick([left, y], u, normal),
    tick([right, y], u, normal),
    panelText([middle, y + LETTERING.small / 2], text, FRAME, { anchor: 'middle', weight: 600 }),
  ];
}
