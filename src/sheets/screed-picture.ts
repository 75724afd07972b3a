import { groundRing } from '@/paving/ground';
import type { LayoutDocument } from '@/paving/layout-document';
import { screedBoard, type ScreedBoard, type ScreedRun } from '@/takeoff/screed-board';
import type { DrawCommand, PaperBox, PaperPoint } from './drawing';
import { PENS, boxHeight, boxInset, boxRing, boxWidth } from './drawing';
import { figureText } from './figures';
import { AGGREGATE_COLOUR, INK, PAPER, SECOND_INK, inkMix } from './inks';
import { hatch } from './layer-section';
import { panelText } from './panel';
import { paperFromGround, paperRing, pointsBounds, viewCentred, type PlanView } from './plan-view';
import { LETTERING, textFitted, textWidth } from './text-measure';

/** Share of the box's width for the small plan. */
const PLAN_SHARE = 0.3;
/** Of the bedding under the board, paper mm. */
const BEDDING = 4.5;

/**
 * The screed board and how it is used: beside a small plan with its strips and the way that it is pulled,
 * the board as seen along the pull, hung between what carries its ears. The board is not to scale.
 */
export function screedPicture(
  document: LayoutDocument,
  box: PaperBox,
  frame: string,
): readonly DrawCommand[] {
  const board = screedBoard(document);
  const planRight = box.left + boxWidth(box) * PLAN_SHARE;
  return [
    ...stripPlan(document, board, { ...box, right: planRight - 2 }),
    ...boardElevation(board, document.display, { ...box, left: planRight + 2 }, frame),
  ];
}

const line = (from: PaperPoint, to: PaperPoint, width: number, dash?: number[]): DrawCommand => ({
  kind: 'line',
  from,
  to,
  stroke: { width, colour: INK, ...(dash ? { dash } : {}) },
});

/** The outline, its strips, and in each the board and an arrow along the pull. */
function stripPlan(document: LayoutDocument, { limbs }: ScreedBoard, box: PaperBox): DrawCommand[] {
  const { edges, outline } = groundRing(document.ground.perimeter, 0, null);
  const bounds = pointsBounds(outline);
  const inner = boxInset(box, 1);
  const scale = Math.max(
    (bounds.greatest[0] - bounds.least[0]) / boxWidth(inner),
    (bounds.greatest[1] - bounds.least[1]) / boxHeight(inner),
  );
  const view = viewCentred(bounds, scale, inner);
  return [
    {
      kind: 'path',
      rings: [paperRing(view, edges)],
      fill: inkMix(PAPER, INK, 0.06),
      stroke: { width: PENS.medium, colour: INK },
    },
    ...limbs.flatMap((run) => runStrips(run, view, limbs.length > 1)),
  ];
}

/** The strips of one limb; where there are several each is outlined. */
function runStrips(
  { outline, pullDeg, passes }: ScreedRun,
  view: PlanView,
  outlined: boolean,
): DrawCommand[] {
  const radians = (pullDeg * Math.PI) / 180;
  const along: PaperPoint = [Math.cos(radians), -Math.sin(radians)];
  const across: PaperPoint = [Math.sin(radians), Math.cos(radians)];
  const paper = outline.map((point) => paperFromGround(view, point));
  const span = ([dx, dy]: PaperPoint) => {
    const measured = paper.map(([x, y]) => x * dx + y * dy);
    return [Math.min(...measured), Math.max(...measured)] as const;
  };
  const [from, to] = span(along);
  const [low, high] = span(across);
  const at = (s: number, t: number): PaperPoint => [
    s * along[0] + t * across[0],
    s * along[1] + t * across[1],
  ];
  const bay = (high - low) / passes;
  const commands: DrawCommand[] = outlined
    ? [
        {
          kind: 'path',
          rings: [{ points: paper, closed: true }],
          stroke: { width: PENS.fine, colour: INK, dash: [1.6, 1] },
        },
      ]
    : [];
  const turned = paper.map(([x, y]): PaperPoint => [
    x * along[0] + y * along[1],
    x * across[0] + y * across[1],
  ]);
  for (let n = 1; n < passes; n++)
    for (const [s0, s1] of stretchesAt(turned, low + n * bay))
      commands.push(line(at(s0, low + n * bay), at(s1, low + n * bay), PENS.fine, [1.6, 1]));
  for (let n = 0; n < passes; n++) {
    const middle = low + (n + 0.5) * bay;
    const [s0, s1] = longestStretch(stretchesAt(turned, middle)) ?? [from, to];
    const [start, end] = [s0 + (s1 - s0) * 0.2, s0 + (s1 - s0) * 0.85];
    commands.push(
      line(at(start, middle - bay * 0.42), at(start, middle + bay * 0.42), PENS.thick),
      line(at(start, middle), at(end, middle), PENS.thin),
      {
        kind: 'path',
        rings: [
          {
            points: [at(end, middle), at(end - 1.8, middle - 0.7), at(end - 1.8, middle + 0.7)],
            closed: true,
          },
        ],
        fill: INK,
      },
    );
  }
  return commands;
}

type Stretch = readonly [from: number, to: number];

