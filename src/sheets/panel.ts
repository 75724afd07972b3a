import type { DrawCommand, FontWeight, PaperBox, PaperPoint, TextAnchor } from './drawing';
import { PENS } from './drawing';
import { INK } from './inks';
import { LETTERING, sheetText, textFitted, textLines, textWidth } from './text-measure';

/** One row of the panel beside the plan: a height, and how to draw it with its top left corner at a point. */
export interface PanelRow {
  readonly height: number;
  /** The next row must stand in the same column, or should where that costs no further sheet. */
  readonly keepsNext?: 'needed' | 'wished';
  readonly draw: (at: PaperPoint, width: number, frame: string) => readonly DrawCommand[];
}

/** Rows that no column's end may part, or should not. */
export const keptTogether = (
  rows: readonly PanelRow[],
  keepsNext: 'needed' | 'wished' = 'needed',
): readonly PanelRow[] =>
  rows.map((row, n) =>
    n < rows.length - 1 ? { ...row, keepsNext: row.keepsNext ?? keepsNext } : row,
  );

/** A column of rows, and the frame that its texts must stay in. */
export interface PanelColumn {
  readonly box: PaperBox;
  readonly frame: string;
}

/** Rows flowed into columns. */
export interface FlowedPanel {
  readonly commands: readonly DrawCommand[];
  /** Rows that found no room. */
  readonly rest: readonly PanelRow[];
}

/** From one baseline to the next. */
export const LINE_PITCH = 4.1;
const HEADING_SPACE = 2.6;

/**
 * Fills columns from the top, one after another; rows that keep their next are not parted from it.
 * Rows that only wish to are parted where all then finds room, and where a column is too low for them together.
 */
export function panelFlowed(
  rows: readonly PanelRow[],
  columns: readonly PanelColumn[],
): FlowedPanel {
  const wished = columnsFilled(rows, columns, true);
  if (wished.rest.length === 0) return wished;
  const parted = columnsFilled(rows, columns, false);
  return parted.rest.length === 0 ? parted : wished;
}

function columnsFilled(
  rows: readonly PanelRow[],
  columns: readonly PanelColumn[],
  wishes: boolean,
): FlowedPanel {
  const highest = Math.max(...columns.map(({ box }) => box.bottom - box.top));
  /** Index after the last row that stays with the row at `first`, and their height. */
  const group = (first: number, wished: boolean): { end: number; height: number } => {
    let end = first + 1;
    let height = rows[first].height;
    for (; end < rows.length; end += 1) {
      const keeps = rows[end - 1].keepsNext;
      if (!keeps || (keeps === 'wished' && !wished)) break;
      height += rows[end].height;
    }
    return wished && height > highest ? group(first, false) : { end, height };
  };
  const commands: DrawCommand[] = [];
  let next = 0;
  for (const { box, frame } of columns) {
    let y = box.top;
    while (next < rows.length) {
      const { end, height } = group(next, wishes);
      if (y + height > box.bottom) break;
      for (; next < end; next += 1) {
        commands.push(...rows[next].draw([box.left, y], box.right - box.left, frame));
        y += rows[next].height;
      }
    }
  }
  return { commands, rest: rows.slice(next) };
}

/** A line of text of the panel; small and plain unless told. */
export function panelText(
  at: PaperPoint,
  text: string,
  frame: string,
  {
    height = LETTERING.small,
    weight = 400,
    anchor = 'start',
  }: { height?: number; weight?: FontWeight; anchor?: TextAnchor } = {},
): DrawCommand {
  return { kind: 'text', at, text, height, weight, anchor, turnDeg: 0, colour: INK, frame };
}

/** A heading over a hairline. */
export function headingRow(text: string, width: number): PanelRow {
  const fitted = textFitted(text, width, LETTERING.small, 700);
  return {
    height: LINE_PITCH + HEADING_SPACE + 0.3,
    keepsNext: 'needed',
    draw: ([x, y], rowWidth, frame) => [
      panelText([x, y + HEADING_SPACE + LETTERING.small], fitted, frame, { weight: 700 }),
      {
        kind: 'line',
        from: [x, y + HEADING_SPACE + LINE_PITCH - 0.35],
        to: [x + rowWidth, y + HEADING_SPACE + LINE_PITCH - 0.35],
        stroke: { width: PENS.fine, colour: INK },
      },
    ],
  };
}

