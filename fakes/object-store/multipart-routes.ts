import { createHash } from 'node:crypto';
import { openSync } from 'node:fs';
import { emptyAnswer, xmlAnswer, type Answer } from './answer';
import { receiveBody, receiveText, refuseBody } from './body';
import type { Call } from './call';
import { composite, checksumNames, type Checksums } from './checksum';
import { writeGuard } from './conditions';
import { StoreError } from './errors';
import { digestHeaders, keptHeaders, keptMetadata, refusePublic } from './facts';
import type { Upload } from './multipart';
import { parameter } from './request';
import type { RecordFacts } from './record';
import { childText, readXml } from './xml-reader';
import type { Element } from './xml';

const partLimit = 10_000;
/** Smallest part but the last, in bytes (5 MiB). */
const smallestPart = 5 * 1024 * 1024;
const documentLimit = 2 * 1024 * 1024;

function uploadOf({ request, store }: Call): Upload {
  return store.uploads.get(parameter(request, 'uploadId') ?? '', request.bucket, request.key);
}

function partNumber(text: string | undefined): number {
  const number = /^\d{1,5}$/.test(text ?? '') ? Number(text) : NaN;
  if (!(number >= 1 && number <= partLimit)) {
    throw new StoreError('InvalidArgument', `A part number must be 1 to ${partLimit}.`);
  }
  return number;
}

/** CreateMultipartUpload. */
export async function createUpload({ request, proof, store, now }: Call): Promise<Answer> {
  refuseBody(request, proof);
  refusePublic(request);
  const bucket = store.buckets.get(request.bucket);
  const upload = await store.uploads.create({
    bucket: bucket.name,
    key: request.key,
    started: now,
    headers: keptHeaders(request),
    metadata: keptMetadata(request),
  });
  return xmlAnswer([
    'InitiateMultipartUploadResult',
    [
      ['Bucket', bucket.name],
      ['Key', request.key],
      ['UploadId', upload.id],
    ],
  ]);
}

/** UploadPart. */
export async function uploadPart(call: Call): Promise<Answer> {
  const { request, proof, store, limit, now, damage } = call;
  const upload = uploadOf(call);
  const number = partNumber(parameter(request, 'partNumber'));
  upload.refuseWhileJoining();
  return store.drafts.with(async (draft) => {
    const keep = (piece: Buffer) => draft.write(piece);
    const { size, md5, checksums } = await receiveBody(request, proof, limit, keep, damage);
    const facts: RecordFacts = {
      key: request.key,
      size,
      etag: md5,
      modified: now,
      headers: {},
      metadata: {},
      checksums,
    };
    await draft.seal(facts);
    uploadOf(call);
    await upload.place(draft.path, number, facts);
    return emptyAnswer(200, digestHeaders(facts));
  });
}

/** The parts named by a CompleteMultipartUpload document, checked against those uploaded. */
function chooseParts(upload: Upload, document: string): Array<[number, RecordFacts]> {
  const root = readXml(document);
  const named = root.children.filter(({ name }) => name === 'Part');
  if (root.name !== 'CompleteMultipartUpload' || named.length === 0) {
    throw new StoreError(
      'MalformedXML',
      'CompleteMultipartUpload with at least one Part is needed.',
    );
  }
  let before = 0;
  const chosen = named.map((node): [number, RecordFacts] => {
    const number = partNumber(childText(node, 'PartNumber'));
    if (number <= before) {
      throw new StoreError('InvalidPartOrder', 'The parts must be named in ascending order.');
    }
    before = number;
    const facts = upload.parts.get(number);
    const etag = childText(node, 'ETag')?.replaceAll('"', '').trim();
    const wrongSum = checksumNames.some((name) => {
      const given = childText(node, `Checksum${name.toUpperCase()}`);
      return given !== undefined && given !== facts?.checksums[name];
    });
    if (facts === undefined || etag !== facts.etag || wrongSum) {
      throw new StoreError('InvalidPart', `Part ${number} was not uploaded or is another one.`);
    }
    return [number, facts];
  });
  const small = chosen.slice(0, -1).find(([, facts]) => facts.size < smallestPart);
  if (small !== undefined) {
    throw new StoreError('EntityTooSmall', `Part ${small[0]} has under ${smallestPart} bytes.`);
  }
  return chosen;
}

