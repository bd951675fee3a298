import { StoreError } from './errors';
import { amz, parameter, type StoreRequest } from './request';
import {
  canonicalRequest,
  requireSigned,
  sameSignature,
  sha256,
  sign,
  signingKey,
} from './signature';

/** The one account of the store. */
export interface Account {
  key: string;
  secret: string;
  region: string;
}

/** A verified request: what the body still has to match. */
export interface Proof {
  /** Hexadecimal SHA-256, `UNSIGNED-PAYLOAD` or one of the `STREAMING-` words. */
  payloadHash: string;
  /** yyyymmddThhmmssZ */
  time: string;
  /** day/region/s3/aws4_request */
  scope: string;
  signature: string;
  signingKey: Buffer;
}

const algorithm = 'AWS4-HMAC-SHA256';
const skewMs = 15 * 60_000;
const weekSeconds = 604_800;

interface Claim {
  credential: string;
  signedHeaders: string[];
  signature: string;
  time: string;
  payloadHash: string;
}

/** Milliseconds since 1970 of `yyyymmddThhmmssZ`, NaN when it is none. */
function parseTime(text: string): number {
  const match = /^(\d{4})(\d\d)(\d\d)T(\d\d)(\d\d)(\d\d)Z$/.exec(text);
  if (match === null) return NaN;
  const [, year, month, day, hour, minute, second] = match;
  return Date.parse(`${year}-${month}-${day}T${hour}:${minute}:${second}Z`);
}

function headerClaim(request: StoreRequest, authorization: string, now: number): Claim {
  const malformed = (why: string) => new StoreError('AuthorizationHeaderMalformed', why);
  const [word, ...rest] = authorization.split(' ');
  if (word !== algorithm) throw malformed(`The authorization must be ${algorithm}.`);
  const fields = new Map(
    rest
      .join('')
      .split(',')
      .map((field) => [field.split('=')[0] ?? '', field.slice(field.indexOf('=') + 1)] as const),
  );
  const [credential, signedHeaders, signature] = ['Credential', 'SignedHeaders', 'Signature'].map(
    (name) => fields.get(name),
  );
  if (!credential || !signedHeaders || !signature) {
    throw malformed('Credential, SignedHeaders and Signature are needed.');
  }
  const time = request.headers.get('x-amz-date') ?? '';
  const at = parseTime(time);
  if (Number.isNaN(at)) throw new StoreError('AccessDenied', 'A valid x-amz-date is needed.');
  if (Math.abs(now - at) > skewMs) {
    throw new StoreError(
      'RequestTimeTooSkewed',
      'The difference between the request time and the current time is too large.',
    );
  }
  const payloadHash = request.headers.get('x-amz-content-sha256');
  if (payloadHash === undefined) {
    throw new StoreError('InvalidRequest', 'The header x-amz-content-sha256 is needed.');
  }
  return { credential, signedHeaders: signedHeaders.split(';'), signature, time, payloadHash };
}

function queryClaim(request: StoreRequest, signature: string, now: number): Claim {
  const wrong = (why: string) => new StoreError('AuthorizationQueryParametersError', why);
  const field = (name: string) => {
    const value = parameter(request, name);
    if (!value) throw wrong(`The query parameter ${name} is needed.`);
    return value;
  };
  if (field('X-Amz-Algorithm') !== algorithm) throw wrong(`X-Amz-Algorithm must be ${algorithm}.`);
  const time = field('X-Amz-Date');
  const at = parseTime(time);
  if (Number.isNaN(at)) throw wrong('X-Amz-Date must be yyyymmddThhmmssZ.');
  const expires = /^\d{1,6}$/.test(field('X-Amz-Expires')) ? Number(field('X-Amz-Expires')) : NaN;
  if (!(expires >= 1 && expires <= weekSeconds)) {
    throw wrong(`X-Amz-Expires must be a whole number of seconds from 1 to ${weekSeconds}.`);
  }
  if (at - now > skewMs) throw new StoreError('AccessDenied', 'Request is not yet valid');
  if (now > at + expires * 1000) throw new StoreError('AccessDenied', 'Request has expired');
  return {
    credential: field('X-Amz-Credential'),
    signedHeaders: field('X-Amz-SignedHeaders').split(';'),
    signature,
    time,
    payloadHash: amz(request, 'x-amz-content-sha256') ?? 'UNSIGNED-PAYLOAD',
  };
}

function readClaim(request: StoreRequest, now: number): Claim {
  const authorization = request.headers.get('authorization');
  const signature = parameter(request, 'X-Amz-Signature');
  if (authorization !== undefined && signature !== undefined) {
    throw new StoreError('InvalidArgument', 'Only one way of signing is allowed, two were given.');
  }
  if (authorization !== undefined) return headerClaim(request, authorization, now);
  if (signature !== undefined) return queryClaim(request, signature, now);
  throw new StoreError('AccessDenied', 'Access Denied: the request is not signed.');
}

/**
 * Verifies who asks: AWS Signature Version 4 in the Authorization header or in a presigned address.
 * `now` in milliseconds since 1970; the clock may differ by 15 minutes.
 *
 * @throws StoreError with S3's code for what does not hold.
 */
export function authorise(request: StoreRequest, account: Account, now: number): Proof {
  const claim = readClaim(request, now);
  const [key, day, region, service, end, ...more] = claim.credential.split('/');
  const scope = `${day}/${region}/${service}/${end}`;
  if (service !== 's3' || end !== 'aws4_request' || more.length > 0 || region !== account.region) {
    throw new StoreError(
      'AuthorizationHeaderMalformed',
      `The credential must read key/day/${account.region}/s3/aws4_request.`,
    );
  }
  if (key !== account.key) {
    throw new StoreError('InvalidAccessKeyId', 'The access key is not known here.');
  }
  if (day === undefined || !claim.time.startsWith(`${day}T`)) {
    throw new StoreError(
      'SignatureDoesNotMatch',
      'The day of the credential is not that of the time.',
    );
  }
  requireSigned(request, claim.signedHeaders);
  const signing = signingKey({ secret: account.secret, day, region });
  const expected = sign(signing, [
    algorithm,
    claim.time,
    scope,
    sha256(canonicalRequest(request, claim.signedHeaders, claim.payloadHash)),
  ]);
  if (!sameSignature(claim.signature, expected)) {
    throw new StoreError(
      'SignatureDoesNotMatch',
      'The signature does not match the one calculated from the request and the secret.',
    );
  }
  return {
    payloadHash: claim.payloadHash,
    time: claim.time,
    scope,
    signature: claim.signature,
    signingKey: signing,
  };
}
