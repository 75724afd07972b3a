import type { Point } from '@/geometry/point';
import { pointTurned, rotation } from '@/geometry/rotation';
import type { Address } from '../layout-document';
import type { Laying } from '../laying';
import type { CutPiece } from './cut-pieces';
import { factorySide, ownRing } from './piece-shape';

/** Middle of the unit with an address, mm. */
export function unitMiddle(
  { lattice, origin, motif, document }: Laying,
  [i, j, k]: Address,
): Point {
  const at = pointTurned(motif[k].at, rotation(document.placement.turn));
  return [
    origin[0] + i * lattice.a[0] + j * lattice.b[0] + at[0],
    origin[1] + i * lattice.a[1] + j * lattice.b[1] + at[1],
  ];
}

/** Runs of a piece's outline that are sawn, each in order, on the ground: a ring sawn all round ends where it began. */
export function sawnRuns(laying: Laying, piece: CutPiece): readonly (readonly Point[])[] {
  const entry = laying.motif[piece.unit[2]];
  const middle = unitMiddle(laying, piece.unit);
  const half: Point = [entry.unit.length / 2, entry.unit.width / 2];
  return [piece.polygon, ...(piece.holes ?? [])].flatMap((ring) => {
    const own = ownRing(entry, middle, ring);
    const next = (n: number) => (n + 1) % ring.length;
    const sawn = own.map((a, n) => factorySide(a, own[next(n)], half) === null);
    const start = sawn.indexOf(false);
    if (start < 0) return [[...ring, ring[0]]];
    const runs: Point[][] = [];
    for (let step = 1; step < ring.length; step++) {
      const n = (start + step) % ring.length;
      if (!sawn[n]) continue;
      const before = (n + ring.length - 1) % ring.length;
      if (sawn[before]) runs[runs.length - 1].push(ring[next(n)]);
      else runs.push([ring[n], ring[next(n)]]);
    }
    return runs;
  });
}

/** A point well inside a convex piece, and near the middle of any: the mean of its corners by area. */
export function pieceMiddle({ polygon }: CutPiece): Point {
  const [ox, oy] = polygon[0];
  let [twice, mx, my] = [0, 0, 0];
  polygon.forEach(([x, y], n) => {
    const [nx, ny] = polygon[(n + 1) % polygon.length];
    const part = (x - ox) * (ny - oy) - (nx - ox) * (y - oy);
    twice += part;
    mx += part * (x - ox + nx - ox);
    my += part * (y - oy + ny - oy);
  });
  return [ox + mx / (3 * twice), oy + my / (3 * twice)];
}
