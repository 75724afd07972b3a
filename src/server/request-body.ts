import type { z } from 'zod';
import type { FieldProblem } from '@/api-types/problem';
import { problemResponse } from './problem-response';

/** No body may be larger, in bytes: some 30,000 lifted addresses, far more than a floor has. */
export const BODY_LIMIT = 1_048_576;

type Read<T> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly response: Response };

const refuse = (response: Response): Read<never> => ({ ok: false, response });

const tooLarge = () => refuse(problemResponse('too-large', 'What was sent is over 1 MB.'));

/** The body's bytes, given up as soon as they pass the limit, whatever the header promised; null when they do. */
export const boundedBytes = async (
  request: Request,
  limit = BODY_LIMIT,
): Promise<Uint8Array | null> => {
  if (Number(request.headers.get('content-length') ?? 0) > limit) return null;
  if (!request.body) return new Uint8Array();
  const reader = request.body.getReader();
  const chunks: Uint8Array[] = [];
  let size = 0;
  for (;;) {
    const { done, value } = await reader.read();
    if (done) break;
    size += value.byteLength;
    if (size > limit) {
      await reader.cancel().catch(() => {});
      return null;
    }
    chunks.push(value);
  }
  return Buffer.concat(chunks);
};

/** Text that no database holds: NUL characters and halves of surrogate pairs. */
const textFaults = (value: unknown, path: (string | number)[] = []): FieldProblem[] => {
  if (typeof value === 'string') {
    return value.includes('\0') || !value.isWellFormed()
      ? [{ path, message: 'holds a character that is not text' }]
      : [];
  }
  if (Array.isArray(value))
    return value.flatMap((item, index) => textFaults(item, [...path, index]));
  if (value !== null && typeof value === 'object') {
    return Object.entries(value).flatMap(([name, item]) => [
      ...textFaults(name, [...path, name]),
      ...textFaults(item, [...path, name]),
    ]);
  }
  return [];
};

/** What zod found wrong, as the field problems of a `Problem`. */
const fieldProblems = (error: z.ZodError): FieldProblem[] =>
  error.issues.map((issue) => ({
    path: issue.path.map((step) => (typeof step === 'symbol' ? String(step) : step)),
    message: issue.message,
  }));

/** Reads a JSON body and parses it with a schema; answers with the problem when either fails. */
export const readBody = async <S extends z.ZodType>(
  request: Request,
  schema: S,
): Promise<Read<z.output<S>>> => {
  const type = request.headers.get('content-type')?.split(';')[0].trim().toLowerCase();
  if (type !== 'application/json') {
    return refuse(problemResponse('wrong-type', 'Send application/json.'));
  }
  const bytes = await boundedBytes(request);
  if (!bytes) return tooLarge();
  let json: unknown;
  try {
    json = JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes));
  } catch {
    return refuse(
      problemResponse('invalid', 'What was sent is not JSON.', {
        errors: [{ path: [], message: 'is not JSON' }],
      }),
    );
  }
  return parsedWith(schema, json);
};

/** Parses what was sent with a schema, or answers with all that is wrong with it. */
export const parsedWith = <S extends z.ZodType>(schema: S, sent: unknown): Read<z.output<S>> => {
  const faults = textFaults(sent);
  const parsed = schema.safeParse(sent);
  const errors = [...faults, ...(parsed.success ? [] : fieldProblems(parsed.error))];
  if (!parsed.success || errors.length > 0) {
    return refuse(problemResponse('invalid', 'Some of what was sent is not right.', { errors }));
  }
  return { ok: true, value: parsed.data };
};
