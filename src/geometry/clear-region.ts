/**
 * Where a rectangle's centre may stand so that the rectangle keeps clear of every chord of a
 * boundary: the complement of the chords, each swept by the rectangle and by a disc. Its own
 * boundary is made of straight pieces and, where the disc turns a corner, of arcs.
 */

/** Boundary pieces, flat. The clear region lies left of start → end; arcs run clockwise about their centre. */
export interface ClearBoundary {
  count: number;
  /** Start and end, mm. */
  x0: Float64Array;
  y0: Float64Array;
  x1: Float64Array;
  y1: Float64Array;
  /** Centre and radius of an arc; radius 0 for a straight piece. Arcs stay within a quarter circle. */
  cx: Float64Array;
  cy: Float64Array;
  radius: Float64Array;
}

/** Chords as flat arrays: from (ax, ay) to (bx, by), mm; `side` is 1 where the ground lies left, −1 where right. */
export interface BoundaryChords {
  readonly count: number;
  readonly ax: Float64Array;
  readonly ay: Float64Array;
  readonly bx: Float64Array;
  readonly by: Float64Array;
  readonly side: Int8Array;
}

/** The rectangle, as half its length and half its width as vectors, mm. */
export interface SweepingRectangle {
  readonly lx: number;
  readonly ly: number;
  readonly wx: number;
  readonly wy: number;
}

/** A chord's sweep: the disc of `radius` about a convex polygon, anticlockwise, 4 or 6 corners. */
interface Sweep {
  readonly n: number;
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** Outward unit normals of the sides. */
  readonly nx: Float64Array;
  readonly ny: Float64Array;
  readonly radius: number;
  readonly minX: number;
  readonly maxX: number;
  readonly minY: number;
  readonly maxY: number;
}

/** Pieces shorter than this, mm, are rounding. */
const LEAST_PIECE_MM = 1e-9;

function sweepOf(
  x0: number,
  y0: number,
  x1: number,
  y1: number,
  { lx, ly, wx, wy }: SweepingRectangle,
  radius: number,
): Sweep {
  const half: [number, number][] = [
    [(x1 - x0) / 2, (y1 - y0) / 2],
    [lx, ly],
    [wx, wy],
  ];
  const upper = half
    .filter(([x, y]) => x !== 0 || y !== 0)
    .map(([x, y]): [number, number] => (y < 0 || (y === 0 && x < 0) ? [-x, -y] : [x, y]))
    .sort((p, q) => q[0] * p[1] - q[1] * p[0]);
  // Parallel directions make one side, so that no side has a length of 0 beside another.
  const axes: [number, number][] = [];
  for (const [x, y] of upper) {
    const last = axes[axes.length - 1];
    if (last) {
      const cross = last[0] * y - last[1] * x;
      if (Math.abs(cross) <= 1e-13 * Math.hypot(...last) * Math.hypot(x, y)) {
        last[0] += x;
        last[1] += y;
        continue;
      }
    }
    axes.push([x, y]);
  }
  const n = 2 * axes.length;
  const x = new Float64Array(n);
  const y = new Float64Array(n);
  const nx = new Float64Array(n);
  const ny = new Float64Array(n);
  let px = (x0 + x1) / 2;
  let py = (y0 + y1) / 2;
  for (const [ax, ay] of axes) {
    px -= ax;
    py -= ay;
  }
  for (let m = 0; m < n; m++) {
    const sign = m < axes.length ? 2 : -2;
    const [ax, ay] = axes[m % axes.length];
    x[m] = px;
    y[m] = py;
    px += sign * ax;
    py += sign * ay;
    const size = Math.hypot(ax, ay);
    nx[m] = ((sign / 2) * ay) / size;
    ny[m] = (-(sign / 2) * ax) / size;
  }
  let minX = Infinity;
  let maxX = -Infinity;
  let minY = Infinity;
  let maxY = -Infinity;
  for (let m = 0; m < n; m++) {
    minX = Math.min(minX, x[m]);
    maxX = Math.max(maxX, x[m]);
    minY = Math.min(minY, y[m]);
    maxY = Math.max(maxY, y[m]);
  }
  return {
    n,
    x,
    y,
    nx,
    ny,
    radius,
    minX: minX - radius,
    maxX: maxX + radius,
    minY: minY - radius,
    maxY: maxY + radius,
  };
}

