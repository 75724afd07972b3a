import type { Point } from '@/geometry/point';
import { bestFace } from '@/paving/fit/best-face';
import { fit, type FitChoice } from '@/paving/fit/fit';
import { fitFrame, groundFromFrame } from '@/paving/fit/fit-frame';
import { shiftMap, shiftMapPlace } from '@/paving/fit/shift-map';
import { layFloor, unitCorners } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { formatLength } from '@/paving/length';
import { COURT } from './sample-floors';

/** What the guide says of a floor's fit, with its pictures as SVG text in the theme's inks. */
export interface FitPicture {
  /** Where one unit's middle may be, on the ground. */
  readonly region: string;
  readonly map: string;
  readonly curve: string;
  /** The start with the most units, and one with fewer and more play, with the floor from each. */
  readonly choices: readonly {
    readonly choice: FitChoice;
    readonly play: string;
    readonly document: LayoutDocument;
  }[];
}

const CHEQUER: LayoutDocument = {
  ...COURT,
  bond: { kind: 'chequer', unit: COURT.units[0].id, joint: 8 },
  placement: { origin: [250, 240], turn: 45 },
};

const MAP_ACROSS = 96;
const TURNS = { from: 0, to: 90, step: 1 } as const;

let made: FitPicture | null = null;

/** The fit of the guide's court, worked out once for as long as the server runs. */
export function fitPicture(): FitPicture {
  made ??= fitPictureOf(CHEQUER);
  return made;
}

function fitPictureOf(document: LayoutDocument): FitPicture {
  const { choices } = fit(document);
  return {
    region: regionSvg(document),
    map: mapSvg(document, choices[0]),
    curve: curveSvg(document),
    choices: choices.slice(0, 2).map((choice) => ({
      choice,
      play: formatLength(choice.play, document.display),
      document: { ...document, placement: choice.placement },
    })),
  };
}

const path = (points: readonly Point[]) =>
  `M${points.map(([x, y]) => `${x.toFixed(1)} ${y.toFixed(1)}`).join('L')}Z`;

/** The ground, the places where a unit's middle may be, and one unit at the edge of them. */
function regionSvg(document: LayoutDocument): string {
  const frame = fitFrame(document);
  const [clear] = frame.clear;
  const { perimeter, keepOuts } = document.ground;
  const high = Math.max(...perimeter.map(([, y]) => y));
  const wide = Math.max(...perimeter.map(([x]) => x));
  const flipped = ([x, y]: readonly [number, number, ...unknown[]]): Point => [x, high - y];
  const grounds = [perimeter, ...keepOuts.map(({ ring }) => ring)].map((ring) =>
    path(ring.map(flipped)),
  );
  // Going on from where one piece ends; straight pieces and quarter arcs at most, which turn clockwise seen from above.
  const { x0, y0, x1, y1 } = clear;
  const left = new Set(
    Array.from({ length: clear.count }, (_, n) => n).filter(
      (n) => Math.hypot(x1[n] - x0[n], y1[n] - y0[n]) > SAME_PLACE_MM,
    ),
  );
  const at = (x: number, y: number) => flipped(groundFromFrame(frame, [x, y]));
  let region = '';
  while (left.size > 0) {
    let [n] = left;
    const [x, y] = at(x0[n], y0[n]);
    region += `M${x.toFixed(1)} ${y.toFixed(1)}`;
    while (left.delete(n)) {
      const [toX, toY] = at(x1[n], y1[n]);
      const radius = clear.radius[n];
      region +=
        radius > 0
          ? `A${radius.toFixed(1)} ${radius.toFixed(1)} 0 0 1 ${toX.toFixed(1)} ${toY.toFixed(1)}`
          : `L${toX.toFixed(1)} ${toY.toFixed(1)}`;
      const [endX, endY] = [x1[n], y1[n]];
      n = [...left].find((m) => Math.hypot(x0[m] - endX, y0[m] - endY) < SAME_PLACE_MM) ?? n;
    }
    region += 'Z';
  }
  const laying = layFloor(document);
  const { k, x, y } = laying.laid;
  const unit = unitCorners(laying.motif[k[0]], x[0], y[0]).map((corner) => flipped([...corner]));
  const [middleX, middleY] = flipped([x[0], y[0]]);
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" viewBox="-40 -40 ${wide + 80} ${high + 80}">` +
    `<path d="${grounds.join('')}" fill="none" stroke="var(--graphite)" stroke-width="34"/>` +
    `<path d="${region}" fill="var(--stone-300)" fill-rule="evenodd" stroke="var(--graphite)" stroke-width="16"/>` +
    `<path d="${path(unit)}" fill="none" stroke="var(--line)" stroke-width="26"/>` +
    `<circle cx="${middleX.toFixed(1)}" cy="${middleY.toFixed(1)}" r="60" fill="var(--line)"/></svg>`
  );
}

