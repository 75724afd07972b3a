import type { Point } from '@/geometry/point';
import type { Address } from './layout-document';
import type { Laying } from './laying';
import { rowSearch, type RowIndex } from './unit-rows';

export type UnitStatus = 'laid' | 'leftOut' | 'lifted';

/** The unit of the laying under a point of the ground, mm, or null where there is none. */
export function unitAt(
  laying: Laying,
  [x, y]: Point,
): { address: Address; status: UnitStatus } | null {
  const { rows, motif, index } = laying;
  const [dx, dy] = rows.direction;
  const px = x - rows.from[0];
  const py = y - rows.from[1];
  const u = px * dx + py * dy;
  const v = py * dx - px * dy;
  for (let k = 0; k < motif.length; k++) {
    const entry = rows.rows[k];
    const { length, width } = motif[k].unit;
    const [lu, lv] = entry.halfLength;
    const [wu, wv] = entry.halfWidth;
    const reachU = Math.abs(lu) + Math.abs(wu);
    const reachV = Math.abs(lv) + Math.abs(wv);
    const row0 = entry.start[1] + entry.first * rows.step[1];
    const from = Math.max(0, Math.ceil((v - reachV - row0) / rows.step[1]));
    const to = Math.min(entry.count - 1, Math.floor((v + reachV - row0) / rows.step[1]));
    for (let row = from; row <= to; row++) {
      const n = entry.first + row;
      const centreV = entry.start[1] + n * rows.step[1];
      const rowU = entry.start[0] + n * rows.step[0];
      const last = Math.floor((u + reachU - rowU) / rows.pitch);
      for (let place = Math.ceil((u - reachU - rowU) / rows.pitch); place <= last; place++) {
        const du = u - rowU - place * rows.pitch;
        const dv = v - centreV;
        const onLength = Math.abs(du * lu + dv * lv) <= (length * length) / 4;
        const onWidth = Math.abs(du * wu + dv * wv) <= (width * width) / 4;
        if (!onLength || !onWidth) continue;
        for (const status of ['laid', 'lifted', 'leftOut'] as const) {
          if (holds(index[status], entry.base + row, place)) {
            const { basis } = rows;
            const address: Address = [
              n * basis.i.b + place * basis.i.a + 0,
              n * basis.j.b + place * basis.j.a + 0,
              k,
            ];
            return { address, status };
          }
        }
      }
    }
  }
  return null;
}

function holds(index: RowIndex, row: number, place: number): boolean {
  const at = rowSearch(index, row, place);
  return at < index.rowStart[row + 1] && index.along[at] === place;
}
