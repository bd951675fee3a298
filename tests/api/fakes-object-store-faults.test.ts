import { once } from 'node:events';
import { readdir, stat } from 'node:fs/promises';
import { request } from 'node:http';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import {
  CompleteMultipartUploadCommand,
  CreateMultipartUploadCommand,
  DeleteObjectCommand,
  GetObjectCommand,
  PutObjectCommand,
  UploadPartCommand,
} from '@aws-sdk/client-s3';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import { afterAll, beforeAll, beforeEach, describe, expect, it, onTestFinished, vi } from 'vitest';
import { startObjectStore, type ObjectStore } from '../../fakes/object-store/server';
import {
  account,
  bucket,
  client,
  codeOf,
  command,
  end,
  json,
  lean,
  raw,
  refusedStart,
  temporaryFolder,
} from './fakes-client';

const script = 'fakes/object-store/serve.ts';
const put = (Key: string, Body: string | Buffer = 'content') =>
  new PutObjectCommand({ Bucket: bucket, Key, Body });
const get = (Key: string) => new GetObjectCommand({ Bucket: bucket, Key });

describe('faults asked for', () => {
  let store: ObjectStore;
  let folder: Awaited<ReturnType<typeof temporaryFolder>>;
  let control: string;

  beforeAll(async () => {
    folder = await temporaryFolder();
    store = await startObjectStore({ ...account, data: folder.path, buckets: [bucket] });
    control = `http://127.0.0.1:${store.controlPort}`;
  });
  afterAll(async () => {
    await store.close();
    await folder.remove();
  });
  beforeEach(async () => {
    await json(`${control}/faults`, 'DELETE');
    await json(`${control}/requests`, 'DELETE');
  });

  const ask = (fault: object) => json(`${control}/faults`, 'POST', fault);
  const read = async (Key: string, settings: object = lean) =>
    (await client(store.port, settings).send(get(Key))).Body?.transformToString();

  it('answer with a status as often as told, then no more', async () => {
    const s3 = client(store.port, lean);
    await ask({ match: { method: 'PUT' }, kind: 'status', status: 503, times: 2 });
    expect(await codeOf(s3.send(put('a')))).toBe('SlowDown');
    expect(await codeOf(s3.send(new DeleteObjectCommand({ Bucket: bucket, Key: 'a' })))).toBe(
      'done',
    );
    expect(await codeOf(s3.send(put('a')))).toBe('SlowDown');
    expect(await codeOf(s3.send(put('a')))).toBe('done');
  });

  it('are outlived by a client that tries again', async () => {
    await ask({ match: { key: 'retry' }, kind: 'status', status: 500, times: 2 });
    const s3 = client(store.port, { ...lean, maxAttempts: 3 });
    const answer = await s3.send(put('retry'));
    expect(answer.$metadata.attempts).toBe(3);
  });

  it('keep to the key or its beginning, and are forgotten on demand', async () => {
    const s3 = client(store.port, lean);
    await ask({ match: { key: 'thumbs/*' }, kind: 'status', times: 99 });
    expect(await codeOf(s3.send(put('photo')))).toBe('done');
    expect(await codeOf(s3.send(put('thumbs/1')))).toBe('SlowDown');
    expect(await json(`${control}/faults`, 'DELETE')).toEqual({ removed: 1 });
    expect(await codeOf(s3.send(put('thumbs/1')))).toBe('done');
  });

  it('delay', async () => {
    await ask({ kind: 'delay', ms: 150 });
    const start = performance.now();
    await client(store.port, lean).send(put('slow'));
    expect(performance.now() - start).toBeGreaterThanOrEqual(149);
  });

  it('drop the connection before the work, or after it with the answer lost', async () => {
    const s3 = client(store.port, lean);
    await ask({ match: { method: 'PUT' }, kind: 'drop' });
    expect(await codeOf(s3.send(put('lost')))).not.toBe('done');
    expect(await codeOf(s3.send(get('lost')))).toBe('NoSuchKey');
    await ask({ match: { method: 'PUT' }, kind: 'drop', when: 'after' });
    expect(await codeOf(s3.send(put('lost')))).not.toBe('done');
    expect(await read('lost')).toBe('content');
  });

  it('cut a content short', async () => {
    await client(store.port, lean).send(put('cut', Buffer.alloc(300_000, 'x')));
    await ask({ match: { method: 'GET' }, kind: 'truncate' });
    await expect(read('cut')).rejects.toThrow();
    expect(await read('cut')).toHaveLength(300_000);
  });

  it('change a content on the way out, which a checking client notices', async () => {
    await client(store.port, {}).send(put('bent'));
    await ask({ match: { method: 'GET' }, kind: 'corrupt', times: 2 });
    expect(await read('bent')).not.toBe('content');
    await expect(read('bent', {})).rejects.toThrow(/checksum/i);
    expect(await read('bent', {})).toBe('content');
  });

  it('change or cut a content on the way in, which the store notices by its hash', async () => {
    const s3 = client(store.port, lean);
    await ask({ match: { method: 'PUT' }, kind: 'corrupt' });
    expect(await codeOf(s3.send(put('in')))).toBe('XAmzContentSHA256Mismatch');
    for (const size of [7, 3_000_000]) {
      await ask({ match: { method: 'PUT' }, kind: 'truncate' });
      expect(await codeOf(s3.send(put('in', Buffer.alloc(size))))).toBe('IncompleteBody');
    }
    await ask({ match: { method: 'PUT' }, kind: 'corrupt' });
    const url = await getSignedUrl(s3, put('in', ''));
    expect((await fetch(url, { method: 'PUT', body: 'content' })).status).toBe(200);
    expect(await read('in')).not.toBe('content');
  });

  it('change a stream on the way in, which the store notices by the checksum in its trailer', async () => {
    const silent = () => undefined;
    const logger = { debug: silent, info: silent, warn: silent, error: silent };
    const s3 = client(store.port, { logger });
    let announced = '';
    s3.middlewareStack.add(
      (next) => (args) => {
        announced =
          (args.request as { headers: Record<string, string> }).headers['x-amz-content-sha256'] ??
          '';
        return next(args);
      },
      { step: 'finalizeRequest', priority: 'low', name: 'look' },
    );
    const stream = () =>
      new PutObjectCommand({
        ...put('stream').input,
        Body: Readable.from([Buffer.alloc(50_000, 'a'), Buffer.alloc(50_000, 'b')]),
        ContentLength: 100_000,
      });
    await ask({ match: { method: 'PUT' }, kind: 'corrupt' });
    expect(await codeOf(s3.send(stream()))).toBe('BadDigest');
    expect(announced).toBe('STREAMING-UNSIGNED-PAYLOAD-TRAILER');
    expect(await codeOf(s3.send(stream()))).toBe('done');
  });

  it('are refused when they make no sense', async () => {
    await expect(ask({ kind: 'explode' })).rejects.toThrow('400');
    await expect(ask({ kind: 'status', status: 200 })).rejects.toThrow('400');
    await expect(json(`${control}/nothing`)).rejects.toThrow('404');
  });

  it('are logged with the requests they hit; objects held are told', async () => {
    const s3 = client(store.port, lean);
    await ask({ match: { method: 'PUT', key: 'seen' }, kind: 'status', status: 500 });
    await codeOf(s3.send(put('seen')));
    await s3.send(put('seen'));
    const { requests } = await json<{ requests: object[] }>(`${control}/requests`);
    expect(requests).toMatchObject([
      { method: 'PUT', bucket, key: 'seen', status: 500, fault: 'status' },
      { method: 'PUT', bucket, key: 'seen', status: 200 },
    ]);
    expect(JSON.stringify(requests)).not.toContain(account.secret);
    const { objects } = await json<{ objects: object[] }>(`${control}/objects`);
    expect(objects).toContainEqual(expect.objectContaining({ bucket, key: 'seen', size: 7 }));
  });

  it('cannot be asked for by a page of another origin or under a foreign name', async () => {
    const body = '{"kind":"drop"}';
    const foreign: Array<Record<string, string>> = [
      { host: `127.0.0.1:${store.controlPort}`, origin: 'http://elsewhere.example' },
      { host: `shop.example:${store.controlPort}` },
    ];
    for (const headers of foreign) {
      expect((await raw(store.controlPort, 'POST', '/faults', headers, body)).status).toBe(403);
    }
    expect(await json(`${control}/faults`)).toEqual({ faults: [] });
  });

  it('listens on the loopback address only', async () => {
    // The port is free on another address of this machine: the store has not taken them all.
    const other = createServer();
    onTestFinished(() => void other.close());
    await once(other.listen(store.port, '127.0.0.2'), 'listening');
    expect(other.listening).toBe(true);
  });
});

