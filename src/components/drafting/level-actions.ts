import type { Point } from '@/geometry/point';
import { surfaceHeight } from '@/geometry/plane-pieces';
import { levelText } from '@/paving/level-text';
import { levelsChanged, spotAdded, spotAt, spotChanged, spotRemoved } from '@/paving/level-edits';
import { documentLevels, GREATEST_SPOTS, type Fall } from '@/paving/levels';
import { existingGround } from '@/takeoff/existing-ground';
import { spotName } from '@/takeoff/level-warnings';
import { nudge } from './nudge';
import type { Placing, TableStore } from './table-store';

/** What keys, buttons and pointing do to the levels. */

/** A new spot's level: what is known of the ground there so far, to a whole millimetre. */
const levelSoFar = (table: TableStore, at: Point): number =>
  Math.round(
    surfaceHeight(existingGround(documentLevels(table.getState().document).spots).surface, at),
  );

/** Puts a spot down and picks it; a spot that is there already is picked instead. */
function spotPlaced(table: TableStore, at: Point): void {
  const { document, edit, set, settleShown } = table.getState();
  settleShown();
  const { spots } = documentLevels(document);
  const there = spotAt(spots, at);
  if (there >= 0) {
    set({ spot: there, said: `Spot ${spotName(spots, there)} is there already.` });
    return;
  }
  if (spots.length >= GREATEST_SPOTS) {
    set({ said: `A floor may have ${GREATEST_SPOTS} spots, and has them.` });
    return;
  }
  const level = levelSoFar(table, at);
  edit((now) => spotAdded(now, { at: [at[0], at[1]], level }));
  set({
    spot: spots.length,
    said: `Spot ${spots.length + 1} put down, ${levelText(level, document.display)} as far as is known. Type what you measured.`,
  });
}

/** A spot in the middle of what is in view, for those who do not point. */
export function spotPlacedInView(table: TableStore): void {
  const { camera } = table.getState();
  if (camera) spotPlaced(table, [Math.round(camera.centre[0]), Math.round(camera.centre[1])]);
}

export function spotTaken(table: TableStore, index: number): void {
  const { document, edit, set } = table.getState();
  const { spots } = documentLevels(document);
  if (index >= spots.length) return;
  edit((now) => spotRemoved(now, index));
  set({ spot: null, said: `Spot ${spotName(spots, index)} taken away.` });
}

export function spotNudged(table: TableStore, by: Point): void {
  const { spot } = table.getState();
  if (spot === null) return;
  nudge(table, (document) => {
    const { spots } = documentLevels(document);
    const at = spots[spot]?.at;
    if (!at) return document;
    const next: [number, number] = [at[0] + by[0], at[1] + by[1]];
    return spotAt(spots, next, spot) >= 0 ? document : spotChanged(document, spot, { at: next });
  });
}

/** Picks the next spot in the list, in either direction. */
export function spotStepped(table: TableStore, by: 1 | -1): void {
  const { document, spot, set } = table.getState();
  const count = documentLevels(document).spots.length;
  if (count === 0) return;
  const from = spot ?? (by === 1 ? -1 : 0);
  set({ spot: (from + by + count) % count });
}

export function placingStarted(table: TableStore, what: Placing['what']): void {
  const { settleShown, set } = table.getState();
  settleShown();
  set({ tool: 'place', placing: { what, first: null, at: null }, spot: null });
}

export function placingLeft(table: TableStore): void {
  table.getState().set({ tool: 'spot', placing: null });
}

const directionDeg = (from: Point, to: Point): number =>
  Math.round((Math.atan2(to[1] - from[1], to[0] - from[0]) * 180) / Math.PI);

/** Takes the place pointed at for whatever is being placed. */
export function placePointed(table: TableStore, at: Point): void {
  const { placing, edit, set } = table.getState();
  if (!placing) return;
  if (placing.what === 'spots') return spotPlaced(table, at);
  const point: [number, number] = [at[0], at[1]];
  const twice = placing.what !== 'fallPoint';
  if (twice && !placing.first) {
    set({
      placing: { ...placing, first: at },
      said:
        placing.what === 'fallLine'
          ? 'Now point at another place on the line.'
          : 'Now point towards where the water is to go.',
    });
    return;
  }
  if (placing.first && Math.hypot(at[0] - placing.first[0], at[1] - placing.first[1]) < 1) return;
  const first = placing.first;
  edit((document) => {
    const { fall } = documentLevels(document);
    const next: Fall =
      fall.kind === 'toPoint'
        ? { ...fall, at: point }
        : fall.kind === 'toLine' && first
          ? { ...fall, from: [first[0], first[1]], to: point }
          : fall.kind === 'oneWay' && first
            ? { ...fall, direction: directionDeg(first, at) }
            : fall;
    return levelsChanged(document, { fall: next });
  });
  placingLeft(table);
}
