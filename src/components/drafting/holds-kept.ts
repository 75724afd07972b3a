import type { EdgeAddress, FitHold } from '@/paving/fit/fit';
import type { LayoutDocument, Vertex } from '@/paving/layout-document';

type Ground = LayoutDocument['ground'];

const rings = ({ perimeter, keepOuts }: Ground): readonly (readonly Vertex[])[] => [
  perimeter,
  ...keepOuts.map(({ ring }) => ring),
];

const samePlace = (a: Vertex | undefined, b: Vertex | undefined) =>
  a !== undefined && b !== undefined && a[0] === b[0] && a[1] === b[1];

/**
 * The holds for a ground that has changed: by the edges between the same two corners where rings have gained or lost
 * corners; a hold is dropped where an edge of it is gone. The same list where nothing is to be done.
 */
export function holdsKept(
  before: Ground,
  after: Ground,
  holds: readonly FitHold[],
): readonly FitHold[] {
  if (before === after || holds.length === 0) return holds;
  const old = rings(before);
  const now = rings(after);
  if (old.length === now.length && old.every((ring, n) => ring.length === now[n].length))
    return holds;
  const found = ([ring, edge]: EdgeAddress): EdgeAddress | null => {
    const corners = old[ring] ?? [];
    const [from, to] = [corners[edge], corners[(edge + 1) % corners.length]];
    // The same ring first, then any: a keep-out taken away renumbers those after it.
    for (const n of [ring, ...now.keys()]) {
      const at = (now[n] ?? []).findIndex(
        (corner, m, all) => samePlace(corner, from) && samePlace(all[(m + 1) % all.length], to),
      );
      if (at >= 0) return [n, at];
    }
    return null;
  };
  return holds.flatMap((hold): FitHold[] => {
    if ('edge' in hold) {
      const edge = found(hold.edge);
      return edge ? [{ edge }] : [];
    }
    const [one, other] = [found(hold.between[0]), found(hold.between[1])];
    return one && other ? [{ between: [one, other] }] : [];
  });
}
