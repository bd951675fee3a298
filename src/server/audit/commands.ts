import type { Queryable } from '@/db/client';
import { audit } from '@/db/schema/people';

/** Who did it; an `Actor` is one. */
export type Doer = { id: number | null; name: string };

/** What the shop's tool does by itself, with nobody at the screen. */
export const THE_SHOP: Doer = { id: null, name: 'the shop' };

export type AuditEntry = {
  actor: Doer;
  /** What was done, as `area.deed`: `person.invited`, `fault.published`. */
  action: string;
  /** To what, as `kind:key`: `person:12`, `ticket:2612-0047`. */
  object: string;
  /** What changed, `{ role: { from, to } }` and the like. Never a secret, never a password. */
  detail?: Record<string, unknown>;
  requestId?: string | null;
};

/** Writes one line of the audit log, in the transaction of the change it tells of. */
export async function record(tx: Queryable, entry: AuditEntry, now: Date): Promise<void> {
  const { actor, action, object, detail = {}, requestId = null } = entry;
  await tx.insert(audit).values({
    at: now,
    actorId: actor.id,
    actorName: actor.name.slice(0, 120),
    action,
    object,
    detail,
    requestId,
  });
}
