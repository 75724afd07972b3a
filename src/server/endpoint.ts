import type { APIContext, APIRoute } from 'astro';
import type { z } from 'zod';
import { database, type Db } from './database';
import { SIGNED_OUT, type Outcome } from './outcomes';
import type { Actor } from './permissions';
import { problemResponse, refusalResponse } from './problem-response';
import { boundedBytes, parsedWith, readBody } from './request-body';

/** What an endpoint hands to a service. */
export interface Call {
  readonly db: Db;
  readonly actor: Actor;
  /** The `[id]` of the path; empty where there is none. */
  readonly id: string;
  readonly context: APIContext;
}

/** A value as JSON that nothing keeps. */
export const jsonResponse = (value: unknown, status = 200): Response =>
  new Response(JSON.stringify(value), {
    status,
    headers: { 'content-type': 'application/json; charset=utf-8', 'cache-control': 'no-store' },
  });

/** An outcome as a response: its value as JSON, or its refusal as a problem. */
export const answer = (outcome: Outcome<unknown>, status = 200): Response =>
  outcome.ok ? jsonResponse(outcome.value, status) : refusalResponse(outcome);

const callOf = async (context: APIContext): Promise<Call | null> => {
  const { person, firm, role } = context.locals;
  if (!person || !firm || !role) return null;
  return {
    db: await database(),
    actor: { personId: person.id, firmId: firm.id, role },
    id: context.params.id ?? '',
    context,
  };
};

const signIn = () => problemResponse('signed-out', SIGNED_OUT);

/** Who calls and what the query says, or the answer to give in place of the service's. */
const queriedWith = async <S extends z.ZodType>(
  schema: S,
  context: APIContext,
): Promise<
  | { readonly ok: true; readonly call: Call; readonly query: z.output<S> }
  | { readonly ok: false; readonly response: Response }
> => {
  const call = await callOf(context);
  if (!call) return { ok: false, response: signIn() };
  const query = parsedWith(schema, Object.fromEntries(context.url.searchParams));
  return query.ok ? { ok: true, call, query: query.value } : query;
};

/** An endpoint that takes no body (GET, DELETE): one service call, its outcome as JSON. */
export const reading =
  (run: (call: Call) => Promise<Outcome<unknown>>): APIRoute =>
  async (context) => {
    const call = await callOf(context);
    return call ? answer(await run(call)) : signIn();
  };

/** A GET endpoint with a query: parsed with the schema, then one service call. An empty field counts as left out. */
export const asking =
  <S extends z.ZodType>(
    schema: S,
    run: (call: Call, query: z.output<S>) => Promise<Outcome<unknown>>,
  ): APIRoute =>
  async (context) => {
    const call = await callOf(context);
    if (!call) return signIn();
    const fields = [...context.url.searchParams].filter(([, value]) => value !== '');
    const query = parsedWith(schema, Object.fromEntries(fields));
    return query.ok ? answer(await run(call, query.value)) : query.response;
  };

/** A GET endpoint with a query that answers with a stream of bytes, such as events or an archive. */
export const streaming =
  <S extends z.ZodType>(
    schema: S,
    type: string,
    run: (call: Call, query: z.output<S>) => Promise<Outcome<ReadableStream<Uint8Array>>>,
    headers: Readonly<Record<string, string>> = {},
  ): APIRoute =>
  async (context) => {
    const asked = await queriedWith(schema, context);
    if (!asked.ok) return asked.response;
    const outcome = await run(asked.call, asked.query);
    if (!outcome.ok) return refusalResponse(outcome);
    return new Response(outcome.value, {
      headers: {
        'content-type': type,
        'cache-control': 'no-store',
        // Proxies must pass each part on as it comes.
        'x-accel-buffering': 'no',
        ...headers,
      },
    });
  };

/** An endpoint that takes a JSON body: parsed with the schema, then one service call. */
export const writing =
  <S extends z.ZodType>(
    schema: S,
    run: (call: Call, input: z.output<S>) => Promise<Outcome<unknown>>,
    status = 200,
  ): APIRoute =>
  async (context) => {
    const call = await callOf(context);
    if (!call) return signIn();
    const body = await readBody(context.request, schema);
    return body.ok ? answer(await run(call, body.value), status) : body.response;
  };

/** An endpoint that takes a file as its body, of at most `limit` bytes, and says in its query what it is. */
export const receiving =
  <S extends z.ZodType>(
    schema: S,
    limit: { readonly bytes: number; readonly words: string },
    run: (call: Call, query: z.output<S>, bytes: Uint8Array) => Promise<Outcome<unknown>>,
    status = 201,
  ): APIRoute =>
  async (context) => {
    const asked = await queriedWith(schema, context);
    if (!asked.ok) return asked.response;
    const bytes = await boundedBytes(context.request, limit.bytes);
    if (!bytes) return problemResponse('too-large', limit.words);
    return answer(await run(asked.call, asked.query, bytes), status);
  };

/** A GET endpoint with a query that answers with a file. Browsers keep no copy: the next to use one must not find it. */
export const fetching =
  <S extends z.ZodType>(
    schema: S,
    type: string,
    run: (call: Call, query: z.output<S>) => Promise<Outcome<Uint8Array>>,
  ): APIRoute =>
  async (context) => {
    const asked = await queriedWith(schema, context);
    if (!asked.ok) return asked.response;
    const outcome = await run(asked.call, asked.query);
    if (!outcome.ok) return refusalResponse(outcome);
    return new Response(new Uint8Array(outcome.value), {
      headers: {
        'content-type': type,
        'content-length': String(outcome.value.byteLength),
        'content-disposition': 'inline',
        'cache-control': 'private, no-store',
      },
    });
  };

/** For `ALL`: every method that the endpoint does not have. */
export const onlyMethods =
  (...methods: string[]): APIRoute =>
  ({ request }) =>
    problemResponse('wrong-method', `${request.method} is not possible here.`, {
      headers: { allow: methods.join(', ') },
    });
