import { asc, desc, eq, inArray, like, or, sql } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { customers, instruments, models } from '@/db/schema/shop';
import { tickets } from '@/db/schema/tickets';
import { SYMPTOMS } from '@/domain/tickets/vocabulary';
import { containing } from '../customers/queries';

const base = (db: Queryable) =>
  db
    .select({
      id: instruments.id,
      maker: models.maker,
      model: models.name,
      category: models.category,
      serial: instruments.serial,
      boardId: models.boardId,
      customerId: customers.id,
      customerName: customers.name,
    })
    .from(instruments)
    .innerJoin(models, eq(models.id, instruments.modelId))
    .innerJoin(customers, eq(customers.id, instruments.customerId));

/** Instruments by serial number or label, each with its stays in the shop, newest first. */
export async function findInstruments(db: Queryable, q: string, limit: number, offset: number) {
  const pattern = containing(q);
  const rows = await base(db)
    .where(
      q
        ? or(
            like(instruments.serial, pattern),
            like(sql`CONCAT(${models.maker}, ' ', ${models.name})`, pattern),
          )
        : undefined,
    )
    .orderBy(asc(instruments.serial), asc(instruments.id))
    .limit(limit)
    .offset(offset);
  if (rows.length === 0) return [];
  const stays = await db
    .select()
    .from(tickets)
    .where(
      inArray(
        tickets.instrumentId,
        rows.map((r) => r.id),
      ),
    )
    .orderBy(desc(tickets.receivedAt));
  return rows.map((r) => ({
    id: r.id,
    maker: r.maker,
    model: r.model,
    serial: r.serial,
    customer: { id: r.customerId, name: r.customerName },
    tickets: stays
      .filter((t) => t.instrumentId === r.id)
      .slice(0, 20)
      .map((t) => ({
        number: t.number,
        stage: t.stage,
        receivedAt: t.receivedAt.toISOString(),
        symptoms: t.symptoms.map((s) => SYMPTOMS[s]).join('; ') || t.symptomText.slice(0, 120),
      })),
  }));
}

export async function instrumentById(db: Queryable, id: number) {
  const [row] = await base(db).where(eq(instruments.id, id));
  return row ?? null;
}
