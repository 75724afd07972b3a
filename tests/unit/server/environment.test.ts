import { expect, test } from 'vitest';
import { parseEnvironment } from '@/server/environment';

test('with nothing set everything has a value that works', () => {
  expect(parseEnvironment({})).toEqual({
    host: '127.0.0.1',
    port: 4321,
    dataDir: 'data',
    databaseUrl: undefined,
    publicOrigin: undefined,
    trustProxy: false,
    secureCookies: 'auto',
    smtpUrl: undefined,
    mailFrom: 'Evenlay <evenlay@localhost>',
  });
});

test('a key that is set but empty counts as not set', () => {
  expect(parseEnvironment({ PORT: '', DATABASE_URL: ' ' })).toEqual(parseEnvironment({}));
});

test('every bad key is named, with what it is and what would do', () => {
  const bad = {
    PORT: 'eighty',
    DATABASE_URL: 'mysql://host/name',
    PUBLIC_ORIGIN: 'floors',
    TRUST_PROXY: 'perhaps',
    SECURE_COOKIES: 'sometimes',
    SMTP_URL: 'http://mail.firm.example',
    MAIL_FROM: 'floors at firm',
    S3_ENDPOINT: 'files.firm.example',
    S3_BUCKET: 'Photos of ours',
    S3_REGION: 'West!',
  };
  const message = (() => {
    try {
      parseEnvironment(bad);
      return '';
    } catch (error) {
      return String(error);
    }
  })();
  for (const [key, value] of Object.entries(bad)) {
    expect(message).toMatch(new RegExp(`${key} must .*\\(it is "${value}"\\)`));
  }
});

test('an origin is kept without its path', () => {
  expect(parseEnvironment({ PUBLIC_ORIGIN: 'https://floors.example/app/' }).publicOrigin).toBe(
    'https://floors.example',
  );
});

test('photos go into a bucket when one is named, and half a key or a service without a bucket is named', () => {
  expect(parseEnvironment({ S3_BUCKET: 'photos' }).s3).toEqual({
    endpoint: undefined,
    region: 'us-east-1',
    bucket: 'photos',
    keys: undefined,
  });
  const keys = { S3_ACCESS_KEY_ID: 'id', S3_SECRET_ACCESS_KEY: 'very secret' };
  expect(
    parseEnvironment({ S3_BUCKET: 'photos', S3_ENDPOINT: 'https://files.example', ...keys }).s3,
  ).toMatchObject({
    endpoint: 'https://files.example',
    keys: { accessKeyId: 'id', secretAccessKey: 'very secret' },
  });
  const half = { S3_BUCKET: 'photos', S3_SECRET_ACCESS_KEY: 'very secret' };
  expect(() => parseEnvironment(half)).toThrow(/S3_ACCESS_KEY_ID is needed/);
  expect(() => parseEnvironment(half)).not.toThrow(/very secret/);
  expect(() => parseEnvironment({ S3_ENDPOINT: 'https://files.example' })).toThrow(
    /S3_BUCKET is needed/,
  );
});
