/** Signing in by e-mail and password, and by code where a second factor is on. Answers never tell which of them exists. */
import { and, eq, isNull, ne } from 'drizzle-orm';
import { users } from '@/db/schema/people';
import type { StaffRole } from '@/domain/people';
import { record } from '../audit/commands';
import { done, refuse, type Outcome, type Refusal } from '../refusal';
import type { Runtime } from '../runtime';
import { takeGuess, type Asker } from './guessing';
import { rememberBrowser } from './known-browser';
import { tellLocked } from './locked';
import { checkPassword } from './passwords';
import { takeCode } from './totp';

/** Somebody whose password was right. */
export type Account = {
  id: number;
  name: string;
  email: string;
  role: StaffRole;
  passwordHash: string;
  totpSecret: string | null;
};

const columns = {
  id: users.id,
  name: users.name,
  email: users.email,
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

/** The first step: the password. Wrong ones are counted (guessing.ts), whether or not there is such an account. */
export async function checkAccount(
  app: Runtime,
  input: { email: string; password: string },
  asker: Asker,
  now: Date,
): Promise<Outcome<Account>> {
  const { email, password } = input;
  const guess = await takeGuess(app, { kind: 'sign-in', subject: email }, asker, now);
  if (!guess.ok) return guess;
  const account = await openAccount(app, { email });
  if (!(await checkPassword(account?.passwordHash ?? null, password)) || !account) return wrong();
  await guess.value();
  return done(account);
}

const codeRefused = (message: string): Refusal =>
  refuse('signed-out', message, { errors: [{ path: 'totp', message }] });

/** The second step, for an account with a second factor: a code that was not used before. */
export async function checkCode(
  app: Runtime,
  account: Account,
  code: string | undefined,
  asker: Asker,
  now: Date,
): Promise<Outcome<Account>> {
  const { id, totpSecret } = account;
  if (totpSecret === null) return done(account);
  if (code === undefined)
    return codeRefused('Your second factor is on: the six-digit code is needed too.');
  const { refusal, first } = await app.limits.tryTake('totp', String(id));
  if (refusal) {
    const what = 'somebody with the password, at the second factor';
    const about = { from: asker.address, what, requestId: asker.requestId };
    if (first) await tellLocked(app, { kind: 'sign-in', subject: account.email }, about, now);
    return refusal;
  }
  if (!(await takeCode(app.db, app.settings.secret, { id, totpSecret }, code, now)))
    return codeRefused('The code is wrong or was used: wait for the next one and type that.');
  await app.limits.clear('totp', String(id));
  return done(account);
}

/**
 * Opens the session and ends the one that was open here before. Answers with the `Set-Cookie` values: the session, and
 * that this browser is known at this account from now on.
 */
export async function openSession(
  app: Runtime,
  account: Account,
  about: { formerCookie: string | undefined; request: Request; requestId: string },
  now: Date,
): Promise<Outcome<string[]>> {
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
  const door = { kind: 'sign-in', subject: account.email } as const;
  return done([cookie, rememberBrowser(app.settings, about.request, door)]);
}
