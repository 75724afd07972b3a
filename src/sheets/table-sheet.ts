import type { DrawCommand, PaperBox } from './drawing';
import { boxInset, boxWidth } from './drawing';
import { sheetHead } from './mark-row';
import type { PanelRow } from './panel';
import type { Paper, PaperName } from './paper';
import { paperOf } from './paper';
import type { PlanInput } from './plan-input';
import type { SheetDraft, SheetKind } from './sheet-draft';
import { footStrip, rule } from './sheet-draft';

/** Rows under a header that every sheet repeats. */
export interface TableSection {
  readonly header: PanelRow | null;
  readonly rows: readonly PanelRow[];
}

/** What a sheet of tables holds. */
export interface TableContent {
  readonly kind: SheetKind;
  readonly type: string;
  /** At the head of every sheet. */
  readonly title: string;
  /** Stands over the table on its first sheet; at most half as high as that. */
  readonly lead?: PanelRow;
  /** For a table of this width. */
  readonly sections: (width: number) => readonly TableSection[];
}

const INSET = 3;
const SECTION_SPACE = 3;
const FRAME = 'table';

/** Small paper lies, large paper stands: either way a table is about 250 mm wide. */
const tablePaper = (name: PaperName): Paper =>
  paperOf(name, name === 'A4' || name === 'Letter' ? 'landscape' : 'portrait');

const space = (height: number): PanelRow => ({ height, draw: () => [] });

/** Where a table of this paper stands. */
export function tableBox(name: PaperName): PaperBox {
  const paper = tablePaper(name);
  return boxInset({ ...paper.frame, bottom: footStrip(paper).top }, INSET);
}

/** Tables over the whole of a sheet, and on to as many as they take. */
export function tableDrafts(
  content: TableContent,
  input: PlanInput,
  name: PaperName,
): readonly SheetDraft[] {
  const paper = tablePaper(name);
  const title = footStrip(paper);
  const box = tableBox(name);
  const width = boxWidth(box);
  const mostTogether = (box.bottom - box.top) * 0.7;
  const sheets: DrawCommand[][] = [];
  let y = box.bottom;
  const put = (row: PanelRow) => {
    sheets[sheets.length - 1].push(...row.draw([box.left, y], width, FRAME));
    y += row.height;
  };
  const begin = (header: PanelRow | null) => {
    sheets.push([]);
    y = box.top;
    sheetHead(content.title, input, width).forEach(put);
    if (sheets.length === 1 && content.lead) put(content.lead);
    if (header) put(header);
  };
  content.sections(width).forEach(({ header, rows }, section) => {
    const fits = (height: number) => sheets.length > 0 && y + height <= box.bottom;
    const first = (header?.height ?? 0) + groupHeight(rows, 0);
    if (!fits(first + SECTION_SPACE)) begin(header);
    else {
      if (section > 0) put(space(SECTION_SPACE));
      if (header) put(header);
    }
    rows.forEach((row, n) => {
      // Rows that belong together go on to the next sheet together, unless no sheet holds them.
      const starts = n === 0 || !rows[n - 1].keepsNext;
      const together = starts ? groupHeight(rows, n) : row.height;
      if (!fits(together > mostTogether ? row.height : together)) begin(header);
      put(row);
    });
  });
  return sheets.map((commands): SheetDraft => ({
    kind: content.kind,
    type: content.type,
    paper,
    scale: null,
    frames: { [FRAME]: box },
    layers: [{ name: 'table', commands }],
    title,
    rules: [rule([title.left, title.top], [title.right, title.top])],
  }));
}

/** Of the row at `first` and those that it keeps. */
function groupHeight(rows: readonly PanelRow[], first: number): number {
  let height = 0;
  for (let n = first; n < rows.length; n += 1) {
    height += rows[n].height;
    if (!rows[n].keepsNext) break;
  }
  return height;
}
