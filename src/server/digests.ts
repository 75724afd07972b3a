import { and, eq, isNull, lt, ne, or, sql } from 'drizzle-orm';
import type { Role } from '@/api-types/people';
import { comments, memberships, mentions, people } from '@/db/schema';
import type { Db } from './database';
import type { LetterBlock } from './mail/letter';
import { postLetter } from './mail/outbox';
import { unreadComments } from './unread';

const MINUTE_MS = 60_000;

/** A digest waits until nothing new was written for this long, minutes, so that a talk comes as one letter … */
export const QUIET_MINUTES = 10;
/** … but no longer than this after the first of it. */
const GREATEST_WAIT_MINUTES = 60;
/** At least this long from one digest to the next, by the person's choice. */
const BETWEEN_MINUTES = { hourly: 60, daily: 24 * 60 } as const;
/** Words quoted in one letter; the rest is counted. */
const QUOTES = 20;

interface Member {
  readonly firmId: string;
  readonly personId: string;
  readonly role: Role;
}

const minutesBefore = (now: Date, minutes: number): Date =>
  new Date(now.getTime() - minutes * MINUTE_MS);

/** Whose last digest is long enough ago. */
const isDue = (now: Date) =>
  or(
    isNull(memberships.digestedAt),
    and(
      eq(people.mailDigest, 'hourly'),
      lt(memberships.digestedAt, minutesBefore(now, BETWEEN_MINUTES.hourly)),
    ),
    and(
      eq(people.mailDigest, 'daily'),
      lt(memberships.digestedAt, minutesBefore(now, BETWEEN_MINUTES.daily)),
    ),
  );

const dueMembers = (db: Db, now: Date): Promise<Member[]> =>
  db
    .select({
      firmId: memberships.firmId,
      personId: memberships.personId,
      role: memberships.role,
    })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(
      and(
        ne(people.mailDigest, 'never'),
        isDue(now),
        sql`exists (select 1 from ${comments} where ${comments.firmId} = ${memberships.firmId}
          and ${comments.at} > coalesce(${memberships.digestedAt}, ${memberships.createdAt})
          and ${comments.personId} <> ${memberships.personId})`,
      ),
    );

type UnreadRow = Awaited<ReturnType<typeof unreadComments>>[number];

const digestBlocks = (rows: readonly UnreadRow[]): LetterBlock[] => {
  const byVersion = new Map<string, UnreadRow[]>();
  for (const row of rows) {
    byVersion.set(row.versionId, [...(byVersion.get(row.versionId) ?? []), row]);
  }
  let left = QUOTES;
  return [...byVersion.values()].flatMap((said): LetterBlock[] => {
    const [{ versionId, projectName, layoutName, versionNumber }] = said;
    const quoted = said.slice(0, left);
    left -= quoted.length;
    const more = said.length - quoted.length;
    return [
      { kind: 'paragraph', text: `${projectName}: ${layoutName}, version ${versionNumber}` },
      ...quoted.map(
        ({ person, body }) => ({ kind: 'quote', by: person.name, text: body }) as const,
      ),
      ...(more > 0 ? [{ kind: 'paragraph', text: `and ${more} more.` } as const] : []),
      { kind: 'action', label: 'Read and answer', path: `/versions/${versionId}` },
    ];
  });
};

/** Gathers one person's unread comments into a letter, if they have rested long enough; whether it did. */
const postDigest = (db: Db, member: Member, now: Date): Promise<boolean> =>
  db.transaction(async (tx) => {
    // Another process that gathers for the same person has the row: it is left to that one.
    const [due] = await tx
      .select({
        since: sql<Date>`coalesce(${memberships.digestedAt}, ${memberships.createdAt})`.mapWith(
          memberships.createdAt,
        ),
        name: people.name,
        email: people.email,
        mailMentions: people.mailMentions,
      })
      .from(memberships)
      .innerJoin(people, eq(people.id, memberships.personId))
      .where(
        and(
          eq(memberships.firmId, member.firmId),
          eq(memberships.personId, member.personId),
          isDue(now),
        ),
      )
      .for('update', { of: memberships, skipLocked: true });
    if (!due) return false;
    const told = due.mailMentions
      ? new Set(
          (
            await tx
              .select({ id: mentions.commentId })
              .from(mentions)
              .where(
                and(eq(mentions.firmId, member.firmId), eq(mentions.personId, member.personId)),
              )
          ).map(({ id }) => id),
        )
      : new Set<string>();
    const rows = (await unreadComments(tx, member))
      .filter(({ id, at }) => at > due.since && at <= now && !told.has(id))
      .reverse();
    if (rows.length === 0) return false;
    const first = rows[0].at;
    const last = rows[rows.length - 1].at;
    const rested = last <= minutesBefore(now, QUIET_MINUTES);
    if (!rested && first > minutesBefore(now, GREATEST_WAIT_MINUTES)) return false;
    const many = rows.length === 1 ? 'A comment' : `${rows.length} comments`;
    await postLetter(
      tx,
      { to: due.email, firmId: member.firmId },
      {
        kind: 'comment-digest',
        subject: `${many} that you have not read`,
        name: due.name,
        blocks: digestBlocks(rows),
        why: 'How often comments are gathered into a letter is for you to say on your account page.',
      },
    );
    await tx
      .update(memberships)
      .set({ digestedAt: now })
      .where(and(eq(memberships.firmId, member.firmId), eq(memberships.personId, member.personId)));
    return true;
  });

/** Gathers every digest that is due into the outbox; how many. Any number of processes may do so at once. */
export const postDigests = async (db: Db, now = new Date()): Promise<number> => {
  let posted = 0;
  for (const member of await dueMembers(db, now)) {
    if (await postDigest(db, member, now)) posted += 1;
  }
  return posted;
};
