import { createHash } from 'node:crypto';

/**
 * Canonical JSON after RFC 8785 (JSON Canonicalization Scheme): members sorted by the UTF-16 code
 * units of their names, no white space, numbers and strings as ECMAScript writes them.
 * `undefined` members are left out, as in JSON.stringify.
 */
export const canonicalJson = (value: unknown): string => {
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(',')}]`;
  if (value !== null && typeof value === 'object') {
    const members = Object.entries(value)
      .filter(([, member]) => member !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([name, member]) => `${JSON.stringify(name)}:${canonicalJson(member)}`);
    return `{${members.join(',')}}`;
  }
  return JSON.stringify(value);
};

/** SHA-256 of the canonical JSON, 64 hexadecimal digits. */
export const fingerprintOf = (document: unknown): string =>
  createHash('sha256').update(canonicalJson(document), 'utf8').digest('hex');

/** As many digits as are printed on sheets: enough to tell a firm's versions apart by eye. */
const SHORT_FINGERPRINT_DIGITS = 10;

/** The beginning of a fingerprint, as it is printed. */
export const shortFingerprint = (fingerprint: string): string =>
  fingerprint.slice(0, SHORT_FINGERPRINT_DIGITS);
