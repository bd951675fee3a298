import { Readable } from 'node:stream';
import {
  CopyObjectCommand,
  CreateBucketCommand,
  DeleteBucketCommand,
  DeleteObjectCommand,
  DeleteObjectsCommand,
  GetObjectCommand,
  HeadBucketCommand,
  HeadObjectCommand,
  PutObjectCommand,
  type S3Client,
} from '@aws-sdk/client-s3';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startObjectStore, type ObjectStore } from '../../fakes/object-store/server';
import {
  account,
  bucket,
  client,
  codeOf,
  lean,
  raw,
  temporaryFolder,
  xmlCode,
} from './fakes-client';

const limit = 200_000;
let store: ObjectStore;
let folder: Awaited<ReturnType<typeof temporaryFolder>>;

beforeAll(async () => {
  folder = await temporaryFolder();
  const options = { ...account, data: folder.path, buckets: [bucket], maxObjectBytes: limit };
  store = await startObjectStore(options);
});
afterAll(async () => {
  await store.close();
  await folder.remove();
});

const put = (Key: string, Body: string | Buffer = 'x', more: object = {}) =>
  new PutObjectCommand({ Bucket: bucket, Key, Body, ...more });
const get = (Key: string, more: object = {}) =>
  new GetObjectCommand({ Bucket: bucket, Key, ...more });
const text = async (s3: S3Client, Key: string, more: object = {}) =>
  (await s3.send(get(Key, more))).Body?.transformToString();

describe.each([
  ['with the shop’s client settings', lean],
  ['with the client’s defaults', {}],
])('objects, %s', (_, settings) => {
  it('gives back content, type, metadata and ETag as they were put', async () => {
    const s3 = client(store.port, settings);
    const more = {
      ContentType: 'text/plain',
      CacheControl: 'no-cache',
      Metadata: { board: 'b-7' },
    };
    await s3.send(put('note', 'hello', more));
    const got = await s3.send(get('note'));
    expect(await got.Body?.transformToString()).toBe('hello');
    // MD5 of "hello", from memory; the same as `printf hello | md5sum` prints.
    expect(got.ETag).toBe('"5d41402abc4b2a76b9719d911017c592"');
    expect(got).toMatchObject({ ...more, ContentLength: 5 });
    const head = await s3.send(new HeadObjectCommand({ Bucket: bucket, Key: 'note' }));
    expect(head).toMatchObject({ ...more, ContentLength: 5, ETag: got.ETag });
  });

  it('takes a stream of known length', async () => {
    const s3 = client(store.port, settings);
    const pieces = [Buffer.alloc(70_000, 'a'), Buffer.alloc(70_000, 'b')];
    const more = { ContentLength: 140_000 };
    await s3.send(
      new PutObjectCommand({ ...put('s').input, Body: Readable.from(pieces), ...more }),
    );
    expect(await text(s3, 's')).toBe('a'.repeat(70_000) + 'b'.repeat(70_000));
    const head = await s3.send(new HeadObjectCommand({ Bucket: bucket, Key: 's' }));
    expect(head.ContentEncoding).toBeUndefined();
  });

  it('deletes one, deletes many, and tells that a key is gone', async () => {
    const s3 = client(store.port, settings);
    for (const key of ['d1', 'd2', 'd&<3>']) await s3.send(put(key));
    await s3.send(new DeleteObjectCommand({ Bucket: bucket, Key: 'd1' }));
    const Objects = [{ Key: 'd2' }, { Key: 'd&<3>' }, { Key: 'never' }];
    const answer = await s3.send(new DeleteObjectsCommand({ Bucket: bucket, Delete: { Objects } }));
    expect(answer.Deleted?.map(({ Key }) => Key)).toEqual(['d2', 'd&<3>', 'never']);
    for (const key of ['d1', 'd2', 'd&<3>'])
      expect(await codeOf(s3.send(get(key)))).toBe('NoSuchKey');
    const head = new HeadObjectCommand({ Bucket: bucket, Key: 'd1' });
    expect(await codeOf(s3.send(head))).toBe('NotFound');
  });

  it('copies within the store, with or without new metadata', async () => {
    const s3 = client(store.port, settings);
    await s3.send(put('from ü', 'copied', { Metadata: { a: '1' } }));
    const input = { Bucket: bucket, Key: 'to', CopySource: `${bucket}/from%20%C3%BC` };
    await s3.send(new CopyObjectCommand(input));
    const copied = await s3.send(new HeadObjectCommand({ Bucket: bucket, Key: 'to' }));
    expect(copied.Metadata).toEqual({ a: '1' });
    const fresh = { MetadataDirective: 'REPLACE', Metadata: { b: '2' } } as const;
    await s3.send(new CopyObjectCommand({ ...input, ...fresh }));
    const got = await s3.send(get('to'));
    expect(got.Metadata).toEqual({ b: '2' });
    expect(await got.Body?.transformToString()).toBe('copied');
    const missing = { ...input, CopySource: `${bucket}/none` };
    expect(await codeOf(s3.send(new CopyObjectCommand(missing)))).toBe('NoSuchKey');
  });
});

