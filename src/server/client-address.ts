import diagnostics from 'node:diagnostics_channel';
import type { IncomingMessage } from 'node:http';
import { environment } from './environment';

const place = globalThis as typeof globalThis & { evenlayForwardedGuard?: true };

/** The address that the nearest proxy saw: it appends, and what stands before may be made up by the client. */
const lastOf = (header: string | string[] | undefined): string | undefined =>
  header?.toString().split(',').at(-1)?.trim();

/**
 * Astro takes X-Forwarded-For from whoever sends it as the client's address, which would let an
 * attacker have as many addresses as they like. Node announces each request on this channel before it is
 * handled, so the header is dropped there, or cut to what the trusted proxy itself added.
 * May go when Astro asks first whether the proxy is trusted.
 */
export const guardForwardedFor = (): void => {
  if (place.evenlayForwardedGuard) return;
  place.evenlayForwardedGuard = true;
  diagnostics.subscribe('http.server.request.start', (message) => {
    const { headers } = (message as { request: IncomingMessage }).request;
    const seen = environment().trustProxy ? lastOf(headers['x-forwarded-for']) : undefined;
    if (seen) headers['x-forwarded-for'] = seen;
    else delete headers['x-forwarded-for'];
  });
};
