import { and, desc, eq, inArray, like } from 'drizzle-orm';
import type { z } from 'zod';
import type { AuditPage, auditQuerySchema } from '@/api-types/audit';
import { auditEvents, people } from '@/db/schema';
import type { Db } from './database';
import { newId } from './ids';
import { exactly, momentKeyRead, olderThan, pageOf } from './keyset';
import { done, notAllowed, type Outcome } from './outcomes';
import { permissions, type Actor } from './permissions';

/** Whom a record names: a person of the firm, or nobody for what the server does by itself. */
export interface Doer {
  readonly firmId: string;
  readonly personId: string | null;
}

const SUBJECT_TYPES = [
  'firm',
  'person',
  'invitation',
  'project',
  'layout',
  'version',
  'thread',
  'choice',
  'item',
  'supplier',
  'quote',
  'order',
] as const;

/** What a line of the audit is about. */
export interface Subject {
  readonly type: (typeof SUBJECT_TYPES)[number];
  readonly id: string;
}

/**
 * Writes down who did what, in the transaction that does it. `what` is subject and past participle, such as
 * `version.shared`. No secret goes into `detail`: owners read and export it.
 */
export const recordAudit = async (
  tx: Db,
  { firmId, personId }: Doer,
  what: string,
  subject: Subject,
  detail: Readonly<Record<string, unknown>> = {},
): Promise<void> => {
  await tx.insert(auditEvents).values({
    id: newId(),
    firmId,
    personId,
    // The clock, not the transaction's start: records of one transaction keep their order.
    at: new Date(),
    what,
    subjectType: subject.type,
    subjectId: subject.id,
    detail,
  });
};

/** Who did what in the firm, newest first, for its owners. */
export const readAudit = async (
  db: Db,
  actor: Actor,
  query: z.output<typeof auditQuerySchema>,
): Promise<Outcome<AuditPage>> => {
  if (!permissions['people, roles, firm settings'][actor.role]) {
    return notAllowed('Only the firm’s owner reads who did what.');
  }
  const { what, person, subject, size } = query;
  const rows = await db
    .select({
      id: auditEvents.id,
      key: exactly(auditEvents.at),
      at: auditEvents.at,
      what: auditEvents.what,
      subjectType: auditEvents.subjectType,
      subjectId: auditEvents.subjectId,
      detail: auditEvents.detail,
      personId: people.id,
      personName: people.name,
    })
    .from(auditEvents)
    .leftJoin(people, eq(people.id, auditEvents.personId))
    .where(
      and(
        eq(auditEvents.firmId, actor.firmId),
        person === undefined ? undefined : eq(auditEvents.personId, person),
        // An id is of one type only; all are named because the index begins with the type.
        subject === undefined
          ? undefined
          : and(
              inArray(auditEvents.subjectType, [...SUBJECT_TYPES]),
              eq(auditEvents.subjectId, subject),
            ),
        what === undefined
          ? undefined
          : what.includes('.')
            ? eq(auditEvents.what, what)
            : like(auditEvents.what, `${what}.%`),
        olderThan(auditEvents.at, auditEvents.id, momentKeyRead(query.after)),
      ),
    )
    .orderBy(desc(auditEvents.at), desc(auditEvents.id))
    .limit(size + 1);
  const { page, next } = pageOf(rows, size);
  return done({
    entries: page.map((row) => ({
      id: row.id,
      at: row.at.toISOString(),
      person:
        row.personId !== null && row.personName !== null
          ? { id: row.personId, name: row.personName }
          : null,
      what: row.what,
      subject: { type: row.subjectType, id: row.subjectId },
      detail: row.detail,
    })),
    next,
  });
};
