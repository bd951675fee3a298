import { emptyAnswer, xmlAnswer, type Answer } from './answer';
import { receiveText, refuseBody } from './body';
import type { Call } from './call';
import { encodePath } from './encoding';
import { StoreError } from './errors';
import { listPage } from './listing';
import { parameter } from './request';
import { childText, readXml } from './xml-reader';
import type { Element } from './xml';

const documentLimit = 2 * 1024 * 1024;
const pageLimit = 1000;

/** CreateBucket. */
export async function createBucket({ request, proof, store }: Call): Promise<Answer> {
  await receiveText(request, proof, documentLimit);
  await store.buckets.create(request.bucket);
  return emptyAnswer(200, { location: `/${request.bucket}` });
}

/** HeadBucket. */
export function headBucket({ request, store }: Call): Answer {
  store.buckets.get(request.bucket);
  return emptyAnswer(200);
}

/** DeleteBucket: an empty one only. */
export async function deleteBucket({ request, proof, store }: Call): Promise<Answer> {
  refuseBody(request, proof);
  await store.buckets.remove(request.bucket);
  return emptyAnswer(204);
}

/** ListBuckets. */
export function listBuckets({ store }: Call): Answer {
  const buckets = store.buckets.list().map(({ name, created }): Element => [
    'Bucket',
    [
      ['Name', name],
      ['CreationDate', new Date(created).toISOString()],
    ],
  ]);
  return xmlAnswer(['ListAllMyBucketsResult', [['Buckets', buckets]]]);
}

function maxKeys(text: string | undefined): number {
  if (text === undefined) return pageLimit;
  if (!/^\d{1,9}$/.test(text)) {
    throw new StoreError('InvalidArgument', 'max-keys must be a whole number from 0.');
  }
  return Math.min(Number(text), pageLimit);
}

/** ListObjectsV2. */
export function listObjects({ request, store }: Call): Answer {
  const bucket = store.buckets.get(request.bucket);
  if (parameter(request, 'list-type') !== '2') {
    throw new StoreError('NotImplemented', 'Only the second version of listing is kept.');
  }
  const query = {
    prefix: parameter(request, 'prefix') ?? '',
    delimiter: parameter(request, 'delimiter') ?? '',
    limit: maxKeys(parameter(request, 'max-keys')),
    startAfter: parameter(request, 'start-after') ?? '',
    token: parameter(request, 'continuation-token'),
  };
  const page = listPage(bucket.sortedKeys(), query);
  const encoded = parameter(request, 'encoding-type') === 'url';
  const text = (key: string) => (encoded ? encodePath(key) : key);
  const contents = page.keys.flatMap((key): Element[] => {
    const facts = bucket.find(key);
    if (facts === undefined) return [];
    return [
      [
        'Contents',
        [
          ['Key', text(key)],
          ['LastModified', new Date(facts.modified).toISOString()],
          ['ETag', `"${facts.etag}"`],
          ['Size', facts.size],
          ['StorageClass', 'STANDARD'],
        ],
      ],
    ];
  });
  return xmlAnswer([
    'ListBucketResult',
    [
      ['Name', bucket.name],
      ['Prefix', text(query.prefix)],
      ...(query.delimiter === '' ? [] : [['Delimiter', text(query.delimiter)] as const]),
      ['MaxKeys', query.limit],
      ...(encoded ? [['EncodingType', 'url'] as const] : []),
      ['KeyCount', page.keys.length + page.prefixes.length],
      ['IsTruncated', page.nextToken !== undefined],
      ...(query.token === undefined ? [] : [['ContinuationToken', query.token] as const]),
      ...(page.nextToken === undefined ? [] : [['NextContinuationToken', page.nextToken] as const]),
      ...(query.startAfter === '' ? [] : [['StartAfter', text(query.startAfter)] as const]),
      ...contents,
      ...page.prefixes.map((prefix): Element => ['CommonPrefixes', [['Prefix', text(prefix)]]]),
    ],
  ]);
}

/** DeleteObjects: up to 1000 keys; the document must carry a checksum. */
export async function deleteObjects({ request, proof, store }: Call): Promise<Answer> {
  const guarded = [...request.headers.keys()].some(
    (name) => name === 'content-md5' || name === 'x-amz-trailer' || /^x-amz-checksum-/.test(name),
  );
  if (!guarded) throw new StoreError('InvalidRequest', 'Content-MD5 or a checksum is needed.');
  const root = readXml(await receiveText(request, proof, documentLimit));
  const keys = root.children
    .filter(({ name }) => name === 'Object')
    .map((node) => childText(node, 'Key') ?? '');
  if (root.name !== 'Delete' || keys.length < 1 || keys.length > pageLimit || keys.includes('')) {
    throw new StoreError('MalformedXML', `Delete with 1 to ${pageLimit} objects is needed.`);
  }
  await store.buckets.get(request.bucket).remove(keys);
  const quiet = childText(root, 'Quiet') === 'true';
  return xmlAnswer([
    'DeleteResult',
    quiet ? [] : keys.map((key): Element => ['Deleted', [['Key', key]]]),
  ]);
}
