import type { DrawCommand, PaperBox } from './drawing';
import { PENS, boxHeight, boxInset, boxRing, boxWidth } from './drawing';
import { lengthText } from './figures';
import { INK, PAPER, inkMix } from './inks';
import { markRows } from './mark-row';
import { panelFlowed, textRows } from './panel';
import type { PartFacts } from './part-drawing';
import { partDrawing } from './part-drawing';
import type { PlanInput } from './plan-input';
import type { PlanPart, PlanParts } from './plan-parts';
import type { GroundBounds } from './plan-view';
import { paperFromGround, paperRing, viewCentred } from './plan-view';
import { scaleBarRow } from './scale-bar';
import type { SheetDraft } from './sheet-draft';
import { footStrip, rule } from './sheet-draft';
import { LETTERING, textWidth } from './text-measure';
import { TITLE_STRIP_WIDTH } from './title-strip';

const KEY_WIDTH = 36;

/** A sheet for each part: the units to a readable scale, and a key plan of where the part lies. */
export function partDrafts(
  input: PlanInput,
  facts: PartFacts,
  made: PlanParts,
  bounds: GroundBounds,
): readonly SheetDraft[] {
  const { paper, window, scale, parts } = made;
  const strip = footStrip(paper);
  const title = { ...strip, right: strip.left + TITLE_STRIP_WIDTH };
  const foot: PaperBox = { ...strip, left: title.right };
  const key = { ...foot, left: foot.right - KEY_WIDTH };
  const words = boxInset({ ...foot, right: key.left }, 2);
  return parts.map((part): SheetDraft => {
    const rows = [
      ...markRows(input, boxWidth(words)),
      scaleBarRow(scale, input.laying.document.display, boxWidth(words)),
      ...textRows(
        `Neighbours repeat ${lengthText(made.overlap, input.laying.document.display)}.`,
        boxWidth(words),
      ),
    ];
    const panel = panelFlowed(rows, [{ frame: 'foot', box: words }]);
    return {
      kinds: ['plan'],
      type: `Floor plan, part ${part.name}`,
      paper,
      scale,
      title,
      frames: { part: { ...paper.frame, bottom: strip.top }, foot: words, key },
      layers: [
        ...partDrawing(facts, part, made),
        { name: 'panel', commands: panel.commands },
        { name: 'key', commands: keyPlan(input, part, parts, bounds, key) },
        { name: 'window', commands: [windowFrame(window)] },
      ],
      rules: [
        rule([strip.left, strip.top], [strip.right, strip.top]),
        rule([title.right, strip.top], [title.right, strip.bottom]),
        rule([key.left, strip.top], [key.left, strip.bottom]),
      ],
    };
  });
}

const windowFrame = (window: PaperBox): DrawCommand => ({
  kind: 'path',
  rings: [boxRing(window)],
  stroke: { width: PENS.fine, colour: inkMix(PAPER, INK, 0.4) },
});

/** The whole ground with its parts; this one dark. */
function keyPlan(
  { laying }: PlanInput,
  part: PlanPart,
  parts: readonly PlanPart[],
  bounds: GroundBounds,
  box: PaperBox,
): readonly DrawCommand[] {
  const inside = boxInset(box, 2.5);
  const [left, low, right, high] = parts.reduce(
    (all, { ground: { least, greatest } }) => [
      Math.min(all[0], least[0]),
      Math.min(all[1], least[1]),
      Math.max(all[2], greatest[0]),
      Math.max(all[3], greatest[1]),
    ],
    [...bounds.least, ...bounds.greatest],
  );
  const whole: GroundBounds = { least: [left, low], greatest: [right, high] };
  const scale = Math.max((right - left) / boxWidth(inside), (high - low) / boxHeight(inside));
  const view = viewCentred(whole, scale, inside);
  const boxOf = ({ ground: { least, greatest } }: PlanPart): PaperBox => {
    const [x0, y0] = paperFromGround(view, [least[0], greatest[1]]);
    const [x1, y1] = paperFromGround(view, [greatest[0], least[1]]);
    return { left: x0, top: y0, right: x1, bottom: y1 };
  };
  const fine = { width: PENS.fine, colour: INK };
  return [
    { kind: 'path', rings: [boxRing(boxOf(part))], fill: inkMix(PAPER, INK, 0.35) },
    ...parts.map((one): DrawCommand => ({
      kind: 'path',
      rings: [boxRing(boxOf(one))],
      stroke: fine,
    })),
    {
      kind: 'path',
      rings: laying.ground.rings.map((ring) => paperRing(view, ring.edges)),
      stroke: { width: PENS.medium, colour: INK },
    },
    ...parts.flatMap((one): DrawCommand[] => {
      const cell = boxOf(one);
      const roomy =
        boxWidth(cell) > textWidth(one.name, LETTERING.small, 600) + 0.8 &&
        boxHeight(cell) > LETTERING.small * 1.5;
      return roomy
        ? [
            {
              kind: 'text',
              at: [
                (cell.left + cell.right) / 2,
                (cell.top + cell.bottom) / 2 + LETTERING.small / 2,
              ],
              text: one.name,
              height: LETTERING.small,
              weight: 600,
              anchor: 'middle',
              turnDeg: 0,
              colour: INK,
              frame: 'key',
            },
          ]
        : [];
    }),
  ];
}
