import Coordinate from 'jsts/org/locationtech/jts/geom/Coordinate.js';
import GeometryFactory, { type Geometry } from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
import DistanceOp from 'jsts/org/locationtech/jts/operation/distance/DistanceOp.js';
import SnapIfNeededOverlayOp from 'jsts/org/locationtech/jts/operation/overlay/snap/SnapIfNeededOverlayOp.js';
import type { Point } from '@/geometry/point';
import type { LayoutDocument } from '@/paving/layout-document';

/**
 * The laying and the report worked out the slow way, from the words of the layout document and
 * JSTS (a port of JTS) alone: every candidate unit against the whole ground. It shares no code
 * with src/ but types. Arcs it flattens for itself, to a sagitta of 0.001 mm.
 */

interface OracleUnit {
  readonly address: string;
  readonly unit: string;
  readonly centre: Point;
  readonly corners: readonly Point[];
  /** Corners of the unit grown by half the joint on every side. */
  readonly grown: readonly Point[];
}

export interface OracleEdge {
  readonly ring: number;
  readonly edge: number;
  /** Each chord of the edge, start, end and the unit vector into the ground. */
  readonly chords: readonly { start: Point; end: Point; inward: Point }[];
}

export interface OracleFloor {
  readonly laid: ReadonlyMap<string, OracleUnit>;
  readonly leftOut: ReadonlySet<string>;
  readonly lifted: ReadonlySet<string>;
  /**
   * Addresses so near to a limit (1e-6 mm, 1e-3 mm²; where there are arcs, 0.06 mm and 60 mm²,
   * as arcs may be flattened in more than one way) that neither answer is wrong.
   */
  readonly undecided: ReadonlySet<string>;
  readonly groundArea: number;
  readonly coveredArea: number;
  readonly leastGap: number | null;
  readonly edges: readonly OracleEdge[];
  readonly reach: number;
}

/** Two right ways to flatten an arc part by no more than this. */
const ARC_DOUBT_MM = 0.06;

const factory = new GeometryFactory();
const coordinates = (ring: readonly Point[]) =>
  [...ring, ring[0]].map(([x, y]) => new Coordinate(x, y));
const linearRing = (ring: readonly Point[]) => factory.createLinearRing(coordinates(ring));
const polygonOf = (ring: readonly Point[]) => factory.createPolygon(linearRing(ring));

function bondTable(document: LayoutDocument) {
  const { bond } = document;
  const size = (id: string) => document.units.find((unit) => unit.id === id)!;
  if (bond.kind === 'custom') return { ...bond, joint: bond.joint ?? 0 };
  const { length: L, width: W } = size(bond.unit);
  const at = (x: number, y: number, turn = 0, unit = bond.unit) => ({ unit, at: [x, y], turn });
  if (bond.kind === 'stepping') {
    const [px, py] = bond.pitch;
    const joint = Math.max(px - L, py - W);
    return { a: [px, 0], b: [bond.shift * px, py], motif: [at(0, 0)], joint };
  }
  const g = bond.joint;
  const p = L + g;
  const q = W + g;
  if (bond.kind === 'stack') return { a: [p, 0], b: [0, q], motif: [at(0, 0)], joint: g };
  if (bond.kind === 'running') {
    return { a: [p, 0], b: [bond.shift * p, q], motif: [at(0, 0)], joint: g };
  }
  if (bond.kind === 'chequer') return { a: [2 * p, 0], b: [p, q], motif: [at(0, 0)], joint: g };
  if (bond.kind === 'basket') {
    const motif = [at(0, q / 2), at(0, -q / 2), at(p + q / 2, 0, 90), at(p - q / 2, 0, 90)];
    return { a: [2 * p, 0], b: [p, p], motif, joint: g };
  }
  if (bond.kind === 'herringbone') {
    const motif = [at(q / 2, 0), at(2 * q, q / 2, 90)];
    return { a: [4 * q, 0], b: [-q, q], motif, joint: g };
  }
  const s = size(bond.small).length + g;
  const motif = [at(0, 0), at((p + s) / 2, (s - p) / 2, 0, bond.small)];
  return { a: [p, s], b: [-s, p], motif, joint: g };
}

