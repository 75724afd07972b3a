import type { DrawCommand, Layer, PaperBox } from './drawing';
import { boxHeight, boxInset, boxWidth } from './drawing';
import type { FlowedPanel, PanelColumn, PanelRow } from './panel';
import { panelFlowed } from './panel';
import type { Orientation, Paper, PaperName } from './paper';
import { paperOf } from './paper';
import type { PlanInput } from './plan-input';
import type { GroundBounds, PlanView } from './plan-view';
import { viewCentred } from './plan-view';
import { rowBand } from './row-band';
import { scaleFitting } from './scales';
import type { SheetDraft, SheetKind } from './sheet-draft';
import { footStrip, rule } from './sheet-draft';
import { tableBox, tableDrafts, type TableContent, type TableLead } from './table-sheet';
import { TITLE_STRIP_HEIGHT } from './title-strip';

/** A drawing of the ground with a panel of figures beside it or below. */
export interface FiguredContent {
  readonly bounds: GroundBounds;
  /** What further sheets for the panel say before it goes on. */
  readonly head: (width: number) => readonly PanelRow[];
  /** The panel's rows for a column of this width; as high at one scale as at another. They decide the arrangement. */
  readonly rows: (scale: number, width: number) => readonly PanelRow[];
  /** What is drawn, inside the box, and the rows beside it. */
  readonly draw: (
    view: PlanView,
    inside: PaperBox,
  ) => {
    readonly layers: readonly Layer[];
    readonly rows: (width: number) => readonly PanelRow[];
  };
}

/** White space round the ground for a line of dimensions and the corners' letters, mm. */
const DIMENSION_MARGIN = 15;
/** Of a column of the panel, paper mm. */
export const COLUMN_WIDTH = 66;
/** Between a column’s edge and its words, paper mm. */
export const COLUMN_INSET = 3;
/** A portrait sheet's band of columns may take at most this share of the frame where it holds all. */
const GREATEST_BAND = 0.55;
/** The lowest band of columns, mm. */
const LEAST_BAND = 40;
/** A plan that fills less of its paper than this, along both sides, is worth a further sheet for its tables if that enlarges it. */
const WELL_FILLED = 0.5;
/** Where drawing, title and panel stand on a paper, mm. */
export interface Arrangement {
  readonly paper: Paper;
  readonly scale: number;
  readonly drawing: PaperBox;
  readonly title: PaperBox;
  readonly columns: readonly PanelColumn[];
  /** Lines between the parts. */
  readonly rules: readonly DrawCommand[];
  /** All in all, with those that the panel goes on to. */
  readonly sheets: number;
}

/**
 * Of a paper's arrangements: the fewest sheets, or one more where the plan would be small and gains by it; then the
 * largest scale; then lying as the ground does; then the roomiest.
 */
export function bestArrangement(content: FiguredContent, name: PaperName): Arrangement {
  const { bounds } = content;
  const orientations: readonly Orientation[] = ['landscape', 'portrait'];
  const candidates = orientations.flatMap((orientation) => {
    const paper = paperOf(name, orientation);
    return orientation === 'portrait'
      ? portraitArrangements(content, paper)
      : [1, 2].flatMap((columns) => landscapeArrangement(content, paper, columns));
  });
  const room = ({ drawing }: Arrangement) => {
    const size = boundsSize(bounds);
    return Math.min(boxWidth(drawing) / size[0], boxHeight(drawing) / size[1]);
  };
  const [across, up] = boundsSize(bounds);
  const lying = across > up * 1.15 ? 'landscape' : across * 1.15 < up ? 'portrait' : null;
  const against = ({ paper }: Arrangement) => Number(lying !== null && paper.orientation !== lying);
  const ordered = [...candidates].sort(
    (p, q) => p.scale - q.scale || against(p) - against(q) || room(q) - room(p),
  );
  const within = (most: number) => ordered.filter(({ sheets }) => sheets <= most);
  const fewest = Math.min(...ordered.map(({ sheets }) => sheets));
  const [chosen] = within(fewest);
  const { frame } = chosen.paper;
  const filled = Math.max(across / boxWidth(frame), up / boxHeight(frame)) / chosen.scale;
  if (filled >= WELL_FILLED) return chosen;
  const [larger] = within(fewest + 1);
  return larger.scale < chosen.scale ? larger : chosen;
}

const boundsSize = ({ least, greatest }: GroundBounds): readonly [number, number] => [
  greatest[0] - least[0],
  greatest[1] - least[1],
];

