import type { Point } from '@/geometry/point';
import type { Segment } from '@/geometry/region-segments';
import type { LayoutDocument } from '@/paving/layout-document';
import { documentLevels } from '@/paving/levels';
import type { EarthModel } from '@/takeoff/earth-cells';
import { levelMap, type LevelMap } from '@/takeoff/level-map';
import { spotName } from '@/takeoff/level-warnings';
import { pegLevels } from '@/takeoff/peg-levels';
import type { DrawCommand, PaperBox, PaperPoint, Stroke } from './drawing';
import { PENS, boxRing } from './drawing';
import { arrowCommands, fallArrows } from './fall-arrows';
import { levelFigureText } from './figures';
import { INK, PAPER, SECOND_INK } from './inks';
import { isFree, withLabels, type LabelSpace } from './label-space';
import { panelText } from './panel';
import { paperFromGround, paperRing, type PlanView } from './plan-view';
import { LETTERING, lineCorners, sheetText, textWidth } from './text-measure';

/** The level map's own pens: black alone tells everything apart. */
const MAP_STROKES = {
  cut: { width: PENS.fine, colour: SECOND_INK },
  fill: { width: PENS.fine, colour: INK },
  contour: { width: PENS.thin, colour: INK },
  meeting: { width: PENS.thick, colour: INK },
  rim: { width: PENS.fine, colour: SECOND_INK, dash: [2, 1.2] },
} as const satisfies Record<string, Stroke>;

/** Of a spot's ring, paper mm. */
const SPOT_RADIUS = 0.8;

/** The level map as commands. */
export interface LevelMapPicture {
  readonly commands: readonly DrawCommand[];
  /** Figures of pegs and spots that found no room; a contour's neighbours tell its level. */
  readonly unfigured: readonly string[];
}

/**
 * The level map: ground and keep-outs, hatching of cut and of fill, contours of the existing ground with their
 * levels, the line where nothing is dug or filled, spots, the fall, and pegs with the finish. Levels are over the datum.
 */
export function levelMapDrawing(
  document: LayoutDocument,
  model: EarthModel,
  view: PlanView,
  {
    box,
    frame,
    pegs = true,
  }: { readonly box: PaperBox; readonly frame: string; readonly pegs?: boolean },
  map: LevelMap = levelMap(model, document.display),
): LevelMapPicture {
  const { display } = document;
  const on = (point: Point): PaperPoint => paperFromGround(view, point);
  const lines = (segments: readonly Segment[], stroke: Stroke): DrawCommand[] =>
    segments.map(({ from, to }) => ({ kind: 'line', from: on(from), to: on(to), stroke }));
  const [perimeter, ...keepOuts] = model.ground.rings;
  const commands: DrawCommand[] = [
    ...lines(map.cut, MAP_STROKES.cut),
    ...lines(map.fill, MAP_STROKES.fill),
    ...lines(map.rim, MAP_STROKES.rim),
    ...map.contours.flatMap(({ segments }) => lines(segments, MAP_STROKES.contour)),
    ...lines(map.meeting, MAP_STROKES.meeting),
    ...keepOuts.map(({ edges }): DrawCommand => ({
      kind: 'path',
      rings: [paperRing(view, edges)],
      fill: PAPER,
      stroke: { width: PENS.medium, colour: INK },
    })),
    {
      kind: 'path',
      rings: [paperRing(view, perimeter.edges)],
      stroke: { width: PENS.thick, colour: INK },
    },
  ];

  // Figures, each on a plate of the paper's own colour: pegs first, then spots, the fall, and contours.
  const arrows = fallArrows(document, perimeter.outline, view);
  let space: LabelSpace = {
    frame: box,
    outlines: arrows.outlines,
    lines: model.ground.rings.flatMap(({ outline }) =>
      outline.map((from, n) => ({
        from: on(from),
        to: on(outline[(n + 1) % outline.length]),
      })),
    ),
  };
  const unfigured: string[] = [];
  const plates: DrawCommand[] = [];
  const place = (
    places: readonly PaperPoint[],
    text: string,
    turnDeg = 0,
    weight: 400 | 600 = 400,
  ): boolean => {
    const width = textWidth(text, LETTERING.small, weight);
    // Clear of edges where there is such a place, else over them.
    const tries = [false, true].flatMap((overLines) => places.map((at) => ({ at, overLines })));
    for (const { at, overLines } of tries) {
      const label = { at, height: LETTERING.small, anchor: 'middle' as const, turnDeg };
      const corners = lineCorners(label, width + 0.8);
      if (!isFree(space, corners, { overLines })) continue;
      space = withLabels(space, [corners]);
      plates.push({ kind: 'path', rings: [{ points: corners, closed: true }], fill: PAPER });
      const command = panelText(at, text, frame, { anchor: 'middle', weight });
      plates.push(command.kind === 'text' ? { ...command, turnDeg } : command);
      return true;
    }
    return false;
  };
  const around = ([x, y]: PaperPoint, width: number): PaperPoint[] => {
    const [dx, up, down] = [width / 2 + 2.2, y - 2.6, y + LETTERING.small + 2];
    return [
      [x, up],
      [x, down],
      [x + dx, y + LETTERING.small / 2],
      [x - dx, y + LETTERING.small / 2],
      [x + dx, up],
      [x - dx, up],
      [x + dx, down],
      [x - dx, down],
    ];
  };
  const { spots } = documentLevels(document);
  const marks: DrawCommand[] = [];
  if (pegs) {
    for (const peg of pegLevels(document, model)) {
      const at = on(peg.at);
      marks.push({
        kind: 'path',
        rings: [
          boxRing({ left: at[0] - 0.9, top: at[1] - 0.9, right: at[0] + 0.9, bottom: at[1] + 0.9 }),
        ],
        fill: INK,
      });
      space = withLabels(space, [
        [
          [at[0] - 1, at[1] - 1],
          [at[0] + 1, at[1] - 1],
          [at[0] + 1, at[1] + 1],
          [at[0] - 1, at[1] + 1],
        ],
      ]);
      const text = sheetText(`${peg.name} ${levelFigureText(peg.finish, display)}`);
      if (!place(around(at, textWidth(text, LETTERING.small, 600)), text, 0, 600))
        unfigured.push(text);
    }
  }
  spots.forEach(({ at: spotAt, level }, n) => {
    const at = on(spotAt);
    marks.push({
      kind: 'circle',
      centre: at,
      radius: SPOT_RADIUS,
      fill: PAPER,
      stroke: { width: PENS.thin, colour: INK },
    });
    const text = sheetText(`${spotName(spots, n)} ${levelFigureText(level, display)}`);
    if (!place(around(at, textWidth(text, LETTERING.small)), text)) unfigured.push(text);
  });
  if (arrows.figure) place(arrows.figure.places, sheetText(arrows.figure.text), 0, 600);
  for (const { level, segments } of map.contours) {
    const longest = [...segments].sort((p, q) => lengthOf(q) - lengthOf(p)).slice(0, 4);
    const text = levelFigureText(level, display);
    place(
      longest.flatMap(({ from, to }): PaperPoint[] =>
        [0.5, 0.25, 0.75].map((t): PaperPoint => {
          const at = on([from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1])]);
          return [at[0], at[1] + LETTERING.small / 2];
        }),
      ),
      text,
    );
  }
  return { commands: [...commands, ...arrows.commands, ...marks, ...plates], unfigured };
}

