import { environment } from './environment';

const place = globalThis as typeof globalThis & { evenlayOrigin?: string };

/** Tells where the server came to listen, for links when PUBLIC_ORIGIN is not set. */
export const noteOrigin = (origin: string): void => {
  place.evenlayOrigin = origin;
};

/**
 * This site's address for links in letters. Never taken from a request: its Host header may be made up, and a
 * letter for a new password would then lead to the forger's site.
 */
export const siteOrigin = (): string =>
  environment().publicOrigin ?? place.evenlayOrigin ?? `http://localhost:${environment().port}`;