/** Part of the line from (px, py) along the unit vector (dx, dy) inside the sweep, or false. */
function lineSection(
  { n, x, y, nx, ny, radius }: Sweep,
  px: number,
  py: number,
  dx: number,
  dy: number,
  out: Float64Array,
): boolean {
  let low = Infinity;
  let high = -Infinity;
  for (let m = 0; m < n; m++) {
    const o = m + 1 === n ? 0 : m + 1;
    const ax = x[m] - px;
    const ay = y[m] - py;
    const bx = x[o] - px;
    const by = y[o] - py;
    const rise = nx[m] * radius * -dy + ny[m] * radius * dx;
    const run = nx[m] * radius * dx + ny[m] * radius * dy;
    const s0 = ay * dx - ax * dy + rise;
    const s1 = by * dx - bx * dy + rise;
    if (s0 > 0 !== s1 > 0) {
      const t0 = ax * dx + ay * dy + run;
      const t1 = bx * dx + by * dy + run;
      const t = t0 + (s0 / (s0 - s1)) * (t1 - t0);
      if (t < low) low = t;
      if (t > high) high = t;
    }
    if (radius > 0) {
      const away = ay * dx - ax * dy;
      if (away < radius && away > -radius) {
        const reach = Math.sqrt(radius * radius - away * away);
        const t = ax * dx + ay * dy;
        if (t - reach < low) low = t - reach;
        if (t + reach > high) high = t + reach;
      }
    }
  }
  out[0] = low;
  out[1] = high;
  return low < high;
}

/** True when the point is inside the sweep. */
function sweepHolds({ n, x, y, nx, ny, radius }: Sweep, px: number, py: number): boolean {
  let inside = true;
  for (let m = 0; m < n; m++) {
    const away = (px - x[m]) * nx[m] + (py - y[m]) * ny[m];
    if (away > radius) return false;
    if (away > 0) inside = false;
  }
  if (inside) return true;
  let least = Infinity;
  for (let m = 0; m < n; m++) {
    const o = m + 1 === n ? 0 : m + 1;
    const ex = x[o] - x[m];
    const ey = y[o] - y[m];
    const along = ((px - x[m]) * ex + (py - y[m]) * ey) / (ex * ex + ey * ey);
    const at = Math.max(0, Math.min(1, along));
    least = Math.min(least, (px - x[m] - at * ex) ** 2 + (py - y[m] - at * ey) ** 2);
  }
  return least < radius * radius;
}

/** Adds the angles at which the circle crosses the sweep's boundary. */
function circleCrossings(
  { n, x, y, nx, ny, radius }: Sweep,
  cx: number,
  cy: number,
  r: number,
  angles: number[],
): void {
  for (let m = 0; m < n; m++) {
    const o = m + 1 === n ? 0 : m + 1;
    const ax = x[m] + nx[m] * radius - cx;
    const ay = y[m] + ny[m] * radius - cy;
    const ex = x[o] - x[m];
    const ey = y[o] - y[m];
    const size = Math.sqrt(ex * ex + ey * ey);
    const away = nx[m] * ax + ny[m] * ay;
    if (Math.abs(away) < r) {
      const reach = Math.sqrt(r * r - away * away);
      const foot = -(ax * ex + ay * ey) / size;
      for (let end = -1; end <= 1; end += 2) {
        const at = foot + end * reach;
        if (at < -1e-9 || at > size + 1e-9) continue;
        angles.push(Math.atan2(ay + (at * ey) / size, ax + (at * ex) / size));
      }
    }
    if (radius <= 0) continue;
    const qx = x[m] - cx;
    const qy = y[m] - cy;
    const d = Math.sqrt(qx * qx + qy * qy);
    if (d === 0 || d > r + radius || d < Math.abs(r - radius)) continue;
    const along = (d * d + r * r - radius * radius) / (2 * d);
    const turn = Math.acos(Math.max(-1, Math.min(1, along / r)));
    const base = Math.atan2(qy, qx);
    angles.push(base + turn, base - turn);
  }
}

/** Chords by the bands of y that they reach into, for telling whether a point is in the ground. */
interface GroundBands {
  readonly chords: BoundaryChords;
  readonly low: number;
  readonly perMm: number;
  /** Chords of band n: `of[start[n] … start[n + 1] − 1]`. */
  readonly start: Int32Array;
  readonly of: Int32Array;
}

