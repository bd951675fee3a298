/** The letters the shop sends, in plain words. Each is built here and sent by the outbox. */
import { eq } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { customers } from '@/db/schema/shop';
import { CUSTOMER_HEADLINES } from '@/domain/tickets/customer-words';
import type { Stage } from '@/domain/tickets/stages';
import type { Mail } from '../outbox/commands';
import type { Shop } from '../tickets/types';

const foot = (shop: Shop) => `\n\n${shop.name}\n${shop.address}\n`;

/** A link opens the check form with the number filled in; the claim code is typed, never part of an address. */
const checkAddress = (shop: Shop, number: string) =>
  `${shop.origin}/check?number=${encodeURIComponent(number)}`;

export function receiptMail(
  shop: Shop,
  customer: { name: string; email: string | null },
  number: string,
  claimCode: string,
  instrument: { maker: string; model: string; serial: string },
): Mail {
  return {
    to: customer.email ?? '',
    subject: `Receipt ${number}: your ${instrument.maker} ${instrument.model} is with us`,
    text: `Dear ${customer.name},

we took in your ${instrument.maker} ${instrument.model}, serial number ${instrument.serial}.

  Ticket      ${number}
  Claim code  ${claimCode}

Follow the repair here, with the ticket number and the claim code:
${checkAddress(shop, number)}

Keep the claim code to yourself: whoever has it can see and approve the repair.${foot(shop)}`,
  };
}

const TOLD: readonly Stage[] = [
  'estimate-sent',
  'waiting-for-parts',
  'ready',
  'beyond-repair',
  'handed-over',
  'returned-unrepaired',
];

/** What a customer is told of a step by mail; null when the step needs no letter or there is no address. */
export async function stepMail(
  db: Queryable,
  shop: Shop,
  customerId: number,
  number: string,
  stage: Stage,
): Promise<Mail | null> {
  if (!TOLD.includes(stage)) return null;
  const [customer] = await db.select().from(customers).where(eq(customers.id, customerId));
  if (!customer?.email) return null;
  return {
    to: customer.email,
    subject: `Ticket ${number}: ${CUSTOMER_HEADLINES[stage]}`,
    text: `Dear ${customer.name},

${CUSTOMER_HEADLINES[stage]}

See ticket ${number} here:
${checkAddress(shop, number)}${foot(shop)}`,
  };
}

export function shopWroteMail(
  shop: Shop,
  customer: { name: string; email: string },
  number: string,
): Mail {
  return {
    to: customer.email,
    subject: `Ticket ${number}: a message from the shop`,
    text: `Dear ${customer.name},

we wrote to you about ticket ${number}. Read and answer it here:
${checkAddress(shop, number)}${foot(shop)}`,
  };
}

export function linkMail(
  shop: Shop,
  customer: { name: string; email: string },
  token: string,
): Mail {
  return {
    to: customer.email,
    subject: `Your link to your repairs at ${shop.name}`,
    text: `Dear ${customer.name},

this link opens your repairs. It works once, for an hour:
${shop.origin}/link/${token}

If you did not ask for it, leave it: nobody gets in without it.${foot(shop)}`,
  };
}
