import type { DrawCommand, FontWeight, PaperPoint } from './drawing';
import { PENS } from './drawing';
import type { DimensionedEdge } from './edge-dimensions';
import { baselineCentred, lineAvoidsTexts, readingTurn } from './edge-dimensions';
import { INK, PAPER } from './inks';
import type { LabelSpace, Segment } from './label-space';
import { isFree, withLabels } from './label-space';
import { LETTERING, lineCorners, textWidth } from './text-measure';

/** Labels that found room, and the room that is left. */
export interface PlacedLabels {
  readonly commands: readonly DrawCommand[];
  readonly space: LabelSpace;
}

/** A text wanted on the drawing, and where it may stand, best first. */
export interface WantedLabel {
  readonly text: string;
  readonly weight?: FontWeight;
  readonly places: readonly LabelPlace[];
}

/** One of the places where a label may stand. */
export interface LabelPlace {
  /** Where the middle of its capitals stands. */
  readonly middle: PaperPoint;
  readonly turnDeg: number;
  /** On a white plate over units and lines. */
  readonly plate?: boolean;
  /** Lines that even a text on a plate keeps clear of. */
  readonly clearOf?: readonly Segment[];
  /** A line from the text to what it names. */
  readonly leader?: Segment;
}

/** Places each label at the first free place; one that finds none is left out. */
export function labelsPlaced(labels: readonly WantedLabel[], start: LabelSpace): PlacedLabels {
  let space = start;
  const commands: DrawCommand[] = [];
  for (const label of labels) {
    const placed = labelPlaced(label, space);
    if (!placed) continue;
    commands.push(...placed.commands);
    space = placed.space;
  }
  return { commands, space };
}

/** The label at the first of its places that is free; null where none is. */
export function labelPlaced(label: WantedLabel, space: LabelSpace): PlacedLabels | null {
  const height = LETTERING.small;
  const weight = label.weight ?? 400;
  const width = textWidth(label.text, height, weight);
  for (const { middle, turnDeg, plate, leader, clearOf = [] } of label.places) {
    const at = baselineCentred(middle, height, turnDeg);
    const line = { at, height, anchor: 'middle' as const, turnDeg };
    const corners = lineCorners(line, width);
    if (!isFree(space, corners, { overLines: plate })) continue;
    if (!isFree({ ...space, outlines: [], lines: clearOf }, corners)) continue;
    if (leader && !lineAvoidsTexts(leader, space)) continue;
    const commands: DrawCommand[] = [];
    if (leader)
      commands.push({ kind: 'line', ...leader, stroke: { width: PENS.fine, colour: INK } });
    if (plate)
      commands.push({
        kind: 'path',
        rings: [{ points: lineCorners(line, width + 1), closed: true }],
        fill: PAPER,
      });
    commands.push({
      kind: 'text',
      ...line,
      text: label.text,
      weight,
      colour: INK,
      frame: 'drawing',
    });
    return { commands, space: withLabels(space, [corners], leader ? [leader] : []) };
  }
  return null;
}

/** Radius of the ring round a corner's letter, mm. */
const LETTER_RADIUS = 2.4;

/** Corner letters in small rings, outside the outline where there is room. */
export function cornerLetters(
  corners: readonly {
    readonly at: PaperPoint;
    readonly outward: PaperPoint;
    readonly name: string;
  }[],
  start: LabelSpace,
): PlacedLabels {
  let space = start;
  const commands: DrawCommand[] = [];
  for (const { at, outward, name } of corners) {
    const radius = Math.max(LETTER_RADIUS, textWidth(name, LETTERING.small, 600) / 2 + 0.7);
    const centre = letterPlaces(at, outward, radius).find((place) => {
      const square = squareRound(place, radius);
      return isFree(space, square);
    });
    if (!centre) continue;
    const away = Math.hypot(centre[0] - at[0], centre[1] - at[1]);
    const leader: Segment = {
      from: at,
      to: [
        centre[0] + ((at[0] - centre[0]) * radius) / away,
        centre[1] + ((at[1] - centre[1]) * radius) / away,
      ],
    };
    if (away - radius > 2.4)
      commands.push({ kind: 'line', ...leader, stroke: { width: PENS.fine, colour: INK } });
    commands.push(
      { kind: 'circle', centre, radius, fill: PAPER, stroke: { width: PENS.fine, colour: INK } },
      {
        kind: 'text',
        at: baselineCentred(centre, LETTERING.small, 0),
        text: name,
        height: LETTERING.small,
        weight: 600,
        anchor: 'middle',
        turnDeg: 0,
        colour: INK,
        frame: 'drawing',
      },
    );
    space = withLabels(space, [squareRound(centre, radius)]);
  }
  return { commands, space };
}

function letterPlaces(
  [x, y]: PaperPoint,
  [ux, uy]: PaperPoint,
  radius: number,
): readonly PaperPoint[] {
  return [2.2, 3.2, 4.6, 6.5, 9].flatMap((white) =>
    [0, 20, -20, 40, -40, 65, -65, 90, -90].map((turn): PaperPoint => {
      const [cos, sin] = [Math.cos((turn * Math.PI) / 180), Math.sin((turn * Math.PI) / 180)];
      const away = white + radius;
      return [x + (ux * cos - uy * sin) * away, y + (ux * sin + uy * cos) * away];
    }),
  );
}

const squareRound = ([x, y]: PaperPoint, radius: number): readonly PaperPoint[] => [
  [x - radius, y - radius],
  [x + radius, y - radius],
  [x + radius, y + radius],
  [x - radius, y + radius],
];

/** Where a text may stand along a straight edge, `distance` to the outside (negative: inside). */
export function placesAlong(
  { from, to }: DimensionedEdge,
  distance: number,
  plate: boolean,
): readonly LabelPlace[] {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const u: PaperPoint = [(to[0] - from[0]) / length, (to[1] - from[1]) / length];
  const turnDeg = readingTurn(u);
  return [0.5, 0.4, 0.6, 0.3, 0.7, 0.2, 0.8].map((share) => ({
    middle: [
      from[0] + u[0] * length * share - u[1] * distance,
      from[1] + u[1] * length * share + u[0] * distance,
    ],
    turnDeg,
    plate,
  }));
}

/** Where an upright text may stand off a point, with a leader to it. */
export function placesOff(
  at: PaperPoint,
  outward: PaperPoint,
  width: number,
  distances: readonly number[],
): readonly LabelPlace[] {
  return distances.flatMap((distance) =>
    [0, 25, -25, 50, -50].map((turn) => {
      const [cos, sin] = [Math.cos((turn * Math.PI) / 180), Math.sin((turn * Math.PI) / 180)];
      const u: PaperPoint = [
        outward[0] * cos - outward[1] * sin,
        outward[0] * sin + outward[1] * cos,
      ];
      const to: PaperPoint = [at[0] + u[0] * distance, at[1] + u[1] * distance];
      // The text's near side meets the leader's end.
      const reachX = width / 2 + 1;
      const reachY = LETTERING.small / 2 + 1;
      const reach = Math.min(
        reachX / Math.max(1e-6, Math.abs(u[0])),
        reachY / Math.max(1e-6, Math.abs(u[1])),
      );
      return {
        middle: [to[0] + u[0] * reach, to[1] + u[1] * reach] as PaperPoint,
        turnDeg: 0,
        leader: { from: at, to },
      };
    }),
  );
}
