import { accountChangeSchema, type Account } from '@/api-types/people';
import { onlyMethods, reading, writing, type Call } from '@/server/endpoint';
import { done } from '@/server/outcomes';
import { changeAccount } from '@/server/people';

const accountOf = ({ context: { locals } }: Call): Account => {
  const { person, firm, role } = locals;
  if (!person || !firm || !role) throw new Error('An endpoint was reached without a session');
  return { ...person, firm, role };
};

export const GET = reading(async (call) => done(accountOf(call)));
export const PATCH = writing(accountChangeSchema, (call, change) =>
  changeAccount(call.db, accountOf(call), change),
);
export const ALL = onlyMethods('GET', 'PATCH');
