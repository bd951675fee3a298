import {
  AbortMultipartUploadCommand,
  CompleteMultipartUploadCommand,
  CreateMultipartUploadCommand,
  GetObjectCommand,
  HeadObjectCommand,
  ListMultipartUploadsCommand,
  ListPartsCommand,
  UploadPartCommand,
  type CompletedPart,
  type S3Client,
} from '@aws-sdk/client-s3';
import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startObjectStore, type ObjectStore } from '../../fakes/object-store/server';
import { account, bucket, client, codeOf, lean, temporaryFolder } from './fakes-client';

const mebi = 1024 * 1024;
let store: ObjectStore;
let folder: Awaited<ReturnType<typeof temporaryFolder>>;

beforeAll(async () => {
  folder = await temporaryFolder();
  const options = { data: folder.path, buckets: [bucket], maxObjectBytes: 12 * mebi };
  store = await startObjectStore({ ...account, ...options });
});
afterAll(async () => {
  await store.close();
  await folder.remove();
});

/** Parts of 5, 5 and 2 MiB whose bytes differ from place to place. */
const parts = [5, 5, 2].map((size, index) => {
  const part = Buffer.alloc(size * mebi);
  for (let at = 0; at < part.length; at += 1024) part.writeUInt32BE(at + index, at);
  return part;
});
const md5 = (data: Buffer) => createHash('md5').update(data).digest();

async function begin(s3: S3Client, Key: string) {
  const input = { Bucket: bucket, Key };
  const created = await s3.send(
    new CreateMultipartUploadCommand({ ...input, ContentType: 'image/png', Metadata: { a: '1' } }),
  );
  const upload = { ...input, UploadId: created.UploadId };
  return {
    upload,
    part: async (PartNumber: number, Body: Buffer | string): Promise<CompletedPart> => {
      const { ETag } = await s3.send(new UploadPartCommand({ ...upload, PartNumber, Body }));
      return { ETag, PartNumber };
    },
    complete: (Parts: CompletedPart[], more: object = {}) =>
      s3.send(
        new CompleteMultipartUploadCommand({ ...upload, MultipartUpload: { Parts }, ...more }),
      ),
  };
}

describe('an upload in parts', () => {
  it.each([
    ['with the shop’s client settings', lean],
    ['with the client’s defaults', {}],
  ])('joins 12 MiB whose parts came out of order, %s', async (_, settings) => {
    const s3 = client(store.port, settings);
    const { upload, part, complete } = await begin(s3, 'board.png');
    const [one, two, three] = parts as [Buffer, Buffer, Buffer];
    const third = await part(3, three);
    await part(1, Buffer.alloc(5 * mebi));
    const [first, second] = await Promise.all([part(1, one), part(2, two)]);
    const listed = await s3.send(new ListPartsCommand(upload));
    expect(listed.Parts?.map(({ PartNumber, Size }) => [PartNumber, Size])).toEqual([
      [1, 5 * mebi],
      [2, 5 * mebi],
      [3, 2 * mebi],
    ]);
    const { ETag } = await complete([first, second, third]);
    // The ETag of a multipart object: MD5 over the parts' MD5s, and their number (common practice).
    const expected = md5(Buffer.concat(parts.map(md5))).toString('hex');
    expect(ETag).toBe(`"${expected}-3"`);
    const got = await s3.send(new GetObjectCommand({ Bucket: bucket, Key: 'board.png' }));
    expect(got).toMatchObject({ ContentType: 'image/png', Metadata: { a: '1' } });
    const content = Buffer.from((await got.Body?.transformToByteArray()) ?? []);
    expect(content.equals(Buffer.concat(parts))).toBe(true);
    expect(await codeOf(s3.send(new ListPartsCommand(upload)))).toBe('NoSuchUpload');
  });

  it('is refused when parts are missing, another, out of order or too small, and can go on', async () => {
    const s3 = client(store.port, lean);
    const { part, complete } = await begin(s3, 'careful');
    const small = await part(1, 'small');
    const last = await part(2, 'last');
    expect(await codeOf(complete([small, last]))).toBe('EntityTooSmall');
    const full = await part(1, Buffer.alloc(5 * mebi));
    expect(await codeOf(complete([last, full]))).toBe('InvalidPartOrder');
    expect(await codeOf(complete([small, last]))).toBe('InvalidPart');
    expect(await codeOf(complete([full, { ...last, PartNumber: 3 }]))).toBe('InvalidPart');
    expect(await codeOf(complete([]))).toBe('MalformedXML');
    expect(await codeOf(complete([full, last]))).toBe('done');
  });

  it('may not be larger in sum than an object', async () => {
    const s3 = client(store.port, lean);
    const { part, complete } = await begin(s3, 'large');
    const named = [await part(1, Buffer.alloc(7 * mebi)), await part(2, Buffer.alloc(6 * mebi))];
    expect(await codeOf(complete(named))).toBe('EntityTooLarge');
  });

  it('of two that would be first, one wins', async () => {
    const s3 = client(store.port, lean);
    const both = await Promise.all([begin(s3, 'first'), begin(s3, 'first')]);
    const named = await Promise.all(both.map(({ part }) => part(1, 'x')));
    const codes = await Promise.all(
      both.map(({ complete }, index) =>
        codeOf(complete(named.slice(index, index + 1), { IfNoneMatch: '*' })),
      ),
    );
    expect(codes.sort()).toEqual(['PreconditionFailed', 'done']);
  });

  it('is listed while it is open and gone when aborted', async () => {
    const s3 = client(store.port, lean);
    const { upload, part } = await begin(s3, 'dropped');
    await part(1, 'x');
    const open = async () =>
      (await s3.send(new ListMultipartUploadsCommand({ Bucket: bucket, Prefix: 'dropped' })))
        .Uploads;
    expect(await open()).toMatchObject([{ Key: 'dropped', UploadId: upload.UploadId }]);
    await s3.send(new AbortMultipartUploadCommand(upload));
    expect(await open()).toBeUndefined();
    expect(await codeOf(part(2, 'x'))).toBe('NoSuchUpload');
    const head = new HeadObjectCommand({ Bucket: bucket, Key: 'dropped' });
    expect(await codeOf(s3.send(head))).toBe('NotFound');
  });
});
