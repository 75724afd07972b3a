import type { Point } from '@/geometry/point';
import { documentRing, vertexPoint } from '@/paving/ground-edits';
import { formatLength } from '@/paving/length';
import { unitCorners } from '@/paving/laying';
import { cornerLabel } from '@/paving/set-out/marks';
import type { ControlPoint, Course, Datum, SetOut } from '@/paving/set-out/set-out';
import { screenFromGround } from '../camera';
import type { Floor } from '../floor';
import {
  boxedText,
  dot,
  liveSegment,
  path,
  screen,
  segment,
  strokeLive,
  type Ink,
} from '../overlay-ink';
import type { TableState } from '../table-store';

/** Half the length of the arcs that are swung at a point, px. */
const ARC_PX = 26;
/** Strings nearer to each other than this are not drawn one by one, px. */
const LEAST_STRING_PX = 6;
/** Points drawn before only the corners are; a floor of many courses would be all crosses. */
const MOST_CROSSES = 160;

/** The point whose tapes are shown: the one pointed at, else the one picked. */
export function pointShown(setOut: SetOut, state: Pick<TableState, 'point' | 'pointed'>) {
  const find = (name: string | null) =>
    name === null ? undefined : setOut.points.find((point) => point.name === name);
  return find(state.pointed) ?? find(state.point) ?? null;
}

/** From where the point is taped. */
export const tapedFrom = (setOut: SetOut, point: ControlPoint): readonly [Datum, Datum] =>
  point.secondPair?.datums ?? setOut.datums;

function cross({ ctx }: Ink, [x, y]: Point, half: number) {
  segment(ctx, [x - half, y], [x + half, y]);
  segment(ctx, [x, y - half], [x, y + half]);
}

/** A corner that tapes are hooked on: a peg with its string. */
function paintDatum(ink: Ink, at: Point, colour: string) {
  const { ctx, colours } = ink;
  const [x, y] = screen(ink, at);
  ctx.beginPath();
  ctx.moveTo(x - 7, y - 9);
  ctx.lineTo(x + 7, y - 9);
  ctx.lineTo(x + 3, y + 8);
  ctx.lineTo(x - 3, y + 8);
  ctx.closePath();
  ctx.fillStyle = colour;
  ctx.fill();
  ctx.strokeStyle = colours.stone50;
  ctx.lineWidth = 1.5;
  ctx.stroke();
}

function paintStrings(ink: Ink, courses: readonly Course[]) {
  const { ctx, colours, camera } = ink;
  const step = Math.min(...courses.map((course) => course.step ?? Infinity));
  if (!(step * camera.scale >= LEAST_STRING_PX)) return;
  ctx.strokeStyle = colours.slate;
  ctx.lineWidth = 0.9;
  for (const { from, to } of courses) segment(ctx, screen(ink, from), screen(ink, to));
}

/** A string in hand: pink, each unit's edges ticked across it. */
function paintCourse(ink: Ink, course: Course) {
  const { ctx } = ink;
  const [a, b] = [screen(ink, course.from), screen(ink, course.to)];
  liveSegment(ink, a, b, 1.8);
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]) || 1;
  const [ux, uy] = [(b[0] - a[0]) / length, (b[1] - a[1]) / length];
  ctx.lineWidth = 1.2;
  for (const { ticks } of course.runs)
    for (const [from, to] of ticks)
      for (const tick of from === to ? [from] : [from, to]) {
        const at = (tick / course.length) * length;
        const [x, y] = [a[0] + ux * at, a[1] + uy * at];
        segment(ctx, [x - uy * 4, y + ux * 4], [x + uy * 4, y - ux * 4]);
      }
}

/** A tape from a corner to the point, figured, with the arc that it is swung in. */
function paintTape(ink: Ink, from: Point, at: Point, length: number, bold: boolean) {
  const { ctx, colours, document } = ink;
  const [a, b] = [screen(ink, from), screen(ink, at)];
  liveSegment(ink, a, b, bold ? 2 : 1.4);
  const radius = Math.hypot(b[0] - a[0], b[1] - a[1]);
  if (radius < 1) return;
  const angle = Math.atan2(b[1] - a[1], b[0] - a[0]);
  const half = Math.min(ARC_PX / radius, Math.PI);
  ctx.lineWidth = 1.2;
  ctx.setLineDash([5, 3]);
  ctx.beginPath();
  ctx.arc(a[0], a[1], radius, angle - half, angle + half);
  ctx.stroke();
  ctx.setLineDash([]);
  if (radius < 60) return;
  const along = angle > Math.PI / 2 || angle < -Math.PI / 2 ? angle + Math.PI : angle;
  // Nearer to the corner than to the point, where the other tape's figure is far off.
  const share = 0.42;
  boxedText(
    ink,
    formatLength(length, document.display, { decimals: length < 1000 ? 1 : 0 }),
    [a[0] + (b[0] - a[0]) * share, a[1] + (b[1] - a[1]) * share],
    along,
    colours.line,
    600,
  );
}

