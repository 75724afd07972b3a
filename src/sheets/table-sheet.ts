import type { DrawCommand, PaperBox } from './drawing';
import { boxInset, boxWidth } from './drawing';
import { sheetHead } from './mark-row';
import { panelText, type PanelRow } from './panel';
import type { Paper, PaperName } from './paper';
import { paperOf } from './paper';
import type { PlanInput } from './plan-input';
import type { SheetDraft, SheetKind } from './sheet-draft';
import { footStrip, rule } from './sheet-draft';
import { LETTERING, textFitted } from './text-measure';

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
  readonly lead?: TableLead;
  /** For a table of this width. */
  readonly sections: (width: number) => readonly TableSection[];
}

/** What the panel of a drawing had no room for, side by side. */
export interface TableLead {
  readonly row: PanelRow;
  /** The kinds of sheet that it belongs to. */
  readonly kinds: readonly SheetKind[];
}

const INSET = 3;
/** A table begins on the sheet of the one before where all of it fits there, or where so much of the sheet is left. */
const SHARE_LEFT = 0.35;
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

/** A table over the whole of a sheet, and on to as many as it takes. */
export const tableDrafts = (
  content: TableContent,
  input: PlanInput,
  name: PaperName,
): readonly SheetDraft[] => tablesDrafts([content], input, name);

interface MadeSheet {
  readonly commands: DrawCommand[];
  readonly kinds: Set<SheetKind>;
  readonly types: Set<string>;
}

/** Tables one after another: a table goes on to as many sheets as it takes, and shares them where there is room. */
export function tablesDrafts(
  contents: readonly TableContent[],
  input: PlanInput,
  name: PaperName,
): readonly SheetDraft[] {
  const paper = tablePaper(name);
  const title = footStrip(paper);
  const box = tableBox(name);
  const width = boxWidth(box);
  const whole = box.bottom - box.top;
  const mostTogether = whole * 0.7;
  const sheets: MadeSheet[] = [];
  let y = box.bottom;
  const put = (row: PanelRow) => {
    sheets[sheets.length - 1].commands.push(...row.draw([box.left, y], width, FRAME));
    y += row.height;
  };
  const fits = (height: number) => y + height <= box.bottom;
  const belongs = ({ kind, type }: TableContent) => {
    const { kinds, types } = sheets[sheets.length - 1];
    kinds.add(kind);
    types.add(type);
  };
  const begin = (content: TableContent, header: PanelRow | null) => {
    sheets.push({ commands: [], kinds: new Set(), types: new Set() });
    belongs(content);
    y = box.top;
    sheetHead(content.title, input, width).forEach(put);
    if (header) put(header);
  };
  for (const content of contents) {
    const sections = content.sections(width);
    const lead = content.lead?.row.height ?? 0;
    const heading = tableHeading(content.title, width);
    const all = sections.reduce(
      (sum, { header, rows }) => sum + SECTION_SPACE + (header?.height ?? 0) + rowsHeight(rows),
      SECTION_SPACE + heading.height + lead,
    );
    const opening = sections.length > 0 ? sectionOpening(sections[0]) : 0;
    const needed = 2 * SECTION_SPACE + heading.height + lead + opening;
    const roomy = box.bottom - y >= whole * SHARE_LEFT && fits(needed);
    if (sheets.length > 0 && (fits(all) || roomy)) {
      put(space(SECTION_SPACE));
      put(heading);
      belongs(content);
    } else begin(content, null);
    if (content.lead) {
      content.lead.kinds.forEach((kind) => sheets[sheets.length - 1].kinds.add(kind));
      put(content.lead.row);
    }
    sections.forEach(({ header, rows }, section) => {
      if (section > 0 || content.lead) {
        if (fits(SECTION_SPACE + sectionOpening({ header, rows }))) {
          if (section > 0) put(space(SECTION_SPACE));
          if (header) put(header);
        } else begin(content, header);
      } else if (header) put(header);
      rows.forEach((row, n) => {
        // Rows that belong together go on to the next sheet together, unless no sheet holds them.
        const starts = n === 0 || !rows[n - 1].keepsNext;
        const together = starts ? groupHeight(rows, n) : row.height;
        if (!fits(together > mostTogether ? row.height : together)) begin(content, header);
        put(row);
      });
    });
  }
  return sheets.map(({ commands, kinds, types }): SheetDraft => ({
    kinds: [...kinds],
    type: [...types]
      .map((type, n) => (n === 0 ? type : type[0].toLowerCase() + type.slice(1)))
      .join(', '),
    paper,
    scale: null,
    frames: { [FRAME]: box },
    layers: [{ name: 'table', commands }],
    title,
    rules: [rule([title.left, title.top], [title.right, title.top])],
  }));
}

const rowsHeight = (rows: readonly PanelRow[]) => rows.reduce((sum, row) => sum + row.height, 0);

/** Of its header and what stands under it at the least. */
const sectionOpening = ({ header, rows }: TableSection) =>
  (header?.height ?? 0) + (rows.length > 0 ? groupHeight(rows, 0) : 0);

const HEADING_HEIGHT = 10;

/** The title of a table that begins on the sheet of another. */
function tableHeading(title: string, width: number): PanelRow {
  const fitted = textFitted(title, width, LETTERING.large, 700);
  return {
    height: HEADING_HEIGHT,
    keepsNext: 'needed',
    draw: ([x, y], _width, frame) => [
      panelText([x, y + 6.8], fitted, frame, { height: LETTERING.large, weight: 700 }),
    ],
  };
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
