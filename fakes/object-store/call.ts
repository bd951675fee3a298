import type { Proof } from './authorise';
import type { Damage } from './body';
import type { Buckets } from './buckets';
import type { Drafts } from './drafts';
import type { Uploads } from './multipart';
import type { StoreRequest } from './request';

/** The opened data folder. */
export interface Store {
  buckets: Buckets;
  uploads: Uploads;
  drafts: Drafts;
}

/** One verified request on its way to a handler. */
export interface Call {
  request: StoreRequest;
  proof: Proof;
  store: Store;
  /** Largest object, in bytes. */
  limit: number;
  /** Milliseconds since 1970. */
  now: number;
  damage: Damage;
}
