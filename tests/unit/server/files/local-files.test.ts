import { createHash, randomBytes } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { startLocalS3, type LocalS3 } from '@/server/files/local-s3';
import { s3Store } from '@/server/files/s3-store';

let folder: string;
let local: LocalS3;

beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'evenlay-files-'));
  local = await startLocalS3(folder);
});
afterAll(async () => {
  await local.close();
  rmSync(folder, { recursive: true, force: true });
});

const hash = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');

describe('files through the S3 SDK', () => {
  // The SDK's own checksums leave their frames in the file with services that do not know them.
  test.each([0, 1, 2000, 65_537, 3_000_000])('%i bytes come back as they went', async (length) => {
    const store = s3Store(local.settings);
    const bytes = randomBytes(length);
    await store.put(`firms/a/photos/${length}.jpg`, bytes, 'image/jpeg');
    const back = await store.get(`firms/a/photos/${length}.jpg`);
    expect(back?.byteLength).toBe(length);
    expect(hash(back!)).toBe(hash(bytes));
  });

  test('a name that nothing is kept under gives null', async () => {
    expect(await s3Store(local.settings).get('firms/a/photos/none.jpg')).toBeNull();
  });

  test.each(['../up', 'firms/../../up', '/firms/a', 'firms/a b', 'firms//a', 'firms/./a'])(
    '%s is no name',
    async (name) => {
      const store = s3Store(local.settings);
      await expect(store.put(name, new Uint8Array(1), 'image/jpeg')).rejects.toThrow(/no name/);
      await expect(store.get(name)).rejects.toThrow(/no name/);
    },
  );

  test('what was kept is there for a service started anew on the folder', async () => {
    await s3Store(local.settings).put('firms/a/kept.jpg', Buffer.from('kept'), 'image/jpeg');
    const again = await startLocalS3(folder);
    try {
      const back = await s3Store(again.settings).get('firms/a/kept.jpg');
      expect(Buffer.from(back!).toString()).toBe('kept');
    } finally {
      await again.close();
    }
  });

  test('others on the machine, who do not know the key of this process, are not answered', async () => {
    const { endpoint, bucket } = local.settings;
    await s3Store(local.settings).put('firms/a/own.jpg', Buffer.from('own'), 'image/jpeg');
    const unsigned = await fetch(`${endpoint}/${bucket}/firms/a/own.jpg`);
    expect(unsigned.status).toBe(403);
    const keys = { accessKeyId: 'S3RVER', secretAccessKey: 'S3RVER' };
    await expect(s3Store({ ...local.settings, keys }).get('firms/a/own.jpg')).rejects.toThrow();
  });
});
