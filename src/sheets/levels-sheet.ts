import { formatLength } from '@/paving/length';
import type { LayoutDocument } from '@/paving/layout-document';
import { documentLevels } from '@/paving/levels';
import { earthModel, type EarthModel } from '@/takeoff/earth-cells';
import { levelMap, type LevelMap } from '@/takeoff/level-map';
import { floorCautions } from './cautions';
import { boxWidth } from './drawing';
import type { FiguredContent, PanelRest } from './figured-sheet';
import { bestArrangement, figuredDraft, furtherDrafts } from './figured-sheet';
import { levelMapDrawing, levelMapKey, mapKeySample } from './level-map-drawing';
import { markRows } from './mark-row';
import type { PanelRow } from './panel';
import { headingRow, itemRow, keptTogether, sampleRow, textRows } from './panel';
import type { PaperName } from './paper';
import type { PlanInput } from './plan-input';
import { pointsBounds } from './plan-view';
import { scaleBarRow } from './scale-bar';
import { scaleName } from './scales';
import type { SheetDraft } from './sheet-draft';

/** Levels: the ground as it is, what is dug and made up, and the finish at the pegs. None of a level floor without spots. */
export function levelsDraft(
  input: PlanInput,
  paper: PaperName,
): {
  readonly draft: SheetDraft;
  readonly rest: PanelRest;
  readonly further: () => readonly SheetDraft[];
} | null {
  const { document, ground } = input.laying;
  const { spots, fall } = documentLevels(document);
  if (spots.length === 0 && fall.kind === 'none') return null;
  const model = earthModel(document, ground);
  const map = mapKnown(document, model);
  const content: FiguredContent = {
    bounds: pointsBounds(model.dug.flat()),
    head: (width) => markRows(input, width),
    rows: (scale, width) => levelsPanel(input, model, map, scale, width, []),
    draw: (view, box) => {
      const { commands, unfigured } = levelMapDrawing(
        document,
        model,
        view,
        { box, frame: 'drawing' },
        map,
      );
      return {
        layers: [{ name: 'level map', commands }],
        rows: (width) => levelsPanel(input, model, map, view.scale, width, unfigured),
      };
    },
  };
  const arrangement = bestArrangement(content, paper);
  const named = { kinds: ['section' as const], type: 'Levels' };
  const { draft, rest } = figuredDraft(content, arrangement, named);
  return {
    draft,
    rest: { rows: rest, width: boxWidth(arrangement.columns[0].box), kinds: named.kinds },
    further: () => furtherDrafts(rest, content, arrangement, named),
  };
}

/** The map as far as the document tells: without spots nothing of the ground, without layers nothing of the dig. */
function mapKnown(document: LayoutDocument, model: EarthModel): LevelMap {
  const map = levelMap(model, document.display);
  const dig = document.buildUp ? map : { ...map, cut: [], fill: [], meeting: [] };
  return model.existing.shape === 'none'
    ? { ...dig, contours: [], rim: [], cut: [], fill: [], meeting: [] }
    : dig;
}

function levelsPanel(
  input: PlanInput,
  model: EarthModel,
  map: LevelMap,
  scale: number,
  width: number,
  unfigured: readonly string[],
): readonly PanelRow[] {
  const { document } = input.laying;
  const { display, buildUp } = document;
  const { spots, fall } = documentLevels(document);
  const interval = formatLength(map.interval, display, { decimals: 1 });
  const key = levelMapKey(model, map, interval, fall.kind !== 'none');
  return [
    ...markRows(input, width),
    headingRow('Levels', width),
    ...keptTogether(
      textRows(
        `All${display === 'metric' ? ' in mm' : ''} from the top of the edge, which is 0: plus is above it, minus below.`,
        width,
      ),
    ),
    ...(spots.length === 0
      ? textRows('No spots of the ground as it is were measured: it is not drawn.', width)
      : []),
    ...(spots.length > 0 && !buildUp
      ? textRows('Layers are not entered yet: what is dug is not drawn.', width)
      : []),
    headingRow(`Key, scale ${scaleName(scale)}`, width),
    ...key.map(({ sample, text }) => sampleRow((box) => mapKeySample(sample, box), text, width)),
    scaleBarRow(scale, display, width),
    ...(unfigured.length === 0
      ? []
      : [headingRow('No room on the map', width), ...textRows(`${unfigured.join('; ')}.`, width)]),
    ...keptTogether(
      [
        headingRow('Take care', width),
        ...floorCautions(document, input.report)
          .filter((text) => /dig|Frost|Figures/.test(text))
          .map((text) => itemRow(text, width)),
      ],
      'wished',
    ),
  ];
}
