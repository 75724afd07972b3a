import { auditEvents } from '@/db/schema';
import type { Db } from './database';
import { newId } from './ids';

/** Who did something: a person of the firm, or null for what the server does by itself. */
export interface Doer {
  readonly firmId: string;
  readonly personId: string | null;
}

export interface Deed {
  /** Subject and past participle, such as `person.invited`. */
  readonly what: string;
  readonly subject: { readonly type: string; readonly id: string };
  /** What the line in the audit needs to be read without the subject, which may change. */
  readonly detail?: Readonly<Record<string, unknown>>;
}

/** Records who did what, in the transaction that does it. */
export const recordDeed = async (tx: Db, doer: Doer, deed: Deed): Promise<void> => {
  await tx.insert(auditEvents).values({
    id: newId(),
    firmId: doer.firmId,
    personId: doer.personId,
    what: deed.what,
    subjectType: deed.subject.type,
    subjectId: deed.subject.id,
    detail: deed.detail ?? {},
  });
};