const lengthOf = ({ from, to }: Segment): number => Math.hypot(to[0] - from[0], to[1] - from[1]);

/** One row of the map's key: how it looks, and what it says. */
export interface MapKeyRow {
  readonly sample: 'cut' | 'fill' | 'contour' | 'meeting' | 'rim' | 'spot' | 'fall' | 'peg';
  readonly text: string;
}

/** What the key of a level map says, for what is on it. */
export function levelMapKey(
  model: EarthModel,
  map: LevelMap,
  intervalText: string,
  falls: boolean,
): MapKeyRow[] {
  const rows: MapKeyRow[] = [];
  if (map.cut.length > 0) rows.push({ sample: 'cut', text: 'Earth to dig' });
  if (map.fill.length > 0) rows.push({ sample: 'fill', text: 'Low ground to make up with base' });
  if (map.meeting.length > 0)
    rows.push({ sample: 'meeting', text: 'Where nothing is dug or made up' });
  if (map.contours.length > 0)
    rows.push({ sample: 'contour', text: `The ground as it is, a line every ${intervalText}` });
  if (model.existing.spots.length > 0) rows.push({ sample: 'spot', text: 'A spot and its level' });
  if (map.rim.length > 0) rows.push({ sample: 'rim', text: 'Measured inside, reckoned outside' });
  if (falls) rows.push({ sample: 'fall', text: 'The floor falls this way' });
  rows.push({ sample: 'peg', text: 'A peg and the level of the finish' });
  return rows;
}

/** A row's sample in a box of the key. */
export function mapKeySample(sample: MapKeyRow['sample'], box: PaperBox): DrawCommand[] {
  const middle = (box.top + box.bottom) / 2;
  const centre: PaperPoint = [(box.left + box.right) / 2, middle];
  switch (sample) {
    case 'cut':
    case 'fill': {
      const way = sample === 'cut' ? 1 : -1;
      const apart = sample === 'cut' ? 2.2 : 1.1;
      const height = box.bottom - box.top;
      const commands: DrawCommand[] = [];
      for (let x = box.left - height; x < box.right; x += apart) {
        const start = Math.max(x, box.left);
        const end = Math.min(x + height, box.right);
        if (end <= start) continue;
        const y = (at: number) => (way === 1 ? box.bottom - (at - x) : box.top + (at - x));
        commands.push({
          kind: 'line',
          from: [start, y(start)],
          to: [end, y(end)],
          stroke: MAP_STROKES[sample],
        });
      }
      return commands;
    }
    case 'contour':
    case 'meeting':
    case 'rim':
      return [
        {
          kind: 'line',
          from: [box.left, middle],
          to: [box.right, middle],
          stroke: MAP_STROKES[sample],
        },
      ];
    case 'fall':
      return [...arrowCommands([box.left, middle], [box.right, middle])];
    case 'spot':
      return [
        {
          kind: 'circle',
          centre,
          radius: SPOT_RADIUS,
          fill: PAPER,
          stroke: { width: PENS.thin, colour: INK },
        },
      ];
    case 'peg':
      return [
        {
          kind: 'path',
          rings: [
            boxRing({
              left: centre[0] - 0.9,
              top: middle - 0.9,
              right: centre[0] + 0.9,
              bottom: middle + 0.9,
            }),
          ],
          fill: INK,
        },
      ];
  }
}
