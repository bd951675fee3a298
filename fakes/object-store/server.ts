import { randomBytes } from 'node:crypto';
import { closeSync } from 'node:fs';
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import { setTimeout as pause } from 'node:timers/promises';
import { FaultQueue } from '../shared/fault-queue';
import { RecentLog } from '../shared/log';
import { listen, stopListening } from '../shared/loopback';
import { emptyAnswer, errorAnswer, type Answer } from './answer';
import { authorise, type Account } from './authorise';
import type { Damage } from './body';
import { Buckets } from './buckets';
import type { Store } from './call';
import { storeControl, type LoggedRequest } from './control';
import { corsHeaders, preflight, type AllowedOrigins } from './cors';
import { Drafts } from './drafts';
import { StoreError } from './errors';
import { fits, type StoreFault } from './faults';
import { Uploads } from './multipart';
import { parseRequest } from './request';
import { route } from './routes';
import { send } from './send';

export interface ObjectStoreOptions {
  /** Folder of the data; made when it is not there. */
  data: string;
  key: string;
  secret: string;
  /** 0 (the default) takes free ports. */
  port?: number;
  controlPort?: number;
  region?: string;
  /** Buckets to make at the start. */
  buckets?: readonly string[];
  /** Largest object in bytes, 100 MiB unless told. */
  maxObjectBytes?: number;
  /** `*`, the default, allows every page of this machine. */
  corsOrigins?: AllowedOrigins;
  /** Milliseconds since 1970. */
  clock?: () => number;
}

export interface ObjectStore {
  port: number;
  controlPort: number;
  close(): Promise<void>;
}

interface Service {
  store: Store;
  account: Account;
  limit: number;
  origins: AllowedOrigins;
  clock: () => number;
  faults: FaultQueue<StoreFault>;
  log: RecentLog<LoggedRequest>;
}

/** The answer to one request; `undefined` when the connection is to be dropped. */
async function answerTo(
  service: Service,
  incoming: IncomingMessage,
  entry: LoggedRequest,
): Promise<{ answer: Answer; damage: Damage } | undefined> {
  const { account, origins, clock, faults, limit, store } = service;
  let damage: Damage;
  let drop = false;
  let answer: Answer;
  try {
    const request = parseRequest(incoming);
    entry.bucket = request.bucket;
    entry.key = request.key;
    const fault = faults.take((each) => fits(each, request.method, request.key));
    entry.fault = fault?.kind;
    if (fault?.kind === 'delay') await pause(fault.ms);
    if (fault?.kind === 'drop' && fault.when === 'before') return undefined;
    if (fault?.kind === 'status') {
      const code = fault.status === 503 ? 'SlowDown' : 'InternalError';
      answer = errorAnswer(new StoreError(code, 'A fault asked for.'), request.path, entry.id);
      return { answer: { ...answer, status: fault.status }, damage };
    }
    drop = fault?.kind === 'drop';
    if (fault?.kind === 'corrupt' || fault?.kind === 'truncate') damage = fault.kind;
    if (request.method === 'OPTIONS') {
      answer = emptyAnswer(200, preflight(origins, request.headers));
    } else {
      const now = clock();
      const proof = authorise(request, account, now);
      const inward = request.method === 'PUT' || request.method === 'POST' ? damage : undefined;
      answer = await route({ request, proof, store, limit, now, damage: inward });
      if (inward !== undefined) damage = undefined;
    }
  } catch (error) {
    if (incoming.destroyed && !incoming.complete) return undefined;
    if (!(error instanceof StoreError)) console.error(error);
    const told =
      error instanceof StoreError ? error : new StoreError('InternalError', 'The store failed.');
    entry.code = told.code;
    answer = errorAnswer(told, (incoming.url ?? '').split('?')[0] ?? '', entry.id);
    damage = undefined;
  }
  if (!drop) return { answer, damage };
  if (!Buffer.isBuffer(answer.body)) closeSync(answer.body.descriptor);
  return undefined;
}

async function handle(
  service: Service,
  incoming: IncomingMessage,
  response: ServerResponse,
): Promise<void> {
  const { method = 'GET', headers } = incoming;
  const id = randomBytes(8).toString('hex').toUpperCase();
  const entry: LoggedRequest = { id, at: new Date().toISOString(), method, bucket: '', key: '' };
  service.log.add(entry);
  const result = await answerTo(service, incoming, entry);
  if (result === undefined) {
    incoming.socket.destroy();
    return;
  }
  const { answer, damage } = result;
  entry.status = answer.status;
  answer.headers = {
    'x-amz-request-id': id,
    server: 'object-store',
    ...corsHeaders(service.origins, headers.origin),
    ...answer.headers,
  };
  await send(response, method, answer, damage);
}

/** Opens the data folder. What a crash left half-written is gone afterwards. */
async function openService(options: ObjectStoreOptions): Promise<Service> {
  const { data, key, secret, region = 'us-east-1' } = options;
  const store = {
    drafts: await Drafts.open(data),
    buckets: await Buckets.open(data),
    uploads: await Uploads.open(data),
  };
  const known = store.buckets.list().map(({ name }) => name);
  for (const name of options.buckets ?? []) {
    if (!known.includes(name)) await store.buckets.create(name);
  }
  return {
    store,
    account: { key, secret, region },
    limit: options.maxObjectBytes ?? 100 * 1024 * 1024,
    origins: options.corsOrigins ?? '*',
    clock: options.clock ?? Date.now,
    faults: new FaultQueue<StoreFault>(),
    log: new RecentLog<LoggedRequest>(),
  };
}

/**
 * Starts the object store and its control port on 127.0.0.1.
 *
 * @throws Error when a port is taken or the data folder cannot be used
 */
export async function startObjectStore(options: ObjectStoreOptions): Promise<ObjectStore> {
  let opened: (service: Service) => void = () => undefined;
  const opening = new Promise<Service>((resolve) => {
    opened = resolve;
  });
  const server = createServer((incoming, response) => {
    opening
      .then((service) => handle(service, incoming, response))
      .catch((error: unknown) => {
        console.error(error);
        response.destroy();
      });
  });
  // The port is taken first: a second store on the same one must not sweep the drafts of the first.
  const port = await listen(server, options.port ?? 0);
  try {
    const service = await openService(options);
    const control = storeControl(service);
    const controlPort = await listen(control, options.controlPort ?? 0);
    opened(service);
    const close = async () => {
      await Promise.all([stopListening(server), stopListening(control)]);
    };
    return { port, controlPort, close };
  } catch (error) {
    server.close();
    server.closeAllConnections();
    throw error;
  }
}
