import { edgeName } from '../edge-names';
import type { Point } from '@/geometry/point';
import type { GroundEdge } from '../ground';
import { frameFromGround, type FitFrame } from './fit-frame';

/** A frame need not have its regions for this. */
type Frame = Omit<FitFrame, 'clear'>;

/** Which edge of the ground: ring (0 the perimeter, 1 the first keep-out …) and edge of that ring. */
export type EdgeAddress = readonly [ring: number, edge: number];

/**
 * What the start must keep to. `edge`: a line of unit sides lies exactly the clearance inside the
 * edge's line. `between`: the margins at the two edges are the same. Each takes one freedom.
 */
export type FitHold =
  { readonly edge: EdgeAddress } | { readonly between: readonly [EdgeAddress, EdgeAddress] };

/** Why a hold cannot be kept: in words, and the turns, degrees, at which it could be. */
export interface HoldRefusal {
  /** Which of the holds, from 0. */
  readonly hold: number;
  readonly message: string;
  readonly turns: readonly number[];
}

/** Origins with n · o = height; those `from` to `to` along the line are all that need be looked at. Frame, mm. */
export interface HoldLine {
  readonly nx: number;
  readonly ny: number;
  readonly height: number;
  readonly from: number;
  readonly to: number;
}

/** Directions nearer than this, degrees, are parallel: the layout document's own measure. */
const PARALLEL_DEG = 0.01;
/** Lines nearer than this, mm, are one. */
const SAME_LINE_MM = 1e-6;
/** A lattice vector along a line is looked for up to this many steps either way. */
const GREATEST_STEPS = 40;

const degrees = (radians: number) => (radians * 180) / Math.PI;

function edgeAt(frame: Frame, [ring, edge]: EdgeAddress): GroundEdge | undefined {
  return frame.ground.rings[ring]?.edges[edge];
}

/** An edge by its corners, as the drawings name it; one that is not there, by its number. */
const edgeWords = (frame: Frame, [ring, edge]: EdgeAddress) => {
  const corners = frame.ground.rings[ring]?.edges.length ?? 0;
  if (edge < corners) return edgeName(ring, edge, corners);
  return ring === 0 ? `edge ${edge} of the perimeter` : `edge ${edge} of keep-out ${ring}`;
};

/** Angle between two directions as lines, degrees, 0 to 90. */
function lineAngle(one: Point, other: Point): number {
  const cross = Math.abs(one[0] * other[1] - one[1] * other[0]);
  const dot = Math.abs(one[0] * other[0] + one[1] * other[1]);
  return degrees(Math.atan2(cross, dot));
}

/** An edge in the frame: its ends, and the way into the ground square to it. */
function edgeInFrame(frame: Frame, edge: GroundEdge) {
  const a = frameFromGround(frame, edge.start);
  const b = frameFromGround(frame, edge.end);
  const size = Math.hypot(b[0] - a[0], b[1] - a[1]);
  const along: Point = [(b[0] - a[0]) / size, (b[1] - a[1]) / size];
  const inward: Point = edge.ring === 0 ? [-along[1], along[0]] : [along[1], -along[0]];
  return { a, b, along, inward };
}

/** Turns next to the present one, either way, at which some unit's sides would be parallel to the edge. */
function parallelTurns(frame: Frame, edge: GroundEdge): number[] {
  const angle = degrees(Math.atan2(edge.end[1] - edge.start[1], edge.end[0] - edge.start[0]));
  const { a } = frame.basis;
  const row = degrees(Math.atan2(a[1], a[0]));
  const turns = frame.entries.flatMap(({ lx, ly }) => {
    // How much farther the pattern must be turned, one way and the other, to meet the edge.
    const unit = row + degrees(Math.atan2(ly, lx));
    const more = (((angle - unit) % 90) + 90) % 90;
    return [frame.turn + more - 90, frame.turn + more].map((turn) => Math.round(turn * 1e6) / 1e6);
  });
  return [...new Set(turns)].sort((p, q) => p - q);
}