function joinedFacts(upload: Upload, parts: readonly RecordFacts[], now: number): RecordFacts {
  const md5 = createHash('md5');
  for (const { etag } of parts) md5.update(Buffer.from(etag, 'hex'));
  const checksums: Checksums = {};
  for (const name of checksumNames) {
    const sums = parts.flatMap((part) => part.checksums[name] ?? []);
    if (sums.length === parts.length) checksums[name] = composite(name, sums);
  }
  return {
    key: upload.facts.key,
    size: parts.reduce((sum, { size }) => sum + size, 0),
    etag: `${md5.digest('hex')}-${parts.length}`,
    modified: now,
    headers: upload.facts.headers,
    metadata: upload.facts.metadata,
    checksums,
  };
}

/** CompleteMultipartUpload: the object appears whole, or not at all and the parts stay. */
export async function completeUpload(call: Call): Promise<Answer> {
  const { request, proof, store, limit, now } = call;
  const document = await receiveText(request, proof, documentLimit);
  const guard = writeGuard(request.headers);
  const upload = uploadOf(call);
  upload.refuseWhileJoining();
  const parts = chooseParts(upload, document);
  const facts = joinedFacts(
    upload,
    parts.map(([, part]) => part),
    now,
  );
  if (facts.size > limit) {
    throw new StoreError('EntityTooLarge', `An upload may have ${limit} bytes.`);
  }
  const bucket = store.buckets.get(request.bucket);
  upload.joining = true;
  try {
    await store.drafts.with(async (draft) => {
      for (const [number, part] of parts) {
        await draft.copy(openSync(upload.partPath(number), 'r'), part.size);
      }
      await draft.seal(facts);
      await bucket.place(draft.path, facts, guard);
    });
    await store.uploads.remove(upload);
  } finally {
    upload.joining = false;
  }
  return xmlAnswer([
    'CompleteMultipartUploadResult',
    [
      ['Bucket', bucket.name],
      ['Key', request.key],
      ['ETag', `"${facts.etag}"`],
    ],
  ]);
}

/** AbortMultipartUpload. */
export async function abortUpload(call: Call): Promise<Answer> {
  refuseBody(call.request, call.proof);
  const upload = uploadOf(call);
  upload.refuseWhileJoining();
  await call.store.uploads.remove(upload);
  return emptyAnswer(204);
}

/** ListParts, at most 1000 a page. */
export function listParts(call: Call): Answer {
  const upload = uploadOf(call);
  const after = Number(parameter(call.request, 'part-number-marker') ?? 0) || 0;
  const all = [...upload.parts].filter(([number]) => number > after).sort(([a], [b]) => a - b);
  const page = all.slice(0, 1000);
  return xmlAnswer([
    'ListPartsResult',
    [
      ['Bucket', upload.facts.bucket],
      ['Key', upload.facts.key],
      ['UploadId', upload.id],
      ['PartNumberMarker', after],
      ['NextPartNumberMarker', page.at(-1)?.[0] ?? 0],
      ['MaxParts', 1000],
      ['IsTruncated', page.length < all.length],
      ...page.map(([number, part]): Element => [
        'Part',
        [
          ['PartNumber', number],
          ['LastModified', new Date(part.modified).toISOString()],
          ['ETag', `"${part.etag}"`],
          ['Size', part.size],
        ],
      ]),
    ],
  ]);
}

/** ListMultipartUploads of a bucket, oldest first, optionally below a prefix. */
export function listUploads({ request, store }: Call): Answer {
  const bucket = store.buckets.get(request.bucket);
  const prefix = parameter(request, 'prefix') ?? '';
  const uploads = store.uploads
    .list(bucket.name)
    .filter(({ facts }) => facts.key.startsWith(prefix))
    .sort((a, b) => a.facts.started - b.facts.started);
  return xmlAnswer([
    'ListMultipartUploadsResult',
    [
      ['Bucket', bucket.name],
      ['Prefix', prefix],
      ['IsTruncated', false],
      ...uploads.map(({ id, facts }): Element => [
        'Upload',
        [
          ['Key', facts.key],
          ['UploadId', id],
          ['Initiated', new Date(facts.started).toISOString()],
        ],
      ]),
    ],
  ]);
}
