import type { Point } from '@/geometry/point';
import type { Segment } from '@/geometry/region-segments';
import { fallPlace, fallWays } from '@/paving/fall-ways';
import { documentRing } from '@/paving/ground-edits';
import { levelFigure } from '@/paving/level-text';
import { documentLevels, type Fall } from '@/paving/levels';
import { groundMiddle } from '@/paving/placement-edits';
import { spotName } from '@/takeoff/level-warnings';
import { letterPlaces } from './corner-letters';
import { earthOf, manySpots, type Earth } from './earth';
import { figureRoom, type Box } from './figure-room';
import type { Floor } from './floor';
import { boxedText, dot, FONT, path, screen, segment, type Ink } from './overlay-ink';
import { ringOutline } from './ring-outline';
import type { TableState } from './table-store';

/** How much of the floor's own picture the level map covers. */
const VEIL = 0.86;
/** A contour's figure needs so much of it in sight, px. */
const FIGURED_FROM_PX = 30;
/** A mark's figure stands no farther from it, px. */
const FIGURE_REACH_PX = 60;
/** Of an arrow that shows a fall, px. */
const ARROW_PX = 56;

function strokeAll(
  ink: Ink,
  segments: readonly Segment[],
  colour: string,
  width: number,
  dash: number[] = [],
) {
  const { ctx } = ink;
  ctx.strokeStyle = colour;
  ctx.lineWidth = width;
  ctx.setLineDash(dash);
  ctx.beginPath();
  for (const { from, to } of segments) {
    const [a, b] = [screen(ink, from), screen(ink, to)];
    ctx.moveTo(a[0], a[1]);
    ctx.lineTo(b[0], b[1]);
  }
  ctx.stroke();
  ctx.setLineDash([]);
}

/** Of many spots, hatching waits until the hand rests: contours follow it. */
const mapShown = (earth: Earth, { preview }: TableState, { document }: Floor) =>
  preview && manySpots(document) ? earth.bareMap : earth.map;

/** The level map under edge and keep-outs: hatching, contours, and where ground and formation meet. */
export function paintLevels(ink: Ink, state: TableState, floor: Floor) {
  const earth = earthOf(floor);
  const { ctx, colours, document } = ink;
  path(ink, ringOutline(documentRing(document, 0)), true);
  ctx.save();
  ctx.globalAlpha = VEIL;
  ctx.fillStyle = colours.stone50;
  ctx.fill();
  ctx.restore();
  if (!earth) return;
  const map = mapShown(earth, state, floor);
  strokeAll(ink, map.cut, colours.slate, 0.6);
  strokeAll(ink, map.fill, colours.graphite, 0.8);
  strokeAll(ink, map.rim, colours.slate, 1, [7, 5]);
  for (const { segments } of map.contours) strokeAll(ink, segments, colours.graphite, 1.1);
  strokeAll(ink, map.meeting, colours.graphite, 3);
}

/** An arrow down a fall. */
function arrow(ink: Ink, from: Point, to: Point, colour: string, width: number) {
  const { ctx } = ink;
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  if (length < 6) return;
  const [ux, uy] = [(to[0] - from[0]) / length, (to[1] - from[1]) / length];
  ctx.strokeStyle = colour;
  ctx.fillStyle = colour;
  ctx.lineWidth = width;
  segment(ctx, from, to);
  ctx.beginPath();
  ctx.moveTo(to[0], to[1]);
  ctx.lineTo(to[0] - 9 * ux + 4 * uy, to[1] - 9 * uy - 4 * ux);
  ctx.lineTo(to[0] - 9 * ux - 4 * uy, to[1] - 9 * uy + 4 * ux);
  ctx.fill();
}

/** Arrows down the fall and its steepness; the places that they take. */
function paintFall(ink: Ink, fall: Fall): Box[] {
  const { colours, document } = ink;
  const at = screen(ink, fallPlace(document));
  // On the screen y is down.
  const ways = fallWays(fall).map(([x, y]): Point => [x, -y]);
  if (fall.kind === 'toLine') {
    ink.ctx.strokeStyle = colours.graphite;
    ink.ctx.lineWidth = 1.6;
    ink.ctx.setLineDash([12, 4, 2, 4]);
    segment(ink.ctx, screen(ink, fall.from), screen(ink, fall.to));
    ink.ctx.setLineDash([]);
  }
  const meets = fall.kind !== 'oneWay';
  for (const [x, y] of ways) {
    // Towards the place that the fall leads to; along the one way, through the middle.
    const [start, end] = meets ? [-ARROW_PX - 12, -12] : [-ARROW_PX / 2, ARROW_PX / 2];
    arrow(
      ink,
      [at[0] + x * start, at[1] + y * start],
      [at[0] + x * end, at[1] + y * end],
      colours.graphite,
      2,
    );
  }
  if (fall.kind === 'toPoint') dot(ink.ctx, at, 5, colours.stone50, colours.graphite);
  if (fall.kind !== 'none') {
    const [x, y] = ways[0];
    const aside: Point = [
      at[0] - y * 17 - (meets ? x * 44 : 0),
      at[1] + x * 17 - (meets ? y * 44 : 0),
    ];
    boxedText(ink, `${Number(fall.percent.toFixed(2))}\u202f%`, aside, 0, colours.graphite, 600);
    return [{ at: aside, half: [20, 9] }];
  }
  return [];
}

