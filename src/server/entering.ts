import type { APIContext, APIRoute } from 'astro';
import type { z } from 'zod';
import { database, type Db } from './database';
import { answer, jsonResponse } from './endpoint';
import type { Outcome } from './outcomes';
import { readBody } from './request-body';
import { sendSession, sessionIdOf } from './session-cookie';
import type { SignedIn, Visit } from './sessions';

/** What a request tells of whoever knocks. */
export const visitOf = (context: APIContext): Visit => ({
  address: context.clientAddress,
  userAgent: context.request.headers.get('user-agent') ?? '',
  before: sessionIdOf(context),
  personId: context.locals.person?.id ?? null,
});

/** An endpoint by which a person comes in: on success the new session's cookie goes with the answer. */
export const entering =
  <S extends z.ZodType>(
    schema: S,
    enter: (db: Db, input: z.output<S>, visit: Visit) => Promise<Outcome<SignedIn>>,
    status = 200,
  ): APIRoute =>
  async (context) => {
    const body = await readBody(context.request, schema);
    if (!body.ok) return body.response;
    const entered = await enter(await database(), body.value, visitOf(context));
    if (!entered.ok) return answer(entered);
    sendSession(context, entered.value);
    return jsonResponse(entered.value.account, status);
  };

/** An endpoint that anybody may call: parsed with the schema, then one service call. */
export const visiting =
  <S extends z.ZodType>(
    schema: S,
    run: (db: Db, input: z.output<S>, visit: Visit) => Promise<Outcome<unknown>>,
  ): APIRoute =>
  async (context) => {
    const body = await readBody(context.request, schema);
    return body.ok
      ? answer(await run(await database(), body.value, visitOf(context)))
      : body.response;
  };
