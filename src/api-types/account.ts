import { z } from 'zod';
import { email, mailDigests, newPassword, type MailDigest, type Role } from './people';

/** PATCH /api/account/mail. 200 → `MailPreferences`. */
export const mailPreferencesSchema = z
  .object({
    mentions: z.boolean(),
    steps: z.boolean(),
    digest: z.enum(mailDigests, { error: 'must be hourly, daily or never' }),
  })
  .partial();
/** GET /api/account/mail. */
export interface MailPreferences {
  /** A letter at once when somebody mentions me. */
  readonly mentions: boolean;
  /** A letter at once when a version is shared, accepted, issued …, or a change is asked for. */
  readonly steps: boolean;
  /** How often comments that I have not read are gathered into one letter. */
  readonly digest: MailDigest;
}

/** POST /api/account/password. 200 → `{}`; every other session of the person ends. */
export const passwordChangeSchema = z.object({
  current: z
    .string({ error: 'Give your present password' })
    .min(1, 'Give your present password')
    .max(200),
  password: newPassword,
});
/** POST /api/forgotten-password. 200 → `{}`, whether or not there is such an account. */
export const forgottenPasswordSchema = z.object({ email });

/** POST /api/reset-password, with the token of a letter. 200 → `Account`, signed in; 404 when it is used or too old. */
export const resetPasswordSchema = z.object({
  token: z.string({ error: 'must be the letter’s token' }).min(1).max(200),
  password: newPassword,
});

/** GET /api/account/sessions → `{ sessions: OwnSession[] }`, last used first. DELETE …/{id} ends one. */
export interface OwnSession {
  /** Not what the cookie holds. */
  readonly id: string;
  readonly firm: string;
  /** In words, such as `Firefox on Windows`. */
  readonly device: string;
  readonly createdAt: string;
  /** To within some minutes. */
  readonly lastSeenAt: string;
  /** The one that asks. */
  readonly current: boolean;
}

/** GET /api/account/firms → `{ firms: OwnFirm[] }`, by name. */
export interface OwnFirm {
  readonly id: string;
  readonly name: string;
  readonly role: Role;
  /** The one that this session acts in. */
  readonly current: boolean;
}

/** POST /api/account/firm: this session acts in another firm of the person's. 200 → `Account`. */
export const switchFirmSchema = z.object({
  firmId: z.string({ error: 'Choose a firm' }).min(1, 'Choose a firm').max(64),
});
