import { auditQuerySchema } from '@/api-types/audit';
import { readAudit } from '@/server/audit';
import { asking, onlyMethods } from '@/server/endpoint';

export const GET = asking(auditQuerySchema, ({ db, actor }, query) => readAudit(db, actor, query));
export const ALL = onlyMethods('GET');
