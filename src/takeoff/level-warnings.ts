import type { Point } from '@/geometry/point';
import { pointSegmentDistance } from '@/geometry/segment-pairs';
import type { LayoutDocument } from '@/paving/layout-document';
import { formatLength } from '@/paving/length';
import { documentLevels, type Spot } from '@/paving/levels';
import type { EarthModel } from './earth-cells';

/** What there is to know before the volumes are believed. */
export interface LevelWarning {
  readonly kind:
    | 'noSpots'
    | 'fewSpots'
    | 'spotsInLine'
    | 'groundBeyondSpots'
    | 'spotsFarApart'
    | 'spotFarOutside'
    | 'overdigLeftOut';
  /** For the person, whole sentences. */
  readonly text: string;
}

/** A share of the ground beyond the spots up to this is not worth a word. */
const BEYOND_SHARE = 0.02;
/** Ground between spots farther apart than this, mm, is a guess that is said. */
const FAR_APART_MM = 10_000;
/** Spots of a narrow band: its width against its length. */
const NARROW_BAND = 0.05;
/** A spot this far outside the edge, mm, may be a slip of the pen. */
const FAR_OUTSIDE_MM = 5000;

/** What a spot is called on the screen and the drawings: its own name, or its place in the list. */
export const spotName = (spots: readonly Spot[], n: number): string =>
  spots[n].name ?? String(n + 1);

/** Length and width of the band that the spots fill, along the line between two that are far apart. */
function spotsBand(spots: readonly Spot[]): { readonly length: number; readonly width: number } {
  const farthestFrom = ([x, y]: Point): Point =>
    spots.reduce<Point>(
      (far, { at }) =>
        Math.hypot(at[0] - x, at[1] - y) > Math.hypot(far[0] - x, far[1] - y) ? at : far,
      [x, y],
    );
  const from = farthestFrom(spots[0].at);
  const to = farthestFrom(from);
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const length = Math.hypot(dx, dy);
  const across = spots.map(({ at: [x, y] }) => (dx * (y - from[1]) - dy * (x - from[0])) / length);
  return { length, width: Math.max(...across) - Math.min(...across) };
}

function outlineDistance(outline: readonly Point[], at: Point): number {
  return outline.reduce(
    (least, from, n) =>
      Math.min(least, pointSegmentDistance(at, from, outline[(n + 1) % outline.length])),
    Infinity,
  );
}

/** @param beyondShare share of the dug area that lies beyond the spots */
export function levelWarnings(
  document: LayoutDocument,
  { existing, ground, floorBins, overdigLeftOut }: EarthModel,
  beyondShare: number,
): LevelWarning[] {
  const { spots } = documentLevels(document);
  const shown = (mm: number) => formatLength(mm, document.display);
  const warnings: LevelWarning[] = [];
  const warn = (kind: LevelWarning['kind'], text: string) => warnings.push({ kind, text });
  if (overdigLeftOut) {
    warn(
      'overdigLeftOut',
      'The overdig could not be drawn round this outline, and is not in the volumes. Work it out by hand, or set it to 0.',
    );
  }
  if (spots.length === 0) {
    warn(
      'noSpots',
      'No spot of the existing ground is measured yet. The volumes take it as level with the top of the edge.',
    );
    return warnings;
  }
  if (spots.length < 3) {
    warn(
      'fewSpots',
      spots.length === 1
        ? 'One spot says how high the ground is, not how it slopes. Measure at least three, better one at each corner.'
        : 'Two spots say how the ground slopes one way only. Measure at least three, better one at each corner.',
    );
  } else {
    const band = spotsBand(spots);
    if (existing.shape === 'line' || band.width < NARROW_BAND * band.length) {
      warn(
        'spotsInLine',
        'The spots stand nearly in one line. Across that line the ground is taken as level. Measure some to both sides of it.',
      );
    }
  }
  if (spots.length >= 3 && existing.shape === 'triangles' && beyondShare > BEYOND_SHARE) {
    warn(
      'groundBeyondSpots',
      `${Math.round(beyondShare * 100)} % of what is dug lies beyond the spots. There each place is taken to be as high as the nearest place among them. Measure nearer to the edge, at the corners first.`,
    );
  }
  const farthest = existing.triangles.reduce(
    (most, corners) =>
      corners.reduce((far, n, place) => {
        const [p, q] = [spots[n].at, spots[corners[(place + 1) % 3]].at];
        return Math.max(far, Math.hypot(q[0] - p[0], q[1] - p[1]));
      }, most),
    0,
  );
  if (farthest > FAR_APART_MM) {
    warn(
      'spotsFarApart',
      `Some neighbouring spots are ${shown(farthest)} apart. The ground between them is taken as even. Measure between them where it is not.`,
    );
  }
  const { outline } = ground.rings[0];
  spots.forEach(({ at }, n) => {
    if (floorBins.holds(0, at)) return;
    // A corner near by says that it is not far outside.
    if (outline.some(([x, y]) => Math.hypot(x - at[0], y - at[1]) <= FAR_OUTSIDE_MM)) return;
    const out = outlineDistance(outline, at);
    if (out > FAR_OUTSIDE_MM) {
      warn(
        'spotFarOutside',
        `Spot ${spotName(spots, n)} lies ${shown(out)} outside the edge. It still counts; check its place.`,
      );
    }
  });
  return warnings;
}
