import type { APIContext, MiddlewareNext } from 'astro';
import { defineMiddleware } from 'astro:middleware';
import { guardForwardedFor } from '@/server/client-address';
import { database, theDatabase } from '@/server/database';
import { environment } from '@/server/environment';
import { logError } from '@/server/log';
import { startPosting } from '@/server/mail/posting';
import { isOpenEndpoint, isOpenPage } from '@/server/next-page';
import { SIGNED_OUT } from '@/server/outcomes';
import { PdfNotMade } from './server/pdf/pdf-thread';
import { problemResponse } from '@/server/problem-response';
import { cameOverTls, isFromThisSite } from '@/server/request-origin';
import { addSecurityHeaders } from '@/server/security-headers';
import { forgetSession, sendSession, sessionIdOf } from '@/server/session-cookie';
import { signedInBy } from '@/server/sessions';

guardForwardedFor(environment().trustProxy);

// The start script does this for the built server.
if (import.meta.env.MODE === 'development') {
  database()
    .then((db) => startPosting(db, environment()))
    .catch((error: unknown) => logError('letters are not sent', error));
}

const identify = async (context: APIContext): Promise<void> => {
  Object.assign(context.locals, { person: null, firm: null, role: null, session: null });
  const id = sessionIdOf(context);
  if (!id) return;
  const signedIn = await signedInBy(await database(), id);
  if (!signedIn) return forgetSession(context);
  const { firm, role, ...person } = signedIn.account;
  Object.assign(context.locals, { person, firm, role, session: signedIn.session });
  if (signedIn.prolonged) sendSession(context, signedIn);
};

/** What it did must be on the disk before it is answered for. */
const changes = ({ method }: Request): boolean => method !== 'GET' && method !== 'HEAD';

const guarded = async (context: APIContext, next: MiddlewareNext): Promise<Response> => {
  const path = context.url.pathname.replace(/(.)\/+$/, '$1');
  const isApi = path === '/api' || path.startsWith('/api/');
  if (!isFromThisSite(context.request, environment())) {
    return problemResponse('wrong-origin', 'This request did not come from a page of this site.');
  }
  try {
    await identify(context);
    if (!context.locals.person) {
      if (isApi && !isOpenEndpoint(path)) {
        return problemResponse('signed-out', SIGNED_OUT);
      }
      if (!isApi && !isOpenPage(path)) {
        const asked = `${context.url.pathname}${context.url.search}`;
        return context.redirect(`/sign-in?next=${encodeURIComponent(asked)}`, 303);
      }
    }
    const response = await next();
    if (isApi && changes(context.request)) await (await theDatabase()).settled();
    return isApi && response.status === 404 && !response.headers.has('content-type')
      ? problemResponse('not-found', 'There is nothing at this address.')
      : response;
  } catch (error) {
    if (!isApi) throw error;
    logError(`${context.request.method} ${path}`, error);
    return problemResponse(
      'failed',
      error instanceof PdfNotMade
        ? error.message
        : 'The server could not do this. Nothing was changed; please try again.',
    );
  }
};

export const onRequest = defineMiddleware(async (context, next) => {
  if (context.isPrerendered) return next();
  const response = await guarded(context, next);
  if (!response.headers.has('cache-control')) {
    response.headers.set('cache-control', 'private, no-cache');
  }
  const tls = cameOverTls(context.request, environment());
  addSecurityHeaders(response.headers, import.meta.env.DEV, tls);
  return response;
});
