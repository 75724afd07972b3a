import type { Point } from '@/geometry/point';
import { documentBuildUp, type BuildUp } from './build-up';
import type { LayoutDocument } from './layout-document';
import { documentLevels, SPOT_SPACING_MM, type Fall, type Levels, type Spot } from './levels';

/** Changes to the levels and layers of a document. */

export const levelsChanged = (document: LayoutDocument, part: Partial<Levels>): LayoutDocument => ({
  ...document,
  levels: { ...documentLevels(document), ...part },
});

/** The document with some of its layers changed. */
export const buildUpChanged = (
  document: LayoutDocument,
  part: Partial<BuildUp>,
): LayoutDocument => ({ ...document, buildUp: { ...documentBuildUp(document), ...part } });

/** The spot at a place, other than `except`; −1 where there is none. */
export const spotAt = (spots: readonly Spot[], [x, y]: Point, except = -1): number =>
  spots.findIndex(
    ({ at }, n) => n !== except && Math.hypot(at[0] - x, at[1] - y) < SPOT_SPACING_MM,
  );

/** The document with one spot more, at the end of the list. */
export const spotAdded = (document: LayoutDocument, spot: Spot): LayoutDocument =>
  levelsChanged(document, { spots: [...documentLevels(document).spots, spot] });

/** The document with a spot moved, renamed or measured anew. */
export const spotChanged = (
  document: LayoutDocument,
  index: number,
  part: Partial<Spot>,
): LayoutDocument =>
  levelsChanged(document, {
    spots: documentLevels(document).spots.map((spot, n) => {
      if (n !== index) return spot;
      const { name, ...changed } = { ...spot, ...part };
      return name ? { name, ...changed } : changed;
    }),
  });

/** The document without a spot. */
export const spotRemoved = (document: LayoutDocument, index: number): LayoutDocument =>
  levelsChanged(document, {
    spots: documentLevels(document).spots.filter((_, n) => n !== index),
  });

/** What a fall is started with when somebody chooses its kind, per cent: the least published. */
const FIRST_PERCENT = 2;

/** A fall of the kind, about the ground's middle, keeping the steepness that there was. */
export function fallOfKind(kind: Fall['kind'], before: Fall, middle: Point): Fall {
  if (kind === before.kind) return before;
  const percent = before.kind === 'none' ? FIRST_PERCENT : before.percent;
  const direction = before.kind === 'oneWay' || before.kind === 'toPoint' ? before.direction : 0;
  const [x, y] = middle.map(Math.round);
  switch (kind) {
    case 'none':
      return { kind };
    case 'oneWay':
      return { kind, direction, percent };
    case 'toPoint':
      return { kind, at: [x, y], direction: 0, percent };
    case 'toLine':
      return { kind, from: [x - 1000, y], to: [x + 1000, y], percent };
  }
}
