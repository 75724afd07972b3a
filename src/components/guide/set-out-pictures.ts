import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor, unitCorners, type Laying } from '@/paving/laying';
import { formatLength } from '@/paving/length';
import { setOut, type ControlPoint, type SetOut } from '@/paving/set-out/set-out';
import { TAPE_READING_MM } from '@/paving/set-out/tape-cross';
import { PLAIN_AGGREGATE, PLAIN_UNIT } from '../ui/drawing-colours';
import { COURT } from './sample-floors';

/** What the guide says of setting out, with its pictures as SVG text. */
export interface SetOutPicture {
  readonly floor: string;
  readonly floorWords: string;
  readonly crossings: readonly { readonly svg: string; readonly words: string }[];
  readonly string: string;
  readonly stringWords: string;
}

let made: SetOutPicture | null = null;

/** Worked out once for as long as the server runs. */
export function setOutPicture(): SetOutPicture {
  made ??= setOutPictureOf(COURT);
  return made;
}

export function setOutPictureOf(document: LayoutDocument): SetOutPicture {
  const laying = layFloor(document);
  const found = setOut(laying);
  const taped = found.points.filter(({ by, kind }) => by === 'tapes' && kind !== 'unit');
  const byAngle = [...taped].sort(
    (one, other) => Math.abs(one.crossingDeg - 90) - Math.abs(other.crossingDeg - 90),
  );
  const shown =
    taped.find(({ kind, angleDeg }) => kind === 'corner' && angleDeg === 90) ?? taped[0];
  const [a, b] = found.datums.map(({ name }) => name);
  const length = (mm: number) => formatLength(mm, document.display, { decimals: 1 });
  const course = found.courses.reduce((most, each) => (each.units > most.units ? each : most));
  return {
    floor: floorSvg(laying, found, shown),
    floorWords: `${shown.name} from ${a} and ${b}: ${length(shown.tapes[0])} and ${length(shown.tapes[1])}. The tapes meet at ${Math.round(shown.crossingDeg)}°.`,
    crossings: [byAngle[0], byAngle[byAngle.length - 1]].map((point) => ({
      svg: crossingSvg(found, point),
      words: `${point.name}: ${Math.round(point.crossingDeg)}°, within ${length(point.doubt)}`,
    })),
    string: stringSvg(course),
    stringWords: `String ${course.number}: ${course.units} units, ${length(course.startGap)} to the first, ${length(course.endGap)} after the last.`,
  };
}

const path = (points: readonly Point[]) =>
  `M${points.map(([x, y]) => `${x.toFixed(1)} ${y.toFixed(1)}`).join('L')}`;

function floorSvg(laying: Laying, { datums, courses }: SetOut, point: ControlPoint): string {
  const { ground, laid, motif } = laying;
  const { min, max } = ground.box;
  const room = 420;
  const size = [max[0] - min[0] + 2 * room, max[1] - min[1] + 2 * room];
  const units = Array.from(
    { length: laid.count },
    (_, n) => `${path(unitCorners(motif[laid.k[n]], laid.x[n], laid.y[n]))}Z`,
  ).join('');
  const rings = ground.rings.map(({ outline }) => `${path(outline)}Z`).join('');
  const strings = courses.map(({ from, to }) => path([from, to])).join('');
  const [a, b] = datums.map(({ at }) => at);
  const tapes = [a, b].map((from) => path([from, point.at])).join('');
  const arcs = [a, b]
    .map((from, n) => {
      const radius = point.tapes[n];
      const angle = Math.atan2(point.at[1] - from[1], point.at[0] - from[0]);
      const half = Math.min(0.5, 480 / radius);
      const at = (turn: number): Point => [
        from[0] + radius * Math.cos(angle + turn),
        from[1] + radius * Math.sin(angle + turn),
      ];
      const [p, q] = [at(-half), at(half)];
      return `M${p[0].toFixed(1)} ${p[1].toFixed(1)}A${radius.toFixed(1)} ${radius.toFixed(1)} 0 0 1 ${q[0].toFixed(1)} ${q[1].toFixed(1)}`;
    })
    .join('');
  const pegs = [a, b].map(([x, y]) => `M${x - 110} ${y + 130}h220l-60 -260h-100Z`).join('');
  const letters = datums
    .map(
      ({ name, at: [x, y] }) =>
        `<text x="${(x - (x > (min[0] + max[0]) / 2 ? -250 : 250)).toFixed(0)}" y="${(-y + 70).toFixed(0)}" font-size="230" font-weight="700" text-anchor="middle" fill="var(--graphite)">${name}</text>`,
    )
    .join('');
  const [px, py] = point.at;
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" viewBox="${min[0] - room} ${-max[1] - room} ${size[0]} ${size[1]}"><g transform="scale(1 -1)">` +
    `<path d="${rings}" fill="${PLAIN_AGGREGATE}" fill-rule="evenodd"/><path d="${units}" fill="${PLAIN_UNIT}" stroke="var(--graphite)" stroke-width="8"/>` +
    `<path d="${strings}" stroke="var(--slate)" stroke-width="10" fill="none"/><path d="${rings}" fill="none" stroke="var(--graphite)" stroke-width="26"/>` +
    `<path d="${path([a, b])}" stroke="var(--graphite)" stroke-width="14" stroke-dasharray="140 50 25 50" fill="none"/>` +
    `<path d="${tapes}" stroke="var(--line)" stroke-width="26" fill="none"/><path d="${arcs}" stroke="var(--line)" stroke-width="16" stroke-dasharray="60 40" fill="none"/>` +
    `<path d="${pegs}" fill="var(--graphite)" stroke="var(--stone-50)" stroke-width="18"/>` +
    `<circle cx="${px}" cy="${py}" r="80" fill="var(--stone-50)" stroke="var(--line)" stroke-width="24"/></g>${letters}` +
    `<text x="${px + (px > (min[0] + max[0]) / 2 ? 250 : -250)}" y="${-py - 190}" font-size="230" font-weight="700" text-anchor="middle" fill="var(--line)">${point.name}</text></svg>`
  );
}

