import type { ControlPoint, TapeCross } from '@/paving/set-out/set-out-types';
import type { DrawCommand, PaperBox } from './drawing';
import { PENS, boxRing } from './drawing';
import type { FiguredContent, PanelRest } from './figured-sheet';
import { figuredAndTabled } from './figured-sheet';
import { figuredText } from '@/paving/figured-words';
import { TAPE_READING_MM } from '@/paving/set-out/tape-cross';
import { figureText, lengthText } from './figures';
import { INK, PAPER } from './inks';
import { markRows } from './mark-row';
import type { PanelRow } from './panel';
import { headingRow, itemRow, keptTogether, pairRow, sampleRow, textRows } from './panel';
import type { PaperName } from './paper';
import { pointsBounds } from './plan-view';
import type { TableCell, TableColumn } from './ruled-table';
import { ruledTable } from './ruled-table';
import { scaleBarRow } from './scale-bar';
import { scaleName } from './scales';
import { BASELINE_STROKE, STRING_STROKE, pointMark, setOutDrawing } from './set-out-drawing';
import type { SetOutInput } from './set-out-input';
import { baselineName } from './set-out-input';
import type { SheetDraft } from './sheet-draft';
import type { TableContent } from './table-sheet';

/** Control: where the tapes hook on and every point by two tapes, by offsets and by coordinates; over the table what the sheet `before` had no room for. */
export function controlDrafts(
  input: SetOutInput,
  paper: PaperName,
  before: PanelRest | null,
): readonly SheetDraft[] {
  const { laying, setOut } = input;
  const content: FiguredContent = {
    bounds: pointsBounds(laying.ground.rings[0].edges.flatMap((edge) => edge.chords)),
    head: (width) => markRows(input, width),
    rows: (scale, width) => controlRows(input, scale, width),
    draw: (view, frame) => ({
      layers: setOutDrawing(laying, setOut, view, { figures: 'points', frame }),
      rows: (width) => controlRows(input, view.scale, width),
    }),
  };
  const table: TableContent = {
    kind: 'control',
    type: 'Control points: table',
    title: `Control points${laying.document.display === 'metric' ? ', in mm' : ''}`,
    sections: (width) => [controlTable(input, width)],
  };
  return figuredAndTabled(content, table, 'Control points', input, paper, before);
}

function controlRows(input: SetOutInput, scale: number, width: number): readonly PanelRow[] {
  const { setOut, laying } = input;
  const { display } = laying.document;
  const [from, to] = setOut.datums;
  const line = baselineName(setOut);
  return [
    ...markRows(input, width),
    headingRow('Datums', width),
    ...keptTogether(
      textRows(
        `Hook the tapes on corners ${from.name} and ${to.name}, ${lengthText(setOut.baseline.length, display)} apart. They stay where they are until the last unit is down.`,
        width,
      ),
    ),
    ...(setOut.diagonals.length === 0
      ? []
      : [
          headingRow('Measure first', width),
          ...setOut.diagonals.map(({ from: one, to: other, length, sameAs }) =>
            pairRow(
              `${one} to ${other}${sameAs ? `, as ${sameAs.join(' to ')}` : ''}`,
              lengthText(length, display),
              width,
            ),
          ),
        ]),
    headingRow('How to set a point', width),
    itemRow(
      `By tapes: one on ${from.name}, one on ${to.name}. The point is where both read as listed, on the side listed as you look from ${from.name} to ${to.name}.`,
      width,
    ),
    itemRow(
      `By offsets: along ${line} from ${from.name} (minus: behind it), then square to it, to the left (minus: to the right).`,
      width,
    ),
    itemRow(
      `“Out by” is how far off a point may come to lie when each tape is read to ±${lengthText(TAPE_READING_MM, display)}.`,
      width,
    ),
    headingRow(`Key, scale ${scaleName(scale)}`, width),
    ...keyRows(input, width),
    scaleBarRow(scale, display, width),
    ...(setOut.advice.length === 0
      ? []
      : [
          headingRow('Before you start', width),
          ...setOut.advice.map(({ text }) =>
            itemRow(figuredText(text, display, lengthText), width),
          ),
        ]),
    ...keptTogether(
      [
        headingRow('Take care', width),
        itemRow('Have buried services marked before you drive a peg: call before you dig.', width),
        itemRow('Figures rule over what is scaled off the drawing.', width),
      ],
      'wished',
    ),
  ];
}

