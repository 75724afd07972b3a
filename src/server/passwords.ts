import { hash, verify } from '@node-rs/argon2';

/** Argon2id with OWASP's second recommended setting (Password Storage Cheat Sheet): 19 MiB, 2 passes, 1 lane. */
const ARGON2ID = { algorithm: 2, memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;

/** Argon2id, with its salt and settings in the text. */
export const passwordHash = (password: string): Promise<string> => hash(password, ARGON2ID);

let nobody: Promise<string> | undefined;

/**
 * Whether the password belongs to the hash. For an unknown person give null: it takes as long, so that
 * the time of the answer does not tell who has an account.
 */
export const passwordFits = async (stored: string | null, password: string): Promise<boolean> => {
  nobody ??= passwordHash('the password of nobody');
  const fits = await verify(stored ?? (await nobody), password);
  return stored !== null && fits;
};
