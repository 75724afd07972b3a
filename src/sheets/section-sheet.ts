import { arcIsStraight } from '@/geometry/arc';
import { documentEdgeName } from '@/paving/edge-names';
import type { Laying } from '@/paving/laying';
import type { Fall } from '@/paving/levels';
import { documentLevels } from '@/paving/levels';
import { pegLevels } from '@/takeoff/peg-levels';
import { screedBoard } from '@/takeoff/screed-board';
import { floorCautions } from './cautions';
import type { PaperBox } from './drawing';
import { boxInset } from './drawing';
import { COLUMN_INSET, COLUMN_WIDTH, panelsFurther, restLead } from './figured-sheet';
import { formatCount } from '@/paving/count';
import { figureText, lengthText } from './figures';
import { layerSection } from './layer-section';
import { levelsDraft } from './levels-sheet';
import { markRows } from './mark-row';
import type { PanelColumn, PanelRow } from './panel';
import {
  headingRow,
  itemRow,
  keptTogether,
  pairRow,
  panelFlowed,
  panelText,
  textRows,
} from './panel';
import type { PaperName } from './paper';
import { paperOf } from './paper';
import type { PlanInput } from './plan-input';
import type { TableColumn } from './ruled-table';
import { ruledTable } from './ruled-table';
import { scaleName } from './scales';
import { screedPicture } from './screed-picture';
import type { SheetDraft } from './sheet-draft';
import { footStrip, rule } from './sheet-draft';
import type { TableContent } from './table-sheet';
import { LETTERING } from './text-measure';

/** Most of the drawing's height that the section takes; the screed board has the rest. */
const SECTION_SHARE = 0.56;
const FRAME = 'section';
const BOARD_TITLE =
  'Screed board: how it is pulled, and the board as you look along its pull (not to scale)';

/** The drawings, and the tables that go with them. */
export interface SectionSheets {
  readonly drafts: readonly SheetDraft[];
  readonly tables: readonly TableContent[];
}

/** Section: the build-up figured, the screed board, and where levels are entered the level map and levels at pegs. */
export function sectionDrafts(input: PlanInput, name: PaperName): SectionSheets {
  const { document } = input.laying;
  const paper = paperOf(name, 'landscape');
  const title = footStrip(paper);
  const split = paper.frame.right - COLUMN_WIDTH;
  const drawing: PaperBox = boxInset({ ...paper.frame, right: split, bottom: title.top }, 3);
  const high = (drawing.bottom - drawing.top) * SECTION_SHARE;
  const section = layerSection(
    document,
    { ...drawing, bottom: drawing.top + high },
    FRAME,
    'sheet',
  );
  const { scale } = section;
  const columns: readonly PanelColumn[] = [
    {
      frame: 'column 1',
      box: boxInset(
        { left: split, top: paper.frame.top, right: paper.frame.right, bottom: title.top },
        COLUMN_INSET,
      ),
    },
  ];
  const width = COLUMN_WIDTH - 2 * COLUMN_INSET;
  const panel = panelFlowed(sectionRows(input, scale, width), columns);
  const levels = levelsDraft(input, name);
  const rests = [
    { rows: panel.rest, width, kinds: ['section' as const] },
    ...(levels ? [levels.rest] : []),
  ].filter(({ rows }) => rows.length > 0);
  const lead = rests.length > 0 ? restLead(rests, name) : null;
  const pegs = pegTable(input);
  const board = { ...drawing, top: drawing.top + high + 4 };
  const rules = [rule([title.left, title.top], [title.right, title.top])];
  const common = { kinds: ['section' as const], paper, title, scale };
  const drafts: readonly SheetDraft[] = [
    {
      ...common,
      type: 'Section',
      frames: { section: drawing, 'column 1': columns[0].box },
      layers: [
        {
          name: 'section',
          commands: section.commands,
        },
        {
          name: 'screed board',
          commands: [
            panelText([board.left, board.top + LETTERING.small], BOARD_TITLE, FRAME, {
              weight: 700,
            }),
            ...screedPicture(document, { ...board, top: board.top + 5 }, FRAME),
          ],
        },
        { name: 'panel', commands: panel.commands },
      ],
      rules: [...rules, rule([split, paper.frame.top], [split, title.top])],
    },
    // Rests too long to stand over a table have sheets of their own.
    ...(lead || panel.rest.length === 0
      ? []
      : panelsFurther(panel.rest, width, paper, (column) => markRows(input, column)).map(
          ({ commands, columns: used }): SheetDraft => ({
            ...common,
            type: 'Section: tables',
            frames: Object.fromEntries(used.map(({ frame, box }) => [frame, box])),
            layers: [{ name: 'panel', commands }],
            rules,
          }),
        )),
    ...(levels ? [levels.draft, ...(lead ? [] : levels.further())] : []),
  ];
  if (pegs) return { drafts, tables: [lead ? { ...pegs, lead } : pegs] };
  const alone: TableContent | null = lead && {
    kind: 'section',
    type: 'Section: tables',
    title: levels ? 'Section and levels' : 'Section',
    lead,
    sections: () => [],
  };
  return { drafts, tables: alone ? [alone] : [] };
}

