import { draftFromProposalSchema } from '@/api-types/site';
import { onlyMethods, writing } from '@/server/endpoint';
import { draftFromProposal } from '@/server/site/proposal-draft';

export const POST = writing(draftFromProposalSchema, ({ db, actor, id }, input) =>
  draftFromProposal(db, actor, id, input),
);
export const ALL = onlyMethods('POST');