function groundBands(chords: BoundaryChords): GroundBands {
  const { count, ay, by } = chords;
  let low = Infinity;
  let high = -Infinity;
  for (let n = 0; n < count; n++) {
    low = Math.min(low, ay[n], by[n]);
    high = Math.max(high, ay[n], by[n]);
  }
  const bands = Math.max(1, count >> 1);
  const perMm = bands / (high - low);
  const bandOf = (y: number) => Math.max(0, Math.min(bands - 1, Math.floor((y - low) * perMm)));
  const start = new Int32Array(bands + 1);
  const each = (visit: (band: number, chord: number) => void) => {
    for (let n = 0; n < count; n++) {
      const last = bandOf(Math.max(ay[n], by[n]));
      for (let band = bandOf(Math.min(ay[n], by[n])); band <= last; band++) visit(band, n);
    }
  };
  each((band) => start[band + 1]++);
  for (let band = 0; band < bands; band++) start[band + 1] += start[band];
  const next = start.slice();
  const of = new Int32Array(start[bands]);
  each((band, chord) => {
    of[next[band]++] = chord;
  });
  return { chords, low, perMm, start, of };
}

/** True when the boundary winds round the point, keep-outs counted against the perimeter. */
function groundHolds(
  { chords, low, perMm, start, of }: GroundBands,
  px: number,
  py: number,
): boolean {
  const { ax, ay, bx, by, side } = chords;
  const band = Math.floor((py - low) * perMm);
  if (!(band >= 0 && band + 1 < start.length)) return false;
  let depth = 0;
  for (let at = start[band]; at < start[band + 1]; at++) {
    const n = of[at];
    const above = ay[n] > py;
    if (above === by[n] > py) continue;
    if (px < ax[n] + ((py - ay[n]) / (by[n] - ay[n])) * (bx[n] - ax[n])) {
      depth += (above ? -1 : 1) * side[n];
    }
  }
  return depth > 0;
}

interface Room {
  x0: number[];
  y0: number[];
  x1: number[];
  y1: number[];
  cx: number[];
  cy: number[];
  radius: number[];
}

const ascending = (one: number, other: number) => one - other;

function roomPut(
  room: Room,
  x0: number,
  y0: number,
  x1: number,
  y1: number,
  cx: number,
  cy: number,
  r: number,
): void {
  room.x0.push(x0);
  room.y0.push(y0);
  room.x1.push(x1);
  room.y1.push(y1);
  room.cx.push(cx);
  room.cy.push(cy);
  room.radius.push(r);
}

/**
 * The boundary of the clear region in the ground that the chords bound. `reach(n)` is how far from
 * chord n the rectangle must stay, mm, 0 or more; `grow(n)` lengthens the rectangle's half sides for
 * chord n, mm, and may be negative. Giving each chord a reach or a growth of its own, a hair apart,
 * keeps boundaries that would coincide from doing so.
 */
export function clearBoundary(
  chords: BoundaryChords,
  rectangle: SweepingRectangle,
  reach: (chord: number) => number,
  grow: (chord: number) => number,
): ClearBoundary {
  const { count, ax, ay, bx, by } = chords;
  const hl = Math.hypot(rectangle.lx, rectangle.ly);
  const hw = Math.hypot(rectangle.wx, rectangle.wy);
  const sweeps: Sweep[] = [];
  for (let n = 0; n < count; n++) {
    const more = grow(n);
    const l = Math.max(1e-6, hl + more) / hl;
    const w = Math.max(1e-6, hw + more) / hw;
    const own = {
      lx: rectangle.lx * l,
      ly: rectangle.ly * l,
      wx: rectangle.wx * w,
      wy: rectangle.wy * w,
    };
    sweeps.push(sweepOf(ax[n], ay[n], bx[n], by[n], own, reach(n)));
  }
  const order = sweeps.map((_, n) => n).sort((m, n) => sweeps[m].minX - sweeps[n].minX);
  const near: number[][] = sweeps.map(() => []);
  for (let m = 0; m < count; m++) {
    const one = sweeps[order[m]];
    for (let n = m + 1; n < count && sweeps[order[n]].minX <= one.maxX; n++) {
      const other = sweeps[order[n]];
      if (other.minY > one.maxY || other.maxY < one.minY) continue;
      near[order[m]].push(order[n]);
      near[order[n]].push(order[m]);
    }
  }
  // Those along the same edge first: they cover the most.
  near.forEach((others, n) => others.sort((p, q) => Math.abs(p - n) - Math.abs(q - n)));
  const room: Room = { x0: [], y0: [], x1: [], y1: [], cx: [], cy: [], radius: [] };
  const ground = groundBands(chords);
  for (let n = 0; n < count; n++) sweepPieces(ground, sweeps, n, near[n], room);
  joinEnds(room);
  return {
    count: room.x0.length,
    x0: Float64Array.from(room.x0),
    y0: Float64Array.from(room.y0),
    x1: Float64Array.from(room.x1),
    y1: Float64Array.from(room.y1),
    cx: Float64Array.from(room.cx),
    cy: Float64Array.from(room.cy),
    radius: Float64Array.from(room.radius),
  };
}

