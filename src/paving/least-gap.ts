import type { Point } from '@/geometry/point';
import { rectangleNearest } from '@/geometry/rectangle';
import { sweepSegment, sweptSection, sweptSegmentRoom } from '@/geometry/row-section';
import { gapReach } from './gap-profile';
import type { Ground } from './ground';
import type { LaidRuns } from './laid-runs';
import type { LaidMotif, Laying } from './laying';
import { chordFrame } from './row-marks';
import { rowSearch, type UnitRows } from './unit-rows';

/** Where a laid unit is nearest to the boundary; points on the ground, mm. */
export interface LeastGap {
  readonly gap: number;
  /** Index into `laying.laid`. */
  readonly unit: number;
  readonly unitPoint: Point;
  readonly edgePoint: Point;
  readonly ring: number;
  readonly edge: number;
}

/** Laid units by their rows, for going through those along the boundary. */
interface LaidPlaces {
  readonly ground: Ground;
  readonly rows: UnitRows;
  readonly motif: readonly LaidMotif[];
  /** Calls `visit` with each laid unit of row `row` of motif entry k between two places of it: its index and its centre, mm. */
  readonly between: (
    k: number,
    row: number,
    first: number,
    last: number,
    visit: (unit: number, x: number, y: number) => void,
  ) => void;
}

/**
 * The least Euclidean distance from any laid unit to the perimeter or a keep-out, and where it
 * is; null when nothing is laid. Looks at units within a band along the boundary only, the band
 * as wide as the least gap so far; it widens the band when that holds no laid unit.
 */
export function leastGapAt(laying: Laying): LeastGap | null {
  const { laid, rows, index } = laying;
  if (laid.count === 0) return null;
  return leastGapFrom(gapReach(laying), {
    ...laying,
    between: (k, row, first, last, visit) => {
      const number = rows.rows[k].base + row;
      const end = index.laid.rowStart[number + 1];
      for (let at = rowSearch(index.laid, number, first); at < end; at++) {
        if (index.laid.along[at] > last) break;
        visit(at, laid.x[at], laid.y[at]);
      }
    },
  });
}

/** The same of units that are known as runs; \`band\`, mm, is where it may be expected. */
export function leastGapOfRuns(runs: LaidRuns, band: number): number | null {
  const { rows, motif, centres, origin, start, from, to, count } = runs;
  if (count === 0) return null;
  const { basis } = rows;
  const found = leastGapFrom(band, {
    ground: runs.ground,
    rows,
    motif,
    between: (k, row, first, last, visit) => {
      const lattice = rows.rows[k].first + row;
      const rowX = origin[0] + (lattice * basis.b[0] + centres[k][0]);
      const rowY = origin[1] + (lattice * basis.b[1] + centres[k][1]);
      const number = rows.rows[k].base + row;
      for (let run = start[number]; run < start[number + 1]; run++) {
        const end = Math.min(last, to[run]);
        for (let place = Math.max(first, from[run]); place <= end; place++) {
          visit(-1, rowX + place * basis.a[0], rowY + place * basis.a[1]);
        }
      }
    },
  });
  return found && found.gap;
}

function leastGapFrom(first: number, laid: LaidPlaces): LeastGap | null {
  const { min, max } = laid.ground.box;
  const across = Math.hypot(max[0] - min[0], max[1] - min[1]);
  for (let band = first; ; band *= 2) {
    const found = leastGapWithin(laid, band);
    if (found) return found;
    if (band > 4 * across)
      throw new Error('laid units lie farther from the ground than it is wide');
  }
}

function leastGapWithin(
  { ground, rows, motif, between }: LaidPlaces,
  band: number,
): LeastGap | null {
  const { chords, edges } = ground;
  const frame = chordFrame(ground, rows);
  const room = sweptSegmentRoom();
  const cut = new Float64Array(2);
  let best = null as LeastGap | null;
  let reach = band;
  for (let n = 0; n < chords.count; n++) {
    for (let k = 0; k < motif.length; k++) {
      const entry = rows.rows[k];
      const { halfLength, halfWidth } = entry;
      const { unit, halfLength: length } = motif[k];
      const hx = unit.length / 2;
      const hy = unit.width / 2;
      const ex = length[0] / hx;
      const ey = length[1] / hx;
      sweepSegment(
        room,
        frame.u0[n],
        frame.v0[n],
        frame.u1[n],
        frame.v1[n],
        halfLength[0],
        halfLength[1],
        halfWidth[0],
        halfWidth[1],
        reach,
      );
      const row0 = entry.start[1] + entry.first * rows.step[1];
      const from = Math.max(0, Math.ceil((room.least - row0) / rows.step[1]));
      const to = Math.min(entry.count - 1, Math.floor((room.greatest - row0) / rows.step[1]));
      const look = (at: number, x: number, y: number) => {
        const into = (px: number, py: number): Point => [
          (px - x) * ex + (py - y) * ey,
          (py - y) * ex - (px - x) * ey,
        ];
        const near = rectangleNearest(
          hx,
          hy,
          into(chords.ax[n], chords.ay[n]),
          into(chords.bx[n], chords.by[n]),
        );
        if (near.distance > reach || (best && near.distance === reach)) return;
        const back = ([px, py]: Point): Point => [x + px * ex - py * ey, y + px * ey + py * ex];
        const { ring, edge } = edges[chords.edge[n]];
        best = {
          gap: near.distance,
          unit: at,
          unitPoint: back(near.onRectangle),
          edgePoint: back(near.onSegment),
          ring,
          edge,
        };
        reach = near.distance;
      };
      for (let row = from; row <= to; row++) {
        const lattice = entry.first + row;
        if (!sweptSection(room, entry.start[1] + lattice * rows.step[1], cut)) continue;
        const u = entry.start[0] + lattice * rows.step[0];
        const first = Math.ceil((cut[0] - u) / rows.pitch);
        const last = Math.floor((cut[1] - u) / rows.pitch);
        between(k, row, first, last, look);
      }
    }
    if (reach === 0) break;
  }
  return best;
}
