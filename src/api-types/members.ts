import { z } from 'zod';
import { roles, type Role } from './people';

/** GET /api/people → `{ people: Member[] }`, by name; for owners. */
export interface Member {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly role: Role;
  readonly since: string;
  /** When they last used Evenlay in this firm; null when they are signed in nowhere. */
  readonly lastSeenAt: string | null;
  /** Projects that they are put on; owners and designers see all without. */
  readonly projects: readonly { readonly id: string; readonly name: string }[];
}

/** PATCH /api/people/{id}. 200 → `Member`; 403 when it would leave the firm without an owner. */
export const memberChangeSchema = z.object({ role: z.enum(roles, { error: 'Choose a role' }) });
/** POST /api/projects/{id}/people and …/people/remove: an installer or client of the firm. 200 → `{ people }`. */
export const projectPersonSchema = z.object({
  personId: z.string({ error: 'Choose a person' }).min(1, 'Choose a person').max(64),
});
/** PATCH /api/firm. 200 → `Firm`. */
export const firmChangeSchema = z
  .object({
    name: z
      .string({ error: 'Give the firm’s name' })
      .trim()
      .min(1, 'Give the firm’s name')
      .max(120, 'Keep it to 120 characters'),
    terms: z.string().trim().max(20_000, 'Keep the terms to 20,000 characters'),
  })
  .partial();
/** GET /api/firm; for owners. */
export interface Firm {
  readonly id: string;
  readonly name: string;
  /** What a client is shown and agrees to when accepting a version; may be empty. */
  readonly terms: string;
}
