import { and, asc, eq, inArray, sql, type SQL } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { z } from 'zod';
import type {
  Comment,
  Mentionable,
  newCommentSchema,
  newReplySchema,
  Thread,
  threadChangeSchema,
  threadReadSchema,
  Threads,
} from '@/api-types/comments';
import { commentReads, comments, mentions, people, versions } from '@/db/schema';
import { recordAudit } from './audit';
import type { Db } from './database';
import { newId } from './ids';
import { seenLayout } from './layouts';
import type { LetterBlock } from './mail/letter';
import { postLetter } from './mail/outbox';
import { mentionedIn } from './mentions';
import { onlookersOf } from './onlookers';
import { done, notAllowed, notFound, type Outcome } from './outcomes';
import { mayDraft, permissions, type Actor } from './permissions';
import { touchProject } from './projects';
import { seenVersion, versionName, type SeenVersion } from './seen-version';
import { versionSeen } from './visibility';

const resolvers = alias(people, 'resolvers');

type Author = { readonly id: string; readonly name: string };

const ofFirm = (actor: Actor) => eq(comments.firmId, actor.firmId);

/** Threads of the versions that the actor sees, oldest first, each with its comments. Ask `projectSeen` before. */
const threadsWhere = async (db: Db, actor: Actor, which: SQL | undefined): Promise<Thread[]> => {
  const rows = await db
    .select({
      comment: comments,
      person: { id: people.id, name: people.name },
      resolver: { id: resolvers.id, name: resolvers.name },
      number: versions.number,
      unread: sql<boolean>`${comments.personId} <> ${actor.personId}
        and (${commentReads.readAt} is null or ${comments.at} > ${commentReads.readAt})`,
    })
    .from(comments)
    .innerJoin(
      versions,
      and(eq(versions.firmId, comments.firmId), eq(versions.id, comments.versionId)),
    )
    .innerJoin(people, eq(people.id, comments.personId))
    .leftJoin(resolvers, eq(resolvers.id, comments.resolvedBy))
    .leftJoin(
      commentReads,
      and(
        eq(commentReads.firmId, comments.firmId),
        eq(commentReads.personId, actor.personId),
        eq(commentReads.threadId, comments.threadId),
      ),
    )
    .where(and(ofFirm(actor), versionSeen(actor), which))
    .orderBy(asc(comments.at), asc(comments.id));
  if (rows.length === 0) return [];
  const named = await db
    .select({ commentId: mentions.commentId, id: people.id, name: people.name })
    .from(mentions)
    .innerJoin(people, eq(people.id, mentions.personId))
    .where(
      and(
        eq(mentions.firmId, actor.firmId),
        inArray(
          mentions.commentId,
          rows.map(({ comment }) => comment.id),
        ),
      ),
    )
    .orderBy(asc(people.name), asc(people.id));
  const mentionsOf = new Map<string, Author[]>();
  for (const { commentId, ...person } of named) {
    mentionsOf.set(commentId, [...(mentionsOf.get(commentId) ?? []), person]);
  }
  const said = new Map<string, Comment[]>();
  for (const { comment, person, unread } of rows) {
    const { id, body, at, threadId } = comment;
    const one = {
      id,
      person,
      body,
      at: at.toISOString(),
      mentions: mentionsOf.get(id) ?? [],
      unread,
    };
    const before = said.get(threadId);
    if (before) before.push(one);
    else said.set(threadId, [one]);
  }
  return rows
    .filter(({ comment }) => comment.id === comment.threadId)
    .map(({ comment, number, resolver }): Thread => {
      const all = said.get(comment.id) ?? [];
      return {
        id: comment.id,
        projectId: comment.projectId,
        layoutId: comment.layoutId,
        versionId: comment.versionId,
        versionNumber: number,
        pin: comment.pinX === null || comment.pinY === null ? null : [comment.pinX, comment.pinY],
        resolved:
          comment.resolvedAt && resolver
            ? { at: comment.resolvedAt.toISOString(), by: resolver }
            : null,
        mayResolve: mayResolve(actor, comment.personId),
        comments: all,
        unread: all.filter(({ unread }) => unread).length,
      };
    });
};

const mayResolve = (actor: Actor, beganBy: string): boolean =>
  beganBy === actor.personId || mayDraft(actor.role);

