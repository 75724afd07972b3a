import { GetObjectCommand, NoSuchKey, PutObjectCommand, S3Client } from '@aws-sdk/client-s3';
import { checkedName, type FileStore } from './file-store';

/** Where files are kept. */
export interface S3Settings {
  /** Address of the service; without one the SDK's own for the region. */
  readonly endpoint: string | undefined;
  readonly region: string;
  readonly bucket: string;
  /** Without them the SDK looks where it usually does: its own variables, a profile, the machine's role. */
  readonly keys: { readonly accessKeyId: string; readonly secretAccessKey: string } | undefined;
}

/** How long a file may take to go over, ms, and how long until the service answers at all. */
const PATIENCE = { requestTimeout: 60_000, connectionTimeout: 10_000 };

/** The SDK speaks at every start of Node 20, which this program still runs on; may go when it no longer does. */
process.env.AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED ??= 'true';

/** A file store in a bucket, through whatever speaks S3. */
export const s3Store = ({ endpoint, region, bucket, keys }: S3Settings): FileStore => {
  const client = new S3Client({
    region,
    // Buckets as the first step of the path: what services on one's own machines understand.
    ...(endpoint ? { endpoint, forcePathStyle: true } : {}),
    ...(keys ? { credentials: keys } : {}),
    // The SDK's own checksums change how a body is framed, and services that do not know them keep the frame as
    // part of the file.
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    requestHandler: PATIENCE,
  });
  return {
    put: async (name, bytes, type) => {
      await client.send(
        new PutObjectCommand({
          Bucket: bucket,
          Key: checkedName(name),
          Body: bytes,
          ContentType: type,
          ContentLength: bytes.byteLength,
        }),
      );
    },
    get: async (name) => {
      try {
        const { Body } = await client.send(
          new GetObjectCommand({ Bucket: bucket, Key: checkedName(name) }),
        );
        return Body ? await Body.transformToByteArray() : null;
      } catch (error) {
        if (error instanceof NoSuchKey) return null;
        throw error;
      }
    },
  };
};
