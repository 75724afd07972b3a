/**
 * A segment swept by a rectangle and then by a disc, cut by lines of constant v: the centres,
 * along a row of units, at which a unit comes too near to a chord. All in the row's frame, u
 * along the row and v square to it. Convex, so each cut is one interval.
 */
export interface SweptSegment {
  /** Corners of the hexagon, anticlockwise from the lowest. */
  readonly u: Float64Array;
  readonly v: Float64Array;
  /** Outward normals of its sides, times the disc's radius. */
  readonly nu: Float64Array;
  readonly nv: Float64Array;
  radius: number;
  least: number;
  greatest: number;
}

/** Room for one swept segment: six corners at the most. */
export function sweptSegmentRoom(): SweptSegment {
  return {
    u: new Float64Array(6),
    v: new Float64Array(6),
    nu: new Float64Array(6),
    nv: new Float64Array(6),
    radius: 0,
    least: 0,
    greatest: 0,
  };
}

/**
 * Writes into `room` the sweep of the segment (u0, v0)–(u1, v1) by the rectangle with half axes
 * (eu, ev) and (fu, fv) and by the disc of the radius.
 */
export function sweepSegment(
  room: SweptSegment,
  u0: number,
  v0: number,
  u1: number,
  v1: number,
  eu: number,
  ev: number,
  fu: number,
  fv: number,
  radius: number,
): void {
  let du = (u1 - u0) / 2;
  let dv = (v1 - v0) / 2;
  if (dv < 0 || (dv === 0 && du < 0)) {
    du = -du;
    dv = -dv;
  }
  if (ev < 0 || (ev === 0 && eu < 0)) {
    eu = -eu;
    ev = -ev;
  }
  if (fv < 0 || (fv === 0 && fu < 0)) {
    fu = -fu;
    fv = -fv;
  }
  // The three directions in order of angle, all in the upper half plane.
  let swap: number;
  if (du * ev - dv * eu < 0) {
    swap = du;
    du = eu;
    eu = swap;
    swap = dv;
    dv = ev;
    ev = swap;
  }
  if (eu * fv - ev * fu < 0) {
    swap = eu;
    eu = fu;
    fu = swap;
    swap = ev;
    ev = fv;
    fv = swap;
  }
  if (du * ev - dv * eu < 0) {
    swap = du;
    du = eu;
    eu = swap;
    swap = dv;
    dv = ev;
    ev = swap;
  }
  const { u, v, nu, nv } = room;
  const mu = (u0 + u1) / 2;
  const mv = (v0 + v1) / 2;
  u[0] = mu - du - eu - fu;
  v[0] = mv - dv - ev - fv;
  u[1] = mu + du - eu - fu;
  v[1] = mv + dv - ev - fv;
  u[2] = mu + du + eu - fu;
  v[2] = mv + dv + ev - fv;
  u[3] = mu + du + eu + fu;
  v[3] = mv + dv + ev + fv;
  u[4] = mu - du + eu + fu;
  v[4] = mv - dv + ev + fv;
  u[5] = mu - du - eu + fu;
  v[5] = mv - dv - ev + fv;
  room.radius = radius;
  room.least = v[0] - radius;
  room.greatest = v[3] + radius;
  if (radius > 0) {
    for (let n = 0; n < 6; n++) {
      const m = n === 5 ? 0 : n + 1;
      const su = u[m] - u[n];
      const sv = v[m] - v[n];
      const size = Math.sqrt(su * su + sv * sv);
      nu[n] = size > 0 ? (sv / size) * radius : 0;
      nv[n] = size > 0 ? (-su / size) * radius : 0;
    }
  }
}

/** Writes the interval of u in which the line at `v` lies in the sweep; false when it misses. */
export function sweptSection(room: SweptSegment, at: number, out: Float64Array): boolean {
  const { u, v, nu, nv, radius } = room;
  let low = Infinity;
  let high = -Infinity;
  for (let n = 0; n < 6; n++) {
    const m = n === 5 ? 0 : n + 1;
    const above = v[n] > at;
    if (above !== v[m] > at) {
      const cut = u[n] + ((at - v[n]) / (v[m] - v[n])) * (u[m] - u[n]);
      if (cut < low) low = cut;
      if (cut > high) high = cut;
    }
    if (radius > 0) {
      const away = at - v[n];
      if (away < radius && away > -radius) {
        const half = Math.sqrt(radius * radius - away * away);
        if (u[n] - half < low) low = u[n] - half;
        if (u[n] + half > high) high = u[n] + half;
      }
      const from = v[n] + nv[n];
      const to = v[m] + nv[n];
      if (from > at !== to > at) {
        const cut = u[n] + nu[n] + ((at - from) / (to - from)) * (u[m] - u[n]);
        if (cut < low) low = cut;
        if (cut > high) high = cut;
      }
    }
  }
  out[0] = low;
  out[1] = high;
  return low <= high;
}