describe('buckets', () => {
  it('are made once, found, and removed when empty', async () => {
    const s3 = client(store.port, lean);
    const Bucket = 'bench-2';
    expect(await codeOf(s3.send(new HeadBucketCommand({ Bucket })))).toBe('NotFound');
    await s3.send(new CreateBucketCommand({ Bucket }));
    await s3.send(new HeadBucketCommand({ Bucket }));
    const again = await codeOf(s3.send(new CreateBucketCommand({ Bucket })));
    expect(again).toBe('BucketAlreadyOwnedByYou');
    await s3.send(new PutObjectCommand({ Bucket, Key: 'a', Body: 'x' }));
    expect(await codeOf(s3.send(new DeleteBucketCommand({ Bucket })))).toBe('BucketNotEmpty');
    await s3.send(new DeleteObjectCommand({ Bucket, Key: 'a' }));
    await s3.send(new DeleteBucketCommand({ Bucket }));
    const put = new PutObjectCommand({ Bucket, Key: 'a', Body: 'x' });
    expect(await codeOf(s3.send(put))).toBe('NoSuchBucket');
    const bad = new CreateBucketCommand({ Bucket: 'Not_A_Bucket' });
    expect(await codeOf(s3.send(bad))).toBe('InvalidBucketName');
  });
});

describe('who asks', () => {
  it('refuses a wrong secret, an unknown key, another region and no signature', async () => {
    const as = (accessKeyId: string, secretAccessKey: string, region = 'us-east-1') =>
      codeOf(
        client(store.port, {
          ...lean,
          region,
          credentials: { accessKeyId, secretAccessKey },
        }).send(put('k')),
      );
    expect(await as(account.key, account.secret)).toBe('done');
    expect(await as(account.key, `${account.secret}.`)).toBe('SignatureDoesNotMatch');
    expect(await as('AKOTHER', account.secret)).toBe('InvalidAccessKeyId');
    expect(await as(account.key, account.secret, 'eu-west-1')).toBe('AuthorizationHeaderMalformed');
    const bare = await raw(store.port, 'GET', `/${bucket}/k`);
    expect([bare.status, xmlCode(bare)]).toEqual([403, 'AccessDenied']);
  });

  it('refuses a clock an hour behind', async () => {
    const s3 = client(store.port, { ...lean, systemClockOffset: -3_600_000 });
    expect(await codeOf(s3.send(put('k')))).toBe('RequestTimeTooSkewed');
  });

  /** Sends a signed put after something on its way has changed it. */
  async function tampered(
    change: (request: { path: string; body: unknown; headers: Record<string, string> }) => void,
  ) {
    const s3 = client(store.port, lean);
    s3.middlewareStack.add(
      (next) => (args) => {
        change(args.request as Parameters<typeof change>[0]);
        return next(args);
      },
      { step: 'finalizeRequest', priority: 'low', name: 'tamper' },
    );
    return codeOf(s3.send(put('victim', 'honest', { Metadata: { owner: 'ida' } })));
  }

  it.each([
    ['nothing', 'done', () => undefined],
    ['the path', 'SignatureDoesNotMatch', (r: { path: string }) => (r.path += '2')],
    ['the body', 'XAmzContentSHA256Mismatch', (r: { body: unknown }) => (r.body = 'hohest')],
    [
      'a signed header',
      'SignatureDoesNotMatch',
      (r: { headers: Record<string, string> }) => (r.headers['x-amz-meta-owner'] = 'eve'),
    ],
    [
      'an added x-amz header',
      'AccessDenied',
      (r: { headers: Record<string, string> }) => (r.headers['x-amz-meta-more'] = '1'),
    ],
  ] as const)('a request with %s changed on the way: %s', async (_, code, change) => {
    expect(await tampered(change)).toBe(code);
  });
});

describe('presigned addresses', () => {
  const presign = (Key: string, more: object = {}) =>
    getSignedUrl(client(store.port, lean), put(Key, '', { ContentType: 'image/jpeg' }), {
      expiresIn: 60,
      signableHeaders: new Set(['content-type']),
      ...more,
    });
  const send = async (url: string, type = 'image/jpeg', body = 'jpeg') => {
    const answer = await fetch(url, { method: 'PUT', body, headers: { 'content-type': type } });
    return answer.ok ? 'done' : /<Code>(\w+)/.exec(await answer.text())?.[1];
  };

  it('let a browser put, with the type that was signed', async () => {
    const url = await presign('p é/1.jpg');
    expect(await send(url)).toBe('done');
    const head = new HeadObjectCommand({ Bucket: bucket, Key: 'p é/1.jpg' });
    expect((await client(store.port, lean).send(head)).ContentType).toBe('image/jpeg');
    expect(await send(url, 'text/html')).toBe('SignatureDoesNotMatch');
  });

  it('end when they expire', async () => {
    const signingDate = new Date(Date.now() - 61_000);
    expect(await send(await presign('late', { signingDate }))).toBe('AccessDenied');
    const recent = new Date(Date.now() - 30_000);
    expect(await send(await presign('late', { signingDate: recent }))).toBe('done');
  });

  it('serve for that key, method and life only', async () => {
    const url = await presign('mine');
    expect(await send(url.replace('/mine', '/yours'))).toBe('SignatureDoesNotMatch');
    expect(await send(url.replace('Expires=60', 'Expires=600'))).toBe('SignatureDoesNotMatch');
    expect((await fetch(url)).status).toBe(403);
    expect(await send(url.replace('Expires=60', 'Expires=604801'))).toBe(
      'AuthorizationQueryParametersError',
    );
  });

  it('read with the headers asked for in the address', async () => {
    const s3 = client(store.port, lean);
    await s3.send(put('report', 'pdf'));
    const name = 'attachment; filename="report.pdf"';
    const url = await getSignedUrl(s3, get('report', { ResponseContentDisposition: name }));
    const answer = await fetch(url);
    expect(answer.headers.get('content-disposition')).toBe(name);
    expect(await answer.text()).toBe('pdf');
  });
});
