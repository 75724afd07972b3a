import { and, eq, sql, type SQL } from 'drizzle-orm';
import { layouts, projectPeople, projects, versionEvents, versions } from '@/db/schema';
import { permissions, type Actor } from './permissions';

/** Of `projects` rows: those of the actor's firm that the actor sees. */
export const projectSeen = (actor: Actor): SQL | undefined =>
  and(
    eq(projects.firmId, actor.firmId),
    permissions['see a project'][actor.role] === 'all'
      ? undefined
      : sql`exists (select 1 from ${projectPeople} where ${projectPeople.firmId} = ${actor.firmId}
          and ${projectPeople.projectId} = ${projects.id}
          and ${projectPeople.personId} = ${actor.personId})`,
  );

/** Of `versions` rows: those of the actor's firm of a kind that the actor sees. Ask `projectSeen` too. */
export const versionSeen = (actor: Actor): SQL | undefined => {
  const seen = permissions['see a version'][actor.role];
  return and(
    eq(versions.firmId, actor.firmId),
    seen === 'any'
      ? undefined
      : sql`exists (select 1 from ${versionEvents} where ${versionEvents.firmId} = ${actor.firmId}
          and ${versionEvents.versionId} = ${versions.id} and ${versionEvents.kind} = ${seen})`,
  );
};

/** Of `layouts` rows: those of the actor's firm with something that the actor sees. Ask `projectSeen` too. */
export const layoutSeen = (actor: Actor): SQL | undefined =>
  and(
    eq(layouts.firmId, actor.firmId),
    permissions['see a version'][actor.role] === 'any'
      ? undefined
      : sql`exists (select 1 from ${versions} where ${versions.layoutId} = ${layouts.id}
          and ${versionSeen(actor)})`,
  );
