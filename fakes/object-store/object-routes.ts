import { closeSync } from 'node:fs';
import { emptyAnswer, xmlAnswer, type Answer } from './answer';
import { receiveBody, refuseBody } from './body';
import type { Call } from './call';
import { checkRead, readRange, writeGuard } from './conditions';
import { decode } from './encoding';
import { StoreError } from './errors';
import { digestHeaders, keptHeaders, keptMetadata, readHeaders, refusePublic } from './facts';
import { amz } from './request';
import type { RecordFacts } from './record';

const noSuchKey = () => new StoreError('NoSuchKey', 'The key does not exist.');

/** PutObject. */
export async function putObject(call: Call): Promise<Answer> {
  const { request, proof, store, limit, now, damage } = call;
  const bucket = store.buckets.get(request.bucket);
  refusePublic(request);
  const guard = writeGuard(request.headers);
  const [headers, metadata] = [keptHeaders(request), keptMetadata(request)];
  return store.drafts.with(async (draft) => {
    const keep = (piece: Buffer) => draft.write(piece);
    const { size, md5, checksums } = await receiveBody(request, proof, limit, keep, damage);
    const facts: RecordFacts = {
      key: request.key,
      size,
      etag: md5,
      modified: now,
      headers,
      metadata,
      checksums,
    };
    await draft.seal(facts);
    await bucket.place(draft.path, facts, guard);
    return emptyAnswer(200, digestHeaders(facts));
  });
}

/** GetObject and HeadObject. */
export async function getObject({ request, store }: Call): Promise<Answer> {
  const bucket = store.buckets.get(request.bucket);
  const facts = bucket.find(request.key);
  if (facts === undefined) throw noSuchKey();
  const headers = readHeaders(request, facts);
  if (checkRead(request.headers, facts) === 'not-modified') return emptyAnswer(304, headers);
  const range = readRange(request.headers.get('range'), facts.size);
  if (range === undefined && amz(request, 'x-amz-checksum-mode') === 'ENABLED') {
    Object.assign(headers, digestHeaders(facts));
  }
  const [first, last] = range === undefined ? [0, facts.size - 1] : [range.first, range.last];
  if (range !== undefined) headers['content-range'] = `bytes ${first}-${last}/${facts.size}`;
  const length = last - first + 1;
  headers['content-length'] = String(length);
  const status = range === undefined ? 200 : 206;
  if (request.method === 'HEAD' || length === 0) return emptyAnswer(status, headers);
  return { status, headers, body: { descriptor: bucket.openContent(facts), first, length } };
}

/** DeleteObject. */
export async function deleteObject({ request, proof, store }: Call): Promise<Answer> {
  refuseBody(request, proof);
  await store.buckets.get(request.bucket).remove([request.key]);
  return emptyAnswer(204);
}

function copySource(call: Call) {
  const text = decode(amz(call.request, 'x-amz-copy-source') ?? '').replace(/^\//, '');
  const slash = text.indexOf('/');
  if (slash < 1 || text.includes('?versionId=')) {
    throw new StoreError('InvalidArgument', 'x-amz-copy-source must read bucket/key.');
  }
  const bucket = call.store.buckets.get(text.slice(0, slash));
  const facts = bucket.find(text.slice(slash + 1));
  if (facts === undefined) throw noSuchKey();
  if (checkRead(call.request.headers, facts, 'x-amz-copy-source-') === 'not-modified') {
    throw new StoreError('PreconditionFailed', 'The condition on the source does not hold.');
  }
  return { bucket, facts };
}

/** CopyObject, within the store. */
export async function copyObject(call: Call): Promise<Answer> {
  const { request, proof, store, now } = call;
  refuseBody(request, proof);
  refusePublic(request);
  const guard = writeGuard(request.headers);
  const target = store.buckets.get(request.bucket);
  const source = copySource(call);
  const replace = amz(request, 'x-amz-metadata-directive') === 'REPLACE';
  if (!replace && source.bucket === target && source.facts.key === request.key) {
    throw new StoreError('InvalidRequest', 'A copy onto itself must replace its metadata.');
  }
  const facts: RecordFacts = {
    ...source.facts,
    key: request.key,
    modified: now,
    ...(replace ? { headers: keptHeaders(request), metadata: keptMetadata(request) } : {}),
  };
  const descriptor = source.bucket.openContent(source.facts);
  let handedOver = false;
  try {
    await store.drafts.with(async (draft) => {
      handedOver = true;
      await draft.copy(descriptor, facts.size);
      await draft.seal(facts);
      await target.place(draft.path, facts, guard);
    });
  } finally {
    if (!handedOver) closeSync(descriptor);
  }
  return xmlAnswer([
    'CopyObjectResult',
    [
      ['LastModified', new Date(facts.modified).toISOString()],
      ['ETag', `"${facts.etag}"`],
    ],
  ]);
}