export const versionThreads = async (
  db: Db,
  actor: Actor,
  versionId: string,
): Promise<Outcome<Threads>> => {
  if (!(await seenVersion(db, actor, versionId))) return notFound('version');
  return done({ threads: await threadsWhere(db, actor, eq(comments.versionId, versionId)) });
};

export const layoutThreads = async (
  db: Db,
  actor: Actor,
  layoutId: string,
): Promise<Outcome<Threads>> => {
  if (!(await seenLayout(db, actor, layoutId))) return notFound('layout');
  return done({ threads: await threadsWhere(db, actor, eq(comments.layoutId, layoutId)) });
};

/** Whom the actor can mention in comments on a version: everybody else who sees it. */
export const mentionable = async (
  db: Db,
  actor: Actor,
  versionId: string,
): Promise<Outcome<{ people: Mentionable[] }>> => {
  const version = await seenVersion(db, actor, versionId);
  if (!version) return notFound('version');
  const people = await onlookersOf(db, version, actor.personId);
  return done({ people: people.map(({ id, name, role }) => ({ id, name, role })) });
};

/** Notes who is mentioned, and writes at once to those who want that. */
const noteMentions = async (
  tx: Db,
  actor: Actor,
  version: SeenVersion,
  commentId: string,
  body: string,
): Promise<void> => {
  if (!body.includes('@')) return;
  const mentioned = mentionedIn(body, await onlookersOf(tx, version, actor.personId));
  if (mentioned.length === 0) return;
  await tx
    .insert(mentions)
    .values(mentioned.map(({ id }) => ({ firmId: actor.firmId, commentId, personId: id })));
  const [author] = await tx
    .select({ name: people.name })
    .from(people)
    .where(eq(people.id, actor.personId));
  const blocks: LetterBlock[] = [
    {
      kind: 'paragraph',
      text: `${author.name} mentions you in a comment on ${versionName(version)} of ${version.projectName}.`,
    },
    { kind: 'quote', by: author.name, text: body },
    { kind: 'action', label: 'Answer', path: `/versions/${version.id}#comment-${commentId}` },
  ];
  for (const person of mentioned.filter(({ mailMentions }) => mailMentions)) {
    await postLetter(
      tx,
      { to: person.email, firmId: actor.firmId },
      {
        kind: 'mention',
        subject: `${author.name} mentions you: ${version.projectName}`,
        name: person.name,
        blocks,
        why: `You are on this project of ${version.firmName}. Which letters you get is for you to say on your account page.`,
      },
    );
  }
};

/** Begins a thread on a version; its id. For a transaction that knows the version to be seen. */
export const openThread = async (
  tx: Db,
  actor: Actor,
  version: SeenVersion,
  { body, pin }: z.output<typeof newCommentSchema>,
): Promise<string> => {
  const id = newId();
  await tx.insert(comments).values({
    id,
    firmId: actor.firmId,
    projectId: version.projectId,
    layoutId: version.layoutId,
    versionId: version.id,
    threadId: id,
    personId: actor.personId,
    body,
    pinX: pin?.[0] ?? null,
    pinY: pin?.[1] ?? null,
    at: new Date(),
  });
  await noteMentions(tx, actor, version, id, body);
  await recordAudit(tx, actor, 'thread.begun', { type: 'thread', id }, { versionId: version.id });
  return id;
};

const refuseUnlessCommenting = (actor: Actor) =>
  permissions['comment on a version'][actor.role]
    ? null
    : notAllowed('You may not comment on this version.');

export const comment = async (
  db: Db,
  actor: Actor,
  versionId: string,
  input: z.output<typeof newCommentSchema>,
): Promise<Outcome<Thread>> => {
  const version = await seenVersion(db, actor, versionId);
  if (!version) return notFound('version');
  const refusal = refuseUnlessCommenting(actor);
  if (refusal) return refusal;
  const id = await db.transaction(async (tx) => {
    const made = await openThread(tx, actor, version, input);
    await touchProject(tx, actor.firmId, version.layoutId);
    return made;
  });
  return readThread(db, actor, id);
};

const readThread = async (db: Db, actor: Actor, id: string): Promise<Outcome<Thread>> => {
  const [thread] = await threadsWhere(db, actor, eq(comments.threadId, id));
  return thread ? done(thread) : notFound('comment');
};