/** Ends nearer than this to a start, mm, are where the boundary goes on: each was worked out on its own side. */
const SAME_END_MM = 1e-6;

/** Makes each piece end exactly where the next begins, so that no line slips between them or counts both. */
function joinEnds({ x0, y0, x1, y1 }: Room): void {
  const order = x0.map((_, n) => n).sort((m, n) => x0[m] - x0[n]);
  const sorted = Float64Array.from(order, (n) => x0[n]);
  for (let n = 0; n < x1.length; n++) {
    let low = 0;
    let high = sorted.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (sorted[middle] < x1[n] - SAME_END_MM) low = middle + 1;
      else high = middle;
    }
    let next = -1;
    let least = SAME_END_MM;
    for (let at = low; at < sorted.length && sorted[at] <= x1[n] + SAME_END_MM; at++) {
      const m = order[at];
      const apart = Math.hypot(x0[m] - x1[n], y0[m] - y1[n]);
      if (m === n || apart > least) continue;
      least = apart;
      next = m;
    }
    if (next < 0) continue;
    x1[n] = x0[next];
    y1[n] = y0[next];
  }
}

/** Adds the parts of one sweep's boundary that no other sweep covers and that lie in the ground. */
function sweepPieces(
  ground: GroundBands,
  sweeps: readonly Sweep[],
  own: number,
  near: readonly number[],
  room: Room,
): void {
  const sweep = sweeps[own];
  const { n, x, y, nx, ny, radius } = sweep;
  const cut = new Float64Array(2);
  const covered: [number, number][] = [];
  for (let m = 0; m < n; m++) {
    const o = m + 1 === n ? 0 : m + 1;
    const px = x[m] + nx[m] * radius;
    const py = y[m] + ny[m] * radius;
    const dx = -ny[m];
    const dy = nx[m];
    const length = (x[o] - x[m]) * dx + (y[o] - y[m]) * dy;
    const qx = px + dx * length;
    const qy = py + dy * length;
    covered.length = 0;
    // Neighbours cover most sides from their ends: what is left between.
    let begin = 0;
    let end = length;
    for (const other of near) {
      const s = sweeps[other];
      if (Math.min(px, qx) > s.maxX || Math.max(px, qx) < s.minX) continue;
      if (Math.min(py, qy) > s.maxY || Math.max(py, qy) < s.minY) continue;
      if (!lineSection(s, px, py, dx, dy, cut)) continue;
      if (cut[1] <= begin || cut[0] >= end) continue;
      if (cut[0] <= begin) begin = cut[1];
      else if (cut[1] >= end) end = cut[0];
      else covered.push([cut[0], cut[1]]);
      if (begin >= end) break;
    }
    // Corners go with the sides: each is looked at after the side that leads to it.
    if (radius > 0 && !cornerCovered(sweeps, near, x[o], y[o])) {
      cornerPieces(ground, sweeps, sweep, o, m, near, room);
    }
    if (begin >= end) continue;
    covered.sort((one, other) => one[0] - other[0]);
    covered.push([end, end]);
    let from = begin;
    for (const [low, high] of covered) {
      const to = Math.min(low, end);
      if (to - from > LEAST_PIECE_MM) {
        const middle = (from + to) / 2;
        if (groundHolds(ground, px + dx * middle, py + dy * middle)) {
          // The sweep is left of its own sides, the clear region right: so turned round.
          roomPut(room, px + dx * to, py + dy * to, px + dx * from, py + dy * from, 0, 0, 0);
        }
      }
      if (high > from) from = high;
    }
  }
}

/** Reaches of two chords differ by less than this, mm. */
const REACH_DIFFERENCE_MM = 1e-5;