function signedArea(ring: readonly Point[]): number {
  return ring.reduce((sum, [x, y], n) => {
    const [nx, ny] = ring[(n + 1) % ring.length];
    return sum + ((x - ring[0][0]) * (ny - ring[0][1]) - (nx - ring[0][0]) * (y - ring[0][1])) / 2;
  }, 0);
}

/** Points along the arc by its centre, as polyline arcs are usually worked out. */
function arcChain(start: Point, end: Point, bulge: number): Point[] {
  const chord = Math.hypot(end[0] - start[0], end[1] - start[1]);
  if (Math.abs(bulge) * chord < 1e-5) return [start, end];
  const sweep = 4 * Math.atan(bulge);
  const radius = chord / 2 / Math.sin(Math.abs(sweep) / 2);
  const toCentre = (chord / 2) * ((1 - bulge * bulge) / (2 * bulge));
  const cx = (start[0] + end[0]) / 2 - ((end[1] - start[1]) / chord) * toCentre;
  const cy = (start[1] + end[1]) / 2 + ((end[0] - start[0]) / chord) * toCentre;
  const from = Math.atan2(start[1] - cy, start[0] - cx);
  const steps = Math.ceil(Math.abs(sweep) / Math.acos(1 - 0.001 / radius) / 2);
  return Array.from({ length: steps + 1 }, (_, n): Point => {
    if (n === 0) return start;
    if (n === steps) return end;
    const angle = from + (sweep * n) / steps;
    return [cx + radius * Math.cos(angle), cy + radius * Math.sin(angle)];
  });
}

export function oracleGround(document: LayoutDocument): {
  ground: Geometry;
  edges: OracleEdge[];
  rings: Point[][];
} {
  const rings = [document.ground.perimeter, ...document.ground.keepOuts.map(({ ring }) => ring)];
  const edges: OracleEdge[] = [];
  const outlines = rings.map((ring, r) => {
    const chains = ring.map((vertex, n) => {
      const next = ring[(n + 1) % ring.length];
      return arcChain([vertex[0], vertex[1]], [next[0], next[1]], vertex[2] ?? 0);
    });
    const outline = chains.flatMap((chain) => chain.slice(0, -1));
    const anticlockwise = signedArea(outline) > 0;
    const left = anticlockwise === (r === 0) ? 1 : -1;
    chains.forEach((chain, edge) => {
      const chords = chain.slice(1).map((end, n) => {
        const start = chain[n];
        const length = Math.hypot(end[0] - start[0], end[1] - start[1]);
        const inward: Point = [
          (-left * (end[1] - start[1])) / length,
          (left * (end[0] - start[0])) / length,
        ];
        return { start, end, inward };
      });
      edges.push({ ring: r, edge, chords });
    });
    return outline;
  });
  let ground: Geometry = polygonOf(outlines[0]);
  for (const keepOut of outlines.slice(1)) {
    ground = SnapIfNeededOverlayOp.difference(ground, polygonOf(keepOut));
  }
  return { ground, edges, rings: outlines };
}

