import type { PaperBox, PaperPoint } from './drawing';

/** What labels must keep clear of: texts as convex outlines, and lines that no text may stand on. */
export interface LabelSpace {
  readonly frame: PaperBox;
  readonly outlines: readonly (readonly PaperPoint[])[];
  readonly lines: readonly Segment[];
}

/** A straight line on the paper. */
export interface Segment {
  readonly from: PaperPoint;
  readonly to: PaperPoint;
}

/** Least white space between two texts, mm. */
const TEXT_CLEARANCE = 0.6;
/** Least white space between a text and a line, mm. */
const LINE_CLEARANCE = 0.35;

/** The room that is left when these stand too. */
export function withLabels(
  space: LabelSpace,
  outlines: readonly (readonly PaperPoint[])[],
  lines: readonly Segment[] = [],
): LabelSpace {
  return {
    ...space,
    outlines: [...space.outlines, ...outlines],
    lines: [...space.lines, ...lines],
  };
}

/** Whether all points lie in a box, its edges included. */
export const insideBox = (box: PaperBox, points: readonly PaperPoint[]): boolean =>
  points.every(([x, y]) => x >= box.left && x <= box.right && y >= box.top && y <= box.bottom);

/** May a text with these corners stand here? `overLines` allows it on lines (on a white plate). */
export function isFree(
  space: LabelSpace,
  corners: readonly PaperPoint[],
  { overLines = false }: { readonly overLines?: boolean } = {},
): boolean {
  return (
    insideBox(space.frame, corners) &&
    !space.outlines.some((taken) => convexGap(taken, corners) < TEXT_CLEARANCE) &&
    (overLines ||
      !space.lines.some(({ from, to }) => convexGap([from, to], corners) < LINE_CLEARANCE))
  );
}

/**
 * A lower bound of the distance between two convex outlines by the separating axis theorem, exact
 * when an edge of one faces the other; negative when they overlap. A segment is an outline of two points.
 */
export function convexGap(p: readonly PaperPoint[], q: readonly PaperPoint[]): number {
  let gap = -Infinity;
  for (const outline of [p, q]) {
    for (let n = 0; n < outline.length; n += 1) {
      const [x1, y1] = outline[n];
      const [x2, y2] = outline[(n + 1) % outline.length];
      const length = Math.hypot(x2 - x1, y2 - y1);
      if (length < 1e-9) continue;
      const [ux, uy] = [(x2 - x1) / length, (y2 - y1) / length];
      gap = Math.max(gap, gapAlong(p, q, [-uy, ux]));
      // A segment has ends as well as sides.
      if (outline.length === 2) gap = Math.max(gap, gapAlong(p, q, [ux, uy]));
    }
  }
  return gap;
}

function gapAlong(p: readonly PaperPoint[], q: readonly PaperPoint[], axis: PaperPoint): number {
  const [pLow, pHigh] = span(p, axis);
  const [qLow, qHigh] = span(q, axis);
  return Math.max(qLow - pHigh, pLow - qHigh);
}

function span(points: readonly PaperPoint[], [ax, ay]: PaperPoint): readonly [number, number] {
  let [low, high] = [Infinity, -Infinity];
  for (const [x, y] of points) {
    const along = x * ax + y * ay;
    low = Math.min(low, along);
    high = Math.max(high, along);
  }
  return [low, high];
}

/** The least distance between two lines, mm. */
export const segmentGap = (p: Segment, q: Segment): number =>
  convexGap([p.from, p.to], [q.from, q.to]);

/** Do two segments cross between their ends, by more than a touch? */
export function segmentsCross(p: Segment, q: Segment): boolean {
  const side = (s: Segment, [x, y]: PaperPoint) =>
    ((s.to[0] - s.from[0]) * (y - s.from[1]) - (s.to[1] - s.from[1]) * (x - s.from[0])) /
    Math.max(1e-9, Math.hypot(s.to[0] - s.from[0], s.to[1] - s.from[1]));
  const apart = (one: number, other: number) =>
    (one > 0.05 && other < -0.05) || (one < -0.05 && other > 0.05);
  return apart(side(p, q.from), side(p, q.to)) && apart(side(q, p.from), side(q, p.to));
}

/** Distance from a point to a segment. */
export function pointGap([x, y]: PaperPoint, { from, to }: Segment): number {
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const square = dx * dx + dy * dy;
  const t =
    square === 0 ? 0 : Math.min(1, Math.max(0, ((x - from[0]) * dx + (y - from[1]) * dy) / square));
  return Math.hypot(x - from[0] - t * dx, y - from[1] - t * dy);
}

/** Is the point inside the closed outline (even-odd)? */
export function isInside([x, y]: PaperPoint, outline: readonly PaperPoint[]): boolean {
  let inside = false;
  for (let n = 0; n < outline.length; n += 1) {
    const [x1, y1] = outline[n];
    const [x2, y2] = outline[(n + 1) % outline.length];
    if (y1 > y !== y2 > y && x < x1 + ((y - y1) / (y2 - y1)) * (x2 - x1)) inside = !inside;
  }
  return inside;
}
