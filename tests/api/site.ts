import { createHash } from 'node:crypto';
import { existsSync, readFileSync, readdirSync, renameSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { PGlite } from '@electric-sql/pglite';
import type { APIContext, APIRoute } from 'astro';
import { createContext } from 'astro/middleware';
import postgres from 'postgres';
import { afterAll, beforeAll, inject } from 'vitest';
import { openDatabase, openPglite, type Db, type OpenDatabase } from '@/db/client';
import { onRequest } from '@/middleware';
import { database, useDatabase } from '@/server/database';
import { TEMPLATE } from '../postgres/template';

type Endpoint = Partial<Record<string, APIRoute>>;

const modules = import.meta.glob<Endpoint>('/src/pages/api/**/*.ts', { eager: true });

/** Every endpoint file as its address, such as `/api/projects/[id]`, with its module. */
export const endpoints: ReadonlyMap<string, Endpoint> = new Map(
  Object.entries(modules).map(([file, module]) => [
    file.replace('/src/pages', '').replace(/(\/index)?\.ts$/, ''),
    module,
  ]),
);

const routeOf = (
  pathname: string,
): { endpoint: Endpoint; params: Record<string, string> } | null => {
  const exact = endpoints.get(pathname);
  if (exact) return { endpoint: exact, params: {} };
  for (const [address, endpoint] of endpoints) {
    const pattern = address.replace('[id]', '(?<id>[^/]+)');
    const match = new RegExp(`^${pattern}$`).exec(pathname);
    if (match) return { endpoint, params: { ...match.groups } };
  }
  return null;
};

export const ORIGIN = 'http://floors.test';

/** As Astro serves a request: the middleware, then the endpoint's method or its `ALL`. */
export const serve = async (request: Request): Promise<Response> => {
  const route = routeOf(new URL(request.url).pathname);
  const context = createContext({
    request,
    params: route?.params ?? {},
    defaultLocale: 'en',
    locals: { person: null, firm: null, role: null, session: null },
  }) as APIContext;
  const response = await onRequest(context, async () => {
    const handler = route?.endpoint[request.method] ?? route?.endpoint.ALL;
    return handler ? await handler(context) : new Response(null, { status: 404 });
  });
  if (!(response instanceof Response)) throw new Error('The middleware gave no response');
  for (const cookie of context.cookies.headers()) response.headers.append('set-cookie', cookie);
  return response;
};

export interface Answer {
  readonly status: number;
  readonly headers: Headers;
  // Tests look into answers of every shape.
  // eslint-disable-next-line @typescript-eslint/no-explicit-any
  readonly body: any;
}

let addresses = 0;

/** A browser with its own cookies and its own address. */
export class Visitor {
  private readonly jar = new Map<string, string>();
  readonly address = `192.0.2.${(addresses += 1) % 250}`;

  cookie(name = 'evenlay_session'): string | undefined {
    return this.jar.get(name);
  }

  setCookie(value: string, name = 'evenlay_session'): void {
    this.jar.set(name, value);
  }

  request(
    method: string,
    url: string,
    body?: unknown,
    headers: Record<string, string> = {},
  ): Request {
    const safe = method === 'GET' || method === 'HEAD';
    return new Request(new URL(url, ORIGIN), {
      method,
      headers: {
        host: new URL(ORIGIN).host,
        'x-forwarded-for': this.address,
        ...(safe ? {} : { origin: ORIGIN, 'content-type': 'application/json' }),
        ...(this.jar.size > 0
          ? { cookie: [...this.jar].map(([name, value]) => `${name}=${value}`).join('; ') }
          : {}),
        ...headers,
      },
      ...(safe ? {} : { body: typeof body === 'string' ? body : JSON.stringify(body ?? {}) }),
    });
  }

  async send(request: Request): Promise<Answer> {
    const response = await serve(request);
    for (const cookie of response.headers.getSetCookie()) {
      const [pair] = cookie.split(';');
      const [name, value] = [pair.slice(0, pair.indexOf('=')), pair.slice(pair.indexOf('=') + 1)];
      if (/expires=Thu, 01 Jan 1970|max-age=0/i.test(cookie)) this.jar.delete(name);
      else this.jar.set(name, value);
    }
    const text = await response.text();
    const isJson = response.headers.get('content-type')?.includes('json');
    return {
      status: response.status,
      headers: response.headers,
      body: isJson && text ? JSON.parse(text) : text,
    };
  }

  call(method: string, url: string, body?: unknown, headers?: Record<string, string>) {
    return this.send(this.request(method, url, body, headers));
  }

  get = (url: string) => this.call('GET', url);
  post = (url: string, body?: unknown) => this.call('POST', url, body);
  put = (url: string, body?: unknown) => this.call('PUT', url, body);
  patch = (url: string, body?: unknown) => this.call('PATCH', url, body);
}

/** A migrated, empty PGlite, dumped once for each state of the migrations: loading it is ten times faster. */
const template = async (): Promise<Blob> => {
  const folder = path.resolve('drizzle');
  const hash = createHash('sha256');
  for (const name of readdirSync(folder).sort()) {
    if (name.endsWith('.sql')) hash.update(readFileSync(path.join(folder, name)));
  }
  hash.update(readFileSync(path.resolve('node_modules/@electric-sql/pglite/package.json')));
  const file = path.join(tmpdir(), `evenlay-template-${hash.digest('hex').slice(0, 16)}.tar`);
  if (!existsSync(file)) {
    const opened = await PGlite.create();
    await openPglite(opened);
    const dump = await opened.dumpDataDir('none');
    await opened.close();
    const part = `${file}.${process.pid}.${Math.random()}`;
    writeFileSync(part, Buffer.from(await dump.arrayBuffer()));
    renameSync(part, file);
  }
  return new Blob([readFileSync(file)]);
};

const onServer = async <T>(run: (client: postgres.Sql) => Promise<T>): Promise<T> => {
  const client = postgres(`${inject('postgres')}/postgres`, { max: 1, onnotice: () => {} });
  try {
    return await run(client);
  } finally {
    await client.end();
  }
};

/** A new, migrated database on the PostgreSQL server of these tests; its address. */
export const newPostgresDatabase = async (): Promise<string> => {
  const name = `test_${process.pid}_${Math.random().toString(36).slice(2)}`;
  await onServer((client) => client.unsafe(`create database ${name} template ${TEMPLATE}`));
  return `${inject('postgres')}/${name}`;
};

export const openEmpty = async (): Promise<OpenDatabase> =>
  inject('postgres')
    ? openDatabase({ databaseUrl: await newPostgresDatabase(), dataDir: '' })
    : openPglite(await PGlite.create({ loadDataDir: await template() }));

/** An empty database of its own for a test file: PGlite in memory, or one on a PostgreSQL server. */
export const useEmptyDatabase = (): void => {
  let opened: OpenDatabase | undefined;
  beforeAll(async () => {
    opened = await openEmpty();
    useDatabase(opened);
  });
  afterAll(async () => {
    await opened?.close();
  });
};

/** The rows of a raw statement, which the two drivers give in different shapes. */
export const rowsOf = <T>(result: unknown): T[] =>
  Array.isArray(result) ? [...(result as T[])] : (result as { rows: T[] }).rows;

export const db = (): Promise<Db> => database();
