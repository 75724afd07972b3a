import { cutPieces } from '@/paving/cutting/cut-pieces';
import type { Laying } from '@/paving/laying';
import type { DrawCommand, PaperPoint, Stroke } from './drawing';
import type { Outline } from './edge-dimensions';
import { grainCommands } from './aggregate-grain';
import { INK, KEEP_OUT_COLOUR, inkMix } from './inks';
import { pieceCommands, type PieceStyle } from './piece-drawing';
import type { PlanView } from './plan-view';
import { paperChords, paperRing } from './plan-view';
import { aggregateColour, courseCommands, unitCommands } from './unit-drawing';

/** How a floor is drawn; lengths in paper mm. */
export interface FloorStyle {
  /** Above this many laid units, or below this least side on the drawing, courses are drawn instead. */
  readonly mostUnits: number;
  readonly leastSide: number;
  readonly outline: Stroke;
  readonly keepOutStroke: Stroke;
  readonly unitStroke: Stroke;
  readonly markTone: boolean;
  /** How pieces cut at the edge are drawn, where there are any; as units without it. */
  readonly pieces?: PieceStyle;
  readonly grain: { readonly spacing: number; readonly size: number };
}

/** A floor as commands, in the order in which they lie on each other. */
export interface FloorDrawing {
  readonly fill: readonly DrawCommand[];
  readonly units: readonly DrawCommand[];
  readonly outline: readonly DrawCommand[];
  /** Perimeter first, then keep-outs, as chords. */
  readonly rings: readonly Outline[];
  /** Units were drawn as courses. */
  readonly asCourses: boolean;
}

/** The floor itself, seen through `view`: aggregate with its grain, laid units, perimeter and keep-outs. */
export function floorDrawing(laying: Laying, view: PlanView, style: FloorStyle): FloorDrawing {
  const { rings } = laying.ground;
  const outlines = rings.map((ring) =>
    outlineOf(ring.edges.flatMap((edge) => paperChords(view, edge).slice(0, -1))),
  );
  const [perimeter, ...keepOuts] = rings.map((ring) => paperRing(view, ring.edges));
  const least = Math.min(...laying.motif.map(({ unit }) => Math.min(unit.length, unit.width)));
  const asCourses = laying.laid.count > style.mostUnits || least / view.scale < style.leastSide;
  const colour = aggregateColour(laying);
  const pieceStyle = style.pieces ?? { stroke: style.unitStroke, sawn: style.unitStroke };
  const pieces = laying.document.cutting === 'edge' ? cutPieces(laying).pieces : [];
  return {
    fill: [
      { kind: 'path', rings: [perimeter], fill: colour },
      ...grainCommands(laying, view, outlines, {
        ...style.grain,
        colour: inkMix(colour, INK, 0.55),
      }),
    ],
    units: [
      ...(asCourses
        ? courseCommands(laying, view, style.unitStroke)
        : unitCommands(laying, view, { stroke: style.unitStroke, markTone: style.markTone })),
      ...pieceCommands(
        laying,
        pieces,
        view,
        asCourses ? { ...pieceStyle, hatch: undefined, marks: false } : pieceStyle,
      ),
    ],
    outline: [
      ...keepOuts.map((ring): DrawCommand => ({
        kind: 'path',
        rings: [ring],
        fill: KEEP_OUT_COLOUR,
        stroke: style.keepOutStroke,
      })),
      { kind: 'path', rings: [perimeter], stroke: style.outline },
    ],
    rings: outlines,
    asCourses,
  };
}

/** A closed outline through points. */
export function outlineOf(points: readonly PaperPoint[]): Outline {
  return {
    points,
    segments: points.map((from, n) => ({ from, to: points[(n + 1) % points.length] })),
  };
}
