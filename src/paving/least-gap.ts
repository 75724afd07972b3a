import type { Point } from '@/geometry/point';
import { rectangleNearest } from '@/geometry/rectangle';
import { sweepSegment, sweptSection, sweptSegmentRoom } from '@/geometry/row-section';
import { gapReach } from './gap-profile';
import type { Laying } from './laying';
import { chordFrame } from './row-marks';
import { rowSearch } from './unit-rows';

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

/**
 * The least Euclidean distance from any laid unit to the perimeter or a keep-out, and where it
 * is; null when nothing is laid. Looks at units within a band along the boundary only, the band
 * as wide as the least gap so far; it widens the band when that holds no laid unit.
 */
export function leastGapAt(laying: Laying): LeastGap | null {
  const { laid, ground } = laying;
  if (laid.count === 0) return null;
  const { min, max } = ground.box;
  const across = Math.hypot(max[0] - min[0], max[1] - min[1]);
  for (let band = gapReach(laying); ; band *= 2) {
    const found = leastGapWithin(laying, band);
    if (found) return found;
    if (band > 4 * across)
      throw new Error('laid units lie farther from the ground than it is wide');
  }
}

function leastGapWithin(laying: Laying, band: number): LeastGap | null {
  const { laid, ground, rows, index, motif } = laying;
  const { chords, edges } = ground;
  const frame = chordFrame(ground, rows);
  const room = sweptSegmentRoom();
  const cut = new Float64Array(2);
  let best: LeastGap | null = null;
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
      for (let row = from; row <= to; row++) {
        const number = entry.base + row;
        const end = index.laid.rowStart[number + 1];
        if (index.laid.rowStart[number] === end) continue;
        const lattice = entry.first + row;
        if (!sweptSection(room, entry.start[1] + lattice * rows.step[1], cut)) continue;
        const u = entry.start[0] + lattice * rows.step[0];
        const first = Math.ceil((cut[0] - u) / rows.pitch);
        const last = Math.floor((cut[1] - u) / rows.pitch);
        for (let at = rowSearch(index.laid, number, first); at < end; at++) {
          if (index.laid.along[at] > last) break;
          const x = laid.x[at];
          const y = laid.y[at];
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
          if (near.distance > reach || (best && near.distance === reach)) continue;
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
        }
      }
    }
    if (reach === 0) break;
  }
  return best;
}
