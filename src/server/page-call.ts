import { database, type Db } from './database';
import type { Refusal } from './outcomes';
import type { Actor } from './permissions';

/** What a page hands to a service. The middleware has seen to it that somebody is signed in. */
export const pageCall = async (locals: App.Locals): Promise<{ db: Db; actor: Actor }> => {
  const { person, firm, role } = locals;
  if (!person || !firm || !role) throw new Error('this page needs somebody signed in');
  return { db: await database(), actor: { personId: person.id, firmId: firm.id, role } };
};

/** A refused page: what is not there and what is not yours look alike. */
export const refusedStatus = (refusal: Refusal): number =>
  refusal.kind === 'not-allowed' ? 403 : 404;
