import { randomBytes } from 'node:crypto';
import { mkdir } from 'node:fs/promises';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import S3rver from 's3rver';
import accounts from 's3rver/lib/models/account.js';
import type { S3Settings } from './s3-store';

/** An S3 server in this process, on this machine’s folder. */
export interface LocalS3 {
  readonly settings: S3Settings;
  readonly close: () => Promise<void>;
}

const BUCKET = 'evenlay';

/**
 * A file service inside this process, for when none is set: it speaks S3 on a free port of this machine alone and
 * keeps files in a folder, so that photos take the same way as they do to a real one. Its key is made
 * anew at each start and known to this process only: nobody else on the machine is answered.
 */
export const startLocalS3 = async (folder: string): Promise<LocalS3> => {
  await mkdir(folder, { recursive: true });
  const keys = {
    accessKeyId: randomBytes(16).toString('hex'),
    secretAccessKey: randomBytes(32).toString('hex'),
  };
  accounts.DUMMY_ACCOUNT.createKeyPair(keys.accessKeyId, keys.secretAccessKey);
  const service = new S3rver({ directory: folder, silent: true, vhostBuckets: false });
  await service.store.putBucket(BUCKET);
  const handle = service.callback();
  const server = createServer((request, response) => {
    // The service lets requests without a signature through and checks no signature of the current kind (s3rver
    // 3.7.1): it is the name of the key that others do not know.
    if (request.headers.authorization?.includes(`Credential=${keys.accessKeyId}/`)) {
      handle(request, response);
      return;
    }
    response.writeHead(403).end();
  });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(0, '127.0.0.1', resolve);
  });
  server.unref();
  const { port } = server.address() as AddressInfo;
  return {
    settings: {
      endpoint: `http://127.0.0.1:${port}`,
      region: 'us-east-1',
      bucket: BUCKET,
      keys,
    },
    close: async () => {
      accounts.DUMMY_ACCOUNT.revokeAccessKey(keys.accessKeyId);
      server.closeAllConnections();
      await new Promise<void>((resolve) => server.close(() => resolve()));
    },
  };
};