describe('pages of other origins', () => {
  it.each([
    ['every page of this machine', undefined, 'http://localhost:4321', true],
    ['every page of this machine', undefined, 'https://shop.example', false],
    ['every page of this machine', undefined, 'http://localhost.evil.example', false],
    ['a list', ['https://shop.example'], 'https://shop.example', true],
    ['a list', ['https://shop.example'], 'http://localhost:4321', false],
  ])('allowed: %s (%s); asked by %s: %s', async (_, corsOrigins, origin, allowed) => {
    const folder = await temporaryFolder();
    onTestFinished(folder.remove);
    const options = { data: folder.path, buckets: [bucket], ...(corsOrigins && { corsOrigins }) };
    const store = await startObjectStore({ ...account, ...options });
    onTestFinished(store.close);
    const asked = {
      origin,
      'access-control-request-method': 'PUT',
      'access-control-request-headers': 'content-type',
    };
    const question = await raw(store.port, 'OPTIONS', `/${bucket}/a`, asked);
    expect(question.status).toBe(allowed ? 200 : 403);
    const url = await getSignedUrl(client(store.port, lean), put('a', ''));
    const answer = await fetch(url, { method: 'PUT', body: 'x', headers: { origin } });
    expect(answer.headers.get('access-control-allow-origin')).toBe(allowed ? origin : null);
    expect(answer.headers.get('access-control-expose-headers')?.includes('ETag') ?? false).toBe(
      allowed,
    );
  });
});

