import type { GroundEdge } from '@/paving/ground';
import type { DrawCommand, Layer, PaperBox } from './drawing';
import { PENS } from './drawing';
import type { DimensionedEdge } from './edge-dimensions';
import { edgeDimensions } from './edge-dimensions';
import { figureText, rangeText } from './figures';
import { floorDrawing } from './floor-drawing';
import { INK, PAPER, inkMix } from './inks';
import type { LabelSpace } from './label-space';
import { withLabels } from './label-space';
import { liftedCommands } from './lifted-marks';
import { PLAN_PIECES } from './piece-drawing';
import { alongArc, alongEdge, arcLabel, letteredCorner } from './plan-edge-labels';
import { crossCommands, keepOutLabels } from './plan-keep-outs';
import type { PlacedLabels, WantedLabel } from './plan-labels';
import { cornerLetters, labelsPlaced } from './plan-labels';
import type { PlanFacts } from './plan-panel';
import { partLabel, partLines } from './plan-part-lines';
import type { PlanView } from './plan-view';
import { paperChords, paperFromGround } from './plan-view';
import { startMark } from './start-mark';

/** More edges than this are figured in the table only: figures round such a ring could not be read. */
const MOST_FIGURED_EDGES = 80;
/** Above this many laid units, or below this side on paper, courses are drawn. */
const MOST_UNITS = 30_000;
const LEAST_SIDE = 0.7;
/** Smaller units on paper than this are outlined lighter, mm, or their lines would darken the whole floor. */
const SMALL_SIDE = 2;

/** The figured floor as layers. */
export interface PlanDrawing {
  readonly layers: readonly Layer[];
  readonly asCourses: boolean;
}

/** The figured floor inside `frame`: floor, dimensions, letters, gaps and start. */
export function planDrawing(facts: PlanFacts, view: PlanView, frame: PaperBox): PlanDrawing {
  const { laying, report } = facts.input;
  const { display } = laying.document;
  const side = Math.min(...laying.motif.map(({ unit }) => Math.min(unit.length, unit.width)));
  const unitInk = side / view.scale < SMALL_SIDE ? 0.4 : 0.75;
  const floor = floorDrawing(laying, view, {
    mostUnits: MOST_UNITS,
    leastSide: LEAST_SIDE,
    outline: { width: PENS.thick, colour: INK },
    keepOutStroke: { width: PENS.medium, colour: INK },
    unitStroke: { width: PENS.fine, colour: inkMix(PAPER, INK, unitInk) },
    markTone: true,
    pieces: PLAN_PIECES,
    grain: { spacing: 1.8, size: 0.3 },
  });
  const [perimeter, ...keepOuts] = laying.ground.rings;
  const lines = floor.rings.flatMap((ring) => ring.segments);
  let space: LabelSpace = { frame, outlines: [], lines: [] };
  const figures: DrawCommand[] = [];
  const take = (placed: PlacedLabels | null) => {
    if (!placed) return;
    figures.push(...placed.commands);
    space = placed.space;
  };

  // Straight edges outside, longest first; then arcs, corners, gaps.
  const paperEdge = (edge: GroundEdge): DimensionedEdge => ({
    from: paperFromGround(view, edge.start),
    to: paperFromGround(view, edge.end),
    label: figureText(edge.length, display),
  });
  const figured = perimeter.edges.length <= MOST_FIGURED_EDGES ? perimeter.edges : [];
  const straight = figured.filter((edge) => edge.bulge === 0).map(paperEdge);
  const dimensions = edgeDimensions(straight, floor.rings[0], space);
  take(dimensions);
  space = withLabels(space, [], lines);
  // Where no dimension line finds room, the bare figure stands along its edge.
  take(
    labelsPlaced(
      dimensions.unplaced.map((n) => ({
        text: straight[n].label,
        places: alongEdge(straight[n], straight[n].label),
      })),
      space,
    ),
  );
  take(
    labelsPlaced(
      figured
        .filter((edge) => edge.bulge !== 0)
        .map((edge) => arcLabel(edge, view, floor.rings[0], display)),
      space,
    ),
  );
  take(
    cornerLetters(
      figured.map((_, n) => letteredCorner(figured, n, view)),
      space,
    ),
  );
  take(keepOutLabels(facts, view, floor, space));
  take(startMark(facts, view, space, lines));
  take(
    labelsPlaced(
      report.edges
        .filter((edge) => edge.ring === 0 && edge.least !== null && edge.greatest !== null)
        .filter((edge) => edge.edge < figured.length)
        .map((edge): WantedLabel => {
          const text = `gap ${rangeText(edge.least!, edge.greatest!, display)}`;
          const drawn = figured[edge.edge];
          const places =
            drawn.bulge === 0
              ? alongEdge(paperEdge(drawn), text).filter(({ plate }) => !plate)
              : alongArc(paperChords(view, drawn), floor.rings[0]);
          return { text, places };
        }),
      space,
    ),
  );

  take(labelsPlaced(facts.parts.map(partLabel(view)), space));

  return {
    asCourses: floor.asCourses,
    layers: [
      { name: 'fill', commands: floor.fill },
      { name: 'units', commands: floor.units },
      { name: 'lifted', commands: liftedCommands(laying, view) },
      { name: 'ground', commands: floor.outline },
      { name: 'keep-outs', commands: keepOuts.flatMap((ring) => crossCommands(ring.edges, view)) },
      {
        name: 'parts',
        commands: partLines(facts.parts, floor.rings[0], view),
      },
      { name: 'figures', commands: figures },
    ],
  };
}