export function oracleFloor(document: LayoutDocument): OracleFloor {
  const { a, b, motif, joint } = bondTable(document);
  const { ground, edges, rings } = oracleGround(document);
  const boundary = rings.map(linearRing);
  const { origin, turn } = document.placement;
  const radians = (degrees: number) => (degrees * Math.PI) / 180;
  const turned = ([x, y]: readonly number[], degrees: number): Point => [
    x * Math.cos(radians(degrees)) - y * Math.sin(radians(degrees)),
    x * Math.sin(radians(degrees)) + y * Math.cos(radians(degrees)),
  ];
  const [ax, ay] = turned(a, turn);
  const [bx, by] = turned(b, turn);
  const cell = ax * by - ay * bx;
  const xs = rings[0].map(([x]) => x);
  const ys = rings[0].map(([, y]) => y);
  const [left, right] = [Math.min(...xs), Math.max(...xs)];
  const [low, high] = [Math.min(...ys), Math.max(...ys)];
  const laid = new Map<string, OracleUnit>();
  const leftOut = new Set<string>();
  const lifted = new Set<string>();
  const undecided = new Set<string>();
  const liftedByHand = new Set(document.lifted.map(String));
  const tolerance = 0.01;
  const arcs = edges.some(({ chords }) => chords.length > 1);
  const doubt = arcs ? ARC_DOUBT_MM : 1e-6;
  const areaDoubt = arcs ? ARC_DOUBT_MM * 1000 : 1e-3;
  let coveredArea = 0;
  let leastGap: number | null = null;
  let greatestDiagonal = 0;

  motif.forEach((entry, k) => {
    const { length, width } = document.units.find(({ id }) => id === entry.unit)!;
    const diagonal = Math.hypot(length, width);
    greatestDiagonal = Math.max(greatestDiagonal, diagonal);
    const [mx, my] = turned(entry.at, turn);
    // Corners of the ground's box, widened by the unit, in lattice coordinates bound i and j.
    const corners = [
      [left - diagonal, low - diagonal],
      [right + diagonal, low - diagonal],
      [right + diagonal, high + diagonal],
      [left - diagonal, high + diagonal],
    ].map(([x, y]) => {
      const dx = x - origin[0] - mx;
      const dy = y - origin[1] - my;
      return [(dx * by - dy * bx) / cell, (dy * ax - dx * ay) / cell];
    });
    const bounds = [0, 1].map((axis) => [
      Math.floor(Math.min(...corners.map((corner) => corner[axis]))),
      Math.ceil(Math.max(...corners.map((corner) => corner[axis]))),
    ]);
    for (let i = bounds[0][0]; i <= bounds[0][1]; i++) {
      for (let j = bounds[1][0]; j <= bounds[1][1]; j++) {
        const x = origin[0] + i * ax + j * bx + mx;
        const y = origin[1] + i * ay + j * by + my;
        if (x < left - diagonal || x > right + diagonal) continue;
        if (y < low - diagonal || y > high + diagonal) continue;
        const rectangle = (grow: number) =>
          [
            [-1, -1],
            [1, -1],
            [1, 1],
            [-1, 1],
          ].map(([sx, sy]): Point => {
            const own = turned(
              [sx * (length / 2 + grow), sy * (width / 2 + grow)],
              turn + entry.turn,
            );
            return [x + own[0], y + own[1]];
          });
        const address = `${i},${j},${k}`;
        const true_ = rectangle(0);
        const polygon = polygonOf(true_);
        const cover = SnapIfNeededOverlayOp.intersection(ground, polygon).getArea();
        const distance = Math.min(...boundary.map((ring) => DistanceOp.distance(ring, polygon)));
        if (cover === 0) {
          // Outside; where arcs are flattened otherwise, one that all but touches may be in.
          if (arcs && distance < doubt) undecided.add(address);
          continue;
        }
        const slack = document.clearance - tolerance;
        let whole: boolean;
        if (slack > 0) {
          whole = cover > (length * width) / 2 && distance >= slack;
          if (Math.abs(distance - slack) < doubt) undecided.add(address);
        } else {
          // It may reach over by the rest of the tolerance: shrunk by that, it meets no edge.
          const meets = (more: number) => {
            const core = polygonOf(rectangle(slack - more));
            return boundary.some((ring) => DistanceOp.distance(ring, core) === 0);
          };
          whole = cover > (length * width) / 2 && !meets(0);
          if (meets(doubt) !== meets(-doubt)) undecided.add(address);
        }
        if (whole && liftedByHand.has(address)) lifted.add(address);
        else if (whole) {
          laid.set(address, {
            address,
            unit: entry.unit,
            centre: [x, y],
            corners: true_,
            grown: rectangle(joint / 2),
          });
          coveredArea += length * width;
          leastGap = Math.min(leastGap ?? Infinity, distance);
        } else {
          if (Math.abs(cover - 1) < areaDoubt) undecided.add(address);
          if (cover > 1) leftOut.add(address);
        }
      }
    }
  });
  return {
    laid,
    leftOut,
    lifted,
    undecided,
    groundArea: ground.getArea(),
    coveredArea,
    leastGap,
    edges,
    reach: document.clearance + joint + greatestDiagonal,
  };
}

