import { eq } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { customers } from '@/db/schema/shop';
import { users } from '@/db/schema/people';
import { done, refuseField, type Outcome } from '../refusal';
import { customerById, customersByEmail } from './queries';

export type NewCustomer = {
  name: string;
  email?: string | null | undefined;
  phone: string;
  address: string;
};
export type CustomerInput = { id: number } | NewCustomer;

export type IntakeCustomer = { id: number; name: string; email: string | null };

/** The customer of an intake whom the shop knows: the one chosen, else the one of this e-mail and name; null if new. */
export async function knownCustomer(
  tx: Queryable,
  input: CustomerInput,
): Promise<Outcome<IntakeCustomer | null>> {
  if ('id' in input) {
    const found = await customerById(tx, input.id);
    return found
      ? done(found)
      : refuseField('customer.id', 'There is no such customer: find one, or write a new one.');
  }
  if (!input.email) return done(null);
  const same = (await customersByEmail(tx, input.email)).find(
    (c) => c.name.toLowerCase() === input.name.toLowerCase(),
  );
  return done(same ?? null);
}

/** Writes a new customer, with the account that the claim code and the one-time link sign in to. */
export async function writeCustomer(
  tx: Queryable,
  { name, email = null, phone, address }: NewCustomer,
  now: Date,
): Promise<IntakeCustomer> {
  const [made] = await tx
    .insert(customers)
    .values({ name, email, phone: phone || null, address: address || null, createdAt: now })
    .$returningId();
  if (!made) throw new Error('The customer was not written.');
  await openAccount(tx, made.id, name, now);
  return { id: made.id, name, email };
}

/** The sign-in account of a customer: no password, and a handle instead of an e-mail. */
export async function openAccount(
  tx: Queryable,
  customerId: number,
  name: string,
  now: Date,
): Promise<void> {
  await tx.insert(users).values({
    email: `customer:${customerId}`,
    name,
    role: 'customer',
    customerId,
    createdAt: now,
  });
}

/** The account of a customer. */
export async function accountOf(db: Queryable, customerId: number): Promise<number | null> {
  const [row] = await db
    .select({ id: users.id })
    .from(users)
    .where(eq(users.customerId, customerId));
  return row?.id ?? null;
}
