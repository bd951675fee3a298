import type { Answer } from './answer';
import * as bucket from './bucket-routes';
import type { Call } from './call';
import { StoreError } from './errors';
import * as multipart from './multipart-routes';
import * as object from './object-routes';
import { amz, parameter } from './request';

/** Parts of S3 that are asked for by the query and not kept here. */
const elsewhere = new Set(
  (
    'accelerate acl analytics attributes cors encryption intelligent-tiering inventory legal-hold ' +
    'lifecycle location logging metrics notification object-lock ownershipControls policy ' +
    'policyStatus publicAccessBlock renameObject replication requestPayment restore retention ' +
    'select tagging torrent versionId versioning versions website'
  ).split(' '),
);

type Handler = (call: Call) => Answer | Promise<Answer>;

/** Handlers by `METHOD level subresource`. */
const handlers: Record<string, Handler> = {
  'GET service': bucket.listBuckets,
  'PUT bucket': bucket.createBucket,
  'HEAD bucket': bucket.headBucket,
  'DELETE bucket': bucket.deleteBucket,
  'GET bucket': bucket.listObjects,
  'GET bucket uploads': multipart.listUploads,
  'POST bucket delete': bucket.deleteObjects,
  'PUT object': object.putObject,
  'PUT object copy': object.copyObject,
  'GET object': object.getObject,
  'HEAD object': object.getObject,
  'DELETE object': object.deleteObject,
  'POST object uploads': multipart.createUpload,
  'PUT object uploadId': multipart.uploadPart,
  'GET object uploadId': multipart.listParts,
  'POST object uploadId': multipart.completeUpload,
  'DELETE object uploadId': multipart.abortUpload,
};

/**
 * Answers a verified request.
 *
 * @throws StoreError NotImplemented, MethodNotAllowed, and what the handlers throw
 */
export async function route(call: Call): Promise<Answer> {
  const { request } = call;
  const unknown = request.query.find(([name]) => elsewhere.has(name));
  if (unknown !== undefined) {
    throw new StoreError('NotImplemented', `${unknown[0]} is not kept here.`);
  }
  const level = request.bucket === '' ? 'service' : request.key === '' ? 'bucket' : 'object';
  const words = [request.method, level];
  const part = ['uploadId', 'uploads', 'delete'].find((n) => parameter(request, n) !== undefined);
  if (part !== undefined) words.push(part);
  if (request.method === 'PUT' && amz(request, 'x-amz-copy-source') !== undefined) {
    words.push('copy');
  }
  const handler = handlers[words.join(' ')];
  if (handler === undefined) {
    const known = Object.keys(handlers).some((name) => name.endsWith(words.slice(1).join(' ')));
    throw known
      ? new StoreError('MethodNotAllowed', 'The method is not allowed on this resource.')
      : new StoreError('NotImplemented', `${words.join(' ')} is not kept here.`);
  }
  return handler(call);
}