/** Where the ray from `from` along `direction` first meets a convex polygon at t ≥ 0, or Infinity. */
function rayMeets(from: Point, direction: Point, polygon: readonly Point[]): number {
  let enter = 0;
  let leave = Infinity;
  polygon.forEach(([x0, y0], n) => {
    const [x1, y1] = polygon[(n + 1) % polygon.length];
    const nx = y1 - y0;
    const ny = x0 - x1;
    const ahead = direction[0] * nx + direction[1] * ny;
    const gap = (x0 - from[0]) * nx + (y0 - from[1]) * ny;
    if (ahead === 0) {
      if (gap < 0) leave = -Infinity;
    } else if (ahead < 0) enter = Math.max(enter, gap / ahead);
    else leave = Math.min(leave, gap / ahead);
  });
  return enter <= leave ? enter : Infinity;
}

/** Least distance square to the chord of the part of the polygon in front of it, or null. */
function gapBefore(
  { start, end, inward }: OracleEdge['chords'][number],
  corners: readonly Point[],
): number | null {
  const length = Math.hypot(end[0] - start[0], end[1] - start[1]);
  const along: Point = [(end[0] - start[0]) / length, (end[1] - start[1]) / length];
  let shape = corners.map(([x, y]): Point => {
    const dx = x - start[0];
    const dy = y - start[1];
    return [dx * along[0] + dy * along[1], dx * inward[0] + dy * inward[1]];
  });
  const cuts: ((point: Point) => number)[] = [([s]) => s, ([s]) => length - s, ([, t]) => t];
  for (const inside of cuts) {
    const next: Point[] = [];
    shape.forEach((point, n) => {
      const before = shape[(n + shape.length - 1) % shape.length];
      const [here, there] = [inside(point), inside(before)];
      if (here >= 0 !== there >= 0) {
        const share = there / (there - here);
        next.push([
          before[0] + share * (point[0] - before[0]),
          before[1] + share * (point[1] - before[1]),
        ]);
      }
      if (here >= 0) next.push(point);
    });
    shape = next;
  }
  const places = shape.map(([s]) => s);
  // Less than the tolerance of the unit is not in front of the edge.
  if (!(Math.max(...places) - Math.min(...places) > 0.01)) return null;
  return Math.min(...shape.map(([, t]) => t));
}

/**
 * Units that face an edge, by casting a ray every `step` mm: each with how many rays met it
 * first (0 for those that none met but that stand in front), how many met it and another at
 * once, and its gap.
 */
export function oracleFacing(
  { laid, reach }: OracleFloor,
  edge: OracleEdge,
  step: number,
): Map<string, { rays: number; tied: number; gap: number }> {
  const facing = new Map<string, { rays: number; tied: number; gap: number }>();
  for (const unit of laid.values()) {
    const gaps = edge.chords
      .map((chord) => gapBefore(chord, unit.corners))
      .filter((gap) => gap !== null);
    if (gaps.length > 0) facing.set(unit.address, { rays: 0, tied: 0, gap: Math.min(...gaps) });
  }
  for (const { start, end, inward } of edge.chords) {
    const length = Math.hypot(end[0] - start[0], end[1] - start[1]);
    for (let s = step / 2; s < length; s += step) {
      const from: Point = [
        start[0] + (s / length) * (end[0] - start[0]),
        start[1] + (s / length) * (end[1] - start[1]),
      ];
      const met = [...laid.values()]
        .map(({ address, grown }) => ({ address, t: rayMeets(from, inward, grown) }))
        .filter(({ t }) => t <= reach + 1e-6);
      const least = Math.min(...met.map(({ t }) => t));
      const first = met.filter(({ t }) => t <= least + 1e-6);
      for (const { address } of first) {
        const known = facing.get(address);
        if (known && first.length === 1) known.rays++;
        else if (known) known.tied++;
      }
    }
  }
  return facing;
}
