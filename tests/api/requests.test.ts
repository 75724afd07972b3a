import { expect, inject, test } from 'vitest';
import { BODY_LIMIT } from '@/server/request-body';
import { newFirm } from './firm';
import { endpoints, useEmptyDatabase, Visitor } from './site';

useEmptyDatabase();

const isProblem = (answer: { status: number; headers: Headers; body: Record<string, unknown> }) => {
  expect(answer.headers.get('content-type')).toMatch(/^application\/problem\+json/);
  expect(answer.body).toMatchObject({
    type: expect.stringMatching(/^urn:evenlay:problem:/),
    title: expect.any(String),
    detail: expect.any(String),
    status: answer.status,
  });
};

test.each([
  ['a page of another site', { origin: 'https://elsewhere.test' }],
  ['a page of another port', { origin: 'http://floors.test:8080' }],
  ['another site, by Sec-Fetch-Site', { 'sec-fetch-site': 'cross-site' }],
  ['a sibling site', { 'sec-fetch-site': 'same-site' }],
  ['a sandboxed frame', { origin: 'null' }],
])('JSON from %s is refused', async (_from, headers) => {
  const { visitor } = await newFirm();
  const answer = await visitor.call('POST', '/api/projects', { name: 'x' }, headers);
  expect(answer.status).toBe(403);
  isProblem(answer);
  expect((await visitor.get('/api/projects')).body.projects).toEqual([]);
});

test('a change whose origin nobody states is refused', async () => {
  const { visitor } = await newFirm();
  const request = visitor.request('POST', '/api/projects', { name: 'x' });
  request.headers.delete('origin');
  expect((await visitor.send(request)).status).toBe(403);
  const told = visitor.request('POST', '/api/projects', { name: 'x' });
  told.headers.delete('origin');
  told.headers.set('sec-fetch-site', 'same-origin');
  expect((await visitor.send(told)).status).toBe(201);
});

test.each(['text/plain', 'application/x-www-form-urlencoded', 'multipart/form-data', ''])(
  'a body of type "%s" is refused',
  async (type) => {
    const { visitor } = await newFirm();
    const answer = await visitor.call('POST', '/api/projects', '{"name":"x"}', {
      'content-type': type,
    });
    expect(answer.status).toBe(415);
    isProblem(answer);
  },
);

test('what is not JSON is refused, and so is JSON of the wrong shape, each with its path', async () => {
  const { visitor } = await newFirm();
  const broken = await visitor.call('POST', '/api/projects', '{"name":');
  expect(broken.status).toBe(422);
  isProblem(broken);
  const shape = await visitor.post('/api/projects', { name: '', siteNote: 7 });
  expect(shape.status).toBe(422);
  isProblem(shape);
  expect(shape.body.errors.map((error: { path: unknown }) => error.path)).toEqual([
    ['name'],
    ['siteNote'],
  ]);
});

test('text that a database cannot hold is refused with its path', async () => {
  const { visitor } = await newFirm();
  for (const bad of ['a\u0000b', 'half \ud83d']) {
    const answer = await visitor.post('/api/projects', { name: 'x', siteNote: bad });
    expect(answer.status).toBe(422);
    expect(answer.body.errors[0].path).toEqual(['siteNote']);
  }
});

/** A body that is made as it is read, and counts how much of it was. */
const endless = (limit: number) => {
  const read = { bytes: 0 };
  const stream = new ReadableStream<Uint8Array>({
    pull: (controller) => {
      if (read.bytes >= limit) return controller.close();
      read.bytes += 65_536;
      controller.enqueue(new Uint8Array(65_536).fill(32));
    },
  });
  return { read, stream };
};

test('a body over 1 MB is given up while it is read', async () => {
  const { visitor } = await newFirm();
  const { read, stream } = endless(200 * BODY_LIMIT);
  const plain = visitor.request('POST', '/api/projects');
  const init = { method: 'POST', headers: plain.headers, body: stream, duplex: 'half' };
  const answer = await visitor.send(new Request(plain.url, init as RequestInit));
  expect(answer.status).toBe(413);
  isProblem(answer);
  expect(read.bytes).toBeLessThan(2 * BODY_LIMIT);
});

test('a body that says it is over 1 MB is not read at all', async () => {
  const { visitor } = await newFirm();
  const { read, stream } = endless(BODY_LIMIT);
  const plain = visitor.request('POST', '/api/projects');
  plain.headers.set('content-length', String(BODY_LIMIT + 1));
  const init = { method: 'POST', headers: plain.headers, body: stream, duplex: 'half' };
  const answer = await visitor.send(new Request(plain.url, init as RequestInit));
  expect(answer.status).toBe(413);
  expect(read.bytes).toBeLessThanOrEqual(65_536);
});

test('a body just within 1 MB is taken', async () => {
  const { visitor } = await newFirm();
  const short = JSON.stringify({ name: 'x' });
  const answer = await visitor.call('POST', '/api/projects', short.padEnd(BODY_LIMIT, ' '));
  expect(answer.status).toBe(201);
});

test('an address that is not there is answered as a problem', async () => {
  const { visitor } = await newFirm();
  const answer = await visitor.get('/api/nothing-here');
  expect(answer.status).toBe(404);
  isProblem(answer);
});

test('a method that an endpoint does not have is refused with those it has', async () => {
  const { visitor } = await newFirm();
  const answer = await visitor.call('DELETE', '/api/projects');
  expect(answer.status).toBe(405);
  expect(answer.headers.get('allow')).toBe('GET, POST');
  isProblem(answer);
});

test('every endpoint refuses the methods that it does not have', () => {
  for (const [address, endpoint] of endpoints) {
    expect(endpoint.ALL, `${address} has no ALL`).toBeDefined();
  }
});

test('every answer carries the security headers', async () => {
  const { visitor } = await newFirm();
  for (const answer of [
    await visitor.get('/api/account'),
    await new Visitor().get('/api/account'),
  ]) {
    expect(answer.headers.get('x-content-type-options')).toBe('nosniff');
    expect(answer.headers.get('content-security-policy')).toContain("frame-ancestors 'none'");
    expect(answer.headers.get('referrer-policy')).toBe('same-origin');
    expect(answer.headers.get('cache-control')).toBe('no-store');
  }
});

test('a page sends whoever is not signed in to the sign-in page, and back afterwards', async () => {
  const answer = await new Visitor().get('/projects/abc?tab=versions');
  expect(answer.status).toBe(303);
  expect(answer.headers.get('location')).toBe(
    `/sign-in?next=${encodeURIComponent('/projects/abc?tab=versions')}`,
  );
});

test('health is answered to anybody', async () => {
  const kind = inject('postgres') ? 'postgres' : 'pglite';
  const answer = await new Visitor().get('/api/health');
  expect(answer).toMatchObject({ status: 200, body: { status: 'ok', database: kind } });
});
