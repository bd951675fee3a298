import type { Stage } from '@/domain/tickets/stages';

/** What every command on a ticket needs of its row. */
export type TicketHead = {
  id: number;
  number: string;
  stage: Stage;
  stageBefore: Stage | null;
  boardId: number | null;
  customerId: number;
  version: number;
};

/** What letters and papers say of the shop, and the secret that claim codes are keyed with. */
export type Shop = {
  name: string;
  address: string;
  timeZone: string;
  currency: string;
  origin: string;
  secret: string;
};
