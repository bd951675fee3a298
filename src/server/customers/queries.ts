import { asc, eq, like, or } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { customers } from '@/db/schema/shop';

/** A pattern for LIKE in which the typed text means itself. */
export const containing = (text: string): string => `%${text.replace(/[\\%_]/g, (c) => `\\${c}`)}%`;

const columns = {
  id: customers.id,
  name: customers.name,
  email: customers.email,
  phone: customers.phone,
  address: customers.address,
};

export async function findCustomers(db: Queryable, q: string, limit: number, offset: number) {
  const pattern = containing(q);
  const rows = db.select(columns).from(customers);
  const found = q
    ? rows.where(
        or(
          like(customers.name, pattern),
          like(customers.email, pattern),
          like(customers.phone, pattern),
        ),
      )
    : rows;
  return found.orderBy(asc(customers.name), asc(customers.id)).limit(limit).offset(offset);
}

export async function customerById(db: Queryable, id: number) {
  const [row] = await db.select(columns).from(customers).where(eq(customers.id, id));
  return row ?? null;
}

/** How a customer is reached, with the version that a correction is made from. */
export async function contactOf(db: Queryable, id: number) {
  const { email, phone, address, version } = customers;
  const [row] = await db
    .select({ email, phone, address, version })
    .from(customers)
    .where(eq(customers.id, id));
  if (!row) throw new Error(`Customer ${id} is gone.`);
  return row;
}

export async function customersByEmail(db: Queryable, email: string) {
  return db.select(columns).from(customers).where(eq(customers.email, email)).limit(5);
}
