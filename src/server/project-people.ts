import { and, asc, desc, eq, isNull } from 'drizzle-orm';
import type { PersonName, Role } from '@/api-types/people';
import { firms, memberships, people, projectPeople, projects } from '@/db/schema';
import { recordDeed } from './audit-record';
import type { Db } from './database';
import { putOnProjectLetter } from './mail/account-letters';
import { postLetter } from './mail/outbox';
import { done, invalid, notFound, type Outcome } from './outcomes';
import { isPutOnProjects, refuseUnlessDrafting, type Actor } from './permissions';
import { projectSeen } from './visibility';

type OnProject = readonly (PersonName & { readonly role: Role })[];

/** The people put on a project, by name. */
export const peopleOnProject = async (
  db: Db,
  firmId: string,
  projectId: string,
): Promise<OnProject> =>
  db
    .select({ id: people.id, name: people.name, role: memberships.role })
    .from(projectPeople)
    .innerJoin(
      memberships,
      and(
        eq(memberships.firmId, projectPeople.firmId),
        eq(memberships.personId, projectPeople.personId),
      ),
    )
    .innerJoin(people, eq(people.id, projectPeople.personId))
    .where(and(eq(projectPeople.firmId, firmId), eq(projectPeople.projectId, projectId)))
    .orderBy(asc(people.name), asc(people.id));

const wrongPerson = (message: string) => invalid(message, [{ path: ['personId'], message }]);

const projectFor = async (db: Db, actor: Actor, id: string) => {
  const [project] = await db
    .select({ id: projects.id, name: projects.name })
    .from(projects)
    .where(and(projectSeen(actor), eq(projects.id, id)));
  if (!project) return notFound('project');
  return refuseUnlessDrafting(actor) ?? done(project);
};

/** The people put on a project, and those of the firm who could be. */
export const projectPeopleOf = async (
  db: Db,
  actor: Actor,
  projectId: string,
): Promise<Outcome<{ people: OnProject; others: OnProject }>> => {
  const project = await projectFor(db, actor, projectId);
  if (!project.ok) return project;
  const put = await peopleOnProject(db, actor.firmId, projectId);
  const all = await db
    .select({ id: people.id, name: people.name, role: memberships.role })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(eq(memberships.firmId, actor.firmId))
    .orderBy(asc(people.name), asc(people.id));
  const others = all.filter(
    ({ id, role }) => isPutOnProjects(role) && !put.some((person) => person.id === id),
  );
  return done({ people: put, others });
};

/** Lets an installer or client of the firm see a project, and tells them. Twice is as good as once. */
export const addToProject = async (
  db: Db,
  actor: Actor,
  projectId: string,
  personId: string,
): Promise<Outcome<{ people: OnProject }>> => {
  const project = await projectFor(db, actor, projectId);
  if (!project.ok) return project;
  const [member] = await db
    .select({ name: people.name, email: people.email, role: memberships.role })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(and(eq(memberships.firmId, actor.firmId), eq(memberships.personId, personId)));
  if (!member) return wrongPerson('There is nobody like that in the firm');
  if (!isPutOnProjects(member.role)) {
    return wrongPerson(`${member.name} sees every project already, as ${member.role}`);
  }
  const { firmId } = actor;
  await db.transaction(async (tx) => {
    const added = await tx
      .insert(projectPeople)
      .values({ firmId, projectId, personId })
      .onConflictDoNothing()
      .returning({ personId: projectPeople.personId });
    if (added.length === 0) return;
    const [told] = await tx
      .select({ firm: firms.name, by: people.name })
      .from(firms)
      .innerJoin(people, eq(people.id, actor.personId))
      .where(eq(firms.id, firmId));
    const letter = putOnProjectLetter({
      ...told,
      name: member.name,
      project: project.value.name,
      projectId,
    });
    await postLetter(tx, { to: member.email, firmId }, letter);
    await recordDeed(tx, actor, {
      what: 'project.person-added',
      subject: { type: 'project', id: projectId },
      detail: { project: project.value.name, personId, name: member.name },
    });
  });
  return done({ people: await peopleOnProject(db, firmId, projectId) });
};

/** Takes somebody off a project; they stay of the firm. */
export const removeFromProject = async (
  db: Db,
  actor: Actor,
  projectId: string,
  personId: string,
): Promise<Outcome<{ people: OnProject }>> => {
  const project = await projectFor(db, actor, projectId);
  if (!project.ok) return project;
  const { firmId } = actor;
  await db.transaction(async (tx) => {
    const removed = await tx
      .delete(projectPeople)
      .where(
        and(
          eq(projectPeople.firmId, firmId),
          eq(projectPeople.projectId, projectId),
          eq(projectPeople.personId, personId),
        ),
      )
      .returning({ personId: projectPeople.personId });
    if (removed.length === 0) return;
    const [person] = await tx
      .select({ name: people.name })
      .from(people)
      .where(eq(people.id, personId));
    await recordDeed(tx, actor, {
      what: 'project.person-removed',
      subject: { type: 'project', id: projectId },
      detail: { project: project.value.name, personId, name: person.name },
    });
  });
  return done({ people: await peopleOnProject(db, firmId, projectId) });
};

/** How many projects a form offers to choose from: those last worked on. */
const OFFERED = 200;

/** Current projects by name, for inviting somebody to one. */
export const projectsToInviteTo = async (
  db: Db,
  actor: Actor,
): Promise<readonly { readonly id: string; readonly name: string }[]> => {
  const rows = await db
    .select({ id: projects.id, name: projects.name })
    .from(projects)
    .where(and(projectSeen(actor), isNull(projects.archivedAt)))
    .orderBy(desc(projects.updatedAt), desc(projects.id))
    .limit(OFFERED);
  return rows.sort((a, b) => a.name.localeCompare(b.name, 'en-GB'));
};
