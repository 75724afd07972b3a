import { openAgreement } from '@/server/agreement';
import { onlyMethods, reading } from '@/server/endpoint';

export const GET = reading(({ db, actor, id }) => openAgreement(db, actor, id));
export const ALL = onlyMethods('GET');
