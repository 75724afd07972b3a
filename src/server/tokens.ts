import { createHash, randomBytes } from 'node:crypto';

/** A secret that a letter carries in a link: 256 random bits, safe in an address. */
export const newToken = (): string => randomBytes(32).toString('base64url');

/** What is kept of a token: a copy of the database lets nobody in. */
export const tokenHash = (token: string): string =>
  createHash('sha256').update(token).digest('hex');
