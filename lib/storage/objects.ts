import { CreateBucketCommand, DeleteObjectsCommand, GetObjectCommand, HeadBucketCommand, ListObjectsV2Command, PutObjectCommand, S3Client } from '@aws-sdk/client-s3';
import { env, storageUrl } from '../config/env';

/** Where files are kept that are no rows: any S3. */
export interface ObjectStore {
  put(key: string, body: Uint8Array, type: string): Promise<void>;
  /** Null where there is none. */
  get(key: string): Promise<Uint8Array | null>;
  remove(keys: readonly string[]): Promise<void>;
  /** Every key that begins so, with when it was written. */
  list(prefix: string): AsyncIterable<{ key: string; at: Date; bytes: number }>;
}

/** Longer than a photo takes, shorter than anybody waits. */
const TIMEOUT_MS = 10_000;

/** What the local stand-in takes for a key and a secret. */
export const LOCAL_KEY = 'S3RVER';

let shared: ObjectStore | undefined;

/** The process's own store. */
export function objectStore(): ObjectStore {
  return (shared ??= s3Store());
}

/** Makes the next call read the environment again; a test that changes it calls this. */
export function forgetObjectStore(): void {
  shared = undefined;
}

const named = (error: unknown, ...names: string[]) => error instanceof Error && names.includes(error.name);

function s3Store(): ObjectStore {
  const { S3_ENDPOINT, S3_BUCKET: Bucket, AWS_REGION, AWS_ACCESS_KEY_ID, AWS_SECRET_ACCESS_KEY } = env();
  const client = new S3Client({
    endpoint: storageUrl(),
    region: AWS_REGION,
    forcePathStyle: true,
    maxAttempts: 2,
    // Checksums of the newer kind are not known to every S3.
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    requestHandler: { requestTimeout: TIMEOUT_MS, connectionTimeout: 2_000 },
    ...(S3_ENDPOINT === undefined
      ? { credentials: { accessKeyId: LOCAL_KEY, secretAccessKey: LOCAL_KEY } }
      : AWS_ACCESS_KEY_ID !== undefined && AWS_SECRET_ACCESS_KEY !== undefined
        ? { credentials: { accessKeyId: AWS_ACCESS_KEY_ID, secretAccessKey: AWS_SECRET_ACCESS_KEY } }
        : {}),
  });

  let made: Promise<void> | undefined;
  const bucket = () =>
    (made ??= client
      .send(new HeadBucketCommand({ Bucket }))
      .then(() => undefined)
      .catch(async (error: unknown) => {
        if (!named(error, 'NotFound', 'NoSuchBucket')) throw error;
        await client.send(new CreateBucketCommand({ Bucket }));
      })
      .catch((error: unknown) => {
        made = undefined;
        throw error;
      }));

  return {
    async put(key, body, type) {
      await bucket();
      await client.send(new PutObjectCommand({ Bucket, Key: key, Body: body, ContentType: type, ContentLength: body.length }));
    },
    async get(key) {
      try {
        const { Body } = await client.send(new GetObjectCommand({ Bucket, Key: key }));
        return (await Body?.transformToByteArray()) ?? null;
      } catch (error) {
        if (named(error, 'NoSuchKey', 'NotFound', 'NoSuchBucket')) return null;
        throw error;
      }
    },
    async remove(keys) {
      for (let from = 0; from < keys.length; from += 1_000) {
        await client.send(new DeleteObjectsCommand({ Bucket, Delete: { Objects: keys.slice(from, from + 1_000).map((Key) => ({ Key })), Quiet: true } }));
      }
    },
    async *list(prefix) {
      await bucket();
      let ContinuationToken: string | undefined;
      do {
        const page = await client.send(new ListObjectsV2Command({ Bucket, Prefix: prefix, ContinuationToken }));
        for (const { Key, LastModified, Size } of page.Contents ?? []) if (Key) yield { key: Key, at: LastModified ?? new Date(0), bytes: Size ?? 0 };
        ContinuationToken = page.IsTruncated ? page.NextContinuationToken : undefined;
      } while (ContinuationToken);
    },
  };
}
