import { z } from 'zod';

export const roles = ['owner', 'designer', 'installer', 'client'] as const;
export type Role = (typeof roles)[number];

export const displaySchema = z.enum(['metric', 'imperial'], {
  error: 'must be metric or imperial',
});
export type Display = z.infer<typeof displaySchema>;

/** How often comments not yet read are gathered into one letter. */
export const mailDigests = ['hourly', 'daily', 'never'] as const;
export type MailDigest = (typeof mailDigests)[number];

const name = (of: string) =>
  z
    .string({ error: `Give ${of}` })
    .trim()
    .min(1, `Give ${of}`)
    .max(120, 'Keep it to 120 characters');

export const personName = name('your name');

export const email = z
  .string({ error: 'Give an e-mail address' })
  .trim()
  .toLowerCase()
  .max(254, 'That is too long for an e-mail address')
  .pipe(z.email('That does not look like an e-mail address'));

/** Length alone is asked for, as NIST SP 800-63B-4 (3.1.1.2) advises. */
export const newPassword = z
  .string({ error: 'Choose a password' })
  .min(10, 'Use at least 10 characters')
  .max(200, 'Keep it to 200 characters');

/** POST /api/sign-up: makes a firm and its owner. 201 → `Account`, signed in. */
export const signUpSchema = z.object({
  firmName: name('the firm’s name'),
  name: personName,
  email,
  password: newPassword,
  display: displaySchema.default('metric'),
});
/** POST /api/sign-in. 200 → `Account`; 401 `signed-out` when the pair is wrong; 429 after too many tries. */
export const signInSchema = z.object({
  email: z.string({ error: 'Give an e-mail address' }).trim().toLowerCase().min(1).max(254),
  password: z.string({ error: 'Give your password' }).min(1, 'Give your password').max(200),
});
/** PATCH /api/account. 200 → `Account`. */
export const accountChangeSchema = z.object({ name: personName, display: displaySchema }).partial();
/** GET /api/account: who is signed in, in which firm and role. */
export interface Account {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly display: Display;
  readonly firm: { readonly id: string; readonly name: string };
  readonly role: Role;
}

/** A person as others see them. */
export interface PersonName {
  readonly id: string;
  readonly name: string;
}
