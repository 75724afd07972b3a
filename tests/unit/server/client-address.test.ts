import { createServer, get } from 'node:http';
import type { AddressInfo } from 'node:net';
import { expect, test } from 'vitest';
import { guardForwardedFor, keepTrustedAddress } from '@/server/client-address';

test('without a trusted proxy nothing is believed', () => {
  const headers = { 'x-forwarded-for': '203.0.113.9' };
  keepTrustedAddress(headers, false);
  expect(headers).toEqual({});
});

test('of a trusted proxy’s header only the address that it added itself is believed', () => {
  const headers = { 'x-forwarded-for': '203.0.113.9, 198.51.100.4' };
  keepTrustedAddress(headers, true);
  expect(headers).toEqual({ 'x-forwarded-for': '198.51.100.4' });
});

test('a server sees no address that a client made up', async () => {
  guardForwardedFor(false);
  const server = createServer((request, response) => {
    response.end(String(request.headers['x-forwarded-for']));
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  const headers = { 'x-forwarded-for': '203.0.113.9' };
  const seen = await new Promise<string>((resolve) => {
    get({ port, host: '127.0.0.1', headers }, (response) => {
      let text = '';
      response.on('data', (chunk) => (text += chunk));
      response.on('end', () => resolve(text));
    });
  });
  await new Promise((resolve) => server.close(resolve));
  expect(seen).toBe('undefined');
});