/** Where the line at `across` runs within an outline whose points are along and across. */
function stretchesAt(outline: readonly PaperPoint[], across: number): readonly Stretch[] {
  const crossings = outline
    .flatMap(([s0, t0], n): number[] => {
      const [s1, t1] = outline[(n + 1) % outline.length];
      return t0 < across === t1 < across ? [] : [s0 + ((across - t0) / (t1 - t0)) * (s1 - s0)];
    })
    .sort((one, other) => one - other);
  return crossings.flatMap((from, n): Stretch[] => (n % 2 === 0 ? [[from, crossings[n + 1]]] : []));
}

const longestStretch = (stretches: readonly Stretch[]): Stretch | undefined =>
  [...stretches].sort((one, other) => other[1] - other[0] - (one[1] - one[0]))[0];

/** The board from the front, between edges or rails, figured. */
function boardElevation(
  board: ScreedBoard,
  display: LayoutDocument['display'],
  box: PaperBox,
  frame: string,
): DrawCommand[] {
  const figure = (mm: number) => figureText(mm, display);
  const carrierName = board.rides === 'edge' ? 'edge' : 'rail';
  const carrier = Math.min(9, boxWidth(box) * 0.12);
  const [left, right] = [box.left + carrier, box.right - carrier];
  const row = LETTERING.small + 2.2;
  const plank = Math.min(7, Math.max(4, boxHeight(box) * 0.14));
  const hang = Math.min(8, Math.max(5, boxHeight(box) * 0.16));
  const whole = 3 * row + 2.4 + plank + hang + BEDDING;
  const ears = box.top + Math.max(0, (boxHeight(box) - whole) / 2) + row + 1.6 + plank;
  const lower = ears + hang;
  const foot = lower + BEDDING;
  const cut = (right - left) * 0.09;
  const [boardLeft, boardRight] = [left + cut, right - cut];
  const [earLeft, earRight] = [left - carrier * 0.75, right + carrier * 0.75];
  const commands: DrawCommand[] = [];
  const filled = (area: PaperBox, fill: string, width: number = PENS.medium) =>
    commands.push({ kind: 'path', rings: [boxRing(area)], fill, stroke: { width, colour: INK } });

  filled(
    { left, top: lower, right, bottom: foot },
    inkMix(PAPER, AGGREGATE_COLOUR, 0.5),
    PENS.thin,
  );
  for (const [outer, rail] of [
    [box.left, left - carrier * 0.3],
    [right, right + carrier * 0.3],
  ]) {
    const area = { left: outer, top: ears, right: outer + carrier, bottom: foot };
    if (board.rides === 'rails') {
      const stroke = { width: PENS.medium, colour: INK };
      commands.push(...hatch({ ...area, top: ears + 3.4 }, 1.3, SECOND_INK), {
        kind: 'circle',
        centre: [rail, ears + 1.7],
        radius: 1.7,
        fill: PAPER,
        stroke,
      });
    } else {
      filled(area, PAPER);
      commands.push(...hatch(area, 1.1, INK));
    }
  }
  // The board: an upper piece with its ears, and the lower edge that hangs between.
  const outline: PaperPoint[] = [
    [earLeft, ears - plank],
    [earRight, ears - plank],
    [earRight, ears],
    [boardRight, ears],
    [boardRight, lower],
    [boardLeft, lower],
    [boardLeft, ears],
    [earLeft, ears],
  ];
  commands.push({
    kind: 'path',
    rings: [{ points: outline, closed: true }],
    fill: inkMix(PAPER, INK, 0.04),
    stroke: { width: PENS.medium, colour: INK },
  });

  const tick = ([x, y]: PaperPoint) => line([x - 0.8, y + 0.8], [x + 0.8, y - 0.8], PENS.fine);
  const dimension = (from: number, to: number, y: number, text: string) => {
    const half = textWidth(text, LETTERING.small) / 2;
    const middle = Math.min(Math.max((from + to) / 2, box.left + half), box.right - half);
    commands.push(line([from, y], [to, y], PENS.fine), tick([from, y]), tick([to, y]));
    commands.push(panelText([middle, y - 0.8], text, frame, { anchor: 'middle' }));
  };
  dimension(earLeft, earRight, ears - plank - 1.4, `${figure(board.earsLength)} over the ears`);
  const first = foot + row;
  for (const x of [boardLeft, boardRight])
    commands.push(line([x, lower], [x, first + 0.8], PENS.fine));
  dimension(boardLeft, boardRight, first, `${figure(board.boardLength)} lower edge`);
  if (textWidth(carrierName, LETTERING.small) < carrier - 0.6)
    for (const x of [box.left + carrier / 2, right + carrier / 2])
      commands.push(panelText([x, first - 0.8], carrierName, frame, { anchor: 'middle' }));
  for (const x of [left, right]) commands.push(line([x, foot], [x, first + row + 0.8], PENS.fine));
  dimension(left, right, first + row, `${figure(board.bayWidth)} clear`);

  // How far the lower edge hangs, within the board.
  const x = boardLeft + (boardRight - boardLeft) * 0.06;
  const text = textFitted(
    `${figureText(board.depth, display, 1)} below the ears`,
    boardRight - x - 2,
    LETTERING.small,
  );
  commands.push(line([x, ears], [x, lower], PENS.fine), tick([x, ears]), tick([x, lower]));
  commands.push(line([boardLeft, ears], [boardRight, ears], PENS.fine, [0.8, 0.6]));
  commands.push(panelText([x + 1.6, (ears + lower) / 2 + LETTERING.small / 2], text, frame));
  return commands;
}
