import { documentRing } from './ground-edits';
import type { LayoutDocument } from './layout-document';

/** The name of a corner of the perimeter as the drawings letter it: A … Z, then A1 … Z1 and so on. */
function vertexLetter(vertex: number): string {
  const round = Math.floor(vertex / 26);
  return String.fromCharCode(65 + (vertex % 26)) + (round > 0 ? String(round) : '');
}

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

/** An edge by the letters of its corners, such as `AB`, or `K1 ab` on a keep-out. */
export const documentEdgeName = (document: LayoutDocument, ring: number, edge: number): string =>
  edgeName(ring, edge, documentRing(document, ring).length);