/** Spots, pegs and figures over everything else, and what is being pointed at. */
export function paintLevelMarks(ink: Ink, state: TableState, floor: Floor) {
  const earth = earthOf(floor);
  const { ctx, colours, document } = ink;
  const { display } = document;
  const { spots, fall } = documentLevels(document);
  // Marks first, so that no mark stands on a figure; then figures, the most wanted first.
  for (const peg of earth?.pegs ?? []) {
    const [x, y] = screen(ink, peg.at);
    ctx.fillStyle = colours.graphite;
    ctx.fillRect(x - 5, y - 5, 10, 10);
  }
  spots.forEach(({ at }, n) => {
    const picked = n === state.spot;
    const stroke = picked ? colours.line : colours.graphite;
    dot(ctx, screen(ink, at), picked ? 6.5 : 4.5, colours.stone50, stroke);
  });
  const room = figureRoom();
  const inSight = ([x, y]: Point) =>
    x >= -FIGURE_REACH_PX &&
    y >= -FIGURE_REACH_PX &&
    x <= ink.size.width + FIGURE_REACH_PX &&
    y <= ink.size.height + FIGURE_REACH_PX;
  for (const at of letterPlaces(ink)) room.take({ at, half: [9, 9] });
  for (const { at } of spots) room.take({ at: screen(ink, at), half: [4, 4] });
  const figure = (text: string, places: readonly Point[], style: FigureStyle) => {
    ctx.font = `${style.weight} 12.5px ${FONT}`;
    const half: Point = [ctx.measureText(text).width / 2 + 5, 9];
    const inWindow = ([x, y]: Point) =>
      x >= half[0] &&
      x <= ink.size.width - half[0] &&
      y >= half[1] &&
      y <= ink.size.height - half[1];
    const at = places.find((place) => inWindow(place) && room.free({ at: place, half }));
    if (!at && !style.always) return;
    room.take({ at: at ?? places[0], half });
    boxedText(ink, text, at ?? places[0], 0, style.colour, style.weight);
  };
  const spotFigure = (n: number) =>
    `${spotName(spots, n)}: ${levelFigure(spots[n].level, display)}`;
  if (state.spot !== null && spots[state.spot]) {
    const style = { colour: colours.line, weight: 600, always: true };
    figure(spotFigure(state.spot), around(screen(ink, spots[state.spot].at)), style);
  }
  paintFall(ink, fall).forEach(room.take);
  for (const { at, kind, name, finish } of earth?.pegs ?? []) {
    const text =
      kind === 'corner' ? levelFigure(finish, display) : `${name} ${levelFigure(finish, display)}`;
    const places = kind === 'corner' ? inwards(ink, at) : around(screen(ink, at));
    figure(text, places, { colour: colours.graphite, weight: 700 });
  }
  spots.forEach(({ at }, n) => {
    const here = screen(ink, at);
    if (n !== state.spot && inSight(here))
      figure(spotFigure(n), around(here), { colour: colours.slate, weight: 400 });
  });
  const contours = earth ? mapShown(earth, state, floor).contours : [];
  for (const { level, segments } of contours) {
    const longest = segments
      .map(({ from, to }) => [screen(ink, from), screen(ink, to)] as const)
      .filter((each) => lengthPx(each) >= FIGURED_FROM_PX)
      .sort((p, q) => lengthPx(q) - lengthPx(p));
    const places = longest
      .slice(0, 3)
      .flatMap(([a, b]) =>
        [0.5, 0.25, 0.75].map((t): Point => [a[0] + t * (b[0] - a[0]), a[1] + t * (b[1] - a[1])]),
      );
    figure(levelFigure(level, display), places, { colour: colours.graphite, weight: 400 });
  }
  paintPlacing(ink, state);
}

interface FigureStyle {
  readonly colour: string;
  readonly weight: number;
  /** Shown even where there is no room. */
  readonly always?: boolean;
}

/** Places for a figure beside a mark, the best first. */
const around = ([x, y]: Point): Point[] => [
  [x, y - 17],
  [x, y + 17],
  [x + 38, y],
  [x - 38, y],
  [x + 30, y - 15],
  [x - 30, y - 15],
  [x + 30, y + 15],
  [x - 30, y + 15],
];

/** Places for a corner's figure, inside the edge: its letter stands outside. */
function inwards(ink: Ink, at: Point): Point[] {
  const [x, y] = screen(ink, at);
  const middle = screen(ink, groundMiddle(ink.document));
  const away = Math.hypot(middle[0] - x, middle[1] - y) || 1;
  const [ux, uy] = [(middle[0] - x) / away, (middle[1] - y) / away];
  return [1, 1.6].map((far): Point => [x + ux * 40 * far, y + uy * 26 * far]);
}

const lengthPx = ([a, b]: readonly [Point, Point]): number => Math.hypot(b[0] - a[0], b[1] - a[1]);

function paintPlacing(ink: Ink, { placing }: TableState) {
  if (!placing) return;
  const { ctx, colours } = ink;
  ctx.strokeStyle = colours.line;
  if (placing.first) {
    const first = screen(ink, placing.first);
    dot(ctx, first, 5, colours.line);
    if (placing.at) {
      const at = screen(ink, placing.at);
      if (placing.what === 'fallDirection') arrow(ink, first, at, colours.line, 2);
      else {
        ctx.lineWidth = 2;
        segment(ctx, first, at);
      }
    }
  }
  if (placing.at) dot(ctx, screen(ink, placing.at), 5, colours.stone50, colours.line);
}
