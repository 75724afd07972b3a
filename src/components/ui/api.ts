import type { Problem } from '@/api-types/problem';

/** An answer that is not the one asked for: the server's problem, or none when it was not reached. */
export class ApiError extends Error {
  constructor(
    readonly status: number,
    /** Null when the server was not reached. */
    readonly problem: (Problem & Record<string, unknown>) | null,
    message: string,
  ) {
    super(message);
    this.name = 'ApiError';
  }

  get offline(): boolean {
    return this.status === 0;
  }
}

/** Sends JSON and reads JSON; throws `ApiError` for any answer but success. */
export async function api<T>(
  method: string,
  path: string,
  body?: unknown,
  init: RequestInit = {},
): Promise<T> {
  let response: Response;
  try {
    response = await fetch(path, {
      method,
      headers: body === undefined ? {} : { 'content-type': 'application/json' },
      body: body === undefined ? undefined : JSON.stringify(body),
      ...init,
    });
  } catch {
    throw new ApiError(
      0,
      null,
      'The server could not be reached. Check the connection and try again.',
    );
  }
  const answer = await response.json().catch(() => null);
  if (!response.ok)
    throw new ApiError(
      response.status,
      answer,
      answer?.detail ?? answer?.title ?? `The server answered with an error (${response.status}).`,
    );
  return answer as T;
}