/** True when some other sweep holds the whole disc at a corner: the corner is well inside its polygon. */
function cornerCovered(
  sweeps: readonly Sweep[],
  near: readonly number[],
  px: number,
  py: number,
): boolean {
  for (const other of near) {
    const { n, x, y, nx, ny, minX, maxX, minY, maxY } = sweeps[other];
    if (px < minX || px > maxX || py < minY || py > maxY) continue;
    let m = 0;
    while (m < n && (px - x[m]) * nx[m] + (py - y[m]) * ny[m] < -REACH_DIFFERENCE_MM) m++;
    if (m === n) return true;
  }
  return false;
}

/** True when the disc at a sweep's corner lies outside the ground; `near` has every chord that could meet it. */
function discOutside(
  ground: GroundBands,
  near: readonly number[],
  cx: number,
  cy: number,
  radius: number,
): boolean {
  const { ax, ay, bx, by } = ground.chords;
  for (const n of near) {
    const ex = bx[n] - ax[n];
    const ey = by[n] - ay[n];
    const px = cx - ax[n];
    const py = cy - ay[n];
    const at = Math.max(0, Math.min(1, (px * ex + py * ey) / (ex * ex + ey * ey)));
    const dx = px - at * ex;
    const dy = py - at * ey;
    if (dx * dx + dy * dy <= radius * radius) return false;
  }
  return !groundHolds(ground, cx, cy);
}

/** The same for the arc at corner `at`, between side `before` and the next. */
function cornerPieces(
  ground: GroundBands,
  sweeps: readonly Sweep[],
  { x, y, nx, ny, radius }: Sweep,
  at: number,
  before: number,
  near: readonly number[],
  room: Room,
): void {
  const cx = x[at];
  const cy = y[at];
  const from = Math.atan2(ny[before], nx[before]);
  let sweep = Math.atan2(ny[at], nx[at]) - from;
  while (sweep < 0) sweep += 2 * Math.PI;
  if (sweep * radius < LEAST_PIECE_MM) return;
  // What is left of the arc after each other sweep, as angles from `from`.
  let left = [0, sweep];
  const cuts: number[] = [];
  // Half of the corners lie outside the ground; most of the rest are gone after the neighbours.
  if (discOutside(ground, near, cx, cy, radius)) return;
  for (const other of near) {
    const s = sweeps[other];
    if (cx - radius > s.maxX || cx + radius < s.minX) continue;
    if (cy - radius > s.maxY || cy + radius < s.minY) continue;
    cuts.length = 0;
    circleCrossings(s, cx, cy, radius, cuts);
    for (let n = 0; n < cuts.length; n++) {
      const away = (cuts[n] - from) % (2 * Math.PI);
      cuts[n] = away < 0 ? away + 2 * Math.PI : away;
    }
    cuts.sort(ascending);
    const rest: number[] = [];
    for (let n = 0; n < left.length; n += 2) {
      let low = left[n];
      for (let m = 0; m <= cuts.length; m++) {
        const high = m < cuts.length ? Math.min(cuts[m], left[n + 1]) : left[n + 1];
        if (high <= low || (high - low) * radius < LEAST_PIECE_MM) continue;
        const middle = from + (low + high) / 2;
        const px = cx + radius * Math.cos(middle);
        const py = cy + radius * Math.sin(middle);
        if (!sweepHolds(s, px, py)) {
          if (rest.length > 0 && rest[rest.length - 1] === low) rest[rest.length - 1] = high;
          else rest.push(low, high);
        }
        low = high;
      }
    }
    left = rest;
    if (left.length === 0) return;
  }
  for (let n = 0; n < left.length; n += 2) {
    const middle = from + (left[n] + left[n + 1]) / 2;
    const inGround = groundHolds(
      ground,
      cx + radius * Math.cos(middle),
      cy + radius * Math.sin(middle),
    );
    if (!inGround) continue;
    // Cut at the quarters, so that each piece rises or falls throughout, in x and in y.
    let high = left[n + 1];
    for (let quarter = 8; quarter >= -5; quarter--) {
      const low = Math.max(left[n], (quarter * Math.PI) / 2 - from);
      if (low >= high) continue;
      if ((high - low) * radius >= LEAST_PIECE_MM) {
        roomPut(
          room,
          cx + radius * Math.cos(from + high),
          cy + radius * Math.sin(from + high),
          cx + radius * Math.cos(from + low),
          cy + radius * Math.sin(from + low),
          cx,
          cy,
          radius,
        );
      }
      high = low;
    }
  }
}