function scaleIn(bounds: GroundBounds, box: PaperBox): number {
  const [width, height] = boundsSize(bounds);
  return scaleFitting(
    width,
    height,
    boxWidth(box) - 2 * DIMENSION_MARGIN,
    boxHeight(box) - 2 * DIMENSION_MARGIN,
  );
}

/** Columns of figures at the right, the title strip under the drawing. */
function landscapeArrangement(
  { bounds, head, rows: rowsAt }: FiguredContent,
  paper: Paper,
  count: number,
): readonly Arrangement[] {
  const { frame } = paper;
  const split = frame.right - count * COLUMN_WIDTH;
  if (split - frame.left < 180) return [];
  const titleTop = frame.bottom - TITLE_STRIP_HEIGHT;
  const drawing = { left: frame.left, top: frame.top, right: split, bottom: titleTop };
  const columns = Array.from({ length: count }, (_, n): PanelColumn => ({
    frame: `column ${n + 1}`,
    box: boxInset(
      {
        left: split + n * COLUMN_WIDTH,
        top: frame.top,
        right: split + (n + 1) * COLUMN_WIDTH,
        bottom: frame.bottom,
      },
      COLUMN_INSET,
    ),
  }));
  const scale = scaleIn(bounds, drawing);
  const rows = rowsAt(scale, COLUMN_WIDTH - 2 * COLUMN_INSET);
  return [
    {
      paper,
      scale,
      drawing,
      title: { left: frame.left, top: titleTop, right: split, bottom: frame.bottom },
      columns,
      rules: [
        rule([split, frame.top], [split, frame.bottom]),
        rule([frame.left, titleTop], [split, titleTop]),
      ],
      sheets: panelsFlowed(rows, columns, paper, head).length,
    },
  ];
}

/** A band of columns over a title strip across the foot: high enough for all, and as high as the largest plan leaves. */
function portraitArrangements(
  { bounds, head, rows: rowsAt }: FiguredContent,
  paper: Paper,
): readonly Arrangement[] {
  const { frame } = paper;
  const count = Math.floor(boxWidth(frame) / 58);
  const width = boxWidth(frame) / count;
  const titleTop = frame.bottom - TITLE_STRIP_HEIGHT;
  const columnsFrom = (top: number) =>
    Array.from({ length: count }, (_, n): PanelColumn => ({
      frame: `column ${n + 1}`,
      box: boxInset(
        {
          left: frame.left + n * width,
          top,
          right: frame.left + (n + 1) * width,
          bottom: titleTop,
        },
        COLUMN_INSET,
      ),
    }));
  // The rows are as high at one scale as at another.
  const rows = rowsAt(100, width - 2 * COLUMN_INSET);
  const greatest = boxHeight(frame) * GREATEST_BAND;
  let holding = LEAST_BAND;
  while (holding < greatest && panelFlowed(rows, columnsFrom(titleTop - holding)).rest.length > 0)
    holding += 2;
  const drawingOver = (band: number): PaperBox => ({ ...frame, bottom: titleTop - band });
  const largest = scaleIn(bounds, drawingOver(LEAST_BAND));
  const needed = boundsSize(bounds)[1] / largest + 2 * DIMENSION_MARGIN;
  const leaving = Math.max(LEAST_BAND, Math.floor(titleTop - frame.top - needed));
  return [holding, leaving].map((band) => {
    const columns = columnsFrom(titleTop - band);
    const drawing = drawingOver(band);
    return {
      paper,
      scale: scaleIn(bounds, drawing),
      drawing,
      title: { ...frame, top: titleTop },
      columns,
      rules: [
        rule([frame.left, titleTop - band], [frame.right, titleTop - band]),
        rule([frame.left, titleTop], [frame.right, titleTop]),
      ],
      sheets: panelsFlowed(rows, columns, paper, head).length,
    };
  });
}

type SheetPanel = FlowedPanel & { readonly columns: readonly PanelColumn[] };

/** The panel on the first sheet's columns, and on as many further sheets as it takes. */
export function panelsFlowed(
  rows: readonly PanelRow[],
  columns: readonly PanelColumn[],
  paper: Paper,
  head: FiguredContent['head'],
): readonly SheetPanel[] {
  const first = { ...panelFlowed(rows, columns), columns };
  return [first, ...panelsFurther(first.rest, boxWidth(columns[0].box), paper, head)];
}

/** What is left of a panel, on as many sheets as it takes. */
export function panelsFurther(
  left: readonly PanelRow[],
  width: number,
  paper: Paper,
  head: FiguredContent['head'],
): readonly SheetPanel[] {
  const columns = furtherColumns(paper, width);
  const panels: SheetPanel[] = [];
  for (let rest = left; rest.length > 0;) {
    const next = { ...panelFlowed([...head(width), ...rest], columns), columns };
    if (next.rest.length >= rest.length)
      throw new Error('A row of the panel is higher than a whole sheet.');
    panels.push(next);
    rest = next.rest;
  }
  return panels;
}

