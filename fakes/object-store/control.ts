import type { Server } from 'node:http';
import { controlServer } from '../shared/control';
import type { FaultQueue } from '../shared/fault-queue';
import { readJson } from '../shared/json-http';
import type { RecentLog } from '../shared/log';
import type { Store } from './call';
import { storeFault, type StoreFault } from './faults';

/** A request as the log tells it; no signature, no secret. */
export interface LoggedRequest {
  id: string;
  /** ISO 8601. */
  at: string;
  method: string;
  bucket: string;
  key: string;
  status?: number;
  /** Code of the refusal. */
  code?: string;
  /** Kind of the fault that happened to it. */
  fault?: string | undefined;
}

/** The control port: faults to come, requests seen, objects held. */
export function storeControl(service: {
  store: Store;
  faults: FaultQueue<StoreFault>;
  log: RecentLog<LoggedRequest>;
}): Server {
  const { store, faults, log } = service;
  return controlServer({
    'POST /faults': async (request) => {
      const fault = await readJson(request, storeFault);
      faults.add(fault);
      return { added: fault };
    },
    'GET /faults': () => ({ faults: faults.list() }),
    'DELETE /faults': () => ({ removed: faults.clear() }),
    'GET /requests': () => ({ requests: log.list() }),
    'DELETE /requests': () => ({ removed: log.clear() }),
    'GET /objects': () => ({
      objects: store.buckets
        .list()
        .flatMap((bucket) =>
          [...bucket.list()].map((facts) => ({ bucket: bucket.name, ...facts })),
        ),
    }),
  });
}
