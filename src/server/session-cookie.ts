import type { APIContext } from 'astro';
import { environment } from './environment';
import { cookiesAreSecure } from './request-origin';
import { SESSION_COOKIE, type SignedIn } from './sessions';

const attributes = (request: Request) =>
  ({
    httpOnly: true,
    sameSite: 'lax',
    path: '/',
    secure: cookiesAreSecure(request, environment()),
  }) as const;

/** What the cookie says, true or not. */
export const sessionIdOf = (context: APIContext): string | undefined =>
  context.cookies.get(SESSION_COOKIE)?.value;

/** Lets the browser keep the session for as long as it holds. */
export const sendSession = (context: APIContext, { session }: SignedIn): void => {
  context.cookies.set(SESSION_COOKIE, session.id, {
    ...attributes(context.request),
    expires: session.expiresAt,
  });
};

/** Takes the cookie off the browser. */
export const forgetSession = (context: APIContext): void => {
  context.cookies.delete(SESSION_COOKIE, attributes(context.request));
};
