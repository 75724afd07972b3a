import { and, asc, eq, inArray, ne, sql, type SQL } from 'drizzle-orm';
import type { Role } from '@/api-types/people';
import { memberships, people, projectPeople, versionEvents } from '@/db/schema';
import type { Db } from './database';
import { permissions } from './permissions';
import type { SeenVersion } from './seen-version';

/** A person of the firm who sees a version, with how they want to be written to. */
export interface Onlooker {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly role: Role;
  readonly mailSteps: boolean;
  readonly mailMentions: boolean;
}

const rolesThat = (row: 'see a project' | 'see a version', how: string): Role[] =>
  (Object.entries(permissions[row]) as [Role, string][])
    .filter(([, value]) => value === how)
    .map(([role]) => role);

/** Members of the version's firm who are put on its project, or need not be. */
const onProject = (projectId: string): SQL | undefined =>
  sql`(${inArray(memberships.role, rolesThat('see a project', 'all'))} or exists (
    select 1 from ${projectPeople} where ${projectPeople.firmId} = ${memberships.firmId}
    and ${projectPeople.projectId} = ${projectId} and ${projectPeople.personId} = ${memberships.personId}))`;

/** Whether the version has had what a role's sight of it hangs on, such as having been shared for clients. */
const hadWhatTheyNeed = (versionId: string): SQL => {
  const had = (role: Role) =>
    permissions['see a version'][role] === 'any'
      ? sql`true`
      : sql`exists (select 1 from ${versionEvents} where ${versionEvents.firmId} = ${memberships.firmId}
          and ${versionEvents.versionId} = ${versionId}
          and ${versionEvents.kind} = ${permissions['see a version'][role]})`;
  return sql`case ${memberships.role} when 'owner' then ${had('owner')} when 'designer' then ${had('designer')}
    when 'installer' then ${had('installer')} when 'client' then ${had('client')} else false end`;
};

/** Everybody who sees a version, by name. */
export const onlookersOf = (
  db: Db,
  version: Pick<SeenVersion, 'id' | 'firmId' | 'projectId'>,
  besides?: string,
): Promise<Onlooker[]> =>
  db
    .select({
      id: people.id,
      name: people.name,
      email: people.email,
      role: memberships.role,
      mailSteps: people.mailSteps,
      mailMentions: people.mailMentions,
    })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(
      and(
        eq(memberships.firmId, version.firmId),
        besides === undefined ? undefined : ne(people.id, besides),
        onProject(version.projectId),
        hadWhatTheyNeed(version.id),
      ),
    )
    .orderBy(asc(people.name), asc(people.id));
