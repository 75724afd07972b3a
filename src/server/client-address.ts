import diagnostics from 'node:diagnostics_channel';
import type { IncomingMessage } from 'node:http';

const place = globalThis as typeof globalThis & { evenlayForwardedGuard?: true };

/**
 * Leaves in X-Forwarded-For what may be believed: nothing, or with a trusted proxy in front the address
 * that it saw. It appends that one; what stands before may be made up by the client.
 */
export const keepTrustedAddress = (
  headers: IncomingMessage['headers'],
  trustProxy: boolean,
): void => {
  const seen = headers['x-forwarded-for']?.toString().split(',').at(-1)?.trim();
  if (trustProxy && seen) headers['x-forwarded-for'] = seen;
  else delete headers['x-forwarded-for'];
};

/**
 * Astro takes X-Forwarded-For from whoever sends it as the client's address, which would let an
 * attacker have as many addresses as they like. Node announces each request on this channel before it is
 * handled, so the header is cut there. May go when Astro asks first whether the proxy is trusted.
 */
export const guardForwardedFor = (trustProxy: boolean): void => {
  if (place.evenlayForwardedGuard) return;
  place.evenlayForwardedGuard = true;
  diagnostics.subscribe('http.server.request.start', (message) => {
    keepTrustedAddress((message as { request: IncomingMessage }).request.headers, trustProxy);
  });
};
