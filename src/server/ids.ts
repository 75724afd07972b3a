import { randomBytes } from 'node:crypto';

const DIGITS = 'abcdefghijkmnpqrstuvwxyz23456789';

/** A random id of 24 characters (120 bits), without letters that are misread. */
export const newId = (): string => {
  let id = '';
  for (const byte of randomBytes(24)) id += DIGITS[byte & 31];
  return id;
};