describe('the command', () => {
  const flags = (data: string) => ['--data', data, '--port', '0', '--control-port', '0'];
  const secrets = {
    FAKE_STORE_KEY: account.key,
    FAKE_STORE_SECRET: account.secret,
    FAKE_STORE_BUCKETS: bucket,
  };
  const portOf = (ready: string) => Number(/store http:\/\/127\.0\.0\.1:(\d+)/.exec(ready)?.[1]);
  const filesBelow = async (path: string) =>
    (await readdir(path, { recursive: true, withFileTypes: true })).filter((f) => f.isFile());

  it('refuses to start with settings that do not fit, and says which', () => {
    const { code, printed } = refusedStart(script, ['--port', 'none', '--control-port', '0']);
    expect(code).toBe(2);
    expect(printed).toContain('--port (or FAKE_STORE_PORT)');
    expect(printed).toContain('--secret (or FAKE_STORE_SECRET)');
  });

  it('ends well on SIGTERM', async () => {
    const folder = await temporaryFolder();
    onTestFinished(folder.remove);
    const { child, ready } = await command(script, flags(folder.path), secrets);
    expect(ready).toMatch(/^ready object store http:\/\/127\.0\.0\.1:\d+ control http/);
    expect(await end(child, 'SIGTERM')).toBe(0);
  });

  it('killed in the middle of an upload it leaves nothing half-written', async () => {
    const folder = await temporaryFolder();
    onTestFinished(folder.remove);
    const first = await command(script, flags(folder.path), secrets);
    const s3 = client(portOf(first.ready), lean);
    await s3.send(put('kept', 'old content'));
    const multipart = await s3.send(
      new CreateMultipartUploadCommand({ Bucket: bucket, Key: 'parts' }),
    );
    const upload = { Bucket: bucket, Key: 'parts', UploadId: multipart.UploadId };
    const part = Buffer.alloc(5 * 1024 * 1024, 'p');
    const one = await s3.send(new UploadPartCommand({ ...upload, PartNumber: 1, Body: part }));

    for (const key of ['kept', 'new']) {
      const url = await getSignedUrl(s3, put(key, ''));
      const sent = request(url, { method: 'PUT', headers: { 'content-length': 4_000_000 } });
      sent.on('error', () => undefined);
      sent.write(Buffer.alloc(2_000_000, 'n'));
    }
    const drafts = join(folder.path, 'drafts');
    await vi.waitFor(async () => {
      const names = await readdir(drafts);
      const sizes = await Promise.all(names.map(async (n) => (await stat(join(drafts, n))).size));
      expect(sizes).toEqual([2_000_000, 2_000_000]);
    });
    await end(first.child, 'SIGKILL');
    expect(await filesBelow(drafts)).toHaveLength(2);

    const second = await command(script, flags(folder.path), secrets);
    expect(await filesBelow(drafts)).toHaveLength(0);
    const again = client(portOf(second.ready), lean);
    const kept = await again.send(get('kept'));
    expect(await kept.Body?.transformToString()).toBe('old content');
    expect(await codeOf(again.send(get('new')))).toBe('NoSuchKey');
    expect(await filesBelow(join(folder.path, 'buckets'))).toHaveLength(1);
    const two = await again.send(new UploadPartCommand({ ...upload, PartNumber: 2, Body: 'end' }));
    const Parts = [one, two].map(({ ETag }, index) => ({ ETag, PartNumber: index + 1 }));
    await again.send(new CompleteMultipartUploadCommand({ ...upload, MultipartUpload: { Parts } }));
    const joined = await again.send(get('parts'));
    expect(await joined.Body?.transformToString()).toBe(`${part.toString()}end`);
  });
});