function keyRows({ setOut }: SetOutInput, width: number): readonly PanelRow[] {
  const middleOf = (box: PaperBox) => [(box.left + box.right) / 2, (box.top + box.bottom) / 2];
  const line =
    (stroke: typeof STRING_STROKE) =>
    (box: PaperBox): readonly DrawCommand[] => {
      const y = middleOf(box)[1];
      return [{ kind: 'line', from: [box.left, y], to: [box.right, y], stroke }];
    };
  const mark = (point: Pick<ControlPoint, 'by' | 'kind'>) => (box: PaperBox) => [
    pointMark(point as ControlPoint, middleOf(box) as [number, number]),
  ];
  return [
    sampleRow(mark({ by: 'datum', kind: 'corner' }), 'Datum: a fixed corner', width),
    sampleRow(mark({ by: 'tapes', kind: 'corner' }), 'Point to peg', width),
    ...(setOut.firstUnit
      ? [
          sampleRow(
            (box) => [
              {
                kind: 'path',
                rings: [boxRing(box)],
                fill: PAPER,
                stroke: { width: PENS.thick, colour: INK },
              },
            ],
            'First unit, its corners U1 to U4',
            width,
          ),
        ]
      : []),
    sampleRow(line(BASELINE_STROKE), `Baseline ${baselineName(setOut)}`, width),
    ...(setOut.courses.length > 0
      ? [sampleRow(line(STRING_STROKE), 'String of a course', width)]
      : []),
  ];
}

const SIDES = { left: 'left', right: 'right', on: 'on line' } as const;

function controlTable({ setOut, laying }: SetOutInput, width: number) {
  const { display } = laying.document;
  const [from, to] = setOut.datums;
  const columns: readonly TableColumn[] = [
    { title: 'Point', align: 'start', weight: 600 },
    { title: 'What it is', align: 'start', grow: 1 },
    { title: `Tape from ${from.name}`, align: 'end', weight: 600 },
    { title: `Tape from ${to.name}`, align: 'end', weight: 600 },
    { title: 'Side', align: 'start' },
    { title: 'Meet at', align: 'end' },
    { title: 'Out by', align: 'end' },
    { title: 'Along', align: 'end' },
    { title: 'Square', align: 'end' },
    { title: 'x', align: 'end' },
    { title: 'y', align: 'end' },
    { title: 'Set', align: 'middle' },
  ];
  const figure = (mm: number) => figureText(mm, display);
  const rows = setOut.points.map((point): readonly TableCell[] => [
    point.name,
    figuredText(point.what, display, lengthText),
    ...tapeCells(point, figure),
    figure(point.along),
    figure(point.square),
    figure(point.at[0]),
    figure(point.at[1]),
    { tick: true },
  ]);
  const table = ruledTable(columns, rows, width);
  return { header: table.header, rows: table.rows };
}

/** Both tapes, the side, the angle and the uncertainty; of a second pair the corners it is taped from. */
function tapeCells(point: ControlPoint, figure: (mm: number) => string): readonly string[] {
  const cells = (cross: TapeCross, names: readonly [string, string] | null) => [
    ...cross.tapes.map((tape, n) => (names ? `${names[n]}: ${figure(tape)}` : figure(tape))),
    SIDES[cross.side],
    `${Math.round(cross.crossingDeg)}°`,
    cross.uncertainty === null ? '–' : `±${figure(Math.max(1, Math.ceil(cross.uncertainty)))}`,
  ];
  switch (point.by) {
    case 'datum':
      return ['datum', 'datum', '–', '–', '–'];
    case 'tapes':
      return cells(point, null);
    case 'second-pair': {
      const [one, other] = point.secondPair!.datums;
      return cells(point.secondPair!, [one.name, other.name]);
    }
    case 'offsets':
      return ['offsets', 'offsets', '–', '–', '–'];
  }
}
