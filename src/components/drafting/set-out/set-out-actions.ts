import { figuredText } from '@/paving/figured-words';
import { documentRing, documentRingCount } from '@/paving/ground-edits';
import type { LayoutDocument } from '@/paving/layout-document';
import { LEAST_BASELINE_MM } from '@/paving/set-out/datum-choice';
import { cornerLabel } from '@/paving/set-out/marks';
import type { CornerAddress } from '@/paving/set-out/set-out-types';
import { floorOf } from '../floor';
import { shownDocument, type TableStore } from '../table-store';

/** What keys, lists and pointing do to the set-out. */

/** Every corner that a tape can be hooked on, the perimeter's first. */
export function datumCorners(document: LayoutDocument): CornerAddress[] {
  return Array.from({ length: documentRingCount(document) }, (_, ring) =>
    documentRing(document, ring).map((_, vertex): CornerAddress => [ring, vertex]),
  ).flat();
}

export function datumsStarted(table: TableStore): void {
  table.getState().set({
    tool: 'datum',
    datumFirst: null,
    pointed: null,
    hover: null,
    said: 'Point at the first corner to tape from.',
  });
}

export function datumsLeft(table: TableStore): void {
  table.getState().set({ tool: 'points', datumFirst: null, hover: null });
}

/** Why the corner cannot be the second of the two; null when it can. */
export function datumRefused(
  document: LayoutDocument,
  first: CornerAddress | null,
  [ring, vertex]: CornerAddress,
): string | null {
  if (!first) return null;
  const [p, q] = [documentRing(document, first[0])[first[1]], documentRing(document, ring)[vertex]];
  return Math.hypot(p[0] - q[0], p[1] - q[1]) < LEAST_BASELINE_MM
    ? 'Too near to the first corner: a tape could not tell directions apart. Take one farther off.'
    : null;
}

/** Points at a corner to tape from; the second settles the choice, one step for Undo. */
export function datumPointed(table: TableStore, corner: CornerAddress): void {
  const { datumFirst: first, document, edit, set } = table.getState();
  const refused = datumRefused(document, first, corner);
  if (refused) {
    set({ said: refused });
    return;
  }
  if (!first) {
    set({
      datumFirst: corner,
      said: `From ${cornerLabel(...corner)} and …: point at the second corner.`,
    });
    return;
  }
  const [p, q] = [first, corner];
  edit((now) => ({
    ...now,
    setOut: {
      datums: [
        [p[0], p[1]],
        [q[0], q[1]],
      ],
    },
  }));
  datumsLeft(table);
  set({ said: `Taped from ${cornerLabel(...p)} and ${cornerLabel(...q)}.` });
}

/** Lets the program pick the two corners again. */
export function datumsCleared(table: TableStore): void {
  table.getState().edit((now) => ({ ...now, setOut: undefined }));
  datumsLeft(table);
  table.getState().set({ said: 'The corners to tape from are picked for you.' });
}

/** Picks the control point before or after, round and round. */
export function pointStepped(table: TableStore, by: 1 | -1): void {
  const state = table.getState();
  const document = shownDocument(state);
  const points = floorOf(document).setOut?.points ?? [];
  if (points.length === 0) return;
  const at = points.findIndex(({ name }) => name === state.point);
  const next =
    at < 0 ? (by === 1 ? 0 : points.length - 1) : (at + by + points.length) % points.length;
  const { name, what } = points[next];
  state.set({
    point: name,
    pointed: null,
    said: `${name}: ${figuredText(what, document.display)}.`,
  });
}
