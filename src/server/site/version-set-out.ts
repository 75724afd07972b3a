import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { setOut } from '@/paving/set-out/set-out';

/** What entries of a version may be about. */
export interface SetOutNames {
  readonly courses: number;
  readonly checks: ReadonlySet<string>;
}

/** Versions whose set-out is kept in memory: a batch of entries comes in for the same few versions all day. */
const MOST_KEPT = 50;

const kept = new Map<string, SetOutNames>();

/** The courses and checks of a version's set-out, worked out once: a version never changes. */
export const versionSetOut = (versionId: string, document: LayoutDocument): SetOutNames => {
  const known = kept.get(versionId);
  if (known) return known;
  const { courses, checks } = setOut(layFloor(document));
  const names = {
    courses: courses.length,
    checks: new Set(checks.map(({ id }) => id)),
  };
  if (kept.size >= MOST_KEPT) kept.delete(kept.keys().next().value!);
  kept.set(versionId, names);
  return names;
};
