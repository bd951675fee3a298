import { eq } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { customers } from '@/db/schema/shop';
import { users } from '@/db/schema/people';
import { done, refuseField, type Outcome } from '../refusal';
import { customerById, customersByEmail } from './queries';

export type CustomerInput =
  { id: number } | { name: string; email?: string | undefined; phone: string; address: string };

export type IntakeCustomer = { id: number; name: string; email: string | null };

/**
 * The customer of an intake: the one chosen, else the one who already has this e-mail and name, else a new one
 * with the account that the claim code and the one-time link sign in to.
 */
export async function customerForIntake(
  tx: Queryable,
  input: CustomerInput,
  now: Date,
): Promise<Outcome<IntakeCustomer>> {
  if ('id' in input) {
    const found = await customerById(tx, input.id);
    return found
      ? done(found)
      : refuseField('customer.id', 'There is no such customer: find one, or write a new one.');
  }
  const email = input.email ?? null;
  if (email !== null) {
    const same = (await customersByEmail(tx, email)).find(
      (c) => c.name.toLowerCase() === input.name.toLowerCase(),
    );
    if (same) return done(same);
  }
  const [made] = await tx
    .insert(customers)
    .values({
      name: input.name,
      email,
      phone: input.phone || null,
      address: input.address || null,
      createdAt: now,
    })
    .$returningId();
  if (!made) throw new Error('The customer was not written.');
  await openAccount(tx, made.id, input.name, now);
  return done({ id: made.id, name: input.name, email });
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
