import type { DrawCommand, FontWeight, PaperPoint, TextAnchor } from './drawing';
import { PENS, boxRing } from './drawing';
import { INK } from './inks';
import type { PanelRow } from './panel';
import { LINE_PITCH, panelText } from './panel';
import { LETTERING, sheetText, textLines, textWidth } from './text-measure';

/** A column of a table. */
export interface TableColumn {
  readonly title: string;
  readonly align: TextAnchor;
  /** Share of the width that is left when every other column is as wide as its widest text; none: as wide as that. */
  readonly grow?: number;
  readonly weight?: FontWeight;
}

/** What stands in a cell: words, a small box to tick, or room to write in. */
export type TableCell = string | { readonly tick: true } | { readonly write: true };

/** A table as rows of a panel. */
export interface RuledTable {
  /** The titles over a line, for the head of every sheet. */
  readonly header: PanelRow;
  readonly rows: readonly PanelRow[];
}

/** White space at either side of a cell's text. */
const PADDING = 1.5;
/** A column made for a text holds it, whatever the sums are rounded to. */
const SLACK = 0.1;
const LEAST_GROWN = 24;
const TICK_BOX = 3;
const WRITE_WIDTH = 20;
/** A row to write in is at least this high. */
const WRITE_HEIGHT = 7;
const LEAST_HEIGHT = 5.2;

const words = (cell: TableCell): string => (typeof cell === 'string' ? cell : '');

function cellWidth(cell: TableCell, weight: FontWeight): number {
  if (typeof cell !== 'string') return 'tick' in cell ? TICK_BOX : WRITE_WIDTH;
  return textWidth(sheetText(cell), LETTERING.small, weight);
}

/** A title may take two lines or more: its column is as wide as its longest word. */
const titleWidth = (title: string): number =>
  Math.max(...title.split(' ').map((word) => textWidth(sheetText(word), LETTERING.small, 600)));

function columnWidths(
  columns: readonly TableColumn[],
  rows: readonly (readonly TableCell[])[],
  width: number,
): readonly number[] {
  const own = columns.map(({ title, weight = 400 }, n) =>
    rows.reduce((most, row) => Math.max(most, cellWidth(row[n], weight)), titleWidth(title)),
  );
  const padded = own.map((one) => one + 2 * PADDING + SLACK);
  const growing = columns.map(({ grow = 0 }) => grow);
  const shares = growing.reduce((sum, one) => sum + one, 0);
  if (shares === 0) return padded;
  const fixed = padded.reduce((sum, one, n) => sum + (growing[n] > 0 ? 0 : one), 0);
  const left = Math.max(width - fixed, shares * LEAST_GROWN);
  const widths = padded.map((one, n) => (growing[n] > 0 ? (left * growing[n]) / shares : one));
  const all = widths.reduce((sum, one) => sum + one, 0);
  return widths.map((one) => (one * width) / Math.max(all, width));
}

/** A table whose columns fit their contents; texts too wide for theirs take more lines. Rows have a cell a column. */
export function ruledTable(
  columns: readonly TableColumn[],
  rows: readonly (readonly TableCell[])[],
  width: number,
): RuledTable {
  const widths = columnWidths(columns, rows, width);
  const lefts = widths.map((_, n) => widths.slice(0, n).reduce((sum, one) => sum + one, 0));
  const lines = (text: string, n: number, weight: FontWeight) =>
    textLines(text, widths[n] - 2 * PADDING, LETTERING.small, weight);
  const full = widths.reduce((sum, one) => sum + one, 0);

  const drawLines = (
    texts: readonly string[],
    n: number,
    [x, y]: PaperPoint,
    frame: string,
    weight: FontWeight,
  ): readonly DrawCommand[] => {
    const at = {
      start: x + lefts[n] + PADDING,
      middle: x + lefts[n] + widths[n] / 2,
      end: x + lefts[n] + widths[n] - PADDING,
    }[columns[n].align];
    return texts.map((line, l) =>
      panelText([at, y + 1.1 + LETTERING.small + l * LINE_PITCH], line, frame, {
        weight,
        anchor: columns[n].align,
      }),
    );
  };
  const ruleUnder = ([x, y]: PaperPoint, pen: number): DrawCommand => ({
    kind: 'line',
    from: [x, y],
    to: [x + full, y],
    stroke: { width: pen, colour: INK },
  });

  const titles = columns.map(({ title }, n) => lines(title, n, 600));
  const headerHeight = Math.max(...titles.map((one) => one.length)) * LINE_PITCH + 1.4;
  const header: PanelRow = {
    height: headerHeight,
    keepsNext: 'needed',
    draw: ([x, y], _width, frame) => [
      ...titles.flatMap((texts, n) => {
        const drop = headerHeight - 1.4 - texts.length * LINE_PITCH;
        return drawLines(texts, n, [x, y + drop], frame, 600);
      }),
      ruleUnder([x, y + headerHeight], PENS.medium),
    ],
  };

  const made = rows.map((cells): PanelRow => {
    const texts = cells.map((cell, n) => lines(words(cell), n, columns[n].weight ?? 400));
    const written = cells.some((cell) => typeof cell !== 'string' && 'write' in cell);
    const most = Math.max(1, ...texts.map((one) => one.length));
    const height = Math.max(written ? WRITE_HEIGHT : LEAST_HEIGHT, most * LINE_PITCH + 1.4);
    return {
      height,
      draw: ([x, y], _width, frame) => [
        ...cells.flatMap((cell, n): readonly DrawCommand[] => {
          const left = x + lefts[n];
          if (typeof cell === 'string')
            return drawLines(texts[n], n, [x, y], frame, columns[n].weight ?? 400);
          if ('tick' in cell) return [tickBox([left + widths[n] / 2, y + height / 2])];
          return [
            {
              kind: 'path',
              rings: [
                boxRing({
                  left: left + 0.8,
                  top: y + 0.8,
                  right: left + widths[n] - 0.8,
                  bottom: y + height - 0.8,
                }),
              ],
              stroke: { width: PENS.fine, colour: INK },
            },
          ];
        }),
        ruleUnder([x, y + height], PENS.fine),
      ],
    };
  });
  return { header, rows: made };
}

/** An empty box to tick, round its middle. */
export const tickBox = ([x, y]: PaperPoint): DrawCommand => ({
  kind: 'path',
  rings: [
    boxRing({
      left: x - TICK_BOX / 2,
      top: y - TICK_BOX / 2,
      right: x + TICK_BOX / 2,
      bottom: y + TICK_BOX / 2,
    }),
  ],
  stroke: { width: PENS.fine, colour: INK },
});
