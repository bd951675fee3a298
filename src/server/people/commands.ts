/** The owner's work on the staff: inviting, changing roles, disabling. Each change leaves a line in the audit log. */
import { and, eq, isNotNull, isNull, ne, or } from 'drizzle-orm';
import { inTransaction, isDuplicate, type Database, type Queryable } from '@/db/client';
import { users } from '@/db/schema/people';
import type { Invite, Person, PersonChange } from '@/contracts/people';
import { record } from '../audit/commands';
import type { Granted } from '../auth/actor';
import { endSessions, revokeTokens } from '../auth/end-access';
import { issueOneTime, voidOneTime } from '../auth/one-time';
import { newPublicId } from '../auth/secrets';
import { invitationMail } from '../mail/staff-letters';
import { promise } from '../outbox/commands';
import { absent, done, refuse, refuseField, type Outcome, type Refusal } from '../refusal';
import type { Shop } from '../tickets/types';
import { readPerson } from './queries';

type Owner = Granted<'people.manage'>;
type Asked = { requestId: string };

async function mailInvitation(
  tx: Queryable,
  actor: Owner,
  to: Pick<Person, 'id' | 'name' | 'email' | 'role'>,
  shop: Shop,
  now: Date,
): Promise<void> {
  const token = await issueOneTime(tx, 'invite', to.id, now);
  const mail = invitationMail(shop, to, actor.name, token);
  await promise(tx, shop.secret, `invite:${newPublicId()}`, { kind: 'mail', mail }, now);
}

/** Makes an account without a password and mails the link that sets one. */
export async function invitePerson(
  db: Database,
  actor: Owner,
  { name, email, role, requestId }: Invite & Asked,
  shop: Shop,
  now: Date,
): Promise<Outcome<Person>> {
  try {
    return await inTransaction(db, async (tx) => {
      const [row] = await tx
        .insert(users)
        .values({ name, email, role, createdAt: now })
        .$returningId();
      const person = row && (await readPerson(tx, row.id));
      if (!person) throw new Error('The account just made cannot be read.');
      await mailInvitation(tx, actor, person, shop, now);
      const object = `person:${person.id}`;
      const detail = { name, email, role };
      await record(tx, { actor, action: 'person.invited', object, detail, requestId }, now);
      return done(person);
    });
  } catch (error) {
    if (!isDuplicate(error)) throw error;
    return refuseField('email', 'A colleague has this address already: give another.');
  }
}

const stale = (current: Person, yours: number): Refusal =>
  refuse('stale', `${current.name} was changed meanwhile: look again, then repeat the change.`, {
    more: { yours, current },
  });

/**
 * Locks the person and all owners who can sign in until the transaction ends, so that of two owners who take each
 * other's role at once the second finds nobody left. True when an owner beside this person is left.
 */
async function lockWithOwners(tx: Queryable, id: number): Promise<boolean> {
  const owner = and(
    eq(users.role, 'owner'),
    isNull(users.disabledAt),
    isNotNull(users.passwordHash),
  );
  const rows = await tx
    .select({ id: users.id })
    .from(users)
    .where(or(owner, eq(users.id, id)))
    .for('update');
  return rows.some((row) => row.id !== id);
}

/** Changes name or role, disables or enables, takes off a second factor; only from the version that was seen. */
export async function changePerson(
  db: Database,
  actor: Owner,
  input: { id: number; version: number; change: PersonChange } & Asked,
  now: Date,
): Promise<Outcome<Person>> {
  const { id, version, change, requestId } = input;
  return inTransaction(db, async (tx) => {
    const othersLeft = await lockWithOwners(tx, id);
    const before = await readPerson(tx, id);
    if (!before) return absent('person');
    if (before.version !== version) return stale(before, version);
    const goes = change.disabled === true || (change.role ?? 'owner') !== 'owner';
    if (goes && before.role === 'owner' && before.state === 'active' && !othersLeft)
      return refuse('conflict', 'This is the last owner who can sign in: make another one first.');
    const [result] = await tx
      .update(users)
      .set({
        version: version + 1,
        ...(change.name === undefined ? {} : { name: change.name }),
        ...(change.role === undefined ? {} : { role: change.role }),
        ...(change.disabled === undefined ? {} : { disabledAt: change.disabled ? now : null }),
        ...(change.secondFactor === false ? { totpSecret: null, totpLastStep: null } : {}),
      })
      .where(and(eq(users.id, id), eq(users.version, version), ne(users.role, 'customer')));
    const after = await readPerson(tx, id);
    if (!after) return absent('person');
    if (result.affectedRows !== 1) return stale(after, version);
    if (change.disabled) {
      await endSessions(tx, id);
      await revokeTokens(tx, id, now);
      await voidOneTime(tx, 'reset', id, now);
      await voidOneTime(tx, 'invite', id, now);
    }
    if (change.secondFactor === false) await endSessions(tx, id);
    await recordChange(tx, actor, before, after, requestId, now);
    return done(after);
  });
}

async function recordChange(
  tx: Queryable,
  actor: Owner,
  before: Person,
  after: Person,
  requestId: string,
  now: Date,
): Promise<void> {
  const object = `person:${after.id}`;
  for (const [what, action] of [
    ['name', 'person.renamed'],
    ['role', 'person.role-changed'],
    ['state', after.state === 'disabled' ? 'person.disabled' : 'person.enabled'],
    ['secondFactor', 'person.second-factor-taken-off'],
  ] as const) {
    const [from, to] = [before[what], after[what]];
    if (from !== to)
      await record(tx, { actor, action, object, detail: { from, to }, requestId }, now);
  }
}

/** Mails a new invitation to somebody who has not taken up the first. */
export async function inviteAgain(
  db: Database,
  actor: Owner,
  { id, requestId }: { id: number } & Asked,
  shop: Shop,
  now: Date,
): Promise<Outcome<null>> {
  return inTransaction(db, async (tx) => {
    const person = await readPerson(tx, id);
    if (!person) return absent('person');
    if (person.state !== 'invited')
      return refuse('conflict', `${person.name} is ${person.state}: there is nothing to take up.`);
    await mailInvitation(tx, actor, person, shop, now);
    const object = `person:${id}`;
    await record(tx, { actor, action: 'person.invited-again', object, requestId }, now);
    return done(null);
  });
}