/** Why these holds cannot be kept at the frame's turn; null when they can. */
export function holdRefusal(frame: Frame, holds: readonly FitHold[]): HoldRefusal | null {
  const normals: Point[] = [];
  if (holds.length > 2) {
    return { hold: 2, message: 'two holds leave no freedom; take one of them off', turns: [] };
  }
  for (let n = 0; n < holds.length; n++) {
    const hold = holds[n];
    const refuse = (message: string, turns: readonly number[] = []) => ({
      hold: n,
      message,
      turns,
    });
    const addresses = 'edge' in hold ? [hold.edge] : hold.between;
    const edges: GroundEdge[] = [];
    for (const address of addresses) {
      const edge = edgeAt(frame, address);
      if (!edge) return refuse(`there is no ${edgeWords(frame, address)}`);
      if (edge.chords.length > 2) {
        return refuse(`${edgeWords(frame, address)} is an arc; hold to a straight edge`);
      }
      edges.push(edge);
    }
    const [first, second] = edges.map((edge) => edgeInFrame(frame, edge));
    normals.push(first.inward);
    if ('edge' in hold) {
      const fits = frame.entries.some(
        ({ lx, ly, wx, wy }) =>
          Math.min(lineAngle([lx, ly], first.along), lineAngle([wx, wy], first.along)) <=
          PARALLEL_DEG,
      );
      if (!fits) {
        const turns = parallelTurns(frame, edges[0]);
        return refuse(
          `no side of the units is parallel to ${edgeWords(frame, hold.edge)} at a turn of ${frame.turn}°; a turn of ${turns.map((turn) => `${turn}°`).join(' or ')} would do`,
          turns,
        );
      }
      continue;
    }
    const words = `${edgeWords(frame, hold.between[0])} and ${edgeWords(frame, hold.between[1])}`;
    if (lineAngle(first.along, second.along) > PARALLEL_DEG) {
      return refuse(`${words} are not parallel, so no pattern is centred between them`);
    }
    const across =
      first.inward[0] * (second.a[0] - first.a[0]) + first.inward[1] * (second.a[1] - first.a[1]);
    const facing =
      first.inward[0] * second.inward[0] + first.inward[1] * second.inward[1] < 0 && across > 0;
    if (!facing) return refuse(`${words} do not face each other across the ground`);
  }
  if (normals.length === 2 && lineAngle(normals[0], normals[1]) <= PARALLEL_DEG) {
    return {
      hold: 1,
      message: 'the two holds are parallel, so both cannot be kept; hold to an edge that is not',
      turns: [],
    };
  }
  return null;
}

/** The shortest lattice vector along a direction, mm, or Infinity when none is near enough. */
function periodAlong({ pitch, rise, shift }: Frame, [nx, ny]: Point): number {
  let least = Infinity;
  for (let j = 0; j <= GREATEST_STEPS; j++) {
    for (let i = -GREATEST_STEPS; i <= GREATEST_STEPS; i++) {
      if (j === 0 && i <= 0) continue;
      const u = i * pitch + j * shift;
      const v = j * rise;
      if (Math.abs(nx * u + ny * v) > SAME_LINE_MM) continue;
      least = Math.min(least, Math.hypot(u, v));
    }
  }
  return least;
}

/** The lines of origins that keep a hold which `holdRefusal` has not refused. */
export function holdLines(frame: Frame, hold: FitHold): HoldLine[] {
  const lines: HoldLine[] = [];
  const put = (nx: number, ny: number, height: number, from: number, to: number) => {
    const period = periodAlong(frame, [nx, ny]);
    const end = Math.min(to, from + period);
    const twin = lines.some(
      (line) =>
        Math.abs(line.height - height) < SAME_LINE_MM &&
        line.nx * nx + line.ny * ny > 1 - 1e-12 &&
        Math.abs(line.from - from) < SAME_LINE_MM,
    );
    if (!twin) lines.push({ nx, ny, height, from, to: end });
  };
  if ('edge' in hold) {
    const { a, b, along, inward } = edgeInFrame(frame, edgeAt(frame, hold.edge)!);
    for (const { lx, ly, wx, wy, atU, atV } of frame.entries) {
      for (const [px, py, qx, qy] of [
        [lx, ly, wx, wy],
        [wx, wy, lx, ly],
      ]) {
        if (lineAngle([px, py], along) > PARALLEL_DEG) continue;
        // Square to the unit's own side, which may be off the edge by a hair: nowhere nearer than the clearance.
        const half = Math.hypot(qx, qy);
        const sign = qx * inward[0] + qy * inward[1] > 0 ? 1 : -1;
        const nx = (sign * qx) / half;
        const ny = (sign * qy) / half;
        const support = Math.max(nx * a[0] + ny * a[1], nx * b[0] + ny * b[1]);
        const height = support + frame.document.clearance + half - (nx * atU + ny * atV);
        const ends = [-ny * a[0] + nx * a[1], -ny * b[0] + nx * b[1]];
        const own = -ny * atU + nx * atV;
        const reach = Math.hypot(px, py);
        put(nx, ny, height, Math.min(...ends) - reach - own, Math.max(...ends) + reach - own);
      }
    }
    return lines;
  }
  const [one, other] = hold.between.map((address) => edgeInFrame(frame, edgeAt(frame, address)!));
  const [nx, ny] = one.inward;
  const near = nx * one.a[0] + ny * one.a[1];
  const far = nx * other.a[0] + ny * other.a[1];
  const ends = [one.a, one.b, other.a, other.b].map(([u, v]) => -ny * u + nx * v);
  const from = Math.min(...ends);
  const to = Math.max(...ends);
  const sides = frame.entries.map(({ lx, ly, wx, wy, atU, atV }) => ({
    at: nx * atU + ny * atV,
    half: Math.abs(nx * lx + ny * ly) + Math.abs(nx * wx + ny * wy),
  }));
  // The unit nearest one edge and that nearest the other stand a lattice vector apart; which one
  // matters only as far as it is odd or even along a and b.
  const a = frame.pitch * nx;
  const b = frame.shift * nx + frame.rise * ny;
  for (const odd of [0, a, b, a + b]) {
    for (const low of sides) {
      for (const high of sides) {
        const height = (near + far + low.half - high.half - low.at - high.at - odd) / 2;
        put(nx, ny, height, from, to);
      }
    }
  }
  return lines;
}
