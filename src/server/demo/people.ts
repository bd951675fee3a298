import { and, inArray, ne } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { users } from '@/db/schema/people';
import type { StaffRole } from '@/domain/people';
import { hashPassword } from '../auth/passwords';

/** The password of every demo account; they exist in demo mode alone. */
export const DEMO_PASSWORD = 'bench-demo-2612';

export type DemoPerson = { email: string; name: string; role: StaffRole };

/** The four whose sign-ins the demo shop shows to everybody. */
export const DEMO_ACCOUNTS: readonly DemoPerson[] = [
  { email: 'counter@meterwright.example', name: 'Marit Ooster', role: 'counter' },
  { email: 'tech@meterwright.example', name: 'Joren Vaal', role: 'technician' },
  { email: 'senior@meterwright.example', name: 'Anselm Brouk', role: 'senior' },
  { email: 'owner@meterwright.example', name: 'Sietske Harrow', role: 'owner' },
];

const COLLEAGUES: readonly DemoPerson[] = [
  { email: 'ferre.lindt@meterwright.example', name: 'Ferre Lindt', role: 'counter' },
  { email: 'odile.marrant@meterwright.example', name: 'Odile Marrant', role: 'technician' },
  { email: 'tamsin.quill@meterwright.example', name: 'Tamsin Quill', role: 'technician' },
];

/**
 * Puts the demo shop's seven members of staff into the database; those already there stay as they are.
 *
 * @returns the key of each person by e-mail address.
 */
export async function seedPeople(db: Queryable, now: Date): Promise<Map<string, number>> {
  const people = [...DEMO_ACCOUNTS, ...COLLEAGUES];
  const emails = people.map(({ email }) => email);
  const known = async () =>
    new Map(
      (
        await db
          .select({ email: users.email, id: users.id })
          .from(users)
          .where(and(inArray(users.email, emails), ne(users.role, 'customer')))
      ).map(({ email, id }) => [email, id]),
    );
  const before = await known();
  const missing = people.filter(({ email }) => !before.has(email));
  if (missing.length === 0) return before;
  const rows = await Promise.all(
    missing.map(async (person) => ({
      ...person,
      passwordHash: await hashPassword(DEMO_PASSWORD),
      createdAt: now,
    })),
  );
  await db.insert(users).values(rows);
  return known();
}
