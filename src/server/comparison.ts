import type { VersionComparison } from '@/api-types/comparison';
import { floorComparison } from '@/paving/comparison';
import { layFloor } from '@/paving/laying';
import type { Db } from './database';
import { done, invalid, type Outcome } from './outcomes';
import type { Actor } from './permissions';
import { openVersion } from './versions';

/** Compares two versions that the actor sees, of one layout or of two layouts of one project. */
export const compareVersions = async (
  db: Db,
  actor: Actor,
  { a, b }: { readonly a: string; readonly b: string },
): Promise<Outcome<VersionComparison>> => {
  const one = await openVersion(db, actor, a);
  if (!one.ok) return one;
  const other = await openVersion(db, actor, b);
  if (!other.ok) return other;
  if (one.value.projectId !== other.value.projectId) {
    return invalid('These two versions are of different projects, so they share no ground.', [
      { path: ['b'], message: 'must be a version of the same project' },
    ]);
  }
  const { kept, moved, gone, added, figures } = floorComparison(
    layFloor(one.value.document),
    layFloor(other.value.document),
    [one.value.figures, other.value.figures],
  );
  return done({ a: one.value, b: other.value, units: { kept, moved, gone, added }, figures });
};
