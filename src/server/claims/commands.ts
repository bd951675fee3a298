/** How a customer comes in: ticket number and claim code, or a one-time link by e-mail. */
import { eq } from 'drizzle-orm';
import { inTransaction, type Database } from '@/db/client';
import { users } from '@/db/schema/people';
import { customers } from '@/db/schema/shop';
import { tickets } from '@/db/schema/tickets';
import { endClaimSessions } from '../auth/end-access';
import { takeGuess, type Asker } from '../auth/guessing';
import { rememberBrowser } from '../auth/known-browser';
import type { Limits } from '../auth/limits';
import { issueOneTime, useOneTime } from '../auth/one-time';
import { hashClaimCode, sameHash } from '../auth/secrets';
import type { SessionKeeper } from '../auth/sessions';
import { accountOf } from '../customers/commands';
import { customersByEmail } from '../customers/queries';
import { linkMail } from '../mail/letters';
import { promise } from '../outbox/commands';
import { done, refuse, type Outcome } from '../refusal';
import type { Runtime } from '../runtime';
import type { Shop } from '../tickets/types';

const wrong = () =>
  refuse(
    'invalid',
    'Ticket number and claim code don’t belong together: check both on your receipt.',
  );

/** Opens a session that sees this ticket alone. Wrong tries are counted (auth/guessing.ts). */
export async function enterByClaim(
  app: Runtime,
  input: { number: string; code: string },
  asker: Asker,
  now: Date,
): Promise<Outcome<{ cookies: string[]; number: string }>> {
  const { number } = input;
  const { secret } = app.settings;
  const door = { kind: 'claim', subject: number } as const;
  const guess = await takeGuess(app, door, asker, now);
  if (!guess.ok) return guess;
  const [ticket] = await app.db.select().from(tickets).where(eq(tickets.number, input.number));
  const given = hashClaimCode(secret, input.number, input.code);
  if (!ticket || !sameHash(ticket.claimHash, given)) return wrong();
  const account = await accountOf(app.db, ticket.customerId);
  if (account === null) throw new Error(`Customer ${ticket.customerId} has no account.`);
  await guess.value();
  const cookie = await app.sessions.open(account, ticket.id);
  // A new code made in the same instant ended the sessions before this one was there.
  const [still] = await app.db.select().from(tickets).where(eq(tickets.id, ticket.id));
  if (still?.claimHash !== ticket.claimHash) {
    await endClaimSessions(app.db, ticket.id);
    return wrong();
  }
  return done({ cookies: [cookie, rememberBrowser(app.settings, asker.request, door)], number });
}

/** Mails a one-time link to every customer with this e-mail. The answer is the same when there is none. */
export async function sendLink(
  app: { db: Database; limits: Limits },
  email: string,
  shop: Shop,
  address: string,
  now: Date,
): Promise<Outcome<null>> {
  const tooMany =
    (await app.limits.take('mail', email)) ?? (await app.limits.take('mail-address', address));
  if (tooMany) return tooMany;
  for (const customer of await customersByEmail(app.db, email)) {
    const account = await accountOf(app.db, customer.id);
    if (account === null) continue;
    await inTransaction(app.db, async (tx) => {
      const token = await issueOneTime(tx, 'link', account, now);
      const mail = linkMail(shop, { name: customer.name, email }, token);
      await promise(
        tx,
        shop.secret,
        `link:${account}:${now.getTime()}`,
        { kind: 'mail', mail },
        now,
      );
    });
  }
  return done(null);
}

/** Uses a one-time link: the session it opens sees all tickets of that customer. */
export async function enterByLink(
  app: { db: Database; sessions: SessionKeeper },
  token: string,
  now: Date,
): Promise<Outcome<{ cookie: string }>> {
  const account = await useOneTime(app.db, 'link', token, now);
  if (account === null)
    return refuse('absent', 'This link was used already or has run out: ask for a new one.');
  const [user] = await app.db
    .select({ id: users.id, disabledAt: users.disabledAt })
    .from(users)
    .innerJoin(customers, eq(customers.id, users.customerId))
    .where(eq(users.id, account));
  if (!user || user.disabledAt) return refuse('absent', 'This link no longer works.');
  return done({ cookie: await app.sessions.open(account) });
}
