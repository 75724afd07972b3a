import polygonClipping, { type MultiPolygon, type Pair } from 'polygon-clipping';
import type { Point } from './point';
import { ringArea } from './ring';

/** One or more polygons, each an outer ring and its holes, rings not closed. */
export type Region = readonly (readonly (readonly Point[])[])[];

export type ClipOperation = 'union' | 'intersection' | 'difference';

/** A region, or why the clipping library gave none, with a place near which it failed. */
export type ClipResult =
  | { readonly ok: true; readonly region: Region; readonly area: number }
  | { readonly ok: false; readonly reason: string; readonly at: Point };

/**
 * Coordinates go to the library as whole micrometres: on raw doubles it throws on abutting turned
 * rectangles, on this grid it does not.
 */
const GRID_PER_MM = 1000;

/** Results whose area is off by more than this share of a boundary's length, mm, are failures. */
const AREA_SLACK_MM = 0.004;

/** Signed area of a region, outer rings less their holes, mm². */
export function regionArea(region: Region): number {
  return region.reduce(
    (sum, polygon) =>
      sum +
      polygon.reduce((area, ring, n) => area + (n === 0 ? 1 : -1) * Math.abs(ringArea(ring)), 0),
    0,
  );
}

function regionLength(region: Region): number {
  let length = 0;
  for (const polygon of region) {
    for (const ring of polygon) {
      ring.forEach(([x, y], n) => {
        const [nx, ny] = ring[n + 1 === ring.length ? 0 : n + 1];
        length += Math.hypot(nx - x, ny - y);
      });
    }
  }
  return length;
}

/**
 * `subject` joined with, met with or less the union of `others`: the one way to the clipping
 * library. Snaps to the micrometre grid, runs, and checks the result's area against what the
 * operation allows. `expectedArea`, mm², when the caller knows it, is checked as well. A failure
 * is a value, never thrown.
 */
export function regionClip(
  operation: ClipOperation,
  subject: Region,
  others: readonly Region[],
  expectedArea?: number,
): ClipResult {
  const from: Point = subject[0]?.[0]?.[0] ?? others[0]?.[0]?.[0]?.[0] ?? [0, 0];
  const fail = (reason: string): ClipResult => ({ ok: false, reason, at: from });
  const snapped = (region: Region): MultiPolygon =>
    region.map((polygon) =>
      polygon.map((ring) =>
        ring.map(([x, y]): Pair => [
          Math.round((x - from[0]) * GRID_PER_MM),
          Math.round((y - from[1]) * GRID_PER_MM),
        ]),
      ),
    );
  let result: MultiPolygon;
  try {
    result = polygonClipping[operation](snapped(subject), ...others.map(snapped));
  } catch (error) {
    return fail(error instanceof Error ? error.message : String(error));
  }
  const region: Region = result.map((polygon) =>
    polygon.map((ring) =>
      ring
        .slice(0, -1)
        .map(([x, y]): Point => [x / GRID_PER_MM + from[0], y / GRID_PER_MM + from[1]]),
    ),
  );
  const area = regionArea(region);
  const whole = regionArea(subject);
  const added = others.reduce((sum, other) => sum + regionArea(other), 0);
  const slack =
    AREA_SLACK_MM *
      (regionLength(subject) + others.reduce((sum, other) => sum + regionLength(other), 0)) +
    1e-3;
  const [least, greatest] =
    operation === 'union'
      ? [whole, whole + added]
      : operation === 'intersection'
        ? [0, whole]
        : [whole - added, whole];
  if (!(area >= least - slack && area <= greatest + slack)) {
    return fail(`area ${area} mm² is outside ${least} to ${greatest} mm²`);
  }
  if (expectedArea !== undefined && Math.abs(area - expectedArea) > slack) {
    return fail(`area ${area} mm² differs from the ${expectedArea} mm² worked out`);
  }
  return { ok: true, region, area };
}
