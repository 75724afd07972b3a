import type { Environment } from './environment';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/** Whether the request came over TLS: as the server sees it, or as a trusted proxy says. */
export const cameOverTls = (request: Request, settings: Environment): boolean => {
  if (settings.publicOrigin) return settings.publicOrigin.startsWith('https:');
  const forwarded = settings.trustProxy && request.headers.get('x-forwarded-proto');
  return forwarded
    ? forwarded.split(',').at(-1)?.trim() === 'https'
    : new URL(request.url).protocol === 'https:';
};

/** Whether cookies of this answer are for TLS only. */
export const cookiesAreSecure = (request: Request, settings: Environment): boolean =>
  settings.secureCookies === 'auto'
    ? cameOverTls(request, settings)
    : settings.secureCookies === 'always';

/**
 * Whether a request that changes something comes from a page of this site. Browsers say where a request
 * comes from in Sec-Fetch-Site and Origin, and no page can forge either; a request with neither
 * is refused, so a program that calls the API sends `Origin` with this site's address.
 */
export const isFromThisSite = (request: Request, settings: Environment): boolean => {
  if (SAFE.has(request.method)) return true;
  const site = request.headers.get('sec-fetch-site');
  if (site !== null && site !== 'same-origin') return false;
  const origin = request.headers.get('origin');
  if (origin === null) return site === 'same-origin';
  if (settings.publicOrigin && origin === settings.publicOrigin) return true;
  const host = request.headers.get('host');
  const scheme = cameOverTls(request, settings) ? 'https' : 'http';
  return host !== null && origin === `${scheme}://${host.toLowerCase()}`;
};
