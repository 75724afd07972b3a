import { and, eq } from 'drizzle-orm';
import { firms, layouts, projects, versions } from '@/db/schema';
import type { Db } from './database';
import type { Actor } from './permissions';
import { versionState } from './version-rows';
import { projectSeen, versionSeen } from './visibility';

/** A version with where it belongs and stands, without its document, if the actor sees it. */
export const seenVersion = async (db: Db, actor: Actor, id: string) =>
  (
    await db
      .select({
        id: versions.id,
        firmId: versions.firmId,
        number: versions.number,
        label: versions.label,
        createdBy: versions.createdBy,
        fingerprint: versions.fingerprint,
        state: versionState,
        layoutId: layouts.id,
        layoutName: layouts.name,
        projectId: projects.id,
        projectName: projects.name,
        firmName: firms.name,
        terms: firms.terms,
      })
      .from(versions)
      .innerJoin(
        layouts,
        and(eq(layouts.firmId, versions.firmId), eq(layouts.id, versions.layoutId)),
      )
      .innerJoin(
        projects,
        and(eq(projects.firmId, layouts.firmId), eq(projects.id, layouts.projectId)),
      )
      .innerJoin(firms, eq(firms.id, versions.firmId))
      .where(and(versionSeen(actor), projectSeen(actor), eq(versions.id, id)))
  )[0];

export type SeenVersion = NonNullable<Awaited<ReturnType<typeof seenVersion>>>;

/** What to call a version in a sentence. */
export const versionName = ({ number, label, layoutName }: SeenVersion): string =>
  `${layoutName}, version ${number} (${label})`;
