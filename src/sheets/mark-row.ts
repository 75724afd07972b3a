import { PENS, boxRing } from './drawing';
import { INK } from './inks';
import type { PanelRow } from './panel';
import { panelText, textRows } from './panel';
import type { PlanInput } from './plan-input';
import { setOutMark, sheetDate } from './plan-input';
import { LETTERING, textFitted, textWidth } from './text-measure';

/** What a sheet says first: whether to build from it. Only an issued version is without "Not for set-out". */
export function markRows(input: PlanInput, width: number): readonly PanelRow[] {
  const row = markRow(setOutMark(input.state), width);
  const why = markReason(input);
  return why === null ? [row] : [{ ...row, keepsNext: 'needed' }, ...textRows(why, width)];
}

/** Why a superseded version must not be built from; null for others. */
function markReason({ state, stamp }: PlanInput): string | null {
  if (state !== 'superseded') return null;
  const { supersededBy } = stamp;
  if (supersededBy === null || supersededBy.number === null)
    return 'Another version is issued. Do not build from this one.';
  const since = sheetDate(supersededBy.at);
  return `Version ${supersededBy.number} was issued in its place on ${since}. Do not build from this one.`;
}

function markRow(text: string, width: number): PanelRow {
  const height =
    textWidth(text, LETTERING.large, 700) <= width - 4 ? LETTERING.large : LETTERING.medium;
  const fitted = textFitted(text, width - 4, height, 700);
  return {
    height: 10.5,
    draw: ([x, y], rowWidth, frame) => [
      {
        kind: 'path',
        rings: [boxRing({ left: x, top: y, right: x + rowWidth, bottom: y + 9.5 })],
        stroke: { width: PENS.thick, colour: INK },
      },
      panelText([x + rowWidth / 2, y + 4.75 + height / 2], fitted, frame, {
        height,
        weight: 700,
        anchor: 'middle',
      }),
    ],
  };
}

const HEAD_HEIGHT = 11;

/** The head of a sheet without a drawing: what it is, and the mark at the right. */
export function sheetHead(title: string, input: PlanInput, width: number): readonly PanelRow[] {
  const mark = setOutMark(input.state);
  const markWidth = textWidth(mark, LETTERING.medium, 700) + 6;
  const fitted = textFitted(title, width - markWidth - 4, LETTERING.large, 700);
  const why = markReason(input);
  return [
    {
      height: HEAD_HEIGHT,
      keepsNext: 'needed',
      draw: ([x, y], rowWidth, frame) => [
        panelText([x, y + 6.8], fitted, frame, { height: LETTERING.large, weight: 700 }),
        {
          kind: 'path',
          rings: [
            boxRing({
              left: x + rowWidth - markWidth,
              top: y,
              right: x + rowWidth,
              bottom: y + 8,
            }),
          ],
          stroke: { width: PENS.thick, colour: INK },
        },
        panelText([x + rowWidth - markWidth / 2, y + 4 + LETTERING.medium / 2], mark, frame, {
          height: LETTERING.medium,
          weight: 700,
          anchor: 'middle',
        }),
      ],
    },
    ...(why === null ? [] : textRows(why, width)),
  ];
}
