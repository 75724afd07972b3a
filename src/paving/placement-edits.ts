import type { Point } from '@/geometry/point';
import type { LayoutDocument, Placement } from './layout-document';
import type { Laying } from './laying';
import { chordLength, documentRing, edgeDirectionDeg, vertexBulge } from './ground-edits';

/** Edits of where the pattern starts and how it is turned. */

export const placementSlid = (placement: Placement, by: Point): Placement => ({
  ...placement,
  origin: [placement.origin[0] + by[0], placement.origin[1] + by[1]],
});

/** An angle brought into [0, 360), with −0 and the last ulp below 360 taken as 0. */
export function turnNormal(turnDeg: number): number {
  const turn = ((turnDeg % 360) + 360) % 360;
  const rounded = Math.round(turn * 1e6) / 1e6;
  return rounded >= 360 || rounded === 0 ? 0 : rounded;
}

/** Placement turned to `turnDeg` about the ground point `pivot`, which keeps its place in the pattern. */
export function placementTurned(placement: Placement, turnDeg: number, pivot: Point): Placement {
  const turn = turnNormal(turnDeg);
  const radians = ((turn - placement.turn) * Math.PI) / 180;
  const cos = Math.cos(radians);
  const sin = Math.sin(radians);
  const x = placement.origin[0] - pivot[0];
  const y = placement.origin[1] - pivot[1];
  return { turn, origin: [pivot[0] + cos * x - sin * y, pivot[1] + sin * x + cos * y] };
}

/** Centre of the box round the perimeter's vertices: what the pattern is turned about. */
export function groundMiddle(document: LayoutDocument): Point {
  const xs = document.ground.perimeter.map((v) => v[0]);
  const ys = document.ground.perimeter.map((v) => v[1]);
  return [(Math.min(...xs) + Math.max(...xs)) / 2, (Math.min(...ys) + Math.max(...ys)) / 2];
}

/** The turn nearest to the present one at which unit sides run along a straight edge; null for an arc. */
export function turnAlongEdge(document: LayoutDocument, ring: number, edge: number): number | null {
  const vertices = documentRing(document, ring);
  if (vertexBulge(vertices[edge]) !== 0 || chordLength(vertices, edge) === 0) return null;
  const off = edgeDirectionDeg(vertices, edge) - document.placement.turn;
  return turnNormal(document.placement.turn + (off - Math.round(off / 90) * 90));
}

/** How many lattice steps either way are searched for the row nearest to an edge. */
const ROW_SEARCH = 12;

/**
 * The least slide that puts a line of unit sides exactly `clearance` inside the line of a straight
 * edge, for a pattern already turned along it. Returns a vector square to the edge, mm.
 */
export function slideToEdge(laying: Laying, ring: number, edge: number): Point {
  const { document, lattice, motif, origin } = laying;
  const vertices = documentRing(document, ring);
  const start = vertices[edge];
  const direction = (edgeDirectionDeg(vertices, edge) * Math.PI) / 180;
  // The ground lies to the left of the perimeter's edges and to the right of a keep-out's: both run anticlockwise.
  const side = ring === 0 ? 1 : -1;
  const normal: Point = [-Math.sin(direction) * side, Math.cos(direction) * side];
  const along = (v: Point) => v[0] * normal[0] + v[1] * normal[1];
  const target = along([start[0], start[1]]) + document.clearance;

  let best = Infinity;
  for (const entry of motif) {
    const half = Math.abs(along(entry.halfLength)) + Math.abs(along(entry.halfWidth));
    const radians = (document.placement.turn * Math.PI) / 180;
    const at: Point = [
      entry.at[0] * Math.cos(radians) - entry.at[1] * Math.sin(radians),
      entry.at[0] * Math.sin(radians) + entry.at[1] * Math.cos(radians),
    ];
    const base = along(origin) + along(at) - half;
    const a = along(lattice.a);
    const b = along(lattice.b);
    // Bring the nearest row close first, so that the search round it is short however far away the origin lies.
    const step = Math.max(Math.abs(a), Math.abs(b));
    const far = step === 0 ? 0 : Math.round((target - base) / step);
    const [fi, fj] = Math.abs(a) >= Math.abs(b) ? [far * Math.sign(a), 0] : [0, far * Math.sign(b)];
    for (let i = fi - ROW_SEARCH; i <= fi + ROW_SEARCH; i++)
      for (let j = fj - ROW_SEARCH; j <= fj + ROW_SEARCH; j++) {
        const slide = target - (base + i * a + j * b);
        if (Math.abs(slide) < Math.abs(best)) best = slide;
      }
  }
  return [normal[0] * best, normal[1] * best];
}

/** Starts nearer than this, mm, are one: half of what a figure shows. */
const SAME_START_MM = 0.05;

/** True when two origins, on the ground, start the same floor: they are a lattice step apart, or none. */
export function sameStart({ a, b }: Laying['lattice'], p: Point, q: Point): boolean {
  const cell = a[0] * b[1] - a[1] * b[0];
  const [dx, dy] = [p[0] - q[0], p[1] - q[1]];
  const i = Math.round((dx * b[1] - dy * b[0]) / cell);
  const j = Math.round((dy * a[0] - dx * a[1]) / cell);
  return Math.hypot(dx - i * a[0] - j * b[0], dy - i * a[1] - j * b[1]) <= SAME_START_MM;
}
