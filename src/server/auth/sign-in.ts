/** Signing in by e-mail and password, and by code where a second factor is on. Answers never tell which of them exists. */
import { and, eq, isNull, ne } from 'drizzle-orm';
import { users } from '@/db/schema/people';
import type { StaffRole } from '@/domain/people';
import { record } from '../audit/commands';
import { done, refuse, type Outcome, type Refusal } from '../refusal';
import type { Runtime } from '../runtime';
import { checkPassword } from './passwords';
import { takeCode } from './totp';

/** Somebody whose password was right. */
export type Account = {
  id: number;
  name: string;
  role: StaffRole;
  passwordHash: string;
  totpSecret: string | null;
};

const columns = {
  id: users.id,
  name: users.name,
  role: users.role,
  passwordHash: users.passwordHash,
  totpSecret: users.totpSecret,
  disabledAt: users.disabledAt,
};

/** The account when it may sign in: staff, not disabled, with a password. */
export async function openAccount(
  app: Runtime,
  by: { email: string } | { id: number },
): Promise<Account | null> {
  const key = 'email' in by ? eq(users.staffEmail, by.email) : eq(users.id, by.id);
  const [row] = await app.db
    .select(columns)
    .from(users)
    .where(and(key, ne(users.role, 'customer'), isNull(users.disabledAt)));
  if (!row || row.role === 'customer' || row.passwordHash === null) return null;
  return { ...row, role: row.role, passwordHash: row.passwordHash };
}

const wrong = (): Refusal => refuse('signed-out', 'E-mail or password is wrong.');

/** The first step: the password. Wrong ones are counted for the account and for the address they come from. */
export async function checkAccount(
  app: Runtime,
  input: { email: string; password: string },
  address: string,
): Promise<Outcome<Account>> {
  const { email, password } = input;
  const { limits } = app;
  const stop =
    (await limits.take('sign-in-address', address)) ?? (await limits.take('sign-in', email));
  if (stop) return stop;
  const account = await openAccount(app, { email });
  if (!(await checkPassword(account?.passwordHash ?? null, password)) || !account) return wrong();
  await limits.giveBack('sign-in-address', address);
  await limits.clear('sign-in', email);
  return done(account);
}

const codeRefused = (message: string): Refusal =>
  refuse('signed-out', message, { errors: [{ path: 'totp', message }] });

/** The second step, for an account with a second factor: a code that was not used before. */
export async function checkCode(
  app: Runtime,
  account: Account,
  code: string | undefined,
  now: Date,
): Promise<Outcome<Account>> {
  const { id, totpSecret } = account;
  if (totpSecret === null) return done(account);
  if (code === undefined)
    return codeRefused('Your second factor is on: the six-digit code is needed too.');
  const stop = await app.limits.take('totp', String(id));
  if (stop) return stop;
  if (!(await takeCode(app.db, app.settings.secret, { id, totpSecret }, code, now)))
    return codeRefused('The code is wrong or was used: wait for the next one and type that.');
  await app.limits.clear('totp', String(id));
  return done(account);
}

/** Opens the session and ends the one that was open here before. Answers with the `Set-Cookie` value. */
export async function openSession(
  app: Runtime,
  account: Account,
  about: { formerCookie: string | undefined; requestId: string },
  now: Date,
): Promise<Outcome<string>> {
  await app.sessions.end(about.formerCookie);
  const cookie = await app.sessions.open(account.id);
  // A reset or a disabling in the same instant ended the sessions before this one was there.
  const still = await openAccount(app, { id: account.id });
  if (still?.passwordHash !== account.passwordHash || still.totpSecret !== account.totpSecret) {
    await app.sessions.endAll(account.id);
    return wrong();
  }
  await record(
    app.db,
    {
      actor: account,
      action: 'session.opened',
      object: `person:${account.id}`,
      requestId: about.requestId,
    },
    now,
  );
  return done(cookie);
}
