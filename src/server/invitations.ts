import { and, asc, count, desc, eq, gt, isNull, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { Invitation, inviteSchema } from '@/api-types/invitations';
import { firms, invitations, memberships, outbox, people, projects } from '@/db/schema';
import { recordDeed } from './audit-record';
import type { Db } from './database';
import { newId } from './ids';
import { invitationLetter } from './mail/account-letters';
import { postLetter } from './mail/outbox';
import { done, invalid, notFound, tooMany, type Outcome } from './outcomes';
import { refuseUnlessManaging, type Actor } from './permissions';
import { newToken, tokenHash } from './tokens';

const DAY_MS = 24 * 60 * 60_000;

/** How long an invitation is open, days. */
const INVITATION_DAYS = 14;

/** Invitations that a firm may send in an hour: enough for any firm, and too few to send the world letters. */
export const INVITATIONS_AN_HOUR = 60;

const stillOpen = and(isNull(invitations.acceptedAt), isNull(invitations.withdrawnAt));

const ofFirm = (actor: Actor, id: string) =>
  and(eq(invitations.firmId, actor.firmId), eq(invitations.id, id), stillOpen);

const columns = {
  invitation: invitations,
  inviter: { id: people.id, name: people.name },
  project: { id: projects.id, name: projects.name },
  // The id first: Drizzle takes a joined row whose first column is null for one that is not there.
  letter: { id: outbox.id, sentAt: outbox.sentAt, refusedAt: outbox.refusedAt },
};

const selected = (db: Db) =>
  db
    .select(columns)
    .from(invitations)
    .innerJoin(people, eq(people.id, invitations.invitedBy))
    .leftJoin(
      projects,
      and(eq(projects.firmId, invitations.firmId), eq(projects.id, invitations.projectId)),
    )
    // A letter has the id of the invitation that it brings.
    .leftJoin(outbox, eq(outbox.id, invitations.id));

type Row = Awaited<ReturnType<typeof selected>>[number];

const invitationOf = ({ invitation, inviter, project, letter }: Row): Invitation => ({
  id: invitation.id,
  email: invitation.email,
  role: invitation.role,
  project,
  invitedBy: inviter,
  at: invitation.createdAt.toISOString(),
  expiresAt: invitation.expiresAt.toISOString(),
  expired: invitation.expiresAt.getTime() <= Date.now(),
  letter: letter?.refusedAt ? 'refused' : letter?.sentAt ? 'sent' : 'waiting',
});

const openInvitation = async (db: Db, actor: Actor, id: string): Promise<Invitation> =>
  invitationOf((await selected(db).where(ofFirm(actor, id)))[0]);

/** Those still open, newest first. Not allowed: who is not an owner. */
export const listInvitations = async (db: Db, actor: Actor): Promise<Outcome<Invitation[]>> => {
  const refusal = refuseUnlessManaging(actor);
  if (refusal) return refusal;
  const rows = await selected(db)
    .where(and(eq(invitations.firmId, actor.firmId), stillOpen))
    .orderBy(desc(invitations.createdAt), asc(invitations.id));
  return done(rows.map(invitationOf));
};

/** Takes back the invitations of an address that are open; a new one, or its removal, puts an end to them. */
export const withdrawOpenOf = async (tx: Db, firmId: string, email: string): Promise<void> => {
  await tx
    .update(invitations)
    .set({ withdrawnAt: new Date() })
    .where(and(eq(invitations.firmId, firmId), eq(invitations.email, email), stillOpen));
};

interface Addressee {
  readonly email: string;
  readonly role: Invitation['role'];
  readonly projectId: string | undefined;
}

const tooOften = async (db: Db, actor: Actor) => {
  const [{ n }] = await db
    .select({ n: count() })
    .from(invitations)
    .where(
      and(
        eq(invitations.firmId, actor.firmId),
        gt(invitations.createdAt, new Date(Date.now() - 60 * 60_000)),
      ),
    );
  return n < INVITATIONS_AN_HOUR
    ? null
    : tooMany('That is many invitations for one hour. Send the others later.', 60 * 60);
};

/** Writes the invitation and its letter; what was open for the address before is withdrawn. */
const send = async (
  db: Db,
  actor: Actor,
  { email, role, projectId }: Addressee,
): Promise<Outcome<Invitation>> => {
  const refusal = await tooOften(db, actor);
  if (refusal) return refusal;
  const id = newId();
  const token = newToken();
  const { firmId } = actor;
  await db.transaction(async (tx) => {
    const [[firm], [inviter], [project]] = [
      await tx.select({ name: firms.name }).from(firms).where(eq(firms.id, firmId)),
      await tx.select({ name: people.name }).from(people).where(eq(people.id, actor.personId)),
      projectId
        ? await tx
            .select({ name: projects.name })
            .from(projects)
            .where(and(eq(projects.firmId, firmId), eq(projects.id, projectId)))
        : [],
    ];
    await withdrawOpenOf(tx, firmId, email);
    await tx.insert(invitations).values({
      id,
      firmId,
      email,
      role,
      projectId: projectId ?? null,
      tokenHash: tokenHash(token),
      invitedBy: actor.personId,
      expiresAt: new Date(Date.now() + INVITATION_DAYS * DAY_MS),
    });
    const told = {
      firm: firm.name,
      inviter: inviter.name,
      role,
      project: project?.name ?? null,
      token,
      days: INVITATION_DAYS,
    };
    await postLetter(tx, { to: email, firmId, id }, invitationLetter(told));
    await recordDeed(tx, actor, {
      what: 'person.invited',
      subject: { type: 'invitation', id },
      detail: { email, role, project: project?.name ?? null },
    });
  });
  return done(await openInvitation(db, actor, id));
};

/** Invites somebody by e-mail into a role, or to one project. */
export const invite = async (
  db: Db,
  actor: Actor,
  input: z.output<typeof inviteSchema>,
): Promise<Outcome<Invitation>> => {
  const refusal = refuseUnlessManaging(actor);
  if (refusal) return refusal;
  if (input.projectId) {
    const [project] = await db
      .select({ id: projects.id })
      .from(projects)
      .where(and(eq(projects.firmId, actor.firmId), eq(projects.id, input.projectId)));
    if (!project) return notFound('project');
  }
  const [member] = await db
    .select({ name: people.name, role: memberships.role })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(and(eq(memberships.firmId, actor.firmId), eq(people.email, input.email)));
  if (member) {
    const message =
      `${member.name} is of the firm already (${member.role}). ` +
      'Change the role in the list, or put them on a project on its own page.';
    return invalid(message, [{ path: ['email'], message }]);
  }
  return send(db, actor, { ...input, projectId: input.projectId });
};

/** A new letter with a new link; the old link no longer opens anything. */
export const inviteAgain = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<Invitation>> => {
  const refusal = refuseUnlessManaging(actor);
  if (refusal) return refusal;
  const [row] = await db.select().from(invitations).where(ofFirm(actor, id));
  if (!row) return notFound('invitation');
  return send(db, actor, { ...row, projectId: row.projectId ?? undefined });
};

/** Its letter’s link lets nobody in from then on. Not allowed: who is not an owner. Not found: no open one of the firm. */
export const withdrawInvitation = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<Record<string, never>>> => {
  const refusal = refuseUnlessManaging(actor);
  if (refusal) return refusal;
  return db.transaction(async (tx) => {
    const [row] = await tx
      .update(invitations)
      .set({ withdrawnAt: sql`now()` })
      .where(ofFirm(actor, id))
      .returning({ email: invitations.email });
    if (!row) return notFound('invitation');
    await recordDeed(tx, actor, {
      what: 'invitation.withdrawn',
      subject: { type: 'invitation', id },
      detail: { email: row.email },
    });
    return done({});
  });
};
