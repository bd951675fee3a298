/** The object store behind a small port: S3 in production, the local stand-in by default, same SDK for both. */
import {
  CreateBucketCommand,
  DeleteObjectCommand,
  GetObjectCommand,
  HeadBucketCommand,
  HeadObjectCommand,
  ListObjectsV2Command,
  PutObjectCommand,
  S3Client,
} from '@aws-sdk/client-s3';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import type { Settings } from '../settings';

export type Store = ReturnType<typeof makeStore>;
type StoreSettings = Settings['store'];

const statusOf = (error: unknown): number | undefined =>
  (error as { $metadata?: { httpStatusCode?: number } }).$metadata?.httpStatusCode;

function client(s: StoreSettings, endpoint: string | undefined): S3Client {
  return new S3Client({
    region: s.region,
    ...(endpoint ? { endpoint, forcePathStyle: true } : {}),
    credentials: { accessKeyId: s.key, secretAccessKey: s.secret },
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    maxAttempts: 3,
    // A store that hangs must not hold requests for ever.
    requestHandler: {
      connectionTimeout: 3000,
      requestTimeout: 15_000,
      socketTimeout: 15_000,
      throwOnRequestTimeout: true,
    },
  });
}

function makeStore(s: StoreSettings) {
  const inside = client(s, s.endpoint);
  const outside = s.publicEndpoint === s.endpoint ? inside : client(s, s.publicEndpoint);
  const Bucket = s.bucket;
  return {
    /** Where browsers put uploads: the content security policy allows it. */
    publicOrigin: s.publicEndpoint
      ? new URL(s.publicEndpoint).origin
      : `https://${s.bucket}.s3.${s.region}.amazonaws.com`,

    async ensureBucket(): Promise<void> {
      try {
        await inside.send(new HeadBucketCommand({ Bucket }));
      } catch (error) {
        if (statusOf(error) !== 404) throw error;
        await inside.send(new CreateBucketCommand({ Bucket })).catch((again: unknown) => {
          if (statusOf(again) !== 409) throw again;
        });
      }
    },

    async put(Key: string, Body: Uint8Array, ContentType: string): Promise<void> {
      const cache = 'public, max-age=31536000, immutable';
      await inside.send(
        new PutObjectCommand({ Bucket, Key, Body, ContentType, CacheControl: cache }),
      );
    },

    /** The object's bytes, or null when there is none. @throws when it is over `limit` bytes. */
    async get(Key: string, limit = 100_000_000): Promise<Uint8Array | null> {
      try {
        const got = await inside.send(new GetObjectCommand({ Bucket, Key }));
        if ((got.ContentLength ?? 0) > limit) throw new RangeError(`Object over ${limit} bytes.`);
        return (await got.Body?.transformToByteArray()) ?? null;
      } catch (error) {
        if (statusOf(error) === 404) return null;
        throw error;
      }
    },

    /** The object as a stream with its length, or null when there is none. */
    async open(Key: string): Promise<{ body: ReadableStream; bytes: number } | null> {
      try {
        const got = await inside.send(new GetObjectCommand({ Bucket, Key }));
        if (!got.Body) return null;
        const body = got.Body.transformToWebStream() as ReadableStream;
        return { body, bytes: got.ContentLength ?? 0 };
      } catch (error) {
        if (statusOf(error) === 404) return null;
        throw error;
      }
    },

    /** Size and type, or null when there is no such object. */
    async head(Key: string): Promise<{ bytes: number; type: string } | null> {
      try {
        const got = await inside.send(new HeadObjectCommand({ Bucket, Key }));
        return { bytes: got.ContentLength ?? 0, type: got.ContentType ?? '' };
      } catch (error) {
        if (statusOf(error) === 404) return null;
        throw error;
      }
    },

    async remove(Key: string): Promise<void> {
      await inside.send(new DeleteObjectCommand({ Bucket, Key }));
    },

    /** One page of keys under a prefix with their ages. */
    async list(Prefix: string, after?: string) {
      const got = await inside.send(
        new ListObjectsV2Command({ Bucket, Prefix, ContinuationToken: after, MaxKeys: 500 }),
      );
      const objects = (got.Contents ?? []).flatMap((o) =>
        o.Key ? [{ key: o.Key, modified: o.LastModified ?? new Date(0), bytes: o.Size ?? 0 }] : [],
      );
      return { objects, next: got.NextContinuationToken };
    },

    /** An address at which a browser may PUT one object of this type for ten minutes. */
    presignPut(Key: string, ContentType: string): Promise<string> {
      return getSignedUrl(outside, new PutObjectCommand({ Bucket, Key, ContentType }), {
        expiresIn: 600,
        signableHeaders: new Set(['content-type']),
      });
    },
  };
}

/** Opens the store; the bucket is made when it is missing. */
export async function openStore(settings: StoreSettings): Promise<Store> {
  process.env['AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED'] = 'true';
  const store = makeStore(settings);
  await store.ensureBucket();
  return store;
}
