import type { Point } from '@/geometry/point';
import type { PaperBox, PaperPoint, PathRing } from './drawing';

/** How the ground lies on the paper: the one place where y flips. */
export interface PlanView {
  /** Ground millimetres for one of the paper. */
  readonly scale: number;
  /** The ground point at the paper point `at`. */
  readonly ground: Point;
  readonly at: PaperPoint;
}

/** An edge of a ring, as the laying has it: straight when `bulge` is 0. */
export interface RingEdge {
  readonly start: Point;
  readonly end: Point;
  readonly bulge: number;
}

/** A place of the ground, mm, on the paper, mm; y turns over here. */
export function paperFromGround(view: PlanView, [x, y]: Point): PaperPoint {
  return [
    view.at[0] + (x - view.ground[0]) / view.scale,
    view.at[1] - (y - view.ground[1]) / view.scale,
  ];
}

/** A place on the paper, mm, back on the ground, mm. */
export function groundFromPaper(view: PlanView, [x, y]: PaperPoint): Point {
  return [
    view.ground[0] + (x - view.at[0]) * view.scale,
    view.ground[1] - (y - view.at[1]) * view.scale,
  ];
}

/** Left and low, right and high, mm on the ground. */
export interface GroundBounds {
  readonly least: Point;
  readonly greatest: Point;
}

/** The least bounds that hold the points. */
export function pointsBounds(points: readonly Point[]): GroundBounds {
  let [left, low, right, high] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [x, y] of points) {
    left = Math.min(left, x);
    low = Math.min(low, y);
    right = Math.max(right, x);
    high = Math.max(high, y);
  }
  return { least: [left, low], greatest: [right, high] };
}

/** The middle of the bounds at the middle of the box. */
export function viewCentred(bounds: GroundBounds, scale: number, box: PaperBox): PlanView {
  return {
    scale,
    ground: [
      (bounds.least[0] + bounds.greatest[0]) / 2,
      (bounds.least[1] + bounds.greatest[1]) / 2,
    ],
    at: [(box.left + box.right) / 2, (box.top + box.bottom) / 2],
  };
}

/** A ring on the paper, its arcs still arcs. */
export function paperRing(view: PlanView, edges: readonly RingEdge[]): PathRing {
  return {
    points: edges.map((edge) => paperFromGround(view, edge.start)),
    bulges: edges.map((edge) => edge.bulge),
    closed: true,
  };
}

/** How far a chord may leave its arc where arcs are only kept clear of, mm on the paper. */
const CHORD_SAGITTA = 0.05;

/** An edge as points on the paper, both ends included. */
export function paperChords(view: PlanView, edge: RingEdge): readonly PaperPoint[] {
  const [from, to] = [paperFromGround(view, edge.start), paperFromGround(view, edge.end)];
  if (edge.bulge === 0) return [from, to];
  const { centre, radius, startAngle, sweep } = arcOf(from, to, edge.bulge);
  const step = 2 * Math.acos(Math.max(0, 1 - CHORD_SAGITTA / Math.max(radius, CHORD_SAGITTA)));
  const count = Math.min(128, Math.max(2, Math.ceil(Math.abs(sweep) / step)));
  return Array.from({ length: count + 1 }, (_, n) => {
    if (n === 0) return from;
    if (n === count) return to;
    const angle = startAngle + (sweep * n) / count;
    return [
      centre[0] + radius * Math.cos(angle),
      centre[1] - radius * Math.sin(angle),
    ] as PaperPoint;
  });
}

/** An arc on the paper; angles in radians, anticlockwise as seen. */
function arcOf(
  from: PaperPoint,
  to: PaperPoint,
  bulge: number,
): {
  readonly centre: PaperPoint;
  readonly radius: number;
  readonly startAngle: number;
  readonly sweep: number;
} {
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const radius = (Math.hypot(dx, dy) * (1 + bulge * bulge)) / (4 * Math.abs(bulge));
  const toCentre = (1 - bulge * bulge) / (4 * bulge);
  const centre: PaperPoint = [
    (from[0] + to[0]) / 2 + dy * toCentre,
    (from[1] + to[1]) / 2 - dx * toCentre,
  ];
  return {
    centre,
    radius,
    startAngle: Math.atan2(centre[1] - from[1], from[0] - centre[0]),
    sweep: 4 * Math.atan(bulge),
  };
}
