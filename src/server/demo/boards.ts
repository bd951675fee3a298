import type { Queryable } from '@/db/client';
import { boardNets, boardParts, boards, models } from '@/db/schema/shop';
import type { DemoBoard } from './content';

/** Writes a board with its nets, parts and labels; answers its key. */
export async function writeBoard(db: Queryable, board: DemoBoard, now: Date): Promise<number> {
  const { code, revision, maker, about, positions } = board;
  const [made] = await db
    .insert(boards)
    .values({ code, revision, maker, about, positions, createdAt: now })
    .$returningId();
  if (!made) throw new Error(`Board ${code} was not written.`);
  const boardId = made.id;
  const netIds = await db
    .insert(boardNets)
    .values(board.nets.map((net, place) => ({ boardId, place, ...net })))
    .$returningId();
  const idOf = new Map(board.nets.map((net, i) => [net.name, netIds[i]?.id ?? null]));
  await db.insert(boardParts).values(
    board.parts.map(({ nets, closed, ...part }, place) => ({
      boardId,
      place,
      ...part,
      netA: nets ? (idOf.get(nets[0]) ?? null) : null,
      netB: nets ? (idOf.get(nets[1]) ?? null) : null,
      closed: closed ?? null,
    })),
  );
  await db
    .insert(models)
    .values(board.models.map((model) => ({ ...model, boardId, createdAt: now })));
  return boardId;
}