const baseline = (y: number, line = 0): number => y + 0.65 + LETTERING.small + line * LINE_PITCH;

/** Words broken to a width, mm, a row a line. */
export function textRows(text: string, width: number): readonly PanelRow[] {
  return textLines(text, width, LETTERING.small).map((line) => ({
    height: LINE_PITCH,
    draw: ([x, y], _width, frame) => [panelText([x, baseline(y)], line, frame)],
  }));
}

/** Lines that stay together, hung from a dash. */
export function itemRow(text: string, width: number): PanelRow {
  const indent = 3;
  const lines = textLines(text, width - indent, LETTERING.small);
  return {
    height: lines.length * LINE_PITCH + 0.5,
    draw: ([x, y], _width, frame) => [
      panelText([x, baseline(y)], '–', frame),
      ...lines.map((line, n) => panelText([x + indent, baseline(y, n)], line, frame)),
    ],
  };
}

/** A name at the left and its figure at the right; the name takes more lines when it must. */
export function pairRow(
  name: string,
  figure: string,
  width: number,
  weight: FontWeight = 600,
): PanelRow {
  const value = sheetText(figure);
  const valueWidth = textWidth(value, LETTERING.small, weight);
  const together = valueWidth <= width * 0.72;
  const names = textLines(name, together ? width - valueWidth - 2 : width, LETTERING.small);
  const values = together ? [value] : textLines(value, width, LETTERING.small, weight);
  const valueLine = together ? 0 : names.length;
  return {
    height: (together ? names.length : names.length + values.length) * LINE_PITCH,
    draw: ([x, y], rowWidth, frame) => [
      ...names.map((line, n) => panelText([x, baseline(y, n)], line, frame)),
      ...values.map((line, n) =>
        panelText([x + rowWidth, baseline(y, valueLine + n)], line, frame, {
          weight,
          anchor: 'end',
        }),
      ),
    ],
  };
}

/** A row of a table: name, then figures, right-aligned, sharing the rest; a figure too wide takes a line of its own. */
export function tableRow(
  cells: readonly [name: string, first: string, second: string],
  width: number,
  weight: FontWeight = 400,
): PanelRow {
  const [name, first, second] = cells;
  const size = (text: string) => textWidth(text, LETTERING.small, weight);
  const firstEnd = Math.max(width * 0.52, size(name) + 2 + size(first));
  const second2 = firstEnd + 2 + size(second) > width;
  return {
    height: (second2 ? 2 : 1) * LINE_PITCH,
    draw: ([x, y], rowWidth, frame) => [
      panelText([x, baseline(y)], name, frame, { weight: weight === 400 ? 600 : weight }),
      panelText([x + Math.min(firstEnd, rowWidth), baseline(y)], first, frame, {
        weight,
        anchor: 'end',
      }),
      panelText([x + rowWidth, baseline(y, second2 ? 1 : 0)], second, frame, {
        weight,
        anchor: 'end',
      }),
    ],
  };
}

/** A sample of what is drawn, and what it means. */
export function sampleRow(
  sample: (box: PaperBox) => readonly DrawCommand[],
  text: string,
  width: number,
): PanelRow {
  const [sampleWidth, sampleHeight, space] = [9, 4.6, 2.5];
  const lines = textLines(text, width - sampleWidth - space, LETTERING.small);
  const height = Math.max(sampleHeight + 1.4, lines.length * LINE_PITCH + 0.8);
  return {
    height,
    draw: ([x, y], _width, frame) => [
      ...sample({
        left: x,
        top: y + 0.7,
        right: x + sampleWidth,
        bottom: y + 0.7 + sampleHeight,
      }),
      ...lines.map((line, n) =>
        panelText([x + sampleWidth + space, baseline(y + 0.2, n)], line, frame),
      ),
    ],
  };
}
