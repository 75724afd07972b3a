import { z } from 'zod';
import type { PersonName } from './people';

/** GET /api/audit?after=…&size=…&person=…&what=…&subject=…: for owners, newest first. `what` may be its first part, such as `version`. */
export const auditQuerySchema = z.object({
  after: z.string().max(200).optional(),
  size: z.coerce.number().int().min(1).max(200).default(50),
  person: z.string().max(64).optional(),
  what: z
    .string()
    .regex(/^[a-z-]+(\.[a-z-]+)?$/)
    .max(64)
    .optional(),
  subject: z.string().max(64).optional(),
});

export interface AuditEntry {
  readonly id: string;
  readonly at: string;
  /** Null for what the server does by itself. */
  readonly person: PersonName | null;
  /** Such as `version.accepted`: subject and past participle. */
  readonly what: string;
  readonly subject: { readonly type: string; readonly id: string };
  readonly detail: Readonly<Record<string, unknown>>;
}

export interface AuditPage {
  readonly entries: readonly AuditEntry[];
  readonly next: string | null;
}