/** The figure that two tapes read to ±2 mm fill at a point, plan the right way up, 12 mm across. */
function crossingSvg({ datums }: SetOut, point: ControlPoint): string {
  const [a, b] = datums.map(({ at }) => at);
  const d = Math.hypot(b[0] - a[0], b[1] - a[1]);
  const [ux, uy] = [(b[0] - a[0]) / d, (b[1] - a[1]) / d];
  const e = TAPE_READING_MM;
  const corners = [
    [e, e],
    [e, -e],
    [-e, -e],
    [-e, e],
  ].map(([dp, dq]): Point => {
    const [p, q] = [point.tapes[0] + dp, point.tapes[1] + dq];
    const x = (p * p - q * q + d * d) / (2 * d);
    const y = (point.square < 0 ? -1 : 1) * Math.sqrt(Math.max(0, p * p - x * x));
    return [a[0] + x * ux - y * uy - point.at[0], a[1] + x * uy + y * ux - point.at[1]];
  });
  const ray = (from: Point) => {
    const [x, y] = [from[0] - point.at[0], from[1] - point.at[1]];
    const far = Math.hypot(x, y) || 1;
    return `M0 0L${((x / far) * 12).toFixed(2)} ${((y / far) * 12).toFixed(2)}`;
  };
  return (
    '<svg xmlns="http://www.w3.org/2000/svg" viewBox="-6.5 -6.5 13 13"><g transform="scale(1 -1)">' +
    `<path d="${path(corners)}Z" fill="var(--stone-300)" stroke="var(--graphite)" stroke-width="0.1"/>` +
    `<path d="${ray(a)}${ray(b)}" stroke="var(--line)" stroke-width="0.14"/>` +
    `<circle r="${point.doubt.toFixed(2)}" fill="none" stroke="var(--graphite)" stroke-width="0.08" stroke-dasharray="0.35 0.25"/>` +
    '<circle r="0.22" fill="var(--line)"/></g></svg>'
  );
}

function stringSvg(course: SetOut['courses'][number]): string {
  const scale = 600 / course.length;
  const units = course.runs
    .flatMap(({ ticks }) => ticks)
    .map(
      ([from, to]) =>
        `<rect x="${(from * scale).toFixed(1)}" y="8" width="${((to - from) * scale).toFixed(1)}" height="34" fill="${PLAIN_UNIT}" stroke="var(--graphite)" stroke-width="1"/><path d="M${(from * scale).toFixed(1)} 42v12" stroke="var(--line)" stroke-width="1.4"/>`,
    )
    .join('');
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" viewBox="-8 0 616 62">${units}` +
    '<path d="M0 46H600" stroke="var(--line)" stroke-width="2.4"/><path d="M0 4V60M600 4V60" stroke="var(--graphite)" stroke-width="3"/></svg>'
  );
}
