import { and, asc, eq, max } from 'drizzle-orm';
import type { z } from 'zod';
import type { Member, memberChangeSchema } from '@/api-types/members';
import { firms, memberships, people, projectPeople, projects, sessions } from '@/db/schema';
import { recordDeed } from './audit-record';
import type { Db } from './database';
import { withdrawOpenOf } from './invitations';
import { removedLetter } from './mail/account-letters';
import { postLetter } from './mail/outbox';
import { done, notAllowed, notFound, type Outcome, type Refusal } from './outcomes';
import { refuseUnlessManaging, type Actor } from './permissions';

type Nothing = Record<string, never>;

const membersOf = async (db: Db, firmId: string, personId?: string): Promise<Member[]> => {
  const which = and(
    eq(memberships.firmId, firmId),
    personId === undefined ? undefined : eq(memberships.personId, personId),
  );
  const rows = await db
    .select({
      id: people.id,
      name: people.name,
      email: people.email,
      role: memberships.role,
      since: memberships.createdAt,
      lastSeenAt: max(sessions.lastSeenAt),
    })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .leftJoin(
      sessions,
      and(eq(sessions.firmId, memberships.firmId), eq(sessions.userId, memberships.personId)),
    )
    .where(which)
    .groupBy(people.id, memberships.firmId, memberships.personId)
    .orderBy(asc(people.name), asc(people.id));
  const put = await db
    .select({ personId: projectPeople.personId, id: projects.id, name: projects.name })
    .from(projectPeople)
    .innerJoin(
      projects,
      and(eq(projects.firmId, projectPeople.firmId), eq(projects.id, projectPeople.projectId)),
    )
    .where(
      and(
        eq(projectPeople.firmId, firmId),
        personId === undefined ? undefined : eq(projectPeople.personId, personId),
      ),
    )
    .orderBy(asc(projects.name));
  return rows.map(({ since, lastSeenAt, ...row }) => ({
    ...row,
    since: since.toISOString(),
    lastSeenAt: lastSeenAt?.toISOString() ?? null,
    projects: put
      .filter((project) => project.personId === row.id)
      .map(({ id, name }) => ({ id, name })),
  }));
};

/** The people of the firm, by name. */
export const listMembers = async (db: Db, actor: Actor): Promise<Outcome<Member[]>> =>
  refuseUnlessManaging(actor) ?? done(await membersOf(db, actor.firmId));

interface Membership {
  readonly role: Member['role'];
  readonly name: string;
  readonly email: string;
}

/**
 * A member of the actor's firm, while no other change of the firm's owners is under way: the firm's row is locked,
 * so that of two owners who take the role from each other at once one finds the other the last.
 */
const lockMember = async (tx: Db, actor: Actor, personId: string): Promise<Membership | null> => {
  await tx
    .select({ id: firms.id })
    .from(firms)
    .where(eq(firms.id, actor.firmId))
    .for('no key update');
  const [member] = await tx
    .select({ role: memberships.role, name: people.name, email: people.email })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(and(eq(memberships.firmId, actor.firmId), eq(memberships.personId, personId)));
  return member ?? null;
};

const refuseIfLastOwner = async (
  tx: Db,
  actor: Actor,
  personId: string,
): Promise<Refusal | null> => {
  const owners = await tx
    .select({ personId: memberships.personId })
    .from(memberships)
    .where(and(eq(memberships.firmId, actor.firmId), eq(memberships.role, 'owner')));
  return owners.length === 1 && owners[0].personId === personId
    ? notAllowed(
        'A firm needs an owner, and this is its only one. Make somebody else an owner first.',
      )
    : null;
};

const ofMember = (actor: Actor, personId: string) =>
  and(eq(memberships.firmId, actor.firmId), eq(memberships.personId, personId));

/** The lock was got after others' changes: whoever was an owner at the start of the request may be none now. */
const stillManages = async (tx: Db, actor: Actor): Promise<Refusal | null> => {
  const [row] = await tx
    .select({ role: memberships.role })
    .from(memberships)
    .where(ofMember(actor, actor.personId));
  return refuseUnlessManaging({ ...actor, role: row?.role ?? 'client' });
};

/** Changes what somebody is in the firm; it holds from their next click on. */
export const changeMember = async (
  db: Db,
  actor: Actor,
  personId: string,
  { role }: z.output<typeof memberChangeSchema>,
): Promise<Outcome<Member>> => {
  const refusal = refuseUnlessManaging(actor);
  if (refusal) return refusal;
  const changed = await db.transaction(async (tx): Promise<Outcome<Nothing>> => {
    const member = await lockMember(tx, actor, personId);
    if (!member) return notFound('person');
    const overtaken = await stillManages(tx, actor);
    if (overtaken) return overtaken;
    if (member.role === role) return done({});
    const last = role === 'owner' ? null : await refuseIfLastOwner(tx, actor, personId);
    if (last) return last;
    await tx.update(memberships).set({ role }).where(ofMember(actor, personId));
    await recordDeed(tx, actor, {
      what: 'person.role-changed',
      subject: { type: 'person', id: personId },
      detail: { name: member.name, from: member.role, to: role },
    });
    return done({});
  });
  if (!changed.ok) return changed;
  const [member] = await membersOf(db, actor.firmId, personId);
  return done(member);
};

/**
 * Takes somebody off the firm. Their sessions in it and their places on projects go with the membership (the
 * database cascades), so that their very next request finds nobody; what they wrote stays.
 */
export const removeMember = async (
  db: Db,
  actor: Actor,
  personId: string,
): Promise<Outcome<Nothing>> => {
  const leaving = personId === actor.personId;
  const refusal = leaving ? null : refuseUnlessManaging(actor);
  if (refusal) return refusal;
  return db.transaction(async (tx): Promise<Outcome<Nothing>> => {
    const member = await lockMember(tx, actor, personId);
    if (!member) return notFound('person');
    const overtaken = leaving ? null : await stillManages(tx, actor);
    const blocked = overtaken ?? (await refuseIfLastOwner(tx, actor, personId));
    if (blocked) return blocked;
    await withdrawOpenOf(tx, actor.firmId, member.email);
    await tx.delete(memberships).where(ofMember(actor, personId));
    await recordDeed(tx, actor, {
      what: leaving ? 'person.left' : 'person.removed',
      subject: { type: 'person', id: personId },
      detail: { name: member.name, email: member.email, role: member.role },
    });
    if (!leaving) {
      const [firm] = await tx
        .select({ name: firms.name })
        .from(firms)
        .where(eq(firms.id, actor.firmId));
      const letter = removedLetter({ name: member.name, firm: firm.name });
      await postLetter(tx, { to: member.email, firmId: actor.firmId }, letter);
    }
    return done({});
  });
};
