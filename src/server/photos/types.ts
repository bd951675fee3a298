import type { photos } from '@/db/schema/photos';
import type { Runtime } from '../runtime';

export type PhotoRow = typeof photos.$inferSelect;

/** What work on photos needs of the process: the tables, the objects, and where to say what went wrong. */
export type PhotoShop = Pick<Runtime, 'db' | 'store' | 'log' | 'settings'>;

/** What decides who may see a photo. */
export type PhotoGuard = {
  shared: boolean;
  /** Null for a photo of a board file. */
  ticketId: number | null;
  customerId: number | null;
};
