/** Corners of the perimeter are A, B, C … Z, then A2, B2 …; those of keep-outs a, b, c …. */
export function cornerName(ring: number, corner: number): string {
  const letter = String.fromCharCode((ring === 0 ? 65 : 97) + (corner % 26));
  const round = Math.floor(corner / 26);
  return round === 0 ? letter : `${letter}${round + 1}`;
}

/** Keep-outs are named by their order: K1, K2 …. */
export const keepOutName = (ring: number): string => `K${ring}`;

/**
 * An edge by its two corners: `AB` on the perimeter, `K1 ab` on a keep-out; `Z–A2` once corners
 * take more than a letter.
 */
export function edgeName(ring: number, edge: number, corners: number): string {
  const [from, to] = [cornerName(ring, edge), cornerName(ring, (edge + 1) % corners)];
  const pair = from.length + to.length > 2 ? `${from}–${to}` : from + to;
  return ring === 0 ? pair : `${keepOutName(ring)} ${pair}`;
}
