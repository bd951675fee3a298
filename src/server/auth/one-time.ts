/** One-time links sent by mail: a secret in the address, its hash in the table, used once and not for long. */
import { and, eq, gt, isNull } from 'drizzle-orm';
import type { Queryable } from '@/db/client';
import { oneTimeTokens } from '@/db/schema/people';
import { hashSecret, newSecret } from './secrets';

const HOUR = 3_600_000;
/** How long each kind of link works, in milliseconds. */
const LIFE = { reset: HOUR, invite: 7 * 24 * HOUR, link: HOUR } as const;
export type OneTimeKind = keyof typeof LIFE;

const live = (kind: OneTimeKind, secret: string, now: Date) =>
  and(
    eq(oneTimeTokens.tokenHash, hashSecret(secret)),
    eq(oneTimeTokens.kind, kind),
    isNull(oneTimeTokens.usedAt),
    gt(oneTimeTokens.expiresAt, now),
  );

/** Puts a person's unused links of one kind out of use. */
export async function voidOneTime(
  tx: Queryable,
  kind: OneTimeKind,
  userId: number,
  now: Date,
): Promise<void> {
  await tx
    .update(oneTimeTokens)
    .set({ usedAt: now })
    .where(
      and(
        eq(oneTimeTokens.kind, kind),
        eq(oneTimeTokens.userId, userId),
        isNull(oneTimeTokens.usedAt),
      ),
    );
}

/** The secret of a new link. Earlier unused ones of the same kind stop working. */
export async function issueOneTime(
  tx: Queryable,
  kind: OneTimeKind,
  userId: number,
  now: Date,
): Promise<string> {
  await voidOneTime(tx, kind, userId, now);
  const secret = newSecret();
  await tx.insert(oneTimeTokens).values({
    kind,
    tokenHash: hashSecret(secret),
    userId,
    expiresAt: new Date(now.getTime() + LIFE[kind]),
    createdAt: now,
  });
  return secret;
}

/** Whose link this is, without using it; null when it is unknown, used or run out. */
export async function readOneTime(
  db: Queryable,
  kind: OneTimeKind,
  secret: string,
  now: Date,
): Promise<number | null> {
  const [row] = await db
    .select({ userId: oneTimeTokens.userId })
    .from(oneTimeTokens)
    .where(live(kind, secret, now));
  return row?.userId ?? null;
}

/** Uses the link: the person's key for exactly one caller, null for everybody after. */
export async function useOneTime(
  tx: Queryable,
  kind: OneTimeKind,
  secret: string,
  now: Date,
): Promise<number | null> {
  const [result] = await tx
    .update(oneTimeTokens)
    .set({ usedAt: now })
    .where(live(kind, secret, now));
  if (result.affectedRows !== 1) return null;
  const [row] = await tx
    .select({ userId: oneTimeTokens.userId })
    .from(oneTimeTokens)
    .where(eq(oneTimeTokens.tokenHash, hashSecret(secret)));
  return row?.userId ?? null;
}
