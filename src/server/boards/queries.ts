import { and, asc, count, eq, inArray, like, or, sql } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { boardNets, boardParts, boards, models } from '@/db/schema/shop';
import { tickets } from '@/db/schema/tickets';
import { containing } from '../customers/queries';

export const boardLabel = (b: { code: string; revision: string }) => `${b.code} rev ${b.revision}`;

export async function findModels(db: Queryable, q: string, limit: number, offset: number) {
  const pattern = containing(q);
  const rows = await db
    .select({
      id: models.id,
      maker: models.maker,
      name: models.name,
      category: models.category,
      boardId: boards.id,
      code: boards.code,
      revision: boards.revision,
    })
    .from(models)
    .leftJoin(boards, eq(boards.id, models.boardId))
    .where(
      q
        ? or(
            like(models.maker, pattern),
            like(models.name, pattern),
            like(sql`CONCAT(${models.maker}, ' ', ${models.name})`, pattern),
          )
        : undefined,
    )
    .orderBy(asc(models.maker), asc(models.name))
    .limit(limit)
    .offset(offset);
  return rows.map(({ boardId, code, revision, ...m }) => ({
    ...m,
    board:
      boardId && code && revision ? { id: boardId, code: boardLabel({ code, revision }) } : null,
  }));
}

export async function listBoards(db: Queryable, q: string, limit: number, offset: number) {
  const pattern = containing(q);
  const rows = await db
    .select()
    .from(boards)
    .where(q ? or(like(boards.code, pattern), like(boards.maker, pattern)) : undefined)
    .orderBy(asc(boards.code), asc(boards.revision))
    .limit(limit)
    .offset(offset);
  if (rows.length === 0) return [];
  const ids = rows.map((b) => b.id);
  const [labels, parts, seen] = await Promise.all([
    db.select().from(models).where(inArray(models.boardId, ids)).orderBy(asc(models.maker)),
    db
      .select({ id: boardParts.boardId, n: count() })
      .from(boardParts)
      .where(inArray(boardParts.boardId, ids))
      .groupBy(boardParts.boardId),
    db
      .select({ id: tickets.boardId, n: count() })
      .from(tickets)
      .where(inArray(tickets.boardId, ids))
      .groupBy(tickets.boardId),
  ]);
  return rows.map((b) => ({
    id: b.id,
    code: b.code,
    revision: b.revision,
    maker: b.maker,
    parts: parts.find((p) => p.id === b.id)?.n ?? 0,
    labels: labels.filter((m) => m.boardId === b.id).map((m) => `${m.maker} ${m.name}`),
    tickets: seen.find((t) => t.id === b.id)?.n ?? 0,
  }));
}

export async function boardById(db: Queryable, id: number) {
  const [row] = await db.select().from(boards).where(eq(boards.id, id));
  return row ?? null;
}

/** The other labels under which a board is sold. */
export async function labelsOf(db: Queryable, boardId: number) {
  return db
    .select({ id: models.id, maker: models.maker, name: models.name })
    .from(models)
    .where(eq(models.boardId, boardId))
    .orderBy(asc(models.maker), asc(models.name));
}

/** The network of a board with its nets and all its parts, drawn into the network or not. */
export async function boardNetwork(db: Queryable, boardId: number) {
  const board = await boardById(db, boardId);
  if (!board) return null;
  const [nets, parts] = await Promise.all([
    db.select().from(boardNets).where(eq(boardNets.boardId, boardId)).orderBy(asc(boardNets.place)),
    db
      .select()
      .from(boardParts)
      .where(eq(boardParts.boardId, boardId))
      .orderBy(asc(boardParts.place)),
  ]);
  const nameOf = new Map(nets.map((n) => [n.id, n.name]));
  return {
    board,
    positions: board.positions,
    nets: nets.map(({ name, label, probe }) => ({ name, label, probe })),
    parts: parts.map((p) => {
      const a = p.netA === null ? undefined : nameOf.get(p.netA);
      const b = p.netB === null ? undefined : nameOf.get(p.netB);
      return {
        id: p.id,
        ref: p.ref,
        kind: p.kind,
        nets: a !== undefined && b !== undefined ? ([a, b] as [string, string]) : null,
        ohms: p.ohms,
        tolerance: p.tolerance,
        closed: p.closed,
        value: p.value,
        protection: p.protection,
        note: p.note,
      };
    }),
  };
}
export type BoardFile = NonNullable<Awaited<ReturnType<typeof boardNetwork>>>;

/** The board part of a reference, or null. */
export async function partOfBoard(db: Queryable, boardId: number, ref: string) {
  const [row] = await db
    .select()
    .from(boardParts)
    .where(and(eq(boardParts.boardId, boardId), eq(boardParts.ref, ref)));
  return row ?? null;
}

export async function countBoards(db: Queryable, q: string): Promise<number> {
  const pattern = containing(q);
  const [row] = await db
    .select({ n: count() })
    .from(boards)
    .where(q ? or(like(boards.code, pattern), like(boards.maker, pattern)) : undefined);
  return row?.n ?? 0;
}
