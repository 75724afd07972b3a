import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { isRowsCheck } from '@/paving/set-out/checks';
import { setOut } from '@/paving/set-out/set-out';

/** What entries of a version may be about. */
export interface SetOutNames {
  readonly courses: number;
  readonly hasCheck: (id: string) => boolean;
}

/** Versions whose set-out is kept in memory: a batch of entries comes in for the same few versions all day. */
const MOST_KEPT = 50;

const kept = new Map<string, SetOutNames>();

/** The courses and checks of a version's set-out, worked out once: a version never changes. */
export const versionSetOut = (versionId: string, document: LayoutDocument): SetOutNames => {
  const known = kept.get(versionId);
  if (known) return known;
  const { courses, checks } = setOut(layFloor(document));
  const ids = new Set(checks.map(({ id }) => id));
  const names = {
    courses: courses.length,
    hasCheck: (id: string) => ids.has(id) || isRowsCheck(id, courses.length),
  };
  if (kept.size >= MOST_KEPT) kept.delete(kept.keys().next().value!);
  kept.set(versionId, names);
  return names;
};
