import { cornerName, keepOutName } from '@/paving/edge-names';
import type { GroundEdge } from '@/paving/ground';
import type { DrawCommand, PaperPoint } from './drawing';
import { PENS } from './drawing';
import { tick } from './edge-dimensions';
import { figureText } from './figures';
import type { FloorDrawing } from './floor-drawing';
import { INK, PAPER, inkMix } from './inks';
import type { KeepOutPlace } from './keep-out-place';
import type { LabelSpace } from './label-space';
import { isInside, withLabels } from './label-space';
import { middleOf, unitVector } from './paper-vectors';
import { letteredCorner } from './plan-edge-labels';
import type { PlacedLabels, WantedLabel } from './plan-labels';
import { labelPlaced, labelsPlaced, placesAlong, placesOff } from './plan-labels';
import type { PlanFacts } from './plan-panel';
import type { PlanView } from './plan-view';
import { paperFromGround } from './plan-view';
import { LETTERING, textFitted, textWidth } from './text-measure';

/** Diagonals of a four-cornered keep-out; nothing on others. */
export function crossCommands(
  edges: readonly GroundEdge[],
  view: PlanView,
): readonly DrawCommand[] {
  if (edges.length !== 4 || edges.some(({ bulge }) => bulge !== 0)) return [];
  const corners = edges.map(({ start }) => paperFromGround(view, start));
  return [0, 1].map((n) => ({
    kind: 'line',
    from: corners[n],
    to: corners[n + 2],
    stroke: { width: PENS.fine, colour: inkMix(PAPER, INK, 0.4) },
  }));
}

/** Keep-outs: name inside or on a leader, sizes along the inside of their edges, and the two placing dimensions. */
export function keepOutLabels(
  { input, keepOuts }: PlanFacts,
  view: PlanView,
  floor: FloorDrawing,
  start: LabelSpace,
): PlacedLabels {
  const { laying } = input;
  const { display } = laying.document;
  let space = start;
  const commands: DrawCommand[] = [];
  const take = (placed: PlacedLabels | null): boolean => {
    if (!placed) return false;
    commands.push(...placed.commands);
    space = placed.space;
    return true;
  };
  for (const place of keepOuts) {
    const ring = laying.ground.rings[place.ring];
    const outline = floor.rings[place.ring].points;
    const middle = middleOf(outline);
    const code = keepOutName(place.ring);
    const full = textFitted(`${code} ${ring.name ?? ''}`.trim(), 60, LETTERING.small, 600);
    const inside = (text: string): WantedLabel => ({
      text,
      weight: 600,
      places: [{ middle, turnDeg: 0, plate: true }],
    });
    const contained = (text: string) => {
      const half = textWidth(text, LETTERING.small, 600) / 2 + 1;
      return [
        [-half, -2.2],
        [half, -2.2],
        [half, 2.2],
        [-half, 2.2],
      ].every(([dx, dy]) => isInside([middle[0] + dx, middle[1] + dy], outline));
    };
    const named = [full, code].find(contained);
    if (!named || !take(labelPlaced(inside(named), space)))
      take(
        labelPlaced(
          {
            text: code,
            weight: 600,
            places: [
              [0.7, -0.7],
              [-0.7, -0.7],
              [0.7, 0.7],
              [-0.7, 0.7],
            ].flatMap((outward) =>
              placesOff(
                middle,
                outward as unknown as PaperPoint,
                textWidth(code, LETTERING.small, 600),
                [6, 10, 15],
              ).map((spot) => ({ ...spot, plate: true })),
            ),
          },
          space,
        ),
      );
    if (place.size?.kind === 'circle') {
      const text = `R ${figureText(place.size.radius, display)}`;
      if (2 * (place.size.radius / view.scale) > textWidth(text, LETTERING.small) + 4)
        take(
          labelPlaced(
            { text, places: [{ middle: [middle[0], middle[1] + 4.6], turnDeg: 0, plate: true }] },
            space,
          ),
        );
    } else {
      take(labelsPlaced(sizeLabels(ring.edges, view, display, outline), space));
      take(labelsPlaced(cornerNames(ring.edges, place, view, outline), space));
    }
    for (const offset of place.offsets) take(placingDimension(offset, view, display, space));
  }
  return { commands, space };
}

/** Lengths along the inside of a keep-out's edges; the second of two equal ones is not repeated. */
function sizeLabels(
  edges: readonly GroundEdge[],
  view: PlanView,
  display: 'metric' | 'imperial',
  outline: readonly PaperPoint[],
): readonly WantedLabel[] {
  const rectangle = edges.length === 4;
  return (rectangle ? edges.slice(0, 2) : edges)
    .filter((edge) => edge.bulge === 0)
    .map((edge) => {
      const along = {
        from: paperFromGround(view, edge.start),
        to: paperFromGround(view, edge.end),
        label: figureText(edge.length, display),
      };
      const room = Math.hypot(along.to[0] - along.from[0], along.to[1] - along.from[1]);
      const fits = textWidth(along.label, LETTERING.small) + 2 <= room;
      const places = placesAlong(along, -2.6, true).filter(({ middle }) =>
        isInside(middle, outline),
      );
      return { text: along.label, places: fits ? places : [] };
    });
}

/** Small letters of a keep-out's corners, just inside them; the one that is measured to first. */
function cornerNames(
  edges: readonly GroundEdge[],
  { ring, corner }: KeepOutPlace,
  view: PlanView,
  outline: readonly PaperPoint[],
): readonly WantedLabel[] {
  const order = edges.map((_, n) => n).sort((p, q) => Number(q === corner) - Number(p === corner));
  return order.map((n) => {
    const { at, outward } = letteredCorner(edges, n, view);
    const places = [3.4, 4.4]
      .map((distance): PaperPoint => [at[0] - outward[0] * distance, at[1] - outward[1] * distance])
      .filter((middle) => isInside(middle, outline));
    return {
      text: cornerName(ring, n),
      places: places.map((middle) => ({ middle, turnDeg: 0, plate: true })),
    };
  });
}

/** A dimension over the floor, square from an edge to a keep-out's point. */
function placingDimension(
  offset: KeepOutPlace['offsets'][number],
  view: PlanView,
  display: 'metric' | 'imperial',
  space: LabelSpace,
): PlacedLabels | null {
  const [from, to] = [paperFromGround(view, offset.foot), paperFromGround(view, offset.to)];
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const text = figureText(offset.distance, display);
  if (length < textWidth(text, LETTERING.small) + 3) return null;
  const u = unitVector([to[0] - from[0], to[1] - from[1]]);
  const normal: PaperPoint = [-u[1], u[0]];
  const line = { from, to };
  const label = labelPlaced(
    { text, places: placesAlong({ from, to, label: text }, 0, true) },
    space,
  );
  if (!label) return null;
  return {
    commands: [
      { kind: 'line', ...line, stroke: { width: PENS.thin, colour: INK } },
      tick(from, u, normal),
      tick(to, u, normal),
      ...label.commands,
    ],
    space: withLabels(label.space, [], [line]),
  };
}
