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

export const sessionIdOf = (context: APIContext): string | undefined =>
  context.cookies.get(SESSION_COOKIE)?.value;

export const sendSession = (context: APIContext, { session }: SignedIn): void => {
  context.cookies.set(SESSION_COOKIE, session.id, {
    ...attributes(context.request),
    expires: session.expiresAt,
  });
};

export const forgetSession = (context: APIContext): void => {
  context.cookies.delete(SESSION_COOKIE, attributes(context.request));
};
