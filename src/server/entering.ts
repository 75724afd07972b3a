import type { APIRoute } from 'astro';
import type { z } from 'zod';
import { database, type Db } from './database';
import { answer, jsonResponse } from './endpoint';
import type { Outcome } from './outcomes';
import { readBody } from './request-body';
import { sendSession, sessionIdOf } from './session-cookie';
import type { SignedIn } from './sessions';

/** An endpoint by which a person comes in: on success the new session's cookie goes with the answer. */
export const entering =
  <S extends z.ZodType>(
    schema: S,
    enter: (
      db: Db,
      input: z.output<S>,
      address: string,
      before: string | undefined,
    ) => Promise<Outcome<SignedIn>>,
    status = 200,
  ): APIRoute =>
  async (context) => {
    const body = await readBody(context.request, schema);
    if (!body.ok) return body.response;
    const before = sessionIdOf(context);
    const entered = await enter(await database(), body.value, context.clientAddress, before);
    if (!entered.ok) return answer(entered);
    sendSession(context, entered.value);
    return jsonResponse(entered.value.account, status);
  };
