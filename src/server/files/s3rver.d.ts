/** What is used of `s3rver`, which comes without types. */
declare module 's3rver' {
  import type { RequestListener } from 'node:http';
  export default class S3rver {
    constructor(options: { directory: string; silent: boolean; vhostBuckets: boolean });
    readonly store: { putBucket(name: string): Promise<unknown> };
    callback(): RequestListener;
  }
}

declare module 's3rver/lib/models/account.js' {
  const accounts: {
    DUMMY_ACCOUNT: {
      createKeyPair(accessKeyId: string, secretAccessKey: string): void;
      revokeAccessKey(accessKeyId: string): void;
    };
  };
  export default accounts;
}
