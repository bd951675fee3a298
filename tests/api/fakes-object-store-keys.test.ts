import {
  CreateBucketCommand,
  GetObjectCommand,
  ListObjectsV2Command,
  paginateListObjectsV2,
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

describe('conditions and ranges', () => {
  it('lets exactly one of 20 parallel first writers win', async () => {
    const s3 = client(store.port, lean);
    const race = Array.from({ length: 20 }, (_, index) =>
      codeOf(s3.send(put('race', `writer ${index}`, { IfNoneMatch: '*' }))),
    );
    const codes = await Promise.all(race);
    expect(codes.filter((code) => code === 'done')).toHaveLength(1);
    expect(codes.filter((code) => code === 'PreconditionFailed')).toHaveLength(19);
    expect(await text(s3, 'race')).toBe(`writer ${codes.indexOf('done')}`);
  });

  it('writes over a version only when it is the one named', async () => {
    const s3 = client(store.port, lean);
    const { ETag } = await s3.send(put('version', 'one'));
    expect(await codeOf(s3.send(put('version', 'two', { IfMatch: '"00"' })))).toBe(
      'PreconditionFailed',
    );
    expect(await codeOf(s3.send(put('version', 'two', { IfMatch: ETag })))).toBe('done');
    expect(await codeOf(s3.send(put('version-none', 'x', { IfMatch: ETag })))).toBe('NoSuchKey');
  });

  it('reads under conditions', async () => {
    const s3 = client(store.port, lean);
    const { ETag } = await s3.send(put('cached', 'content'));
    const status = (more: object) =>
      s3.send(get('cached', more)).then(
        async (answer) => {
          await answer.Body?.transformToString();
          return answer.$metadata.httpStatusCode;
        },
        (error: { $metadata: { httpStatusCode: number } }) => error.$metadata.httpStatusCode,
      );
    expect(await status({ IfMatch: ETag })).toBe(200);
    expect(await status({ IfMatch: '"other"' })).toBe(412);
    expect(await status({ IfNoneMatch: ETag })).toBe(304);
    expect(await status({ IfNoneMatch: '"other"' })).toBe(200);
    expect(await status({ IfModifiedSince: new Date(Date.now() + 1000) })).toBe(304);
    expect(await status({ IfUnmodifiedSince: new Date(0) })).toBe(412);
  });

  it.each([
    ['bytes=0-3', '0123', 'bytes 0-3/10'],
    ['bytes=7-', '789', 'bytes 7-9/10'],
    ['bytes=-2', '89', 'bytes 8-9/10'],
    ['bytes=8-99', '89', 'bytes 8-9/10'],
    ['bytes=3-1', '0123456789', undefined],
    ['bytes=0-1,3-4', '0123456789', undefined],
  ])('range %s', async (Range, content, header) => {
    const s3 = client(store.port, lean);
    await s3.send(put('digits', '0123456789'));
    const got = await s3.send(get('digits', { Range }));
    expect(await got.Body?.transformToString()).toBe(content);
    expect(got.ContentRange).toBe(header);
  });

  it('refuses a range beyond the end', async () => {
    const s3 = client(store.port, lean);
    await s3.send(put('digits', '0123456789'));
    expect(await codeOf(s3.send(get('digits', { Range: 'bytes=10-' })))).toBe('InvalidRange');
  });
});

describe('limits and promises', () => {
  it('takes an object of the limit and refuses one byte more', async () => {
    const s3 = client(store.port, lean);
    expect(await codeOf(s3.send(put('big', Buffer.alloc(limit))))).toBe('done');
    expect(await codeOf(s3.send(put('big', Buffer.alloc(limit + 1))))).toBe('EntityTooLarge');
    expect(await text(s3, 'big')).toHaveLength(limit);
  });

  it('verifies Content-MD5 and checksums sent along', async () => {
    const s3 = client(store.port, lean);
    const wrong = Buffer.alloc(16).toString('base64');
    expect(await codeOf(s3.send(put('sum', 'hello', { ContentMD5: wrong })))).toBe('BadDigest');
    expect(await codeOf(s3.send(put('sum', 'hello', { ContentMD5: 'short' })))).toBe(
      'InvalidDigest',
    );
    // CRC-32 of "hello", 0x3610a686 (from memory; zlib's crc32 gives the same).
    expect(await codeOf(s3.send(put('sum', 'hello', { ChecksumCRC32: 'NhCmhg==' })))).toBe('done');
    expect(await codeOf(s3.send(put('sum', 'hellO', { ChecksumCRC32: 'NhCmhg==' })))).toBe(
      'BadDigest',
    );
    expect(await text(s3, 'sum')).toBe('hello');
  });

  it('refuses what it does not keep instead of ignoring it', async () => {
    const s3 = client(store.port, lean);
    expect(await codeOf(s3.send(put('a', 'x', { ACL: 'public-read' })))).toBe(
      'AccessControlListNotSupported',
    );
    const url = await getSignedUrl(s3, get('a', { VersionId: '1' }));
    expect((await fetch(url)).status).toBe(501);
  });
});

describe('keys', () => {
  const strange = [
    '../../../etc/passwd',
    '..',
    'a/../b',
    'a//b/',
    'Ω–µ 漢😀.jpg',
    'a%2Fb',
    "x!*'()+&=?#",
  ];

  it.each(strange)('keeps %s as it is and inside the data folder', async (key) => {
    const s3 = client(store.port, lean);
    await s3.send(put(key, `content of ${key}`));
    expect(await text(s3, key)).toBe(`content of ${key}`);
    const { Contents } = await s3.send(new ListObjectsV2Command({ Bucket: bucket, Prefix: key }));
    expect(Contents?.map(({ Key }) => Key)).toContain(key);
  });

  it('takes an encoded slash for a slash of the key', async () => {
    const s3 = client(store.port, lean);
    await s3.send(put('deep/er', 'found'));
    const url = new URL(await getSignedUrl(s3, get('deep/er')));
    const answer = await raw(store.port, 'GET', `/${bucket}/deep%2Fer${url.search}`, {
      host: url.host,
    });
    expect(answer.body).toBe('found');
  });

  it('refuses broken encoding and keys over 1024 bytes', async () => {
    const broken = await raw(store.port, 'GET', `/${bucket}/%E0%A4%A`);
    expect([broken.status, xmlCode(broken)]).toEqual([400, 'InvalidURI']);
    const s3 = client(store.port, lean);
    expect(await codeOf(s3.send(put('k'.repeat(1024))))).toBe('done');
    expect(await codeOf(s3.send(put('k'.repeat(1025))))).toBe('KeyTooLongError');
  });
});

describe('listing', () => {
  const Bucket = 'listing';
  const keys = Array.from({ length: 1100 }, (_, i) => `t/${String(i).padStart(4, '0')}/photo.jpg`);

  beforeAll(async () => {
    const s3 = client(store.port, lean);
    await s3.send(new CreateBucketCommand({ Bucket }));
    for (let at = 0; at < keys.length; at += 50) {
      const some = keys.slice(at, at + 50);
      await Promise.all(
        some.map((Key) => s3.send(new PutObjectCommand({ Bucket, Key, Body: 'x' }))),
      );
    }
  });

  it('pages through more than 1000 keys, each once and in order', async () => {
    const seen: string[] = [];
    const sizes: number[] = [];
    for await (const page of paginateListObjectsV2(
      { client: client(store.port, lean) },
      { Bucket },
    )) {
      sizes.push(page.KeyCount ?? 0);
      seen.push(...(page.Contents ?? []).map(({ Key }) => Key ?? ''));
    }
    expect(sizes).toEqual([1000, 100]);
    expect(seen).toEqual(keys);
  });

  it('folds keys below a delimiter, over pages', async () => {
    const s3 = client(store.port, lean);
    const top = await s3.send(new ListObjectsV2Command({ Bucket, Delimiter: '/' }));
    expect(top.CommonPrefixes).toEqual([{ Prefix: 't/' }]);
    const input = { Bucket, Prefix: 't/', Delimiter: '/' };
    const folded: string[] = [];
    for await (const page of paginateListObjectsV2({ client: s3, pageSize: 300 }, input)) {
      folded.push(...(page.CommonPrefixes ?? []).map(({ Prefix }) => Prefix ?? ''));
    }
    expect(folded).toEqual(keys.map((key) => key.replace('photo.jpg', '')));
  });

  it('keeps to prefix and start', async () => {
    const s3 = client(store.port, lean);
    const found = async (more: object) =>
      (await s3.send(new ListObjectsV2Command({ Bucket, ...more }))).Contents?.map(
        ({ Key }) => Key,
      );
    expect(await found({ Prefix: 't/109' })).toEqual(keys.slice(1090));
    expect(await found({ StartAfter: keys[1097] })).toEqual(keys.slice(1098));
    expect(await found({ Prefix: 'none' })).toBeUndefined();
    const foreign = new ListObjectsV2Command({ Bucket, ContinuationToken: 'zzzz' });
    expect(await codeOf(s3.send(foreign))).toBe('InvalidArgument');
  });
});