/** Along the baseline and square to it, for a point that no two tapes fix well. */
function paintOffsets(ink: Ink, { datums }: SetOut, point: ControlPoint) {
  const { colours, document } = ink;
  const [first, second] = datums.map(({ at }) => at);
  const length = Math.hypot(second[0] - first[0], second[1] - first[1]);
  const foot: Point = [
    first[0] + ((second[0] - first[0]) * point.along) / length,
    first[1] + ((second[1] - first[1]) * point.along) / length,
  ];
  const [a, b, c] = [screen(ink, first), screen(ink, foot), screen(ink, point.at)];
  liveSegment(ink, a, b, 2);
  liveSegment(ink, b, c, 2);
  const shown = (mm: number) => formatLength(Math.abs(mm), document.display, { decimals: 1 });
  const level = (p: Point, q: Point): number => {
    const angle = Math.atan2(q[1] - p[1], q[0] - p[0]);
    return angle > Math.PI / 2 || angle < -Math.PI / 2 ? angle + Math.PI : angle;
  };
  if (Math.hypot(b[0] - a[0], b[1] - a[1]) > 50)
    boxedText(
      ink,
      shown(point.along),
      [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2],
      level(a, b),
      colours.line,
      600,
    );
  if (Math.hypot(c[0] - b[0], c[1] - b[1]) > 40)
    boxedText(
      ink,
      shown(point.square),
      [(b[0] + c[0]) / 2, (b[1] + c[1]) / 2],
      level(b, c),
      colours.line,
      600,
    );
}

function paintLive(ink: Ink, setOut: SetOut, point: ControlPoint, floor: Floor) {
  const { ctx, colours, document, size } = ink;
  const course = setOut.courses.find(({ number }) => number === point.course);
  if (course) paintCourse(ink, course);
  if (point.kind === 'unit' && setOut.firstUnit && floor.laying) {
    const { laid, motif } = floor.laying;
    const { unit } = setOut.firstUnit;
    path(ink, unitCorners(motif[laid.k[unit]], laid.x[unit], laid.y[unit]), true);
    strokeLive(ink, 1.8);
  }
  const [x, y] = screen(ink, point.at);
  if (point.by === 'offsets') paintOffsets(ink, setOut, point);
  else if (point.by !== 'datum') {
    const tapes = point.secondPair?.tapes ?? point.tapes;
    tapedFrom(setOut, point).forEach(({ at }, n) => paintTape(ink, at, point.at, tapes[n], true));
  }
  dot(ctx, [x, y], 6, colours.stone50, colours.line);
  dot(ctx, [x, y], 2.2, colours.line);
  const crossing = (point.secondPair ?? point).crossingDeg;
  const doubt = formatLength(point.doubt, document.display, { decimals: 1 });
  const text =
    point.by === 'datum'
      ? `${point.name}: a tape is hooked on here`
      : point.by === 'offsets'
        ? `${point.name}: along and square, ±${doubt}`
        : `${point.name}: tapes meet at ${Math.round(crossing)}°, ±${doubt}`;
  ctx.font = "600 12.5px 'Nunito Sans', sans-serif";
  const width = ctx.measureText(text).width + 16;
  // On the far side of the tapes, where it covers neither them nor their figures.
  const away = tapedFrom(setOut, point).reduce<Point>(
    (sum, { at }) => {
      const [tx, ty] = screen(ink, at);
      const far = Math.hypot(x - tx, y - ty) || 1;
      return [sum[0] + (x - tx) / far, sum[1] + (y - ty) / far];
    },
    [0, 0],
  );
  const reach = Math.hypot(...away) || 1;
  const [ax, ay] = point.by === 'datum' ? [0, -1] : [away[0] / reach, away[1] / reach];
  const [lx, ly] = [x + ax * (width / 2 + 26), y + ay * 34];
  const left = Math.min(Math.max(lx - width / 2, 4), size.width - width - 4);
  const top = Math.min(Math.max(ly - 11, 4), size.height - 26);
  ctx.fillStyle = colours.line;
  ctx.fillRect(left, top, width, 22);
  ctx.fillStyle = colours.onLine;
  ctx.textAlign = 'left';
  ctx.textBaseline = 'middle';
  ctx.fillText(text, left + 8, top + 11.5);
}

function paintChoosing(ink: Ink, state: TableState) {
  const { document, colours } = ink;
  const { datumFirst, hover } = state;
  if (datumFirst) {
    const at = vertexPoint(documentRing(document, datumFirst[0])[datumFirst[1]]);
    paintDatum(ink, at, colours.line);
    const to =
      hover?.kind === 'vertex'
        ? vertexPoint(documentRing(document, hover.ring)[hover.vertex])
        : null;
    if (to) {
      liveSegment(ink, screen(ink, at), screen(ink, to), 1.6);
    }
  }
  if (hover?.kind === 'vertex') {
    const [x, y] = screenFromGround(
      ink.camera,
      ink.size,
      vertexPoint(documentRing(document, hover.ring)[hover.vertex]),
    );
    dot(ink.ctx, [x, y], 8, colours.stone50, colours.line);
    boxedText(ink, cornerLabel(hover.ring, hover.vertex), [x, y - 20], 0, colours.line, 600);
  }
}

/** What is set out, over the floor: corners to tape from, strings, points; and in pink the point in hand with its tapes. */
export function paintSetOut(ink: Ink, state: TableState, floor: Floor) {
  const { ctx, colours } = ink;
  const { setOut } = floor;
  if (!setOut) return;
  paintStrings(ink, setOut.courses);
  const [first, second] = setOut.datums;
  ctx.strokeStyle = colours.graphite;
  ctx.lineWidth = 1.2;
  ctx.setLineDash([12, 4, 2, 4]);
  segment(ctx, screen(ink, first.at), screen(ink, second.at));
  ctx.setLineDash([]);
  ctx.lineWidth = 1.2;
  const all = setOut.points.length <= MOST_CROSSES;
  for (const point of setOut.points)
    if (all || point.kind !== 'string') cross(ink, screen(ink, point.at), 4);
  for (const { at } of setOut.datums) paintDatum(ink, at, colours.graphite);
  if (state.tool === 'datum') {
    paintChoosing(ink, state);
    return;
  }
  const point = pointShown(setOut, state);
  if (point) paintLive(ink, setOut, point, floor);
}
