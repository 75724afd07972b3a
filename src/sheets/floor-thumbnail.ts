import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';
import type { Drawing } from './drawing';
import { floorDrawing } from './floor-drawing';
import { INK, inkMix } from './inks';
import { pointsBounds, viewCentred } from './plan-view';
import { drawingSvg } from './svg-sink';

/** White space round the floor, px. */
const MARGIN = 3;
/** More units than this are drawn as courses, so that a picture of any floor stays small. */
const MOST_UNITS = 4000;

/**
 * A small picture of a floor for lists, as SVG text of `widthPx` by `heightPx` (it scales to
 * its box). A document that cannot be laid gives an empty picture of that size.
 */
export function floorThumbnailSvg(
  document: LayoutDocument,
  widthPx: number,
  heightPx: number,
  title?: string,
): string {
  const parsed = parseLayoutDocument(document);
  const layers = parsed.ok ? floorLayers(parsed.document, widthPx, heightPx) : [];
  return drawingSvg({ width: widthPx, height: heightPx, layers }, { unit: 'px', title });
}

function floorLayers(document: LayoutDocument, width: number, height: number): Drawing['layers'] {
  const laying = layFloor(document);
  const bounds = pointsBounds(laying.ground.rings[0].edges.flatMap((edge) => edge.chords));
  const scale = Math.max(
    (bounds.greatest[0] - bounds.least[0]) / (width - 2 * MARGIN),
    (bounds.greatest[1] - bounds.least[1]) / (height - 2 * MARGIN),
  );
  const view = viewCentred(bounds, scale, { left: 0, top: 0, right: width, bottom: height });
  const floor = floorDrawing(laying, view, {
    mostUnits: MOST_UNITS,
    leastSide: 1.6,
    outline: { width: 1.5, colour: INK },
    keepOutStroke: { width: 1, colour: INK },
    unitStroke: { width: 0.4, colour: inkMix('#ffffff', INK, 0.45) },
    markTone: false,
    pieces: {
      stroke: { width: 0.4, colour: inkMix('#ffffff', INK, 0.45) },
      sawn: { width: 0.6, colour: INK },
      hatch: { spacing: 2.6, stroke: { width: 0.5, colour: inkMix('#ffffff', INK, 0.5) } },
    },
    grain: { spacing: Math.max(7, Math.sqrt((width * height) / 900)), size: 0.7 },
  });
  return [
    { name: 'fill', commands: floor.fill },
    { name: 'units', commands: floor.units },
    { name: 'ground', commands: floor.outline },
  ];
}
