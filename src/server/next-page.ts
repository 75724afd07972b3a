/** Where to go after signing in: a path of this site, never another site's address. */
export const nextPage = (asked: string | null | undefined, otherwise = '/projects'): string => {
  if (!asked?.startsWith('/')) return otherwise;
  const here = new URL('http://here.invalid');
  const url = URL.canParse(asked, here) ? new URL(asked, here) : here;
  const path = `${url.pathname}${url.search}${url.hash}`;
  return url.origin === here.origin && !path.startsWith('//') ? path : otherwise;
};

const OPEN_PAGES: ReadonlySet<string> = new Set([
  '/',
  '/sign-in',
  '/sign-up',
  '/accept-invitation',
  '/forgotten-password',
  '/reset-password',
  '/dev/mail',
  '/404',
  '/500',
]);

/**
 * Pages that anybody may open. Every other page sends those who are not signed in to `/sign-in`. `/site` is the same for
 * everybody: phones keep it, and must never keep the sign-in page in its place.
 */
export const isOpenPage = (path: string): boolean =>
  OPEN_PAGES.has(path) ||
  ['/guide', '/site'].some((open) => path === open || path.startsWith(`${open}/`)) ||
  path.startsWith('/current/');

const OPEN_ENDPOINTS: ReadonlySet<string> = new Set([
  '/api/health',
  '/api/sign-up',
  '/api/sign-in',
  '/api/sign-out',
  '/api/accept-invitation',
  '/api/forgotten-password',
  '/api/reset-password',
  '/api/dev/mail',
]);

/** Endpoints that answer without a session. Letters kept on this machine are guarded by `local-mail.ts`. */
export const isOpenEndpoint = (path: string): boolean =>
  OPEN_ENDPOINTS.has(path) || path.startsWith('/api/dev/mail/') || path.startsWith('/api/current/');