/** Places nearer than this are one corner of a region, mm. */
const SAME_PLACE_MM = 0.01;

function mapSvg(document: LayoutDocument, { placement, play }: FitChoice): string {
  const map = shiftMap(document, MAP_ACROSS);
  const [w, h] = [map.pitch / map.width, map.rise / map.height];
  const squares: string[] = [];
  for (let row = 0; row < map.height; row++)
    for (let column = 0; column < map.width;) {
      const count = map.counts[row * map.width + column];
      let end = column + 1;
      while (end < map.width && map.counts[row * map.width + end] === count) end++;
      const grey = Math.round(
        240 - ((count - map.least) / Math.max(1, map.most - map.least)) * 180,
      );
      const fill = `#${grey.toString(16).padStart(2, '0').repeat(3)}`;
      squares.push(
        `<rect x="${(column * w).toFixed(2)}" y="${(map.rise - (row + 1) * h).toFixed(2)}" width="${((end - column) * w + 0.3).toFixed(2)}" height="${(h + 0.3).toFixed(2)}" fill="${fill}"/>`,
      );
      column = end;
    }
  const [u, v] = shiftMapPlace(map, placement.origin);
  const outline = bestFace(document).outline?.map(([a, b]): Point => [a, map.rise - b]) ?? [];
  const lines =
    (outline.length > 0 ? `<path d="${path(outline)}"/>` : '') +
    `<circle cx="${u.toFixed(2)}" cy="${(map.rise - v).toFixed(2)}" r="${play.toFixed(2)}"/>`;
  // In both of the theme's inks, one over the other, so that they show on any grey.
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${map.pitch.toFixed(2)} ${map.rise.toFixed(2)}">` +
    squares.join('') +
    `<g fill="none" stroke="var(--stone-50)" stroke-width="${(map.pitch / 75).toFixed(2)}">${lines}</g>` +
    `<g fill="none" stroke="var(--graphite)" stroke-width="${(map.pitch / 180).toFixed(2)}">${lines}</g>` +
    `<circle cx="${u.toFixed(2)}" cy="${(map.rise - v).toFixed(2)}" r="${(map.pitch / 80).toFixed(2)}" fill="var(--line)"/></svg>`
  );
}

/** The turn curve, with its turns along the foot and its fewest and most units up the side. */
function curveSvg(document: LayoutDocument): string {
  const { turns = [] } = fit(document, { choices: false, turn: TURNS });
  const counts = turns.map((turn) => turn.wholeUnits);
  const [least, most] = [Math.min(...counts), Math.max(...counts)];
  const x = (turn: number) => 28 + (turn / TURNS.to) * 264;
  const y = (count: number) => 10 + ((most - count) / Math.max(1, most - least)) * 62;
  const curve = turns
    .map(({ turn, wholeUnits }) => `${x(turn).toFixed(1)},${y(wholeUnits).toFixed(1)}`)
    .join(' ');
  const text = (at: number, up: number, anchor: string, words: string) =>
    `<text x="${at}" y="${up}" text-anchor="${anchor}" font-size="10" fill="var(--slate)">${words}</text>`;
  return (
    '<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 300 96">' +
    `<polyline points="${curve}" fill="none" stroke="var(--graphite)" stroke-width="1.6"/>` +
    '<path d="M28 78.5H292" stroke="var(--stone-300)"/>' +
    text(22, y(most) + 3, 'end', String(most)) +
    text(22, y(least) + 3, 'end', String(least)) +
    [0, 15, 30, 45, 60, 75, 90]
      .map((turn) => text(x(turn), 91, turn === 90 ? 'end' : 'middle', `${turn}°`))
      .join('') +
    '</svg>'
  );
}