function sectionRows(input: PlanInput, scale: number, width: number): readonly PanelRow[] {
  const { document } = input.laying;
  const { display, buildUp } = document;
  const { finish, fall, proud } = documentLevels(document);
  const board = screedBoard(document);
  const length = (mm: number) => lengthText(mm, display, 1);
  const pair = (words: string, value: string) => pairRow(words, value, width);
  const unknown = 'not entered yet';
  return [
    ...markRows(input, width),
    headingRow(`Build-up, section ${scaleName(scale)}`, width),
    ...document.units
      .filter(({ id }) => (input.report.byUnit[id] ?? 0) > 0)
      .map(({ name, thickness }) => pair(name, length(thickness))),
    pair('Bedding', buildUp ? length(buildUp.bedding) : unknown),
    pair('Base', buildUp ? length(buildUp.base) : unknown),
    pair('Geotextile', buildUp ? (buildUp.geotextile ? 'yes' : 'none') : unknown),
    ...(buildUp ? [pair('Dig beyond the edge', length(buildUp.overdig))] : []),
    headingRow('Finish', width),
    ...(document.levels
      ? [
          ...textRows(`${finishWords(finish, display)} ${fallWords(fall)}`, width),
          ...(proud > 0
            ? textRows(`Lay the units ${length(proud)} proud: compaction takes them down.`, width)
            : []),
        ]
      : textRows('Levels are not entered yet: drawn flat, flush with the edge.', width)),
    headingRow('Screed board', width),
    ...board.limbs.flatMap((run, n) => [
      ...(board.limbs.length > 1 ? [pair('Limb', `${n + 1} of ${board.limbs.length}`)] : []),
      pair('Pulled', pullWords(input.laying, run.pullDeg)),
      pair(
        run.passes > 1 ? `Clear, each of ${formatCount(run.passes)} strips` : 'Clear width',
        length(run.bayWidth),
      ),
      pair('Board', length(run.boardLength)),
    ]),
    pair('Lower edge below the ears', length(board.depth)),
    pair('Rides on', board.rides === 'edge' ? 'the edge' : 'rails at the finish'),
    ...(board.rails > 0 ? [pair('Rails to set', formatCount(board.rails))] : []),
    ...keptTogether(
      [
        headingRow('Take care', width),
        ...floorCautions(document, input.report)
          .filter((text) => /dig|compactor|Frost|Figures/i.test(text))
          .map((text) => itemRow(text, width)),
      ],
      'wished',
    ),
  ];
}

function finishWords(finish: number, display: 'metric' | 'imperial'): string {
  if (Math.abs(finish) < 0.05) return 'Flush with the top of the edge.';
  const off = lengthText(Math.abs(finish), display, 1);
  return `${off} ${finish < 0 ? 'below' : 'above'} the top of the edge where it is highest.`;
}

