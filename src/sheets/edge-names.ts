import { vertexLetter } from '@/paving/ground-edits';

/** Corners of the perimeter are A, B, C … Z, then A1, B1 …, as on the table; those of keep-outs a, b, c …. */
export const cornerName = (ring: number, corner: number): string =>
  ring === 0 ? vertexLetter(corner) : vertexLetter(corner).toLowerCase();

/** Keep-outs are named by their order: K1, K2 …. */
export const keepOutName = (ring: number): string => `K${ring}`;

/**
 * An edge by its two corners: `AB` on the perimeter, `K1 ab` on a keep-out; `Z–A1` once corners
 * take more than a letter.
 */
export function edgeName(ring: number, edge: number, corners: number): string {
  const [from, to] = [cornerName(ring, edge), cornerName(ring, (edge + 1) % corners)];
  const pair = from.length + to.length > 2 ? `${from}–${to}` : from + to;
  return ring === 0 ? pair : `${keepOutName(ring)} ${pair}`;
}
