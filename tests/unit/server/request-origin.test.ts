import { expect, test } from 'vitest';
import { parseEnvironment } from '@/server/environment';
import { cameOverTls, cookiesAreSecure, isFromThisSite } from '@/server/request-origin';

const post = (headers: Record<string, string>) =>
  new Request('http://localhost/api/projects', { method: 'POST', headers });

const settings = (variables: Record<string, string> = {}) => parseEnvironment(variables);

test('the site is the host that the browser asked', () => {
  const origin = 'http://192.0.2.7:4321';
  expect(isFromThisSite(post({ host: '192.0.2.7:4321', origin }), settings())).toBe(true);
  expect(isFromThisSite(post({ host: '192.0.2.8:4321', origin }), settings())).toBe(false);
});

test('behind a proxy the site is the public origin', () => {
  const behind = settings({ PUBLIC_ORIGIN: 'https://floors.example' });
  const inside = { host: 'inside:4321' };
  expect(isFromThisSite(post({ ...inside, origin: 'https://floors.example' }), behind)).toBe(true);
  expect(isFromThisSite(post({ ...inside, origin: 'http://floors.example' }), behind)).toBe(false);
  expect(isFromThisSite(post({ ...inside, origin: 'https://other.example' }), behind)).toBe(false);
});

test('a forwarded scheme counts only from a trusted proxy', () => {
  const forwarded = post({ 'x-forwarded-proto': 'https' });
  expect(cameOverTls(forwarded, settings())).toBe(false);
  expect(cameOverTls(forwarded, settings({ TRUST_PROXY: 'true' }))).toBe(true);
});

test('cookies are secure over TLS, or as they are told to be', () => {
  const plain = post({});
  expect(cookiesAreSecure(plain, settings())).toBe(false);
  expect(cookiesAreSecure(plain, settings({ SECURE_COOKIES: 'always' }))).toBe(true);
  const tls = settings({ PUBLIC_ORIGIN: 'https://floors.example' });
  expect(cookiesAreSecure(plain, tls)).toBe(true);
  expect(cookiesAreSecure(plain, { ...tls, secureCookies: 'never' })).toBe(false);
});