/** Directions of the plan as it is drawn: y is up. */
function fallWords(fall: Fall): string {
  const percent = 'percent' in fall ? `${Math.round(fall.percent * 100) / 100}\u2009%` : '';
  switch (fall.kind) {
    case 'none':
      return 'No fall: level all over.';
    case 'oneWay':
      return `Falls ${percent} one way, ${fallsTo(fall.direction)} on the plan.`;
    case 'toPoint':
      return `Falls ${percent} from all sides to one point.`;
    case 'toLine':
      return `Falls ${percent} from both sides to a line.`;
  }
}

/** `to the right`, `upwards` …, or the angle from the plan's foot. */
function fallsTo(degrees: number): string {
  const angle = Number((((degrees % 360) + 360) % 360).toFixed(1));
  const ways: Readonly<Record<number, string>> = {
    0: 'to the right',
    90: 'upwards',
    180: 'to the left',
    270: 'downwards',
  };
  return ways[angle] ?? `${angle}° anticlockwise from the right`;
}

/** An edge runs the board's way when its ends are no further out of it than this, mm. */
const ALONG_MM = 1;

/** `along AB` where a straight edge runs that way; else by the plan as it is drawn. A board is pulled either way. */
function pullWords({ ground, document }: Laying, degrees: number): string {
  const radians = (degrees * Math.PI) / 180;
  const along = ground.rings[0].edges
    .filter(
      ({ start, end, bulge }) =>
        arcIsStraight(start, end, bulge) &&
        Math.abs(
          (end[0] - start[0]) * Math.sin(radians) - (end[1] - start[1]) * Math.cos(radians),
        ) < ALONG_MM,
    )
    .sort((one, other) => other.length - one.length);
  if (along.length > 0) return `along ${documentEdgeName(document, 0, along[0].edge)}`;
  const angle = Number((90 - ((((90 - degrees) % 180) + 180) % 180)).toFixed(1));
  if (angle === 0) return 'left to right';
  if (Math.abs(angle) === 90) return 'bottom to top';
  return `${Math.abs(angle)}° ${angle > 0 ? 'anticlockwise' : 'clockwise'} from left to right`;
}

/** Levels at pegs, where there are levels and a build-up to reckon them from. */
function pegTable(input: PlanInput): TableContent | null {
  const { document } = input.laying;
  const { display } = document;
  if (!document.levels || !document.buildUp) return null;
  const pegs = pegLevels(document);
  const existing = pegs.some((peg) => peg.existing !== null);
  const columns: readonly TableColumn[] = [
    { title: 'Peg', align: 'start', weight: 600 },
    { title: 'Where', align: 'start', grow: 1 },
    { title: 'Finish', align: 'end', weight: 600 },
    { title: 'Units as laid', align: 'end' },
    { title: 'Bedding screeded', align: 'end' },
    { title: 'Base', align: 'end' },
    { title: 'Bottom of dig', align: 'end', weight: 600 },
    ...(existing
      ? [
          { title: 'Ground now', align: 'end' as const },
          { title: 'Dig', align: 'end' as const },
        ]
      : []),
    { title: 'Measured', align: 'middle' },
  ];
  const figure = (mm: number | null) => (mm === null ? '–' : figureText(mm, display));
  const where = { corner: 'corner of the edge', low: 'lowest', high: 'highest' } as const;
  const rows = pegs.map((peg) => [
    peg.name,
    where[peg.kind],
    figure(peg.finish),
    figure(peg.laid),
    figure(peg.screeded),
    figure(peg.base),
    figure(peg.formation),
    ...(existing ? [figure(peg.existing), figure(peg.dig)] : []),
    { write: true } as const,
  ]);
  return {
    kind: 'section',
    type: 'Levels at pegs',
    title: `Levels at pegs, above the edge’s top${display === 'metric' ? ', in mm' : ''}`,
    sections: (width) => [ruledTable(columns, rows, width)],
  };
}
