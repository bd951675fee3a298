/** API tokens of one member of staff: made, shown once, revoked by their owner. */
import { and, count, eq } from 'drizzle-orm';
import { inTransaction, type Database } from '@/db/client';
import { apiTokens, users } from '@/db/schema/people';
import type { ApiToken, NewToken } from '@/contracts/tokens';
import { scopesFor } from '@/domain/people';
import { record } from '../audit/commands';
import type { Granted } from '../auth/actor';
import { hashSecret, newSecret } from '../auth/secrets';
import { absent, done, refuse, refuseField, type Outcome } from '../refusal';
import { inUse } from './queries';

type Self = Granted<'account.own'>;

/** Tokens one person may have in use. */
export const MOST_TOKENS = 20;

/** Tokens are made and revoked by a person at a screen: a stolen token must not be able to make more of itself. */
const bySession = (actor: Self) =>
  actor.scopes === null
    ? null
    : refuse('not-allowed', 'A token may not make or revoke tokens: sign in for that.');

/** Makes a token. The answer holds it in clear, once; the table keeps its hash. */
export async function createToken(
  db: Database,
  actor: Self,
  { name, scopes, requestId }: NewToken & { requestId: string },
  now: Date,
): Promise<Outcome<ApiToken & { token: string }>> {
  const stop = bySession(actor);
  if (stop) return stop;
  const allowed = scopesFor(actor.role);
  const beyond = scopes.filter((scope) => !allowed.includes(scope));
  if (beyond.length > 0)
    return refuseField(
      'scopes',
      `${beyond.join(', ')} is beyond your role: choose from ${allowed.join(', ')}.`,
    );
  return inTransaction(db, async (tx) => {
    // One at a time for each person, so that the count holds.
    await tx.select({ id: users.id }).from(users).where(eq(users.id, actor.id)).for('update');
    const [held] = await tx.select({ n: count() }).from(apiTokens).where(inUse(actor.id));
    if ((held?.n ?? 0) >= MOST_TOKENS)
      return refuse('conflict', `You have ${MOST_TOKENS} tokens in use: revoke one first.`);
    const token = `mw_${newSecret()}`;
    const values = {
      userId: actor.id,
      name,
      hint: token.slice(0, 9),
      tokenHash: hashSecret(token),
      scopes,
      createdAt: now,
    };
    const [row] = await tx.insert(apiTokens).values(values).$returningId();
    if (!row) throw new Error('The token just made has no key.');
    const detail = { name, scopes };
    const object = `token:${row.id}`;
    await record(tx, { actor, action: 'token.made', object, detail, requestId }, now);
    const { hint } = values;
    const createdAt = now.toISOString();
    return done({ id: row.id, name, hint, scopes, createdAt, lastUsedAt: null, token });
  });
}

/** Revokes a token of one's own; one that is not is not there. */
export async function revokeToken(
  db: Database,
  actor: Self,
  { id, requestId }: { id: number; requestId: string },
  now: Date,
): Promise<Outcome<null>> {
  const stop = bySession(actor);
  if (stop) return stop;
  return inTransaction(db, async (tx) => {
    const [result] = await tx
      .update(apiTokens)
      .set({ revokedAt: now })
      .where(and(eq(apiTokens.id, id), inUse(actor.id)));
    if (result.affectedRows !== 1) return absent('token');
    await record(tx, { actor, action: 'token.revoked', object: `token:${id}`, requestId }, now);
    return done(null);
  });
}