/** The sheet by itself, and the rows of its panel that it has no room for. */
export function figuredDraft(
  content: FiguredContent,
  arrangement: Arrangement,
  named: Pick<SheetDraft, 'kinds' | 'type'>,
): { readonly draft: SheetDraft; readonly rest: readonly PanelRow[] } {
  const { paper, scale, drawing, columns, title, rules } = arrangement;
  const inside = boxInset(drawing, 1.5);
  const drawn = content.draw(viewCentred(content.bounds, scale, drawing), inside);
  const panel = panelFlowed(drawn.rows(boxWidth(columns[0].box)), columns);
  const frames = columns.map(({ frame, box }) => [frame, box]);
  return {
    draft: {
      ...named,
      paper,
      scale,
      title,
      frames: { drawing: inside, ...Object.fromEntries(frames) },
      layers: [...drawn.layers, { name: 'panel', commands: panel.commands }],
      rules,
    },
    rest: panel.rest,
  };
}

/** What a panel has no room for, on sheets of its own. */
export function furtherDrafts(
  rest: readonly PanelRow[],
  { head }: FiguredContent,
  { paper, scale, columns }: Arrangement,
  { kinds, type }: Pick<SheetDraft, 'kinds' | 'type'>,
): readonly SheetDraft[] {
  const title = footStrip(paper);
  return panelsFurther(rest, boxWidth(columns[0].box), paper, head).map((panel): SheetDraft => ({
    kinds,
    type: `${type}: tables`,
    paper,
    scale,
    title,
    frames: Object.fromEntries(panel.columns.map(({ frame, box }) => [frame, box])),
    layers: [{ name: 'panel', commands: panel.commands }],
    rules: [rule([title.left, title.top], [title.right, title.top])],
  }));
}

/** Rows of a panel, or of several, that found no room there. */
export interface PanelRest {
  readonly rows: readonly PanelRow[];
  /** The width that they are made for. */
  readonly width: number;
  readonly kinds: readonly SheetKind[];
}

/** What panels had no room for, side by side over a table; null where it would take more than half of the table's first sheet. */
export function restLead(rests: readonly PanelRest[], name: PaperName): TableLead | null {
  const some = rests.filter(({ rows }) => rows.length > 0);
  const box = tableBox(name);
  const row = rowBand(
    some.flatMap(({ rows }) => rows),
    Math.max(...some.map(({ width }) => width)),
    boxWidth(box),
  );
  return row.height <= boxHeight(box) / 2
    ? { row, kinds: some.flatMap(({ kinds }) => kinds) }
    : null;
}

/**
 * The sheet, then its table. What the panel has no room for, and what is left of a sheet `before`, stands over the table where that
 * leaves the table half of its first sheet, and else on sheets of its own. `before` must fit by itself.
 */
export function figuredAndTabled(
  content: FiguredContent,
  table: TableContent,
  type: string,
  input: PlanInput,
  name: PaperName,
  before: PanelRest | null = null,
): readonly SheetDraft[] {
  const named = { kinds: [table.kind], type };
  const arrangement = bestArrangement(content, name);
  const { draft, rest } = figuredDraft(content, arrangement, named);
  const own: PanelRest = { rows: rest, width: boxWidth(arrangement.columns[0].box), ...named };
  const left = [...(before ? [before] : []), ...(rest.length > 0 ? [own] : [])];
  if (left.length === 0) return [draft, ...tableDrafts(table, input, name)];
  const lead = restLead(left, name);
  if (lead) return [draft, ...tableDrafts({ ...table, lead }, input, name)];
  const lone = before && restLead([before], name);
  return [
    draft,
    ...furtherDrafts(rest, content, arrangement, named),
    ...tableDrafts(lone ? { ...table, lead: lone } : table, input, name),
  ];
}

/** Columns over the whole of a further sheet. */
function furtherColumns({ frame }: Paper, columnWidth: number): readonly PanelColumn[] {
  const count = Math.floor(boxWidth(frame) / (columnWidth + 2 * COLUMN_INSET));
  const pitch = boxWidth(frame) / count;
  return Array.from({ length: count }, (_, n) => {
    const left = frame.left + n * pitch + COLUMN_INSET;
    return {
      frame: `column ${n + 1}`,
      box: {
        left,
        top: frame.top + COLUMN_INSET,
        right: left + columnWidth,
        bottom: frame.bottom - TITLE_STRIP_HEIGHT - COLUMN_INSET,
      },
    };
  });
}
