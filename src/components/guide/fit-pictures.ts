import { fit } from '@/paving/fit/fit';
import { shiftMap, shiftMapPlace } from '@/paving/fit/shift-map';
import type { LayoutDocument } from '@/paving/layout-document';
import { COURT } from './sample-floors';

/** What the guide says of a floor's fit, with its pictures as SVG text. */
export interface FitPicture {
  readonly most: number;
  readonly play: number;
  readonly map: string;
  readonly curve: string;
  readonly best: LayoutDocument;
}

const CHEQUER: LayoutDocument = {
  ...COURT,
  bond: { kind: 'chequer', unit: COURT.units[0].id, joint: 5 },
  placement: { origin: [250, 240], turn: 45 },
};

const MAP_ACROSS = 72;
const TURNS = { from: 0, to: 90, step: 2 } as const;

let made: FitPicture | null = null;

/** The fit of the guide's court, worked out once for as long as the server runs. */
export function fitPicture(): FitPicture {
  made ??= fitPictureOf(CHEQUER);
  return made;
}

function fitPictureOf(document: LayoutDocument): FitPicture {
  const { wholeUnits, placement, play } = fit(document, { choices: false })!;
  const { turns = [] } = fit(document, { choices: false, turn: TURNS })!;
  const counts = turns.map((turn) => turn.wholeUnits);
  const [least, most] = [Math.min(...counts), Math.max(...counts)];
  const curve = turns
    .map(
      ({ turn, wholeUnits: count }) =>
        `${((turn / 90) * 300).toFixed(1)},${(8 + ((most - count) / Math.max(1, most - least)) * 64).toFixed(1)}`,
    )
    .join(' ');
  return {
    most: wholeUnits,
    play: play ?? 0,
    best: { ...document, placement },
    map: mapSvg(document, placement.origin, play ?? 0),
    curve:
      '<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 300 80">' +
      `<polyline points="${curve}" fill="none" stroke="#1f2527" stroke-width="1.6"/>` +
      '<path d="M0 79.5H300" stroke="#cfd1ca"/></svg>',
  };
}

function mapSvg(document: LayoutDocument, best: readonly [number, number], play: number): string {
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
  const [u, v] = shiftMapPlace(map, best);
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${map.pitch.toFixed(2)} ${map.rise.toFixed(2)}">` +
    squares.join('') +
    `<circle cx="${u.toFixed(2)}" cy="${(map.rise - v).toFixed(2)}" r="${play.toFixed(2)}" fill="none" stroke="#ffffff" stroke-width="${(map.pitch / 160).toFixed(2)}" stroke-dasharray="${(map.pitch / 50).toFixed(1)}"/>` +
    `<circle cx="${u.toFixed(2)}" cy="${(map.rise - v).toFixed(2)}" r="${(map.pitch / 70).toFixed(2)}" fill="#c2185b"/></svg>`
  );
}