/** A thread's first comment with its version, if the actor sees that. */
const seenThread = async (db: Db, actor: Actor, id: string) => {
  const [first] = await db
    .select()
    .from(comments)
    .where(and(ofFirm(actor), eq(comments.id, id), eq(comments.threadId, id)));
  const version = first && (await seenVersion(db, actor, first.versionId));
  return version ? { first, version } : undefined;
};

/** Comments of one thread go one by one, so that none is dated before one that was read. */
const lockThread = async (tx: Db, actor: Actor, id: string): Promise<Date> => {
  await tx
    .select({ id: comments.id })
    .from(comments)
    .where(and(ofFirm(actor), eq(comments.id, id)))
    .for('update');
  const [{ last }] = await tx
    .select({ last: sql<Date>`max(${comments.at})`.mapWith(comments.at) })
    .from(comments)
    .where(and(ofFirm(actor), eq(comments.threadId, id)));
  return new Date(Math.max(Date.now(), last.getTime() + 1));
};

/** Notes a thread as read up to one of its comments; never back again. */
const noteRead = (db: Db, actor: Actor, threadId: string, upTo: string) =>
  db.execute(sql`insert into ${commentReads} (firm_id, thread_id, person_id, read_at)
    select ${actor.firmId}, ${threadId}, ${actor.personId}, ${comments.at} from ${comments}
    where ${comments.firmId} = ${actor.firmId} and ${comments.threadId} = ${threadId} and ${comments.id} = ${upTo}
    on conflict (firm_id, person_id, thread_id)
    do update set read_at = greatest(${commentReads.readAt}, excluded.read_at)`);

export const reply = async (
  db: Db,
  actor: Actor,
  threadId: string,
  { body, upTo }: z.output<typeof newReplySchema>,
): Promise<Outcome<Thread>> => {
  const seen = await seenThread(db, actor, threadId);
  if (!seen) return notFound('comment');
  const refusal = refuseUnlessCommenting(actor);
  if (refusal) return refusal;
  const { version } = seen;
  await db.transaction(async (tx) => {
    const at = await lockThread(tx, actor, threadId);
    const id = newId();
    await tx.insert(comments).values({
      id,
      firmId: actor.firmId,
      projectId: version.projectId,
      layoutId: version.layoutId,
      versionId: version.id,
      threadId,
      personId: actor.personId,
      body,
      at,
    });
    await noteRead(tx, actor, threadId, upTo ?? id);
    await noteMentions(tx, actor, version, id, body);
    await settle(tx, actor, threadId, false);
    await recordAudit(
      tx,
      actor,
      'thread.answered',
      { type: 'thread', id: threadId },
      { comment: id },
    );
    await touchProject(tx, actor.firmId, version.layoutId);
  });
  return readThread(db, actor, threadId);
};

/** Marks a thread resolved or open. One that is so already keeps who made it so, and when. */
const settle = async (tx: Db, actor: Actor, id: string, resolved: boolean): Promise<void> => {
  const changed = await tx
    .update(comments)
    .set({
      resolvedAt: resolved ? new Date() : null,
      resolvedBy: resolved ? actor.personId : null,
    })
    .where(
      and(
        ofFirm(actor),
        eq(comments.id, id),
        resolved ? sql`${comments.resolvedAt} is null` : sql`${comments.resolvedAt} is not null`,
      ),
    )
    .returning({ id: comments.id });
  if (changed.length > 0) {
    const what = resolved ? 'thread.resolved' : 'thread.reopened';
    await recordAudit(tx, actor, what, { type: 'thread', id });
  }
};

export const changeThread = async (
  db: Db,
  actor: Actor,
  id: string,
  { resolved }: z.output<typeof threadChangeSchema>,
): Promise<Outcome<Thread>> => {
  const seen = await seenThread(db, actor, id);
  if (!seen) return notFound('comment');
  if (!mayResolve(actor, seen.first.personId)) {
    return notAllowed(
      'Whoever began these comments resolves them, or the firm’s owner and designers.',
    );
  }
  await db.transaction((tx) => settle(tx, actor, id, resolved));
  return readThread(db, actor, id);
};

/** Marks what is in a thread as read, up to the comment that was shown last. */
export const markThreadRead = async (
  db: Db,
  actor: Actor,
  id: string,
  { upTo }: z.output<typeof threadReadSchema>,
): Promise<Outcome<Thread>> => {
  const seen = await seenThread(db, actor, id);
  if (!seen) return notFound('comment');
  await noteRead(db, actor, id, upTo);
  return readThread(db, actor, id);
};
