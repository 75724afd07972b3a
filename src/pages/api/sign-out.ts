import type { APIRoute } from 'astro';
import { database } from '@/server/database';
import { onlyMethods } from '@/server/endpoint';
import { forgetSession, sessionIdOf } from '@/server/session-cookie';
import { endSession } from '@/server/sessions';

export const POST: APIRoute = async (context) => {
  const id = sessionIdOf(context);
  if (id) await endSession(await database(), id);
  forgetSession(context);
  return new Response(null, { status: 204 });
};
export const ALL = onlyMethods('POST');
